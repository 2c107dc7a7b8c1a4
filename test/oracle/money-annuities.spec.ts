/*
 * Tables of compound interest: present value of 1 a year at the end of each year, five decimals as printed in any of
 * them. Values at 10 % over 10 years and 12 % over 15 years seen; the others are from memory.
 */
import { describe, expect, it } from 'vitest';
import { annuityPerYear, NO_RUNNING, netColumn, paybackTime, presentValue, rateOfReturn } from '#libs/engine/index.js';

const TABLE: [discountPct: number, years: number, present: number][] = [
  [10, 10, 6.14457],
  [12, 15, 6.81086],
  [5, 20, 12.46221],
  [8, 10, 6.71008],
  [1, 30, 25.80771],
];
const HALF_A_DIGIT = 5e-6;

/** 1 at the end of each year, by twelve months of which the last alone saves. */
function onceAYear(years: number, capital = 0): Float64Array {
  const saving = [...new Array(11).fill(0), 1];
  const finance = { discountPct: 0, horizonYears: years, billGrowthPct: 0, costGrowthPct: 0 };
  return netColumn(saving, 1, { capital, running: NO_RUNNING }, finance);
}

describe.each(TABLE)('1 a year at %f %% over %i years', (discountPct, years, present) => {
  it('has the printed present value', () => {
    expect(Math.abs(presentValue(onceAYear(years), discountPct) - present)).toBeLessThan(HALF_A_DIGIT);
  });

  it('is what that present value comes to as an annuity', () => {
    const finance = { discountPct, horizonYears: years, billGrowthPct: 0, costGrowthPct: 0 };
    expect(Math.abs(annuityPerYear(present, finance) - 1)).toBeLessThan(HALF_A_DIGIT);
  });

  it('returns that rate on a capital of that value', () => {
    // the printed capital is off by up to half a digit, which moves the rate by a few thousandths of a per cent at most
    const { irrPct, irrReason } = rateOfReturn(onceAYear(years, present));
    expect(irrReason).toBeNull();
    expect(Math.abs(irrPct! - discountPct)).toBeLessThan(1e-4);
  });
});

describe('a payback', () => {
  it('of 5 paid back at 2 a year is two and a half years, where the months are equal', () => {
    const finance = { discountPct: 0, horizonYears: 4, billGrowthPct: 0, costGrowthPct: 0 };
    const net = netColumn(new Array(12).fill(2 / 12), 7, { capital: 5, running: NO_RUNNING }, finance);
    expect(paybackTime(net).years).toBeCloseTo(2.5, 12);
  });
});
