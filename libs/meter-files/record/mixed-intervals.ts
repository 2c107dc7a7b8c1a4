import type { Problem } from '#libs/engine/index.js';

/**
 * The problem of a row whose interval is not that of the others.
 * @param row row of the file, counted from 1
 * @param expectedS interval of the other rows [s]
 * @param foundS interval of this one [s]
 */
export function mixedIntervals(row: number, expectedS: number, foundS: number): Problem {
  return { code: 'mixed-intervals', row, expected: `an interval of ${expectedS} s`, found: `${foundS} s`, unit: 's' };
}
