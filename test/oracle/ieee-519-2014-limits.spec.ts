// IEEE 519-2014: the tables of the 2022 edition (from memory), even orders held to 25 % of the odd band's limit (seen at
// second hand).
import { describe, expect, it } from 'vitest';
import { chosenVoltageLimits, currentLimits, limitChoice } from '#libs/engine/index.js';

const ROWS: [from: number, bandsPct: number[], totalPct: number][] = [
  [0, [4, 2, 1.5, 0.6, 0.3], 5],
  [20, [7, 3.5, 2.5, 1, 0.5], 8],
  [50, [10, 4.5, 4, 1.5, 0.7], 12],
  [100, [12, 5.5, 5, 2, 1], 15],
  [1000, [15, 7, 6, 2.5, 1.4], 20],
];

const BANDS = [
  { odd: [3, 5, 7, 9], even: [2, 4, 6, 8, 10] },
  { odd: [11, 13, 15], even: [12, 14, 16] },
  { odd: [17, 19, 21], even: [18, 20, 22] },
  { odd: [23, 25, 33], even: [24, 30, 34] },
  { odd: [35, 37, 49], even: [36, 40, 50] },
];

describe('harmonic current by the 2014 edition', () => {
  it.each(ROWS)('with I_sc/I_L from %d: even orders have a quarter of the band', (from, bandsPct, totalPct) => {
    const limits = currentLimits(from, 'IEEE 519-2014');
    expect(limits.totalPct).toBe(totalPct);
    expect(limits.source).toBe('IEEE 519-2014');
    BANDS.forEach(({ odd, even }, band) => {
      for (const orderH of odd) expect(limits.orderPct(orderH)).toBe(bandsPct[band]);
      for (const orderH of even) expect(limits.orderPct(orderH)).toBeCloseTo(bandsPct[band]! / 4, 12);
    });
  });

  it('is never looser than that of 2022, which allows even orders more', () => {
    for (const [from] of ROWS) {
      const [older, newer] = [currentLimits(from, 'IEEE 519-2014'), currentLimits(from)];
      for (let h = 2; h <= 50; h++) expect(older.orderPct(h)!).toBeLessThanOrEqual(newer.orderPct(h)!);
    }
    expect(currentLimits(10, 'IEEE 519-2014').orderPct(8)).toBe(1);
    expect(currentLimits(10).orderPct(8)).toBe(4);
  });
});

describe('harmonic voltage by the 2014 edition', () => {
  it.each([
    [480, 5, 8],
    [13_800, 3, 5],
    [115_000, 1.5, 2.5],
    [230_000, 1, 1.5],
  ])('at %d V is that of 2022, under its own name', (nominalV, individualPct, totalPct) => {
    const limits = chosenVoltageLimits(nominalV, 2, limitChoice('ieee', { edition: 'IEEE 519-2014' }));
    expect(limits.orderPct(5)).toBe(individualPct);
    expect(limits.distortionPct).toBe(totalPct);
    expect(limits.source).toBe('IEEE 519-2014');
  });
});
