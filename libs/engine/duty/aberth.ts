import { type ComplexNumber, cAbs, cDivide, cSubtract } from '../quantity/complex-number.js';

const ONE: ComplexNumber = { re: 1, im: 0 };
const MOST_ITERATIONS = 200;
const ROOT_SHARE = 1e-13;

/**
 * Roots of a polynomial by simultaneous iteration: Newton's step −1/(N'/N), the other roots pushing it away.
 * @param guesses one a root, no two alike; improved in place
 * @param logSlope N'/N of the polynomial
 * @returns the same list
 * @source aberth-1973
 */
export function improvedRoots(
  guesses: ComplexNumber[],
  logSlope: (s: ComplexNumber) => ComplexNumber,
): ComplexNumber[] {
  for (let round = 0; round < MOST_ITERATIONS; round++) {
    let moved = 0;
    for (let k = 0; k < guesses.length; k++) moved = Math.max(moved, improve(guesses, k, logSlope));
    if (moved < ROOT_SHARE) break;
  }
  return guesses;
}

function improve(roots: ComplexNumber[], k: number, logSlope: (s: ComplexNumber) => ComplexNumber): number {
  const s = roots[k]!;
  let pull = logSlope(s);
  for (let other = 0; other < roots.length; other++) {
    if (other !== k) pull = cSubtract(pull, cDivide(ONE, cSubtract(s, roots[other]!)));
  }
  const step = cDivide(ONE, pull);
  if (!Number.isFinite(step.re) || !Number.isFinite(step.im)) return 0;
  roots[k] = cSubtract(s, step);
  return cAbs(step) / cAbs(roots[k]);
}
