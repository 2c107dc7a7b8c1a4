import { describe, expect, it } from 'vitest';
import type { Loads } from './loads.js';
import { combine, excitation, neutralA, summationExponent } from './summation.js';

const loads = (more: Partial<Loads>): Loads => ({
  motorSharePct: 60,
  distorting: [],
  backgroundPct: [],
  dampingKw: { max: 0, min: 0 },
  summation: 'exponent',
  ...more,
});

describe('summation exponent', () => {
  it.each([
    [2, 1],
    [4.9, 1],
    [5, 1.4],
    [10, 1.4],
    [10.1, 2],
    [50, 2],
  ])('of order %d is %d', (orderH, alpha) => {
    expect(summationExponent(orderH, 'exponent')).toBe(alpha);
    expect(summationExponent(orderH, 'arithmetic')).toBe(1);
  });
});

describe('combined magnitudes', () => {
  it.each([
    [3, 4, 1, 7, 'in phase'],
    [3, 4, 2, 5, 'at right angles'],
    [3, 0, 1.4, 3, 'one alone, to the bit'],
    [0, 4, 1.4, 4, 'the other alone'],
    [1, 1, 1.4, 2 ** (1 / 1.4), 'between the two'],
    [0, 0, 1.4, 0, 'nothing'],
  ])('%d and %d with α %d make %d: %s', (a, b, alpha, sum, _why) => {
    expect(combine(a, b, alpha)).toBeCloseTo(sum, 15);
    expect(combine(b, a, alpha)).toBeCloseTo(sum, 15);
  });

  it('of three do not depend on how they are grouped', () => {
    expect(combine(combine(2, 3, 1.4), 4, 1.4)).toBeCloseTo(combine(2, combine(3, 4, 1.4), 1.4), 12);
  });
});

describe('what excites the network', () => {
  it('is every order present, ascending, loads combined and background in volts a phase', () => {
    const found = excitation(
      loads({
        distorting: [
          {
            name: 'a',
            fundamentalA: 100,
            orders: [
              { orderH: 7, pct: 3 },
              { orderH: 3, pct: 3 },
            ],
          },
          {
            name: 'b',
            fundamentalA: 100,
            orders: [
              { orderH: 3, pct: 4 },
              { orderH: 11, pct: 4 },
            ],
          },
          { name: 'c', fundamentalA: 100, orders: [{ orderH: 11, pct: 3 }] },
        ],
        backgroundPct: [{ orderH: 5, pct: 1 }],
      }),
      400,
    );
    expect([...found.ordersH]).toEqual([3, 5, 7, 11]);
    expect([...found.injectedA]).toEqual([7, 0, 3, 5]);
    expect(found.backgroundV[1]).toBeCloseTo(4 / Math.sqrt(3), 12);
    expect([...found.exponent]).toEqual([1, 1.4, 1.4, 2]);
  });

  it('leaves out what is nothing and what is beyond order 50', () => {
    const found = excitation(
      loads({
        distorting: [
          {
            name: 'a',
            fundamentalA: 100,
            orders: [
              { orderH: 5, pct: 0 },
              { orderH: 51, pct: 9 },
            ],
          },
        ],
        backgroundPct: [
          { orderH: 7, pct: 0 },
          { orderH: 60, pct: 2 },
        ],
      }),
      400,
    );
    expect([...found.ordersH]).toEqual([]);
  });

  it('is nothing where nothing is known', () => {
    expect(excitation(loads({ distorting: null, backgroundPct: null }), 400).ordersH).toHaveLength(0);
  });

  it('takes given orders before a named spectrum', () => {
    const load = { name: 'a', fundamentalA: 10, spectrum: 'six-pulse' as const, orders: [{ orderH: 2, pct: 50 }] };
    expect([...excitation(loads({ distorting: [load] }), 400).ordersH]).toEqual([2]);
  });
});

describe('neutral current', () => {
  it('takes given triplens that are said to be zero sequence, which the bank then does not see', () => {
    const orders = [
      { orderH: 3, pct: 80, sequence: 'zero' as const },
      { orderH: 5, pct: 60 },
      { orderH: 9, pct: 20 },
    ];
    const distorting = [{ name: 'offices', fundamentalA: 100, orders }];
    expect([...excitation(loads({ distorting }), 400).ordersH]).toEqual([5, 9]);
    expect(neutralA({ distorting, summation: 'exponent' })).toBeCloseTo(3 * 80, 9);
  });

  const lights = (fundamentalA: number) => ({ name: 'l', fundamentalA, spectrum: 'single-phase-electronic' as const });

  it.each([
    [[], 0, 'of nothing'],
    [[{ name: 'd', fundamentalA: 100, spectrum: 'six-pulse' as const }], 0, 'of three-phase drives'],
    [[lights(100)], 3 * Math.hypot(81, 15.7, 7.9), 'three times the phase triplens'],
    [
      [lights(50), lights(50)],
      3 * Math.hypot(81, 2 ** (1 / 1.4) * 7.85, Math.SQRT2 * 3.95),
      'the 3rd of two loads adds',
    ],
  ])('%#: %s', (distorting, amperes, _why) => {
    expect(neutralA({ distorting, summation: 'exponent' })).toBeCloseTo(amperes, 9);
  });
});
