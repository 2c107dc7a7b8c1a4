import { describe, expect, it } from 'vitest';
import { meetsTarget, nearestLevelIndex, type OperationMonth } from './operation.js';

const month = (powerFactorLagging: number | null): OperationMonth => ({
  month: '2025-01',
  powerFactorLagging,
  activeKwh: 1,
  laggingKvarh: 0,
  leadingKvarh: 0,
});

describe('the target', () => {
  it.each([
    [[0.96, 0.95], true, 'in every month, the edge included'],
    [[0.99, 0.9499], false, 'missed in one'],
    [[0.95 * (1 - 1e-13)], true, 'a rounding below is none'],
    [[null, 0.97], true, 'a month without energy meets every target'],
    [[], true, 'no month misses it'],
  ] as [(number | null)[], boolean, string][])('of 0.95 by %j: %s, %s', (factors, met, _why) => {
    expect(meetsTarget(factors.map(month), 0.95)).toBe(met);
  });
});

describe('the level nearest to a connected kvar', () => {
  const levels = [0, 25, 50, 100].map((levelKvar) => ({ levelKvar, vectors: [] }));

  it.each([
    [-5, 0],
    [0, 0],
    [12.4, 0],
    [12.6, 1],
    [25.0000001, 1],
    [74.9, 2],
    [75.1, 3],
    [1e6, 3],
  ])('%d is level %d', (kvar, index) => {
    expect(nearestLevelIndex(levels, kvar)).toBe(index);
  });
});
