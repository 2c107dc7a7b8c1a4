import { describe, expect, it } from 'vitest';
import type { StageGroup } from '../layout/bank.js';
import { branchRatio, stageAdmittance, stageBranch } from './stage-admittance.js';

const stage: StageGroup = {
  count: 1,
  ratedKvar: 40,
  ratedV: 400,
  reactorPct: 10,
  reactorQuality: 20,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
};
const NOMINAL = { capacitanceFactor: 1, inductanceFactor: 1 };

describe('a stage in a corner', () => {
  it('has less reactance with more capacitance, and p times both factors; its resistance stays', () => {
    const branch = stageBranch(stage, { capacitanceFactor: 1.1, inductanceFactor: 1.03 }, 0.5);
    expect(branch.capacitiveOhm).toBeCloseTo(4 / 1.1, 12);
    expect(branch.inductiveOhm).toBeCloseTo(0.4 * 1.03, 12);
    expect(branch.resistanceOhm).toBeCloseTo(0.02, 12);
    expect(branchRatio(branch)).toBeCloseTo(0.1 * 1.1 * 1.03, 12);
  });
});

describe('admittance of a stage', () => {
  const at = (parts: Partial<StageGroup>, orderH: number): { re: number; im: number } => {
    const { re, im } = stageAdmittance(stageBranch({ ...stage, ...parts }, NOMINAL, 0.5), Float64Array.of(orderH));
    return { re: re[0]!, im: im[0]! };
  };

  it.each([
    [{ reactorPct: 0 }, 1, { re: 0, im: 0.25 }, 'a plain capacitor: 1/4 Ω, leading'],
    [{ reactorPct: 0 }, 5, { re: 0, im: 1.25 }, 'growing with the order'],
    [
      { reactorPct: 25 },
      2,
      { re: 1 / (0.05 * Math.SQRT2), im: 0 },
      'at its tuned order its resistance alone, grown by √h',
    ],
  ])('%j at order %d: %s', (parts, orderH, y) => {
    expect(at(parts, orderH).re).toBeCloseTo(y.re, 9);
    expect(at(parts, orderH).im).toBeCloseTo(y.im, 9);
  });

  it('leads below the tuned order and lags above it', () => {
    expect(at({ reactorPct: 25 }, 1.9).im).toBeGreaterThan(0);
    expect(at({ reactorPct: 25 }, 2.1).im).toBeLessThan(0);
  });
});
