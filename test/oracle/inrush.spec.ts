// - Three-phase kvar form K·√(Q1·Q2/((Q1+Q2)·L)), Q in kvar, L in µH, peak A, K = 1330 at 60 Hz and 1456.7 at 50 Hz: after
//   IEEE C37.99-1990; seen. Digits as printed.
// - 600 kvar at 12.47 kV: 27.7 A rated; the same guide's example; seen.
import { describe, expect, it } from 'vitest';
import { closedFormInrush, inrushStages, ratedA } from '#libs/engine/index.js';
import { madeBank, madeGroup } from '../support/made-network.js';

const PAIRS: [stageKvar: number, otherKvar: number, betweenUh: number][] = [
  [50, 50, 2],
  [25, 150, 1.3],
  [600, 600, 40],
];

function ontoBankA(nominalV: number, frequencyHz: number, [one, other, betweenUh]: (typeof PAIRS)[number]): number {
  const bank = {
    ...madeBank([madeGroup({ ratedKvar: one, ratedV: nominalV }), madeGroup({ ratedKvar: other, ratedV: nominalV })]),
    interStageUh: betweenUh,
  };
  const [first] = inrushStages(bank, { nominalV, frequencyHz, shortCircuitMva: 20, rules: 'ieee' });
  return first!.ontoBankPeakA!;
}

describe('back-to-back inrush in its kvar form', () => {
  it.each([
    [60, 1330, 5e-4],
    [50, 1456.7, 5e-5],
  ])('at %d Hz has K = %d, whatever the voltage', (frequencyHz, printedK, within) => {
    for (const nominalV of [400, 480, 12_470]) {
      for (const pair of PAIRS) {
        const [one, other, betweenUh] = pair;
        const root = Math.sqrt((one * other) / ((one + other) * betweenUh));
        expect(Math.abs(ontoBankA(nominalV, frequencyHz, pair) / root / printedK - 1)).toBeLessThan(within);
      }
    }
  });
});

describe('rated current', () => {
  it('of 600 kvar at 12.47 kV is 27.7 A, the last digit cut off', () => {
    expect(Math.floor(10 * ratedA(madeGroup({ ratedKvar: 600, ratedV: 12_470 }))) / 10).toBe(27.7);
  });
});

describe('a single stage on its supply', () => {
  // Textbook form: the peak is √2·I·√(X_C/X_L) for a current I at rated voltage, and rings at f·√(X_C/X_L).
  it('peaks at √2 times its rated current times the ratio of natural to power frequency', () => {
    const [xc, xl] = [160_000 / 50_000, 160_000 / 20e6];
    const { peakA, frequencyHz } = closedFormInrush(xc, xl, { nominalV: 400, frequencyHz: 50 });
    const rated = 50_000 / (Math.sqrt(3) * 400);
    expect(frequencyHz).toBeCloseTo(50 * Math.sqrt(20_000 / 50), 9);
    expect(peakA).toBeCloseTo(Math.SQRT2 * rated * Math.sqrt(20_000 / 50), 9);
  });
});
