import type { Figure } from '#libs/engine/index.js';

/** Lines of a hand check, at most. */
const MOST_ROWS = 10;

/**
 * The few decisive figures to be worked again by hand: fault level, one stage of each group, bank, tuned order, parallel
 * resonance.
 * @param figures of a result, in words
 * @returns at most ten, no working twice
 */
export function handChecked(figures: readonly Figure[]): Figure[] {
  const wanted = [
    /^network\.shortCircuitMva$/,
    /^bank\.group\[\d+\]\.effectiveKvar$/,
    /^bank\.effectiveKvar$/,
    /^bank\.group\[\d+\]\.tunedOrderH$/,
    /^network\.parallelOrderClosedFormH$/,
  ];
  const found = wanted.flatMap((pattern) => figures.filter(({ id }) => pattern.test(id)));
  const distinct = found.filter(({ working }, at) => found.findIndex((other) => other.working === working) === at);
  if (distinct.length <= MOST_ROWS) return distinct;
  const single = (id: string) => !/\[[1-9]\d*\]/.test(id);
  return distinct.filter(({ id }) => single(id)).slice(0, MOST_ROWS);
}
