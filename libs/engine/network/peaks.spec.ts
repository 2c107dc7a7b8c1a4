import { describe, expect, it } from 'vitest';
import type { Bank, StageGroup } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import type { Supply } from '../supply/supply.js';
import { networkTable } from './bus-admittance.js';
import type { CornerCase } from './corners.js';
import { networkModel } from './network-model.js';
import { PeakFinder, peakGrid } from './peaks.js';
import { admittanceSquareInto } from './scan-into.js';
import { stageAdmittance, stageBranch } from './stage-admittance.js';

const group = (parts: Partial<StageGroup>): StageGroup => ({
  count: 1,
  ratedKvar: 50,
  ratedV: 400,
  reactorPct: 0,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
  ...parts,
});

function finderOf(groups: StageGroup[], supply: Partial<Supply> = {}, { nominalV = 400, dampingKw = 0 } = {}) {
  const bank: Bank = { groups, interStageUh: 2, interStageGiven: true, ambientCategory: null };
  const settled: Supply = {
    faultLevelMva: { max: 10, min: 10 },
    rOverX: 0.1,
    resistanceExponent: 0.5,
    rippleHz: null,
    transformers: [],
    ...supply,
  };
  const loads = {
    motorSharePct: 0,
    distorting: [],
    backgroundPct: [],
    dampingKw: { max: dampingKw, min: dampingKw },
    summation: 'exponent' as const,
  };
  const model = networkModel(settled, loads, nominalV, 0);
  const levels = bankLevels(bank, nominalV);
  return { finder: new PeakFinder(model, bank), model, vector: levels[levels.length - 1]!.vectors[0]! };
}

describe('the parallel resonance', () => {
  it('of a plain bank is √(S_k/Q_c) but for the damping of the source: 10 MVA and 400 kvar make 5', () => {
    const { finder, model, vector } = finderOf([group({ ratedKvar: 400 })], { rOverX: 0.001 });
    expect(finder.greatest(vector, model.corners.corners[0]!)!.orderH).toBeCloseTo(5, 4);
  });

  it('of a tuned bank is 1/√(p + Q_c/S_k), below the tuned order', () => {
    const groups = [group({ ratedKvar: 400, reactorPct: 7, reactorQuality: 1000 })];
    const { finder, model, vector } = finderOf(groups, { rOverX: 0.001 });
    const { orderH } = finder.greatest(vector, model.corners.corners[0]!)!;
    expect(orderH).toBeCloseTo(1 / Math.sqrt(0.07 + 0.04), 3);
    expect(orderH).toBeLessThan(1 / Math.sqrt(0.07));
  });

  it('is none without a bank: an inductive impedance only rises', () => {
    const { finder, model } = finderOf([group({})]);
    expect(finder.greatest(Int32Array.of(0), model.corners.corners[0]!)).toBeNull();
  });

  it('is none where it would lie beyond order 50', () => {
    const { finder, model, vector } = finderOf([group({ ratedKvar: 1 })]);
    expect(finder.greatest(vector, model.corners.corners[0]!)).toBeNull();
  });

  // Their tuned orders differ in the last digit; the two samples that makes were once taken for a valley of their own.
  it('is where it belongs with two groups of one ratio and different ratings', () => {
    const tuned = { reactorPct: 7, ratedV: 480 * 1.31 };
    const transformer = { ratedKva: 630, impedancePct: 6.537214931100607, loadLossKw: 3.605311243329197 };
    const supply = {
      faultLevelMva: { max: 89.44529318766436, min: 89.44529318766436 },
      rOverX: 0.05,
      resistanceExponent: 1,
      transformers: [{ ...transformer, impedanceTolerancePct: 0, noLoadLossKw: 0, noLoadCurrentPct: 0 }],
    };
    const groups = [
      group({ count: 2, ratedKvar: 12.5, ratedV: 576, reactorPct: 14, reactorQuality: 80 }),
      group({ ...tuned, ratedKvar: 25, reactorQuality: 80 }),
      group({ ...tuned, ratedV: 576, reactorQuality: 10 }),
    ];
    const { finder, model, vector } = finderOf(groups, supply, { nominalV: 480, dampingKw: 300 });
    const ohmAt = (orderH: number, { network, factors }: CornerCase): number => {
      const at = Float64Array.of(orderH);
      const square = new Float64Array(1);
      const table = networkTable(model.corners.networks[network]!, model.damping, at);
      const stages = groups.map((g) => stageAdmittance(stageBranch(g, model.corners.factors[factors]!, 1), at));
      admittanceSquareInto(table.bus, stages, vector, square);
      return 1 / Math.sqrt(square[0]!);
    };
    for (const corner of model.corners.corners) {
      const peaks = finder.peaks(vector, corner);
      expect(peaks).toHaveLength(2);
      for (const { orderH, impedanceOhm } of peaks) {
        for (const off of [-1e-3, 1e-3]) expect(ohmAt(orderH + off, corner)).toBeLessThan(impedanceOhm);
      }
    }
  });
});

describe('the grid on which peaks are looked for', () => {
  it('ascends from 1 to 50 with no two points a rounding apart', () => {
    const grid = peakGrid([3.78, 3.78 + 2 ** -51, 2.67, 60]);
    expect(grid[0]).toBe(1);
    expect(grid[grid.length - 1]).toBe(50);
    for (let i = 1; i < grid.length; i++) expect(grid[i]! - grid[i - 1]!).toBeGreaterThan(1e-10);
  });

  it('closes in on every tuned order from both sides', () => {
    const grid = peakGrid([3.78]);
    const nearest = (side: number): number =>
      Math.min(...grid.filter((h) => (h - 3.78) * side > 0).map((h) => Math.abs(h - 3.78)));
    expect(nearest(1)).toBeLessThan(1e-5);
    expect(nearest(-1)).toBeLessThan(1e-5);
  });
});
