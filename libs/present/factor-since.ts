import type { Reevaluation, SinceWhen } from '#libs/engine/index.js';
import type { Chart, Mark } from './chart.js';
import { formatNumber } from './format-number.js';
import { formatMonth } from './local-stamp.js';
import { monthAxis, pairMarks } from './month-pairs.js';
import { factorAxis } from './power-factor-by-month.js';

type SinceMonth = SinceWhen['months'][number];

/**
 * The months of both records beside the target: as metered (ring) and with the bank simulated (disc), joined.
 * @param reevaluation the bank judged again
 * @param target power factor asked for now
 * @returns chart with the months of the later record on a quiet ground; null where nothing changed or no month has energy
 */
export function factorSince({ since, newRecord }: Reevaluation, target: number): Chart | null {
  if (since === null) return null;
  const { months, firstMonthOut, monthsBy } = since;
  const known = months.flatMap((month) => [month.powerFactorMetered, month.powerFactorWithBank]).filter(isKnown);
  if (known.length === 0) return null;
  return {
    id: 'factorSince',
    finding:
      firstMonthOut === null
        ? 'The last month meets the target'
        : `Below the target since ${formatMonth(firstMonthOut)}`,
    caption:
      `Energy power factor at the meter. Ring: as metered. Disc: with the bank simulated. Dotted: target ${formatNumber(target, 'given')}. ` +
      `Since when is told by the ${monthsBy === 'metered' ? 'rings' : 'discs'}.` +
      (newRecord ? ' Quiet ground: the later record.' : ''),
    sentence: months.map(sentenceOf).join(' '),
    x: monthAxis(
      months.map(({ month }) => month),
      firstMonthOut,
    ),
    y: factorAxis(Math.min(...known, target)),
    equalScales: false,
    series: [{ part: 'limit', shape: 'line', x: [-0.5, months.length - 0.5], y: [target, target] }],
    marks: [...(newRecord ? laterGround(months) : []), ...months.flatMap(pairOf)],
    table: {
      columns: ['month', 'record', 'as metered', 'with the bank', 'needed kvar'].map((head, at) => ({
        head,
        right: at > 1,
      })),
      rows: months.map((month) => [
        formatMonth(month.month),
        month.record === 'before' ? 'earlier' : 'later',
        factor(month.powerFactorMetered),
        factor(month.powerFactorWithBank),
        formatNumber(month.neededKvar),
      ]),
    },
  };
}

function isKnown(value: number | null): value is number {
  return value !== null;
}

function factor(value: number | null): string {
  return value === null ? '–' : formatNumber(value);
}

function sentenceOf({ month, powerFactorMetered, powerFactorWithBank }: SinceMonth): string {
  return `${formatMonth(month)}: ${factor(powerFactorMetered)} metered, ${factor(powerFactorWithBank)} with the bank.`;
}

function laterGround(months: readonly SinceMonth[]): Mark[] {
  return months.flatMap(({ record }, at) =>
    record === 'after' ? [{ kind: 'window' as const, from: at - 0.5, to: at + 0.5 }] : [],
  );
}

function pairOf({ powerFactorMetered, powerFactorWithBank }: SinceMonth, at: number): Mark[] {
  return pairMarks(at, powerFactorMetered, powerFactorWithBank);
}
