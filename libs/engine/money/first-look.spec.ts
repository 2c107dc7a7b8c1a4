import { describe, expect, it } from 'vitest';
import type { RequirementMonth, RequirementSummary } from '../requirement/requirement.js';
import { firstLook } from './first-look.js';

const PRICES = { perKvarh: { low: 0.01, high: 0.02 }, perKvar: { low: 30, high: 50 } };

/** 0.8 as target has tan φ = 0.75 exactly. */
function requirementOf(months: readonly [kWh: number, kvarh: number][]): RequirementSummary {
  return {
    targetPowerFactor: 0.8,
    maxKvar: 120,
    p99Kvar: 100,
    p95Kvar: 90,
    p50Kvar: 40,
    meanKvar: 45,
    intervalsInNeed: 1,
    months: months.map(([activeKwh, laggingKvarh]) => ({ activeKwh, laggingKvarh }) as RequirementMonth),
  };
}

describe('a first look at the money', () => {
  it('takes what lies beyond the target month by month: a good month does not pay for a bad one', () => {
    // 1 000 kWh allow 750 kvarh: 250 beyond in the first month, none in the second though it has 350 to spare
    const look = firstLook(
      requirementOf([
        [1000, 1000],
        [1000, 400],
      ]),
      8760,
      PRICES,
    );
    expect(look.avoidableKvarh).toBeCloseTo(250, 9);
    expect(look.saving.low).toBeCloseTo(2.5, 9);
    expect(look.saving.high).toBeCloseTo(5, 9);
  });

  it('brings a part of a year to a year', () => {
    const months: [number, number][] = [[1000, 1000]];
    expect(firstLook(requirementOf(months), 876, PRICES).avoidableKvarh).toBeCloseTo(2500, 9);
  });

  it('prices the bank from the need of 99 % to the greatest, and pairs the ends of the payback', () => {
    const { capital, paybackYears } = firstLook(requirementOf([[100_000, 175_000]]), 8760, PRICES);
    expect(capital).toEqual({ low: 3000, high: 6000 });
    // 100 000 kvarh save 1 000 to 2 000 a year
    expect(paybackYears!.low).toBeCloseTo(1.5, 9);
    expect(paybackYears!.high).toBeCloseTo(6, 9);
  });

  it('promises no payback where nothing is saved', () => {
    expect(firstLook(requirementOf([[1000, 0]]), 8760, PRICES).paybackYears).toBeNull();
  });
});
