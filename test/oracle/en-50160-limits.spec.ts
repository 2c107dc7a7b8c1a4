// EN 50160:2010, 95 % values of the ten-minute means of a week, harmonic voltages up to the 25th in % of nominal and a
// total distortion of 8 %: from memory, not seen. Copies give the 15th and the 21st as 0.5; orders above the 25th have no row.
import { describe, expect, it } from 'vitest';
import { chosenVoltageLimits, limitChoice } from '#libs/engine/index.js';

const choice = limitChoice('iec', { edition: 'EN 50160:2010' });

const ROWS: [orderH: number, pct: number][] = [
  [2, 2],
  [3, 5],
  [4, 1],
  [5, 6],
  [6, 0.5],
  [7, 5],
  [8, 0.5],
  [9, 1.5],
  [10, 0.5],
  [11, 3.5],
  [12, 0.5],
  [13, 3],
  [14, 0.5],
  [15, 0.5],
  [16, 0.5],
  [17, 2],
  [18, 0.5],
  [19, 1.5],
  [20, 0.5],
  [21, 0.5],
  [22, 0.5],
  [23, 1.5],
  [24, 0.5],
  [25, 1.5],
];

describe('EN 50160', () => {
  const limits = chosenVoltageLimits(400, 2, choice);

  it.each(ROWS)('order %d: %d %%', (orderH, pct) => {
    expect(limits.orderPct(orderH)).toBe(pct);
  });

  it('holds the total to 8 %, and says its edition', () => {
    expect(limits.distortionPct).toBe(8);
    expect(limits.source).toBe('EN 50160:2010');
  });

  it.each([1, 1.5, 2.5, 26, 27, 29, 50])('order %d has no row and no limit', (orderH) => {
    expect(limits.orderPct(orderH)).toBeNull();
  });

  it('knows no classes: the class of a plant moves none of its rows', () => {
    for (const [orderH] of ROWS) {
      expect(chosenVoltageLimits(400, 3, choice).orderPct(orderH)).toBe(limits.orderPct(orderH));
    }
  });
});
