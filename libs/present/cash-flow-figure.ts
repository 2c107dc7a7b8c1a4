import type { Money, MoneyPapers, Worth } from '#libs/engine/index.js';
import type { Chart, Mark, Series } from './chart.js';
import { formatFixed } from './format-number.js';
import { say } from './language.js';
import { formatMoney, formatPayback, paybackWords } from './money-words.js';
import { linearAxis } from './ticks.js';

/** Half the width of a year's bar [year]. */
const HALF = 0.32;

/** Money with prices. */
export type PricedMoney = Extract<Money, Worth>;

/**
 * Whether a result's money holds prices, so that a bank is worth something.
 * @param money a result's money
 * @returns true where capital, running costs and cash flow stand
 */
export function isPriced(money: Money): money is PricedMoney {
  return money.capital !== null;
}

/**
 * The cash flow: a bar a year, the running sum by month, a ring at the moment the capital is back.
 * @param money with prices
 * @param papers currency and horizon
 * @returns chart, its table by year with the capital first
 */
export function cashFlowFigure(money: PricedMoney, papers: MoneyPapers): Chart {
  const { months, years } = money.cashFlow;
  const capital = money.capital.total;
  const sums = [-capital, ...months.map(({ cumulative }) => cumulative)];
  const end = sums.at(-1)!;
  const bars = [0 - capital, ...years.map(({ net }) => net)];
  const lastYear = years.length;
  const ring: Mark[] = money.paybackYears === null ? [] : [{ kind: 'ring', x: money.paybackYears, y: 0 }];
  return {
    id: 'cashFlow',
    finding:
      money.paybackYears === null
        ? say`Payback: ${paybackWords(money, papers.finance.horizonYears)}`
        : say`Paid back after ${formatPayback(money.paybackYears)}`,
    caption: say`Bars: net of each year, the capital at 0. Line: their sum, month by month, not discounted. Ring: paid back.`,
    sentence: say`${formatMoney(capital, papers.currency)} are paid at the beginning; after ${lastYear} years the sum is
        ${formatMoney(end, papers.currency)}.`,
    x: {
      label: say`years`,
      unit: '',
      scale: 'linear',
      from: -0.5,
      to: lastYear + 0.5,
      ticks: Array.from({ length: lastYear + 1 }, (_, at) => ({ at, text: String(at) })),
    },
    y: linearAxis('', papers.currency, { least: Math.min(...sums, ...bars), most: Math.max(...sums, ...bars) }),
    equalScales: false,
    series: [
      ...bars.map((net, year) => bar(net, year)),
      { part: 'beyond', shape: 'line', x: [-0.5, lastYear + 0.5], y: [0, 0] },
      { part: 'after', shape: 'line', x: sums.map((_, month) => month / 12), y: sums },
    ],
    marks: ring,
    table: cashTable(money),
  };
}

/** A year's bar stands at the year's end, where its months are all in. */
function bar(net: number, year: number): Series {
  return { part: 'bank', shape: 'washStair', x: [year - HALF, year + HALF], y: [net, net], base: [0, 0] };
}

function cashTable({ cashFlow, capital }: PricedMoney): Chart['table'] {
  const rows = cashFlow.years.map(({ year, net }) => {
    const discounted = cashFlow.months
      .slice(12 * (year - 1), 12 * year)
      .reduce((sum, month) => sum + month.discounted, 0);
    return { year, net, discounted, sum: cashFlow.months[12 * year - 1]!.cumulative };
  });
  const start = formatFixed(0 - capital.total, 0);
  return {
    columns: [say`year`, say`in the year`, say`discounted`, say`sum`].map((head, at) => ({ head, right: at > 0 })),
    rows: [
      ['0', start, start, start],
      ...rows.map(({ year, net, discounted, sum }) => [
        String(year),
        ...[net, discounted, sum].map((value) => formatFixed(value, 0)),
      ]),
    ],
  };
}
