// Source: electrical-installation guide, chapter L, figure L21 (kvar of 20 kV distribution transformers at no load and
// at full load), printed to a tenth; first three rows seen, the rest from memory. The table states no impedances: they
// are the customary u_k of each size, and a resistive part of 1 to 1.7 %.
import { describe, expect, it } from 'vitest';
import { busFromPrimary, primaryFromBus, type Supply, transformerPassage } from '#libs/engine/index.js';

const ROWS: [ratedKva: number, impedancePct: number, noLoadKvar: number, fullLoadKvar: number][] = [
  [100, 4, 2.5, 6.1],
  [160, 4, 3.7, 9.6],
  [250, 4, 5.3, 14.7],
  [315, 4, 6.3, 18.4],
  [400, 4, 7.6, 22.9],
  [500, 4, 9.5, 28.7],
  [630, 4, 11.3, 35.7],
  [800, 4.5, 20.0, 54.5],
  [1000, 5, 23.9, 72.4],
  [1250, 5.5, 27.4, 94.5],
  [1600, 6, 31.9, 126],
  [2000, 7, 37.8, 176],
];

function passage(ratedKva: number, impedancePct: number, noLoadKvar: number, resistivePct: number) {
  const supply: Supply = {
    faultLevelMva: { max: 250, min: 250 },
    rOverX: 0.1,
    resistanceExponent: 0.5,
    rippleHz: null,
    transformers: [
      {
        ratedKva,
        impedancePct,
        impedanceTolerancePct: 0,
        loadLossKw: (resistivePct / 100) * ratedKva,
        noLoadLossKw: 0,
        noLoadCurrentPct: (100 * noLoadKvar) / ratedKva,
      },
    ],
  };
  return transformerPassage(supply);
}

describe('a transformer’s own kvar', () => {
  it.each(ROWS)('of %d kVA with %d %% is %d at no load and %d at full load', (kva, impedancePct, none, full) => {
    // Rated current at rated voltage, whatever the load's own power factor.
    const takenKvar = (resistivePct: number): number => {
      const through = passage(kva, impedancePct, none, resistivePct);
      return none - busFromPrimary(through, kva, none).reactiveKvar;
    };
    const printing = impedancePct > 5.9 ? 0.55 : 0.1;
    expect(primaryFromBus(passage(kva, impedancePct, none, 1), 0, 0)!.reactiveKvar).toBeCloseTo(none, 9);
    expect(takenKvar(1.7)).toBeLessThanOrEqual(full + printing);
    expect(takenKvar(1)).toBeGreaterThanOrEqual(full - printing);
  });

  it('is the square root of what is left of the magnetising current after its loss', () => {
    const supply: Supply = {
      faultLevelMva: { max: 250, min: 250 },
      rOverX: 0.1,
      resistanceExponent: 0.5,
      rippleHz: null,
      transformers: [
        {
          ratedKva: 1000,
          impedancePct: 6,
          impedanceTolerancePct: 10,
          loadLossKw: 10,
          noLoadLossKw: 3,
          noLoadCurrentPct: 0.5,
        },
      ],
    };
    expect(transformerPassage(supply).noLoadKvar).toBeCloseTo(4, 12);
  });
});
