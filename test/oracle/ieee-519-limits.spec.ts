// IEEE 519: voltage limits by bus voltage, seen at second hand and from memory; current limits up to 69 kV by I_sc/I_L,
// from memory; the even-order rule of the 2022 edition (half the band's limit up to the 6th), seen at second hand.
import { describe, expect, it } from 'vitest';
import { currentLimits, voltageLimits } from '#libs/engine/index.js';

describe('harmonic voltage', () => {
  it.each([
    [400, 5, 8],
    [1000, 5, 8],
    [1001, 3, 5],
    [69_000, 3, 5],
    [69_001, 1.5, 2.5],
    [161_000, 1.5, 2.5],
    [161_001, 1, 1.5],
  ])('at %d V is %d %% for an order and %d %% in all', (nominalV, individualPct, totalPct) => {
    const limits = voltageLimits('ieee', nominalV, 2);
    expect(limits.distortionPct).toBe(totalPct);
    for (const orderH of [2, 2.5, 3, 5, 17, 49, 50]) expect(limits.orderPct(orderH)).toBe(individualPct);
    expect(limits.source).toBe('IEEE 519-2022');
  });
});

const ROWS: [from: number, below: number, bandsPct: number[], totalPct: number][] = [
  [0, 20, [4, 2, 1.5, 0.6, 0.3], 5],
  [20, 50, [7, 3.5, 2.5, 1, 0.5], 8],
  [50, 100, [10, 4.5, 4, 1.5, 0.7], 12],
  [100, 1000, [12, 5.5, 5, 2, 1], 15],
  [1000, 1e9, [15, 7, 6, 2.5, 1.4], 20],
];

describe('harmonic current', () => {
  it.each(ROWS)('with I_sc/I_L from %d to below %d', (from, below, bandsPct, totalPct) => {
    for (const ratio of [from, below * (1 - 1e-12)]) {
      const limits = currentLimits(ratio);
      expect(limits.totalPct).toBe(totalPct);
      const firstAndLast = [
        [3, 9],
        [11, 15],
        [17, 21],
        [23, 33],
        [35, 49],
      ];
      firstAndLast.forEach((orders, band) => {
        for (const orderH of orders) expect(limits.orderPct(orderH)).toBe(bandsPct[band]);
      });
    }
  });

  it('of an even order is half the band’s up to the 6th and the whole of it above', () => {
    const limits = currentLimits(10);
    expect([2, 4, 6].map((h) => limits.orderPct(h))).toEqual([2, 2, 2]);
    expect([8, 10, 12, 16, 18, 24, 36, 50].map((h) => limits.orderPct(h))).toEqual([4, 4, 2, 2, 1.5, 0.6, 0.3, 0.3]);
  });
});
