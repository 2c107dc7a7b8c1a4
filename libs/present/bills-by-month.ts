import type { Bill, MoneyPapers } from '#libs/engine/index.js';
import type { Chart } from './chart.js';
import { formatFixed } from './format-number.js';
import { say } from './language.js';
import { formatMonth } from './local-stamp.js';
import { billDecimals, formatMoney } from './money-words.js';
import { monthAxis, pairMarks } from './month-pairs.js';
import { niceStep } from './ticks.js';

/**
 * Each month's bill before (ring) and after (disc), joined: the saving is length.
 * @param bills before and after
 * @param papers tariff and currency
 * @returns chart with both bills and their difference in its table, the record's sums last
 */
export function billsByMonth(bills: { before: Bill; after: Bill }, papers: MoneyPapers): Chart {
  const decimals = billDecimals(papers);
  const amount = (value: number) => formatFixed(value, decimals);
  const months = bills.before.months.map(({ month, total, partial }, at) => {
    const after = bills.after.months[at]?.total ?? total;
    return { month, name: `${formatMonth(month)}${partial ? '*' : ''}`, before: total, after, saved: total - after };
  });
  const values = months.flatMap(({ before, after }) => [before, after]);
  const saved = bills.before.total - bills.after.total;
  const partial = months.some(({ name }) => name.endsWith('*')) ? say` *: the record holds a part of this month.` : '';
  const y = amountAxis(Math.min(...values), Math.max(...values), papers.currency);
  return {
    id: 'billsByMonth',
    finding:
      saved >= 0
        ? say`The bills fall by ${formatMoney(saved, papers.currency, decimals)} over the record`
        : say`The bills rise by ${formatMoney(-saved, papers.currency, decimals)} over the record`,
    caption: say`Bill of each month at the meter. Ring: before. Disc: after.${y.from > 0 ? say` The axis does not begin at 0.` : ''}${partial}`,
    sentence: months
      .map(({ name, before, after }) => say`${name}: ${amount(before)} before, ${amount(after)} after.`)
      .join(' '),
    x: monthAxis(months.map(({ month }) => month)),
    y,
    equalScales: false,
    series: [],
    marks: months.flatMap(({ before, after }, at) => pairMarks(at, before, after)),
    table: {
      columns: [say`month`, say`before`, say`after`, say`saved`].map((head, at) => ({ head, right: at > 0 })),
      rows: [
        ...months.map((month) => [month.name, amount(month.before), amount(month.after), amount(month.saved)]),
        [say`together`, amount(bills.before.total), amount(bills.after.total), amount(saved)],
      ],
    },
  };
}

function amountAxis(least: number, most: number, currency: string): Chart['y'] {
  const room = Math.max(most - least, 1) * 0.05;
  const step = niceStep(least - room, most + room, 5);
  const from = Math.floor((least - room) / step) * step;
  const to = Math.ceil((most + room) / step) * step;
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const ticks = [];
  for (let n = Math.round(from / step); n * step <= to + step / 2; n++) {
    ticks.push({ at: n * step, text: formatFixed(n * step, decimals) });
  }
  return { label: say`bill`, unit: currency, scale: 'linear', from, to, ticks };
}
