import { say } from './language.js';

/**
 * Why a bank is judged again, where it is held beside a revision.
 * @param revision number of the proposal and of its revision
 * @returns a sentence
 */
export function againWords({ number, revision }: { number: string; revision: number }): string {
  return say`Judged again beside ${number}, revision ${revision}.`;
}
