import type { Duty, EstimateOutcome, Outcome, Remark } from '#libs/engine/index.js';
import { dutyName } from './figure-words.js';
import { formatApart, formatQuantity, GAP } from './format-number.js';
import { FINDING_LEVELS, type FindingLevel } from './message.js';
import { messageOf, remarkConsequence, remarkSubject } from './remark-words.js';

/** Something a reviewer has to know, with what it rests on and what follows. */
export interface Finding {
  level: FindingLevel;
  what: string;
  /** with its unit, empty where there is none */
  value: string;
  limit: string;
  source: string;
  consequence: string;
}

/**
 * The findings of an outcome, gravest first: reasons of the verdict, notes of the record, rows that have no limit.
 * @param outcome the plan or judgement
 * @returns findings in the order of their four levels
 */
export function findings({ result }: Outcome | EstimateOutcome): Finding[] {
  const all = [
    ...result.reasons.map(remarkFinding),
    ...notJudgedFinding(result.duties),
    ...(result.record?.notes ?? []).map(remarkFinding),
  ];
  return FINDING_LEVELS.flatMap((level) => all.filter((finding) => finding.level === level));
}

/**
 * How many findings stand at each level, in words.
 * @param list findings
 * @returns "one blocks issue, two to be accepted"
 */
export function findingCount(list: readonly Finding[]): string {
  const parts = FINDING_LEVELS.flatMap((level) => {
    const count = list.filter((finding) => finding.level === level).length;
    return count === 0 ? [] : [`${countWord(count)} ${level === 'blocks issue' && count > 1 ? 'block issue' : level}`];
  });
  return parts.length === 0 ? 'none' : parts.join(', ');
}

const WORDS = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve'];

/**
 * A small count as a word.
 * @param count 0 or more
 * @returns a word to twelve, then figures
 */
export function countWord(count: number): string {
  return WORDS[count] ?? String(count);
}

function remarkFinding(remark: Remark): Finding {
  const { value, limit } = remark.values;
  const unit = remark.unit ?? '';
  const shown = { value: '', limit: '' };
  if (typeof value === 'number' && typeof limit === 'number') {
    const apart = formatApart(value, limit);
    shown.value = `${apart.value}${GAP}${unit}`;
    shown.limit = `${apart.limit}${GAP}${unit}`;
  } else if (typeof value === 'number') shown.value = formatQuantity(value, unit, 'given');
  return {
    level: messageOf(remark.code)?.level ?? 'to be noted',
    what: remarkSubject(remark),
    ...shown,
    source: remark.source ?? '',
    consequence: remarkConsequence(remark),
  };
}

function notJudgedFinding(duties: readonly Duty[]): Finding[] {
  const open = duties.filter(({ verdict }) => verdict === null);
  if (open.length === 0) return [];
  const names = open.map(dutyName).join('; ');
  return [
    {
      level: 'to be noted',
      what: `${open.length === 1 ? 'One row is' : `${countWord(open.length)} rows are`} not judged: ${names}.`.replace(
        /^./,
        (c) => c.toUpperCase(),
      ),
      value: '',
      limit: '',
      source: '',
      consequence: 'Give the missing limit or the missing loads, or judge by hand.',
    },
  ];
}
