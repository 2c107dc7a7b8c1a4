// Rated current and fault current by I = S/(√3·U); least impedances by IEC 60076-5, table 1 (memory); the rest is practice.
import { describe, expect, it } from 'vitest';
import type { SettledTransformer, Supply } from './supply.js';
import { unusualSupply } from './unusual-supply.js';

const PLAIN: SettledTransformer = {
  ratedKva: 1000,
  impedancePct: 6,
  impedanceTolerancePct: 10,
  loadLossKw: 10.5,
  noLoadLossKw: 1.7,
  noLoadCurrentPct: 1.2,
};

function codes(parts: Partial<SettledTransformer>, max = 250, nominalV = 400): string[] {
  return unusualSupply(supplyOf([{ ...PLAIN, ...parts }], max), nominalV).map(({ code }) => code);
}

function supplyOf(transformers: SettledTransformer[], max: number): Supply {
  return { faultLevelMva: { max, min: max }, rOverX: 0.1, resistanceExponent: 0.5, rippleHz: null, transformers };
}

describe('a supply unlike what is built', () => {
  it('is silent on what is built', () => {
    for (const [ratedKva, impedancePct] of [
      [100, 4],
      [630, 4],
      [1000, 5.75],
      [1600, 6],
      [2500, 6],
      [3150, 7],
    ] as const) {
      expect(codes({ ratedKva, impedancePct })).toEqual([]);
    }
  });

  it('is told for an impedance with a digit too few or too many', () => {
    for (const impedancePct of [0.6, 2.9, 15.1, 60])
      expect(codes({ impedancePct })).toEqual(['supply.impedanceUnusual']);
    for (const impedancePct of [3.1, 14.9]) expect(codes({ impedancePct })).toEqual([]);
    expect(unusualSupply(supplyOf([PLAIN, { ...PLAIN, impedancePct: 0.6 }], 250), 400)).toMatchObject([
      { path: 'supply.transformers[1].impedancePct', values: { number: 2, tablePct: 5, lowPct: 3, highPct: 15 } },
    ]);
  });

  it('is told for a rating no low-voltage gear carries, and not at a higher voltage', () => {
    const most = (6300 * Math.sqrt(3) * 400) / 1000;
    expect(codes({ ratedKva: most * 1.001, impedancePct: 8 })).toEqual(['supply.ratingUnusual']);
    expect(codes({ ratedKva: most * 0.999, impedancePct: 8 })).toEqual([]);
    expect(codes({ ratedKva: 10_000, impedancePct: 8 }, 250, 6000)).toEqual([]);
  });

  it('is told for losses that were exchanged, where both are given', () => {
    expect(codes({ loadLossKw: 1.7, noLoadLossKw: 10.5 })).toEqual(['supply.lossesUnusual']);
    expect(codes({ loadLossKw: 0, noLoadLossKw: 1.7 })).toEqual([]);
  });

  it('is told for a fault level in kA or in kVA', () => {
    // 1 000 kVA at 6 % let 16.7 MVA through
    expect(codes({}, 16.6)).toEqual(['supply.faultLevelLow']);
    expect(codes({}, 16.7)).toEqual([]);
    expect(codes({}, 250_000)).toEqual(['supply.faultLevelHigh']);
  });

  it('is told for a transformer left out, by the fault current its bus would see', () => {
    const most = (150 * Math.sqrt(3) * 400) / 1000;
    const told = (max: number, nominalV: number) => unusualSupply(supplyOf([], max), nominalV).map(({ code }) => code);
    expect(told(most * 1.001, 400)).toEqual(['supply.busFaultUnusual']);
    expect(told(most * 0.999, 400)).toEqual([]);
    expect(told(250, 10_000)).toEqual([]);
  });
});
