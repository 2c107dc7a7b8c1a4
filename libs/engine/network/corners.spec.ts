import { describe, expect, it } from 'vitest';
import type { Supply } from '../supply/supply.js';
import { cornerSet } from './corners.js';
import type { Loads } from './loads.js';

const supply: Supply = {
  faultLevelMva: { max: 250, min: 180 },
  rOverX: 0.1,
  resistanceExponent: 0.5,
  rippleHz: null,
  transformers: [
    {
      ratedKva: 1000,
      impedancePct: 6,
      impedanceTolerancePct: 10,
      loadLossKw: 10,
      noLoadLossKw: 1,
      noLoadCurrentPct: 1,
    },
  ],
};
const loads: Loads = {
  motorSharePct: 60,
  distorting: [],
  backgroundPct: [],
  dampingKw: { max: 400, min: 50 },
  summation: 'exponent',
};

describe('corners', () => {
  const { corners, networks, factors } = cornerSet(supply, loads, 400);

  it('begin with nominal: greatest fault level, factors 1, most damping', () => {
    expect(corners[0]!.corner).toEqual({
      faultLevelMva: 250,
      capacitanceFactor: 1,
      inductanceFactor: 1,
      dampingKw: 400,
    });
  });

  it('go on in the order written down, damping fastest', () => {
    const written = corners
      .slice(1)
      .map(({ corner: c }) => [c.faultLevelMva, c.capacitanceFactor, c.inductanceFactor, c.dampingKw]);
    const expected = [250, 180].flatMap((fault) =>
      [0.95, 1.1].flatMap((c) => [0.97, 1.03].flatMap((l) => [0, 50, 400].map((kw) => [fault, c, l, kw]))),
    );
    expect(written).toEqual(expected);
  });

  it('take the least impedance of the transformer with the greatest fault level and the other way round', () => {
    const zPct = ({ network }: (typeof corners)[number]): number => {
      const { rOhm, xOhm } = networks[network]!.path.transformers[0]!;
      return (100 * Math.hypot(rOhm, xOhm)) / 0.16;
    };
    expect(zPct(corners[0]!)).toBeCloseTo(6, 9);
    expect(zPct(corners[1]!)).toBeCloseTo(5.4, 9);
    expect(zPct(corners[corners.length - 1]!)).toBeCloseTo(6.6, 9);
  });

  it('point at a network and factors of their own kind', () => {
    for (const { corner, network, factors: f } of corners) {
      expect(networks[network]!.dampingKw).toBe(corner.dampingKw);
      expect(factors[f]).toEqual({
        capacitanceFactor: corner.capacitanceFactor,
        inductanceFactor: corner.inductanceFactor,
      });
    }
  });

  it.each([
    [{ max: 400, min: 0 }, 2, 'none stands twice'],
    [{ max: 0, min: 0 }, 1, 'nor three times'],
    [{ max: 50, min: 50 }, 2, 'nor a maximum that is the minimum'],
  ])('with damping %j have %d dampings each: %s', (dampingKw, distinct, _why) => {
    expect(cornerSet(supply, { ...loads, dampingKw }, 400).corners).toHaveLength(1 + 8 * distinct);
  });

  it('with one fault level still take both ends of the transformer’s tolerance', () => {
    const set = cornerSet({ ...supply, faultLevelMva: { max: 250, min: 250 } }, loads, 400);
    expect(set.corners).toHaveLength(25);
    expect(set.networks[1]!.path.transformers).not.toEqual(set.networks[4]!.path.transformers);
  });
});
