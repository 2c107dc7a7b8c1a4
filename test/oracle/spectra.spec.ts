// Harmonic currents in % of the fundamental:
// - six-pulse with commutation, orders 5 to 25: IEEE 519-1992, typical values; from memory.
// - drive benchmark: IEEE task force, Transactions on Power Delivery 14(2), 1999; from memory.
// - diode bridge without and with choke, twelve-pulse, active front end, orders 5 to 19: common practice; from memory.
// - single-phase electronic, orders 3 to 15: IEEE 1100, typical values; from memory.
import { describe, expect, it } from 'vitest';
import { type DistortingLoad, injectedOrders, neutralA, SPECTRA, type SpectrumName } from '#libs/engine/index.js';

const TO_19 = [5, 7, 11, 13, 17, 19];
const TO_25 = [...TO_19, 23, 25];

const PRINTED: [SpectrumName, number[], number[]][] = [
  ['six-pulse', TO_25, [17.5, 11.1, 4.5, 2.9, 1.5, 1.0, 0.9, 0.8]],
  [
    'drive-benchmark',
    [...TO_25, 29, 31, 35, 37],
    [18.24, 11.9, 5.73, 4.01, 1.93, 1.39, 0.94, 0.86, 0.71, 0.62, 0.44, 0.38],
  ],
  ['six-pulse-no-choke', TO_19, [63, 54, 10, 6.1, 6.7, 4.8]],
  ['six-pulse-choke', TO_19, [30, 12, 8.9, 5.6, 4.4, 4.1]],
  ['twelve-pulse', TO_19, [3.6, 2.6, 7.5, 5.2, 1.2, 1.3]],
  ['active-front-end', TO_19, [2.6, 3.4, 3, 0.1, 2.1, 2.2]],
  ['single-phase-electronic', [3, 5, 7, 9, 11, 13, 15], [81, 60.6, 37, 15.7, 2.4, 6.3, 7.9]],
];

describe('named spectra', () => {
  it.each(PRINTED)('%s', (name, orders, pct) => {
    expect(SPECTRA[name].orders).toEqual(orders.map((orderH, k) => ({ orderH, pct: pct[k] })));
  });

  it('six-pulse-ideal is 100/h at 6k ± 1, up to the 49th', () => {
    const { orders } = SPECTRA['six-pulse-ideal'];
    expect(orders.map(({ orderH }) => orderH)).toEqual([5, 7, 11, 13, 17, 19, 23, 25, 29, 31, 35, 37, 41, 43, 47, 49]);
    for (const { orderH, pct } of orders) expect(pct * orderH).toBeCloseTo(100, 12);
  });

  it('covers every name', () => {
    expect([...PRINTED.map(([name]) => name), 'six-pulse-ideal'].sort()).toEqual(Object.keys(SPECTRA).sort());
  });
});

describe('triplens of single-phase electronic loads', () => {
  const load = { name: 'lighting', fundamentalA: 100, spectrum: 'single-phase-electronic' as const };
  const loadsOf = (distorting: DistortingLoad[]) => ({ distorting, summation: 'exponent' as const });

  it('stay out of the bank and meet in the neutral at three times their phase value', () => {
    expect(injectedOrders(load).map(({ orderH }) => orderH)).toEqual([5, 7, 11, 13]);
    expect(neutralA(loadsOf([load]))).toBeCloseTo(3 * Math.hypot(81, 15.7, 7.9), 9);
  });

  it('of two loads are as many as of one twice the size, where they add: the 3rd to the last ampere', () => {
    const halves = [50, 50].map((fundamentalA) => ({ ...load, fundamentalA }));
    const arithmetic = { distorting: halves, summation: 'arithmetic' as const };
    expect(neutralA(arithmetic)).toBeCloseTo(neutralA(loadsOf([load])), 9);
    expect(neutralA(loadsOf(halves))).toBeGreaterThan(3 * 81);
  });

  it('given as orders are what the bank sees', () => {
    const given = { name: 'lighting', fundamentalA: 100, orders: [{ orderH: 3, pct: 81 }] };
    expect(injectedOrders(given)).toEqual([{ orderH: 3, pct: 81 }]);
    expect(neutralA(loadsOf([given]))).toBe(0);
  });
});
