import type { Robustness, StandingRange } from '#libs/engine/index.js';
import { formatNumber, GAP } from './format-number.js';
import { verdictWords } from './verdict-words.js';

/** How firm the verdict is, in one line. */
export function firmnessFinding({ ranges }: Robustness): string {
  const moved = ranges.filter(({ lowFactor, highFactor }) => lowFactor !== null || highFactor !== null);
  if (moved.length === 0) return 'The verdict stands over every range that was tried';
  return `The verdict changes with ${moved.map(({ quantity }) => quantity).join(', ')}`;
}

/** Names of the columns of `firmnessRows`. */
export const FIRMNESS_HEADS = ['moved', 'stands down to', 'stands up to'] as const;

/**
 * How far each quantity may move, times its own value, before the verdict is another one.
 * @returns a row of three cells a quantity
 */
export function firmnessRows({ ranges }: Robustness): string[][] {
  return ranges.map(({ quantity, ...range }) => [
    quantity,
    endWords(range.lowFactor, range.leastTried, range.verdictBelow),
    endWords(range.highFactor, range.mostTried, range.verdictAbove),
  ]);
}

function endWords(factor: number | null, tried: number, beyond: StandingRange['verdictBelow']): string {
  const times = (value: number) => `×${GAP}${formatNumber(value)}`;
  if (factor === null) return `${times(tried)}, as far as tried`;
  return `${times(factor)}, beyond it ${verdictWords(beyond)}`;
}
