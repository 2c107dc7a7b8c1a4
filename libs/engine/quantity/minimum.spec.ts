import { describe, expect, it } from 'vitest';
import { goldenMinimum, increasingZero } from './minimum.js';

describe('golden section', () => {
  it.each([
    [(x: number) => (x - 3) ** 2, 0, 10, 3, 'a parabola'],
    [(x: number) => Math.abs(x - 0.25), 0, 1, 0.25, 'a valley with a corner'],
    [(x: number) => x, 2, 5, 2, 'a slope: the lower end'],
    [(x: number) => -x, 2, 5, 5, 'a slope the other way: the upper end'],
  ])('%#: finds the least value (%s)', (f, low, high, place) => {
    expect(Math.abs(goldenMinimum(f, low, high, 1e-6) - place)).toBeLessThan(1e-6);
  });
});

describe('zero by halving', () => {
  it.each([
    [(x: number) => x - 0.3, 0, 1, 0.3, 'a line'],
    [(x: number) => x ** 3 - 2, 0, 2, Math.cbrt(2), 'a curve'],
    [(x: number) => (x < 0.7 ? -1 : 1), 0, 1, 0.7, 'a step'],
  ])('%#: finds where the sign turns (%s)', (f, low, high, place) => {
    expect(increasingZero(f, low, high, 1e-12)).toBeCloseTo(place, 11);
  });

  it('ends at neighbouring numbers where the width asked for is below them', () => {
    expect(increasingZero((x) => x - 1e9, 0, 2e9, 0)).toBeCloseTo(1e9, 6);
  });
});
