import { describe, expect, it } from 'vitest';
import { deviationOf } from './hand-check.js';

describe('a hand check', () => {
  it.each([
    ['the same', 300, 300, 0, false],
    ['exactly 2 % above, which is not beyond', 306, 300, 2, false],
    ['exactly 2 % below, though the binary quotient is a rest above', 294, 300, 2, false],
    ['exactly 2 % of a figure no power of two divides', 0.1 * 1.02, 0.1, 2, false],
    ['a little more than 2 %', 306.1, 300, 2.0333333333333, true],
    ['the right size with the wrong sign', -300, 300, 200, true],
    ['of a negative figure', -302, -300, 0.6666666666667, false],
    ['of nothing, nothing', 0, 0, 0, false],
  ])('that is %s', (_what, value, computed, pct, isBeyond) => {
    const found = deviationOf(value, computed);
    expect(found.deviationPct).toBeCloseTo(pct, 9);
    expect(found.isBeyond).toBe(isBeyond);
  });

  it('of a figure that is 0 has no share to be told, and is beyond', () => {
    expect(deviationOf(0.1, 0)).toEqual({ deviationPct: null, isBeyond: true });
  });
});
