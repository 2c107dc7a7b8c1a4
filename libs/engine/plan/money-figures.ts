import type { Capital } from '../money/capital.js';
import { type CashMonth, presentValue, type SettledFinance } from '../money/cash-flow.js';
import type { Money, Worth } from '../money/money-result.js';
import { type Figure, figure } from './figure.js';
import type { MoneyPapers } from './money-papers.js';

const SOURCE = 'method, money';

/** Rates between which an internal rate is told lie so far apart [%]. */
const RATE_STEP_PCT = 1e-4;

/**
 * Saving, net present value, payback, internal rate and annuity with the values put in.
 * @param money a result's money
 * @param papers discount and horizon as they were taken, and the currency of every amount
 * @returns figures in that order; without prices the saving alone, and none for a time or a rate that there is not
 * @source method-money
 */
export function moneyFigures(money: Money, { finance, currency }: Pick<MoneyPapers, 'finance' | 'currency'>): Figure[] {
  const months = money.savingByMonth.map((saving, k): Term => [`S_${k + 1}`, saving, currency]);
  const saving = summed('money.savingPerYear', { value: money.savingPerYear, unit: currency }, months);
  return money.capital === null ? [saving] : [saving, ...worthFigures(money, finance, currency)];
}

type Term = readonly [symbol: string, value: number, unit: string];

function summed(id: string, value: { value: number; unit: string }, terms: readonly Term[]): Figure {
  const formula = terms.map(([symbol]) => symbol).join(' + ');
  return figure(id, value, { formula, source: SOURCE }, terms);
}

function worthFigures(worth: Worth, finance: SettledFinance, currency: string): Figure[] {
  const { capital, cashFlow, npv } = worth;
  const { months } = cashFlow;
  const years = cashFlow.years.map(({ year }, k): Term => {
    const present = months.slice(12 * k, 12 * (k + 1)).reduce((sum, { discounted }) => sum + discounted, 0);
    return [`P_${year}`, present, currency];
  });
  return [
    summed('money.npv', { value: npv, unit: currency }, [['P_0', 0 - capital.total, currency], ...years]),
    ...paybackFigure(
      'money.paybackYears',
      worth.paybackYears,
      sumsOf(worth, ({ net }) => net),
      currency,
    ),
    ...paybackFigure(
      'money.discountedPaybackYears',
      worth.discountedPaybackYears,
      sumsOf(worth, ({ discounted }) => discounted),
      currency,
    ),
    ...rateFigure(worth, currency),
    annuityFigure(worth, finance, currency),
  ];
}

/** The running sum by month, the capital first. */
function sumsOf({ capital, cashFlow }: Worth, amount: (month: CashMonth) => number): number[] {
  const sums = [0 - capital.total];
  for (const month of cashFlow.months) sums.push(sums.at(-1)! + amount(month));
  return sums;
}

/** The last month whose sum is negative, and so much of the next as it takes. */
function paybackFigure(id: string, years: number | null, sums: readonly number[], currency: string): Figure[] {
  if (years === null || years === 0) return [];
  const last = sums.findLastIndex((sum, month) => month < 12 * years && sum < 0);
  return [
    figure(id, { value: years, unit: 'years' }, { formula: '(m − S / N) / 12', source: SOURCE }, [
      ['m', last, 'months'],
      ['S', sums[last]!, currency],
      ['N', sums[last + 1]! - sums[last]!, currency],
    ]),
  ];
}

/** Between two rates next to it, in proportion to the net present value at each. */
function rateFigure({ irrPct, capital, cashFlow }: Worth, currency: string): Figure[] {
  if (irrPct === null) return [];
  const net = Float64Array.of(0 - capital.total, ...cashFlow.months.map((month) => month.net));
  const below = Math.floor(irrPct / RATE_STEP_PCT) * RATE_STEP_PCT;
  const above = below + RATE_STEP_PCT;
  return [
    figure(
      'money.irrPct',
      { value: irrPct, unit: '%' },
      { formula: 'a + (b − a) · V_a / (V_a − V_b)', source: SOURCE },
      [
        ['a', below, '%'],
        ['b', above, '%'],
        ['V_a', presentValue(net, below), currency],
        ['V_b', presentValue(net, above), currency],
      ],
    ),
  ];
}

function annuityFigure(
  { npv, annuityPerYear }: Worth,
  { discountPct, horizonYears }: SettledFinance,
  currency: string,
) {
  const value = { value: annuityPerYear, unit: currency };
  const [worth, years]: [Term, Term] = [
    ['V', npv, currency],
    ['n', horizonYears, 'years'],
  ];
  if (discountPct === 0)
    return figure('money.annuityPerYear', value, { formula: 'V / n', source: SOURCE }, [worth, years]);
  return figure('money.annuityPerYear', value, { formula: 'V · d / (1 − 1 / (1 + d)^n)', source: 'annuity tables' }, [
    worth,
    ['d', discountPct / 100, ''],
    years,
  ]);
}

/**
 * What a bank costs new, its items added up.
 * @param capital items and total
 * @param currency unit of the amounts
 * @returns a figure
 * @source method-figures
 */
export function capitalFigure({ total, lines }: Capital, currency: string): Figure {
  const symbols = lines.map((_, at) => `a_${at + 1}`);
  return figure(
    'money.capital.total',
    { value: total, unit: currency },
    { formula: symbols.join(' + '), source: 'the price book, item by item' },
    lines.map(({ amount }, at) => [symbols[at]!, amount, currency]),
  );
}
