import { describe, expect, it } from 'vitest';
import type { Bank, StageGroup } from '../layout/bank.js';
import { type CostBasis, capitalOf } from './capital.js';
import type { PriceBook } from './papers.js';
import { runningCosts } from './running-cost.js';

const group = (count: number, ratedKvar: number, reactorPct: number): StageGroup => ({
  count,
  ratedKvar,
  ratedV: 480,
  reactorPct,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
});
const bankOf = (...groups: StageGroup[]): Bank => ({
  groups,
  interStageUh: 2,
  interStageGiven: true,
  ambientCategory: null,
});

/** The price book of the written rules, made up. */
const prices: PriceBook = {
  perKvar: 9,
  perStage: 55,
  reactors: [{ reactorPct: 7, perKvar: 11.5 }],
  installationFixed: 700,
  installationPerKvar: 2.2,
  fixed: 850,
  contingencyPct: 5,
  switches: [{ kind: 'contactor', perStage: 38, perKvar: 0.9, lifeSwitchings: 150_000, lossWPerKvar: 0.5 }],
  cabinets: [
    { name: 'wall', price: 640 },
    { name: 'floor', price: 1280 },
  ],
  maintenancePerYear: 120,
  maintenancePerStage: 14,
  lossWPerKvar: { plain: 1.8, reactor: 6.5 },
  lossPricePerKwh: 0.11,
  capacitorLifeYears: 8.5,
  replacementFactor: 1.25,
};
const cost = (rest: Partial<CostBasis> = {}): CostBasis => ({ prices, cabinets: [], switchKind: 'contactor', ...rest });

describe('capital', () => {
  it('adds up item by item, per rated kvar and per stage', () => {
    const { lines, total } = capitalOf(bankOf(group(3, 50, 7), group(1, 25, 0)), cost());
    expect(Object.fromEntries(lines.map(({ item, amount }) => [item, amount]))).toEqual({
      capacitors: 9 * 175,
      stages: 55 * 4,
      reactors: 11.5 * 150,
      switches: 38 * 4 + 0.9 * 175,
      cabinets: 0,
      installation: 700 + 2.2 * 175,
      'controller and engineering': 850,
      contingency: 0.05 * 5764.5,
    });
    expect(total).toBeCloseTo(1.05 * 5764.5, 9);
    expect(lines[3]!.working).toBe('4 · 38 + 175 · 0.9');
  });

  it('has no reactor price for a ratio that is not exactly in the book', () => {
    const { lines } = capitalOf(bankOf(group(2, 50, 7.0001)), cost());
    expect(lines.find(({ item }) => item === 'reactors')).toMatchObject({ amount: 0, working: '0' });
  });

  it.each([
    ['the one that holds it', 100, 4, { name: 'wall', maxKvar: 150, maxStages: 4 }, 640],
    ['two for the kvar', 200, 2, { name: 'wall', maxKvar: 150, maxStages: 4 }, 1280],
    ['two for the stages', 100, 5, { name: 'wall', maxKvar: 150, maxStages: 4 }, 1280],
    ['one where the kvar are exactly its own', 150, 3, { name: 'wall', maxKvar: 150, maxStages: 4 }, 640],
  ])('takes %s of one cabinet kind', (_why, kvar, stages, cabinet, amount) => {
    const { lines } = capitalOf(bankOf(group(stages, kvar / stages, 0)), cost({ cabinets: [cabinet] }));
    expect(lines.find(({ item }) => item === 'cabinets')!.amount).toBe(amount);
  });

  it('takes fewer cabinets where the price is the same', () => {
    const cabinets = [
      { name: 'wall', maxKvar: 150, maxStages: 4 },
      { name: 'floor', maxKvar: 400, maxStages: 12 },
    ];
    // two at 640 or one at 1 280
    const { lines } = capitalOf(bankOf(group(6, 50, 0)), cost({ cabinets }));
    expect(lines.find(({ item }) => item === 'cabinets')).toMatchObject({ amount: 1280, working: '1 · 1280' });
  });

  it('is 0 throughout where the book is empty', () => {
    const { total, lines } = capitalOf(bankOf(group(2, 50, 7)), cost({ prices: {} }));
    expect(total).toBe(0);
    expect(lines).toHaveLength(8);
  });
});

describe('running costs', () => {
  const use = {
    validHours: 2190, // a quarter of a year
    connectedHours: Float64Array.from([1000, 500]),
    stageKvar: Float64Array.from([40, 40]),
    switchings: Int32Array.from([5000, 0]),
  };

  it('take losses and switchings up to a year', () => {
    const running = runningCosts(bankOf(group(2, 50, 7)), prices, use, { switchKind: 'contactor', horizonYears: 10 });
    // 4 · 1 500 h · 40 kvar · (6.5 + 0.5) W/kvar
    expect(running.lossKwhPerYear).toBeCloseTo(4 * 1500 * 40 * 7 * 1e-3, 9);
    expect(running.lossPerYear).toBeCloseTo(1680 * 0.11, 9);
    expect(running.switchingsPerYear).toBe(20_000);
    expect(running.maintenancePerYear).toBe(148);
    // 150 000 / 20 000 = 7.5 years for the first switch; the second is never switched; capacitors after 8.5 years
    expect(running.replacements).toEqual([
      { month: 90, amount: (38 + 0.9 * 50) * 1.25 },
      { month: 102, amount: 9 * 100 * 1.25 },
    ]);
  });

  it('count a plain stage by its own losses', () => {
    const running = runningCosts(bankOf(group(1, 50, 7), group(1, 50, 0)), prices, use, {
      switchKind: null,
      horizonYears: 10,
    });
    expect(running.lossKwhPerYear).toBeCloseTo(4 * 40 * (1000 * 6.5 + 500 * 1.8) * 1e-3, 9);
  });
});
