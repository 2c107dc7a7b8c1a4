import { describe, expect, it } from 'vitest';
import { cashFlow, netColumn, type SettledFinance } from './cash-flow.js';
import { paybacks, paybackTime, rateOfReturn } from './return-on-capital.js';
import { NO_RUNNING, replacements } from './running-cost.js';
import { savingByMonth } from './saving.js';

const FLAT: SettledFinance = { discountPct: 8, horizonYears: 2, billGrowthPct: 0, costGrowthPct: 0 };

describe('the nets of a cash flow', () => {
  it('begin with the month in which the record begins', () => {
    const saving = Array.from({ length: 12 }, (_, month) => month + 1);
    const net = netColumn(saving, 11, { capital: 100, running: NO_RUNNING }, FLAT);
    expect([...net.subarray(0, 5)]).toEqual([-100, 11, 12, 1, 2]);
    expect(net).toHaveLength(25);
  });

  it('grow once a year, savings and losses with bills, maintenance and replacements with costs', () => {
    const running = {
      ...NO_RUNNING,
      lossPerYear: 12,
      maintenancePerYear: 24,
      replacements: [{ month: 14, amount: 40 }],
    };
    const finance = { ...FLAT, billGrowthPct: 10, costGrowthPct: 50 };
    const net = netColumn(new Array(12).fill(11), 1, { capital: 0, running }, finance);
    // (11 − 1) − 2 in the first year; (11 − 1)·1.1 − 2·1.5 in the second, and 40·1.5 more in month 14
    expect(net[1]).toBeCloseTo(8, 12);
    expect(net[13]).toBeCloseTo(8, 12);
    expect(net[14]).toBeCloseTo(8 - 60, 12);
    expect(net[12]).toBeCloseTo(8, 12);
  });

  it('are shown by month with the sum so far, and by year', () => {
    const net = Float64Array.from([-100, ...new Array(24).fill(10)]);
    const { months, years } = cashFlow(net, 8);
    expect(months[0]).toEqual({ month: 1, net: 10, discounted: 10 * 1.08 ** (-1 / 12), cumulative: -90 });
    expect(months[23]!.cumulative).toBe(140);
    expect(years).toEqual([
      { year: 1, net: 120 },
      { year: 2, net: 120 },
    ]);
  });
});

describe('what is replaced', () => {
  it('falls into the month a life ends in, and not into the last month', () => {
    // 8.5 years are 102 months; 17 years are 204
    expect(replacements([{ years: 8.5, amount: 5 }], 240)).toEqual([
      { month: 102, amount: 5 },
      { month: 204, amount: 5 },
    ]);
    expect(replacements([{ years: 1, amount: 5 }], 24)).toEqual([{ month: 12, amount: 5 }]);
  });

  it('that ends a hair past a month falls into it, and is added where ends coincide', () => {
    const years = 1 + 1e-12;
    expect(
      replacements(
        [
          { years, amount: 5 },
          { years: 0.5, amount: 1 },
        ],
        20,
      ),
    ).toEqual([
      { month: 6, amount: 1 },
      { month: 12, amount: 6 },
      { month: 18, amount: 1 },
    ]);
  });

  it('many times a month is counted as often', () => {
    // a life of half a month: two ends a month
    expect(replacements([{ years: 1 / 24, amount: 3 }], 4)).toEqual([
      { month: 1, amount: 6 },
      { month: 2, amount: 6 },
      { month: 3, amount: 6 },
    ]);
  });

  it('never is nothing', () => {
    expect(replacements([{ years: Number.POSITIVE_INFINITY, amount: 3 }], 240)).toEqual([]);
  });
});

describe('a payback', () => {
  const column = (...amounts: number[]) => Float64Array.from(amounts);

  it('counts from the last month that is still negative, a fraction of the next one', () => {
    // −30, −20, 5, −5 (a replacement), 15: negative for the last time in month 3, a quarter of month 4
    expect(paybackTime(column(-30, 10, 25, -10, 20))).toEqual({ years: 3.25 / 12, reason: null });
  });

  it('has no answer without capital, or where the sum ends below 0', () => {
    expect(paybackTime(column(0, 10))).toEqual({ years: null, reason: 'no capital' });
    expect(paybackTime(column(-30, 10, 10))).toEqual({ years: null, reason: 'negative to the end' });
  });

  it('comes later when money is discounted', () => {
    const net = Float64Array.from([-100, ...new Array(120).fill(3)]);
    const { paybackYears, discountedPaybackYears } = paybacks(net, 12);
    expect(paybackYears).toBeCloseTo(100 / 36, 12);
    expect(discountedPaybackYears!).toBeGreaterThan(paybackYears!);
  });
});

describe('a rate of return', () => {
  it('that doubles the money in a year is 100 %', () => {
    const net = Float64Array.from([-100, ...new Array(11).fill(0), 200]);
    expect(rateOfReturn(net).irrPct).toBeCloseTo(100, 9);
  });

  it('is none where nothing changes its sign, and none where it changes twice', () => {
    expect(rateOfReturn(Float64Array.from([-100, -1, -1]))).toEqual({ irrPct: null, irrReason: 'no sign change' });
    expect(rateOfReturn(new Float64Array(13))).toEqual({ irrPct: null, irrReason: 'no sign change' });
    // −100, +230 after a year, −132 after two: 0 at 10 and at 20 %
    const twice = new Float64Array(25);
    twice.set([-100], 0);
    twice[12] = 230;
    twice[24] = -132;
    expect(rateOfReturn(twice)).toEqual({ irrPct: null, irrReason: 'several sign changes' });
  });
});

describe('savings by calendar month', () => {
  const month = (monthOfYear: number, coverage: number) => ({
    name: '',
    month: monthOfYear,
    monthsSinceYearZero: 0,
    coverage,
    from: 0,
    end: 0,
  });

  it('are taken up to whole months, and filled in where the record holds none of the name', () => {
    // half a December that saved 50 and half a January that saved 30 are whole months of 100 and 60
    const { byMonth, monthsFilled } = savingByMonth([month(12, 0.5), month(1, 0.5)], [80, 60], [30, 30]);
    expect(byMonth[11]).toBe(100);
    expect(byMonth[0]).toBe(60);
    expect(byMonth[5]).toBe(80);
    expect(monthsFilled).toBe(10);
  });

  it('of two months of one name are added over both coverages', () => {
    const { byMonth } = savingByMonth([month(3, 1), month(3, 0.25)], [100, 40], [50, 15]);
    expect(byMonth[2]).toBe(75 / 1.25);
  });
});
