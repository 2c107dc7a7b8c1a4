import type { Duty, Verdict } from '#libs/engine/index.js';
import { say, words } from './language.js';

/** The verdict as a person reads it. */
export const VERDICT_WORDS: Record<Verdict, string> = words({
  clear: 'within limits',
  watch: 'near a limit',
  avoid: 'over a limit',
});

/** What stands where a row has no limit. */
export function notJudged(): string {
  return say`not judged`;
}

/** Stands once on every paper. */
export function noPermission(): string {
  return say`That no computed limit was passed is not permission to energise.`;
}

/**
 * The verdict of one row in words.
 * @param verdict null where the row has no limit
 * @returns words for people
 */
export function verdictWords(verdict: Verdict | null): string {
  return verdict === null ? notJudged() : VERDICT_WORDS[verdict];
}

/** How many rows were held against a limit, and how they came out. */
export interface DutyCount {
  judged: number;
  notJudged: number;
  clear: number;
  watch: number;
  avoid: number;
}

/**
 * Counts the duty rows by verdict.
 * @param duties every row of the result
 * @returns counts; judged = clear + watch + avoid
 */
export function countDuties(duties: readonly Duty[]): DutyCount {
  const count: DutyCount = { judged: 0, notJudged: 0, clear: 0, watch: 0, avoid: 0 };
  for (const { verdict } of duties) {
    if (verdict === null) count.notJudged++;
    else {
      count.judged++;
      count[verdict]++;
    }
  }
  return count;
}
