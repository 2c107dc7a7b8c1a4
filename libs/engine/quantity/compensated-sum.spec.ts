import { describe, expect, it } from 'vitest';
import { compensatedSum, Total } from './compensated-sum.js';

describe('compensated sum', () => {
  it.each([
    [[], 0, 'nothing'],
    [[0.1, 0.2, 0.3], 0.6, 'the nearest number to the exact sum, which a plain sum misses'],
    [[1e16, 1, -1e16], 1, 'a small term between two that cancel'],
    [[1, 1e16, 1, -1e16], 2, 'small terms before and after the large one'],
    [[-0.1, -0.2], -0.30000000000000004, 'negative terms, rounded once'],
  ])('of %j is %d: %s', (values, sum) => {
    expect(compensatedSum(values)).toBe(sum);
    const total = new Total();
    for (const value of values) total.add(value);
    expect(total.value).toBe(sum);
  });

  it('of a year of tenths is exact, where a plain sum drifts', () => {
    const year = new Float64Array(35_040).fill(0.1);
    expect(compensatedSum(year)).toBe(3504);
    expect(year.reduce((sum, value) => sum + value, 0)).not.toBe(3504);
  });
});
