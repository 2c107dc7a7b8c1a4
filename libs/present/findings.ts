import type { Duty, EstimateResult, Remark, Result, Verdict } from '#libs/engine/index.js';
import { remark } from '#libs/engine/index.js';
import { effectWords } from './effect-words.js';
import { engineName } from './engine-name.js';
import { dutyName } from './figure-words.js';
import { formatApart, formatQuantity, GAP } from './format-number.js';
import { say, words } from './language.js';
import { FINDING_LEVELS, type FindingLevel } from './message.js';
import { messageOf, remarkConsequence, remarkSubject } from './remark-words.js';

/** Something a reviewer has to know, with what it rests on and what follows. */
export interface Finding {
  /** code and place, unlike that of every other finding of the result */
  id: string;
  level: FindingLevel;
  code: string;
  /** path into the site file of the field it concerns */
  path: string | null;
  what: string;
  value: number | null;
  limit: number | null;
  /** of value and limit */
  unit: string;
  /** empty where there is none */
  source: string;
  consequence: string;
}

/** A result before or after its words were filled in. */
interface Judged {
  result: Result | EstimateResult;
}

/**
 * The findings of an outcome, gravest first, in four strict levels. What is over a limit, a record that supports no bank and
 * a plan outside what was computed block issue; what is near a limit, every assumption that would turn the verdict and every
 * one that rests on stale papers has to be accepted, each by itself; notes of the record and rows without a limit are to be noted; the rest informs.
 * @param judged the plan or judgement
 * @returns findings in the order of their levels, each with an id of its own
 */
export function findings({ result }: Judged): Finding[] {
  const all = [
    ...result.reasons.map(remarkFinding),
    ...result.assumptions.flatMap(assumptionFinding),
    ...notJudgedFinding(result.duties),
    ...(result.record?.notes ?? []).map(remarkFinding),
  ];
  const complete = [...verdictFinding(result.verdict, all), ...all];
  return apart(FINDING_LEVELS.flatMap((level) => complete.filter((finding) => finding.level === level)));
}

/**
 * Whether nothing but a draft may be made of a plan.
 * @param list its findings
 * @returns those that block issue
 */
export function blocking(list: readonly Finding[]): Finding[] {
  return list.filter(({ level }) => level === 'blocks issue');
}

/**
 * How many findings stand at each level, in words.
 * @param list findings
 * @returns "one blocks issue, two to be accepted"
 */
export function findingCount(list: readonly Finding[]): string {
  const parts = FINDING_LEVELS.flatMap((level) => {
    const count = list.filter((finding) => finding.level === level).length;
    return count === 0
      ? []
      : [
          level === 'blocks issue' && count > 1
            ? say`${countWord(count)} block issue`
            : `${countWord(count)} ${levelWords(level)}`,
        ];
  });
  return parts.length === 0 ? say`none` : parts.join(', ');
}

/**
 * Value and limit of a finding as they are printed: with more digits where rounding would hide that they differ.
 * @param finding with numbers
 * @returns both with their unit, empty where there is none
 */
export function findingNumbers({ value, limit, unit }: Finding): { value: string; limit: string } {
  if (value === null) return { value: '', limit: '' };
  if (limit === null) return { value: formatQuantity(value, unit, 'given'), limit: '' };
  const shown = formatApart(value, limit);
  return { value: `${shown.value}${GAP}${unit}`.trim(), limit: `${shown.limit}${GAP}${unit}`.trim() };
}

const LEVELS: Record<FindingLevel, string> = words({
  'blocks issue': 'blocks issue',
  'to be accepted': 'to be accepted',
  'to be noted': 'to be noted',
  information: 'information',
});

/**
 * A level of findings as it is printed.
 * @param level in the catalogue
 */
export function levelWords(level: FindingLevel): string {
  return LEVELS[level];
}

const WORDS = words([
  'no',
  'one',
  'two',
  'three',
  'four',
  'five',
  'six',
  'seven',
  'eight',
  'nine',
  'ten',
  'eleven',
  'twelve',
]);

/**
 * A small count as a word.
 * @param count 0 or more
 * @returns a word to twelve, then figures
 */
export function countWord(count: number): string {
  return WORDS[count] ?? String(count);
}

function remarkFinding(said: Remark): Finding {
  const { value, limit } = said.values;
  return {
    id: idOf(said),
    level: messageOf(said.code)?.level ?? 'to be noted',
    code: said.code,
    path: said.path,
    what: remarkSubject(said),
    value: typeof value === 'number' ? value : null,
    limit: typeof value === 'number' && typeof limit === 'number' ? limit : null,
    unit: said.unit ?? '',
    source: said.source === 'practice' ? say`common practice` : engineName(said.source ?? ''),
    consequence: remarkConsequence(said),
  };
}

/** An assumption that would turn the verdict is accepted, and so is one that the catalogue wants accepted, stale prices say. */
function assumptionFinding(assumption: Remark): Finding[] {
  if (assumption.effect?.changesVerdict === true) return [turningFinding(assumption)];
  return messageOf(assumption.code)?.level === 'to be accepted' ? [remarkFinding(assumption)] : [];
}

/** An assumption that would turn the verdict, had it been another value that practice meets. */
function turningFinding(assumption: Remark): Finding {
  const { effect } = assumption;
  return {
    ...remarkFinding(assumption),
    level: 'to be accepted',
    value: null,
    limit: null,
    unit: '',
    consequence: `${effect === null ? '' : `${effectWords(effect)}. `}${remarkConsequence(assumption)}`,
  };
}

/** The verdict itself, where nothing that was found says it. */
function verdictFinding(verdict: Verdict, found: readonly Finding[]): Finding[] {
  const has = (...levels: FindingLevel[]) => found.some(({ level }) => levels.includes(level));
  if (verdict === 'avoid' && !has('blocks issue')) return [remarkFinding(remark('verdict.avoid'))];
  if (verdict === 'watch' && !has('blocks issue', 'to be accepted')) return [remarkFinding(remark('verdict.watch'))];
  return [];
}

function notJudgedFinding(duties: readonly Duty[]): Finding[] {
  const open = duties.filter(({ verdict }) => verdict === null);
  if (open.length === 0) return [];
  return [remarkFinding(remark('limit.notJudged', { rows: open.length, duties: open.map(dutyName).join('; ') }))];
}

/** Values that say where a remark stands, not how much it found. */
const PLACES = [
  'duty',
  'device',
  'group',
  'orderH',
  'presentOrderH',
  'levelKvar',
  'quantity',
  'bus',
  'capacitors',
  'name',
  'register',
  'of',
];

function idOf({ code, path, values }: Remark): string {
  const place = PLACES.flatMap((key) => (values[key] === undefined ? [] : [String(values[key])]));
  return [code, ...(path === null ? [] : [path]), ...place].join(':');
}

/** The second and third of equal ids are counted. */
function apart(list: readonly Finding[]): Finding[] {
  const seen = new Map<string, number>();
  return list.map((finding) => {
    const count = (seen.get(finding.id) ?? 0) + 1;
    seen.set(finding.id, count);
    return count === 1 ? finding : { ...finding, id: `${finding.id}:${count}` };
  });
}
