import { describe, expect, it } from 'vitest';
import type { Supply } from './supply.js';
import { busFromPrimary, primaryFromBus, transformerPassage } from './transformer-passage.js';

const transformer = {
  ratedKva: 1000,
  impedancePct: 5,
  impedanceTolerancePct: 10,
  loadLossKw: 30,
  noLoadLossKw: 3,
  noLoadCurrentPct: 0.5,
};

const supplyOf = (transformers: Supply['transformers']): Supply => ({
  faultLevelMva: { max: 100, min: 100 },
  rOverX: 0.1,
  resistanceExponent: 0.5,
  rippleHz: null,
  transformers,
});

describe('several transformers as one', () => {
  it('of one is its own nameplate: r = P_k/S_r, x = √(u_k² − r²), Q₀ = √((i₀·S_r)² − P₀²)', () => {
    const passage = transformerPassage(supplyOf([transformer]));
    expect(passage.rPu).toBeCloseTo(0.03, 12);
    expect(passage.xPu).toBeCloseTo(0.04, 12);
    expect(passage.noLoadKvar).toBeCloseTo(4, 12);
  });

  it('of two equal ones has twice the base and the same per-unit impedance', () => {
    const passage = transformerPassage(supplyOf([transformer, transformer]));
    expect(passage).toMatchObject({ baseKva: 2000, noLoadKw: 6 });
    expect(passage.rPu).toBeCloseTo(0.03, 12);
    expect(passage.xPu).toBeCloseTo(0.04, 12);
    expect(passage.noLoadKvar).toBeCloseTo(8, 12);
  });

  it('of two unequal ones parallels complex impedances: in ohms at 1 kV and 1 MVA', () => {
    const small = { ...transformer, ratedKva: 500, loadLossKw: 5, impedancePct: 4 };
    const { baseKva, rPu, xPu } = transformerPassage(supplyOf([transformer, small]));
    // z₁ = 0.03 + 0.04j, z₂ = (0.01 + 0.0387j)·2 on the same 1 MVA; z = z₁z₂/(z₁+z₂) by hand.
    const [r1, x1, r2, x2] = [0.03, 0.04, 0.02, 2 * Math.sqrt(0.04 ** 2 - 0.01 ** 2)];
    const [nr, ni, dr, di] = [r1 * r2 - x1 * x2, r1 * x2 + x1 * r2, r1 + r2, x1 + x2];
    const square = dr ** 2 + di ** 2;
    expect((rPu * 1000) / baseKva).toBeCloseTo((nr * dr + ni * di) / square, 12);
    expect((xPu * 1000) / baseKva).toBeCloseTo((ni * dr - nr * di) / square, 12);
  });

  it('whose magnetising current is less than its loss magnetises with nothing', () => {
    expect(transformerPassage(supplyOf([{ ...transformer, noLoadCurrentPct: 0.1 }])).noLoadKvar).toBe(0);
  });
});

describe('power through it', () => {
  const passage = { baseKva: 1000, noLoadKw: 3, noLoadKvar: 4, rPu: 0.03, xPu: 0.04 };

  it('from the meter: S₂ = S₁ − (r + jx)·|S₁|², the shunt taken off first', () => {
    const { activeKw, reactiveKvar } = busFromPrimary(passage, 603, 804);
    expect(activeKw).toBeCloseTo(600 - 30, 9);
    expect(reactiveKvar).toBeCloseTo(800 - 40, 9);
  });

  it('to the meter and back is where it came from', () => {
    const primary = primaryFromBus(passage, 570, 760)!;
    expect(primary.activeKw).toBeCloseTo(603, 9);
    expect(primary.reactiveKvar).toBeCloseTo(804, 9);
    // |V₂|² = (P₂² + Q₂²)/|S₁|² since the current is the same on both sides.
    expect(primary.busVoltagePu).toBeCloseTo(0.95, 9);
  });

  it('at no load keeps the voltage and takes the shunt alone', () => {
    expect(primaryFromBus(passage, 0, 0)).toEqual({ activeKw: 3, reactiveKvar: 4, busVoltagePu: 1 });
  });

  it('beyond the greatest power has no answer: 1/(2·(|z| + r cos φ + x sin φ)) of the base', () => {
    // Reactive power alone: at most 1/(4x) were r nothing; with r a little less.
    expect(primaryFromBus({ ...passage, rPu: 0 }, 0, 6249)).not.toBeNull();
    expect(primaryFromBus({ ...passage, rPu: 0 }, 0, 6251)).toBeNull();
  });
});
