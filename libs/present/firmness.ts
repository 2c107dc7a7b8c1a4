import type { Robustness, StandingRange } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatNumber, GAP } from './format-number.js';
import { say, words } from './language.js';
import { verdictWords } from './verdict-words.js';

/** How firm the verdict is, in one line. */
export function firmnessFinding({ ranges }: Robustness): string {
  const moved = ranges.filter(({ lowFactor, highFactor }) => lowFactor !== null || highFactor !== null);
  if (moved.length === 0) return say`The verdict stands over every range that was tried`;
  return say`The verdict changes with ${moved.map(({ quantity }) => engineName(quantity)).join(', ')}`;
}

/** Names of the columns of `firmnessRows`. */
export const FIRMNESS_HEADS = words(['moved', 'stands down to', 'stands up to'] as const);

/**
 * How far each quantity may move, times its own value, before the verdict is another one.
 * @returns a row of three cells a quantity
 */
export function firmnessRows({ ranges }: Robustness): string[][] {
  return ranges.map(({ quantity, ...range }) => [
    engineName(quantity),
    endWords(range.lowFactor, range.leastTried, range.verdictBelow),
    endWords(range.highFactor, range.mostTried, range.verdictAbove),
  ]);
}

function endWords(factor: number | null, tried: number, beyond: StandingRange['verdictBelow']): string {
  const times = (value: number) => `×${GAP}${formatNumber(value)}`;
  if (factor === null) return say`${times(tried)}, as far as tried`;
  return say`${times(factor)}, beyond it ${verdictWords(beyond)}`;
}
