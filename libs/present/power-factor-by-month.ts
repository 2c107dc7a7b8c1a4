import type { Outcome } from '#libs/engine/index.js';
import type { Chart } from './chart.js';
import { formatApart, formatFixed, formatNumber } from './format-number.js';
import { say } from './language.js';
import { formatMonth } from './local-stamp.js';
import { monthAxis, pairMarks } from './month-pairs.js';
import { niceStep } from './ticks.js';

interface MonthPair {
  month: string;
  before: number | null;
  after: number | null;
}

/**
 * Each billing month's energy power factor before (ring) and after (disc), joined: change is length.
 * @param outcome the plan or judgement
 * @returns chart with the target as a dotted line; a month without energy has no mark
 */
export function powerFactorByMonth(outcome: Outcome): Chart {
  const months = monthPairs(outcome);
  const target = outcome.site.targetPowerFactor;
  const known = months.flatMap(({ before, after }) => [before, after]).filter((value) => value !== null);
  return {
    id: 'powerFactorByMonth',
    finding: finding(months, target),
    caption: say`Energy power factor at the meter, lagging kvarh only. Ring: before. Disc: after. Dotted: target ${formatNumber(target, 'given')}.`,
    sentence: months
      .map(({ month, before, after }) => say`${formatMonth(month)}: ${number(before)} before, ${number(after)} after.`)
      .join(' '),
    x: monthAxis(months.map(({ month }) => month)),
    y: factorAxis(Math.min(...known, target)),
    equalScales: false,
    series: [{ part: 'limit', shape: 'line', x: [-0.5, months.length - 0.5], y: [target, target] }],
    marks: months.flatMap(({ before, after }, at) => pairMarks(at, before, after)),
    table: {
      columns: [say`month`, say`before`, say`after`].map((head, at) => ({ head, right: at > 0 })),
      rows: months.map(({ month, before, after }) => [formatMonth(month), number(before), beside(after, target)]),
    },
  };
}

function monthPairs(outcome: Outcome): MonthPair[] {
  const after = new Map(outcome.result.operation.months.map((month) => [month.month, month.powerFactorLagging]));
  return outcome.result.requirement.months.map(({ month, powerFactorLagging }) => ({
    month,
    before: powerFactorLagging,
    after: after.get(month) ?? null,
  }));
}

function number(value: number | null): string {
  return value === null ? '–' : formatNumber(value);
}

/** A factor barely under the target takes more digits, so that it does not read as met. */
function beside(value: number | null, target: number): string {
  return value === null ? '–' : formatApart(value, target).value;
}

/**
 * The axis of a power factor: from a round value under the least one up to 1.
 * @param least least value shown
 * @returns axis with its ticks
 */
export function factorAxis(least: number): Chart['y'] {
  const step = niceStep(Math.min(least, 0.98), 1, 4);
  const from = Math.max(0, Math.floor(least / step - 0.05) * step);
  const ticks = [];
  for (let n = Math.round(from / step); n * step <= 1 + 1e-9; n++) {
    ticks.push({ at: n * step, text: formatFixed(n * step, 2) });
  }
  return { label: say`power factor`, unit: '', scale: 'linear', from, to: 1, ticks };
}

function finding(months: readonly MonthPair[], target: number): string {
  const text = formatNumber(target, 'given');
  const missed = months.filter(({ after }) => after !== null && after < target - 1e-9);
  if (missed.length === 0) return say`Every month reaches ${text}`;
  const worst = missed.reduce((low, month) => (month.after! < low.after! ? month : low));
  const count = missed.length === 1 ? say`One month stays` : say`${missed.length} months stay`;
  return say`${count} under ${text}, ${formatMonth(worst.month)} by most`;
}
