import { describe, expect, it } from 'vitest';
import { InputProblem } from '../problem.js';
import type { SettledTransformer, Supply } from './supply.js';
import { networkOhm, pathImpedanceInto, shortCircuitMva, supplyPath, transformerOhm } from './supply-path.js';

const transformer: SettledTransformer = {
  ratedKva: 1000,
  impedancePct: 5,
  impedanceTolerancePct: 10,
  loadLossKw: 30,
  noLoadLossKw: 1,
  noLoadCurrentPct: 1,
};

const supply: Supply = {
  faultLevelMva: { max: 16, min: 8 },
  rOverX: 0.75,
  resistanceExponent: 0.5,
  rippleHz: null,
  transformers: [],
};

describe('the network behind the transformer', () => {
  it.each([
    [16, 400, 0, { rOhm: 0, xOhm: 0.01 }, '160 000 / 16 MVA, all reactance'],
    [16, 400, 0.75, { rOhm: 0.006, xOhm: 0.008 }, 'the 3-4-5 triangle'],
    [1, 20_000, 0, { rOhm: 0, xOhm: 400 }, 'a weak line at 20 kV'],
  ])('of %d MVA at %d V and R/X %d: %s', (faultLevelMva, nominalV, rOverX, ohm) => {
    const found = networkOhm(faultLevelMva, nominalV, rOverX);
    expect(found.rOhm).toBeCloseTo(ohm.rOhm, 12);
    expect(found.xOhm).toBeCloseTo(ohm.xOhm, 12);
  });
});

describe('a transformer', () => {
  it.each([
    ['asGiven', 0.05],
    ['least', 0.045],
    ['most', 0.055],
  ] as const)('%s has an impedance of %d per unit; its resistance is not touched by the tolerance', (end, zPu) => {
    const { rOhm, xOhm } = transformerOhm(transformer, 400, end);
    expect(rOhm).toBeCloseTo(0.03 * 0.16, 12);
    expect(Math.hypot(rOhm, xOhm)).toBeCloseTo(zPu * 0.16, 12);
  });

  it('whose loss leaves no reactance is refused, tolerance included', () => {
    expect(() => transformerOhm({ ...transformer, loadLossKw: 44 }, 400, 'asGiven')).not.toThrow();
    expect(() => transformerOhm({ ...transformer, loadLossKw: 45.1 }, 400, 'least')).toThrow(InputProblem);
  });
});

describe('the way from the source to the bus', () => {
  const at = (path: ReturnType<typeof supplyPath>, orderH: number): number[] => {
    const out = new Float64Array(2);
    pathImpedanceInto(path, orderH, out);
    return [...out];
  };

  it('grows with h in reactance and with √h in resistance', () => {
    const path = supplyPath(supply, 400, 16, 'asGiven');
    expect(at(path, 1)[0]).toBeCloseTo(0.006, 12);
    expect(at(path, 4)[0]).toBeCloseTo(0.012, 12);
    expect(at(path, 4)[1]).toBeCloseTo(0.032, 12);
  });

  it('through two equal transformers has half the impedance of one', () => {
    const none = supplyPath(supply, 400, 16, 'asGiven');
    const one = supplyPath({ ...supply, transformers: [transformer] }, 400, 16, 'asGiven');
    const two = supplyPath({ ...supply, transformers: [transformer, transformer] }, 400, 16, 'asGiven');
    for (const part of [0, 1]) {
      const beyond = (path: typeof one): number => at(path, 7)[part]! - at(none, 7)[part]!;
      expect(beyond(two)).toBeCloseTo(beyond(one) / 2, 12);
    }
  });

  it('has the fault level it was made from where no transformer stands in it', () => {
    expect(shortCircuitMva(supplyPath(supply, 400, 16, 'asGiven'), 400)).toBeCloseTo(16, 9);
  });
});
