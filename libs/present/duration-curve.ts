import type { Outcome } from '#libs/engine/index.js';
import type { Chart, Mark } from './chart.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say } from './language.js';
import { linearAxis } from './ticks.js';

/** Shares of the record that the table lists [%]. */
const LISTED_PCT = [0, 1, 2, 5, 10, 25, 50, 75, 90, 100];

/**
 * The need over the share of the record with at least that need, with the bank's levels inscribed under it.
 * @param outcome the plan or judgement
 * @returns chart; the gap between line and stair is what the bank leaves
 */
export function durationCurve(outcome: Outcome): Chart {
  const need = outcome.series.needKvar.slice().sort().reverse();
  const n = need.length;
  const levels = outcome.result.bank.levelsKvar;
  const top = levels.at(-1) ?? 0;
  const { maxKvar, p99Kvar, p95Kvar } = outcome.result.requirement;
  const { share, reached, beyond, floor } = columnsOf(need, levels);
  const target = formatNumber(outcome.site.targetPowerFactor, 'given');
  return {
    id: 'durationCurve',
    finding: finding(outcome, top),
    caption: say`Needed kvar over the share of the record with at least that need; the steps are the bank’s levels.`,
    sentence: say`Needed kvar for ${target}, sorted: at most ${formatQuantity(maxKvar, 'kvar')},
        ${formatQuantity(p99Kvar, 'kvar')} or more for 1 % of the record, ${formatQuantity(p95Kvar, 'kvar')} or more for 5 %.
        The bank’s levels reach ${formatQuantity(top, 'kvar')}.`,
    x: {
      ...linearAxis(say`share of the record with at least this need`, '%', { least: 0, most: 100 }, 4),
      to: 100,
      ticks: quarters(),
    },
    y: linearAxis(say`needed`, 'kvar', { least: 0, most: Math.max(maxKvar, top) }),
    equalScales: false,
    series: [
      { part: 'bank', shape: 'washStair', x: share, y: reached },
      { part: 'beyond', shape: 'hatch', x: share, y: beyond, base: floor },
      { part: 'site', shape: 'line', x: share, y: need },
    ],
    marks: [...pointMarks(outcome), ...levelMarks(levels, top)],
    table: {
      columns: [
        { head: say`share of the record`, right: true },
        { head: say`need at least`, right: true },
        { head: say`level that fits under it`, right: true },
      ],
      rows: LISTED_PCT.map((pct) => {
        const kvar = need[Math.round((pct / 100) * (n - 1))]!;
        return [
          formatQuantity(pct, '%', 'given'),
          formatQuantity(kvar, 'kvar'),
          formatQuantity(levelUnder(levels, kvar), 'kvar'),
        ];
      }),
    },
  };
}

/** Columns of the chart over the sorted need; the level under it only falls, so one pass finds it. */
function columnsOf(need: Float64Array, levelsKvar: readonly number[]) {
  const n = need.length;
  const columns = {
    share: new Float64Array(n),
    reached: new Float64Array(n),
    beyond: new Float64Array(n),
    floor: new Float64Array(n),
  };
  const top = levelsKvar.at(-1) ?? 0;
  let at = levelsKvar.length - 1;
  for (let i = 0; i < n; i++) {
    const kvar = need[i]!;
    while (at > 0 && !fitsUnder(levelsKvar[at]!, kvar)) at--;
    columns.share[i] = n === 1 ? 0 : (100 * i) / (n - 1);
    columns.reached[i] = levelsKvar[at] ?? 0;
    columns.beyond[i] = kvar > top ? kvar : Number.NaN;
    columns.floor[i] = kvar > top ? top : Number.NaN;
  }
  return columns;
}

function fitsUnder(levelKvar: number, kvar: number): boolean {
  return levelKvar <= kvar * (1 + 1e-12);
}

function finding(outcome: Outcome, top: number): string {
  const { maxKvar } = outcome.result.requirement;
  const most = formatQuantity(maxKvar, 'kvar');
  const bank = formatQuantity(top, 'kvar');
  if (maxKvar <= 1e-9) return say`No interval of the record needs a bank`;
  if (top === 0) return say`Up to ${most} are needed and no bank stands against it`;
  return top >= maxKvar
    ? say`${bank} reach the greatest need, ${most}`
    : say`${bank} stand against a greatest need of ${most}`;
}

/** The greatest level at or below a need. */
function levelUnder(levelsKvar: readonly number[], kvar: number): number {
  let level = 0;
  for (const step of levelsKvar) if (fitsUnder(step, kvar)) level = step;
  return level;
}

function quarters() {
  return [0, 25, 50, 75, 100].map((at) => ({ at, text: String(at) }));
}

function pointMarks(outcome: Outcome): Mark[] {
  const { maxKvar, p99Kvar, p95Kvar } = outcome.result.requirement;
  if (maxKvar <= 1e-9) return [];
  const points = [
    { x: 0, y: maxKvar, text: say`maximum ${formatNumber(maxKvar)}` },
    { x: 1, y: p99Kvar, text: `P99 ${formatNumber(p99Kvar)}` },
    { x: 5, y: p95Kvar, text: `P95 ${formatNumber(p95Kvar)}` },
  ];
  return points.map((point) => ({ kind: 'ring', side: 'right', ...point }));
}

function levelMarks(levelsKvar: readonly number[], top: number): Mark[] {
  return levelsKvar.map((kvar) => ({
    kind: 'level',
    y: kvar,
    text:
      kvar === top && top > 0
        ? say`${formatNumber(kvar)} all stages`
        : kvar === 0
          ? say`0 none in`
          : formatNumber(kvar),
  }));
}
