import { describe, expect, it } from 'vitest';
import type { Bank, StageGroup } from '../layout/bank.js';
import { stageAdmittance, stageBranch } from './stage-admittance.js';
import { bankStates, kindShares, stageKinds } from './stage-kinds.js';

const group = (more: Partial<StageGroup>): StageGroup => ({
  count: 1,
  ratedKvar: 25,
  ratedV: 480,
  reactorPct: 7,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
  ...more,
});
const bankOf = (...groups: StageGroup[]): Bank => ({
  groups,
  interStageUh: 2,
  interStageGiven: false,
  ambientCategory: null,
});
const vectors = (...rows: number[][]): Int32Array[] => rows.map((row) => Int32Array.from(row));

describe('kinds of stages', () => {
  const mixed = bankOf(
    group({}),
    group({ ratedKvar: 50 }),
    group({ reactorPct: 14 }),
    group({ ratedV: 525 }),
    group({ reactorQuality: 60 }),
    group({ reactorPct: 0 }),
    group({ reactorPct: 0, reactorQuality: 60, ratedKvar: 10 }),
  );

  it('are told apart by ratio and quality, plain ones by neither', () => {
    expect(stageKinds(mixed).kindOf).toEqual([0, 0, 1, 0, 2, 3, 3]);
  });

  it('give the admittance of the bank in every corner', () => {
    const kinds = stageKinds(mixed);
    const ordersH = Float64Array.of(1, 3.7, 5, 11.2, 49);
    const vector = Int32Array.of(1, 1, 1, 1, 1, 1, 1);
    const shares = kindShares(kinds, vector);
    for (const factors of [
      { capacitanceFactor: 1, inductanceFactor: 1 },
      { capacitanceFactor: 0.95, inductanceFactor: 1.03 },
    ]) {
      const at = (of: StageGroup) => stageAdmittance(stageBranch(of, factors, 0.5), ordersH);
      const sum = (of: readonly StageGroup[], counts: ArrayLike<number>, part: 're' | 'im', i: number): number =>
        of.reduce((total, each, g) => total + counts[g]! * at(each)[part][i]!, 0);
      for (const i of ordersH.keys()) {
        for (const part of ['re', 'im'] as const) {
          const expected = sum(mixed.groups, vector, part, i);
          expect(sum(kinds.first, shares, part, i)).toBeCloseTo(expected, 12);
        }
      }
    }
  });
});

describe('electrical states', () => {
  it('take count vectors with the same sum of one kind together, and say which groups may be in', () => {
    const kinds = stageKinds(bankOf(group({}), group({}), group({ ratedKvar: 50 })));
    const states = bankStates(kinds, vectors([0, 0, 1], [0, 1, 0], [1, 0, 0], [1, 1, 0]));
    expect(states.map(({ vector }) => [...vector])).toEqual([
      [0, 0, 1],
      [0, 1, 0],
    ]);
    expect(states.map(({ connected }) => [...connected])).toEqual([
      [1, 1, 1],
      [1, 1, 0],
    ]);
  });

  it('control: keep apart what the network tells apart', () => {
    const kinds = stageKinds(bankOf(group({}), group({ reactorPct: 14 })));
    expect(bankStates(kinds, vectors([0, 1], [1, 0], [1, 1]))).toHaveLength(3);
  });
});
