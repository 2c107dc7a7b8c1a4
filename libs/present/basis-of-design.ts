import type { BankOutcome, RuleSet } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { words } from './language.js';

/** A document the plan rests on. */
export interface Basis {
  rule: string;
  edition: string;
  usedFor: string;
}

export const RULE_SET_WORDS: Record<RuleSet, string> = words({ iec: 'IEC rules', ieee: 'IEEE rules' });

/** Documents used whatever the duties are. */
const ALWAYS: Record<RuleSet, Basis[]> = words({
  iec: [
    { rule: 'IEC TR 61000-3-6', edition: 'summation exponents', usedFor: 'adding distorting loads and background' },
    { rule: 'common practice', edition: 'no source', usedFor: 'controller, resonance distance, fuse range' },
  ],
  ieee: [
    { rule: 'IEC TR 61000-3-6', edition: 'summation exponents', usedFor: 'adding distorting loads and background' },
    { rule: 'NEC', edition: 'article 460', usedFor: 'discharge, conductors and disconnector' },
    { rule: 'common practice', edition: 'no source', usedFor: 'controller, resonance distance, fuse range' },
  ],
});

/** What a rule set names besides its duties. */
const ALSO: Record<string, string[]> = words({ 'IEC 60831-1:2014': ['discharge', 'conductors and disconnector'] });

/**
 * Every document the plan was judged by, with its edition and what it was used for.
 * @param outcome the plan or judgement
 * @returns rows in the order of the duties
 */
export function basisOfDesign(outcome: BankOutcome): Basis[] {
  const { duties } = outcome.result;
  const bySource = new Map<string, Set<string>>();
  for (const { source, name } of duties) {
    if (source === '') continue;
    if (!bySource.has(source)) bySource.set(source, new Set());
    bySource.get(source)!.add(name);
  }
  const rows = [...bySource].map(([source, names]) => {
    const [rule, edition] = splitEdition(source);
    return {
      rule: engineName(rule),
      edition: engineName(edition),
      usedFor: [...[...names].map(engineName), ...(ALSO[source] ?? [])].join(', '),
    };
  });
  return [...rows, ...ALWAYS[outcome.site.rules]];
}

/** "IEC 60831-1:2014" and "IEEE 18-2012" part at the year; what follows the year stays with it. */
function splitEdition(source: string): [string, string] {
  const parts = /^(.*?)[:-](\d{4}.*)$/.exec(source);
  return parts === null ? [source, ''] : [parts[1]!, parts[2]!];
}
