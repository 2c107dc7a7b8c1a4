import { describe, expect, it } from 'vitest';
import { percentile } from './percentile.js';

describe('percentile', () => {
  it.each([
    [[7], 0.99, 7, 'one value is all of them'],
    [[1, 2, 3, 4, 5], 0.5, 3, 'the middle one of five'],
    [[1, 2, 3, 4], 0.5, 2.5, 'half way between the middle two of four'],
    [[0, 100], 0.99, 99, 'position (n−1)·p, in a straight line'],
    [[0, 10, 20], 0.75, 15, 'half way from the second to the third'],
    [[1, 2, 3], 0, 1, 'the least'],
    [[1, 2, 3], 1, 3, 'the greatest'],
  ])('of %j at %d is %d: %s', (ascending, share, value) => {
    expect(percentile(ascending, share)).toBe(value);
  });

  it('of nothing is a fault', () => {
    expect(() => percentile([], 0.5)).toThrow('empty');
  });
});
