import { describe, expect, it } from 'vitest';
import type { StageGroup } from '../layout/bank.js';
import { switchedBank } from './switched-bank.js';

const group = (count: number, ratedKvar: number, more: Partial<StageGroup> = {}): StageGroup => ({
  count,
  ratedKvar,
  ratedV: 400,
  reactorPct: 0,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
  ...more,
});

const seen = (...groups: StageGroup[]) =>
  switchedBank({ groups, interStageUh: 2, interStageGiven: true, ambientCategory: null }, 400);

describe('a bank as its controller sees it', () => {
  it('has its sizes largest first, stages counted through the groups', () => {
    const { classes, smallestKvar, stageCount } = seen(group(2, 10), group(3, 20));
    expect(classes.map(({ kvar, stages }) => [Math.round(kvar), [...stages]])).toEqual([
      [20, [2, 3, 4]],
      [10, [0, 1]],
    ]);
    expect(smallestKvar).toBeCloseTo(10, 9);
    expect(stageCount).toBe(5);
  });

  it('takes stages of equal effective kvar for one size, whatever their nameplates', () => {
    // 50 kvar at 400 V, and 78.125 kvar at 500 V: the same on a 400 V bus.
    expect(seen(group(1, 50), group(1, 78.125, { ratedV: 500 })).classes).toHaveLength(1);
    expect(seen(group(1, 50), group(1, 50.0001)).classes).toHaveLength(2);
  });

  it('leaves out what is never switched, and counts it as always in', () => {
    const { classes, fixedKvar, smallestKvar, stageCount } = seen(group(2, 5, { fixed: true }), group(1, 20));
    expect(classes.map(({ stages }) => [...stages])).toEqual([[2]]);
    expect(fixedKvar).toBeCloseTo(10, 9);
    expect(smallestKvar).toBeCloseTo(20, 9);
    expect(stageCount).toBe(3);
  });

  it('without a switchable stage has no size and nothing to decide', () => {
    expect(seen(group(2, 5, { fixed: true }))).toMatchObject({ classes: [], smallestKvar: 0 });
    expect(seen()).toMatchObject({ classes: [], stageCount: 0, fixedKvar: 0 });
  });
});
