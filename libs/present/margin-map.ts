import type { MarginMap } from '#libs/engine/index.js';
import type { CellFill, Chart, Mark } from './chart.js';
import { formatNumber, formatQuantity, formatShare } from './format-number.js';
import { say } from './language.js';

/** Shares of the limit at which a cell's fill changes [%]; over a limit only beyond rounding. */
const QUIET_FROM_PCT = 50;
const HATCH_FROM_PCT = 80;
const SOLID_FROM_PCT = 100 * (1 + 1e-9);

/**
 * Harmonic voltage of every level and order as a share of its own limit, worst over every corner: a table that can be
 * seen from across the room.
 * @param margins shares by level and order
 * @param name what the bank is, for example "7 % reactors"
 * @param mostLevels more levels than this are thinned to those nearest their limits, the lowest and highest kept
 * @returns chart made of cells; the greatest level on top
 */
export function marginMap(
  margins: Pick<MarginMap, 'levelsKvar' | 'ordersH' | 'sharePct'>,
  name: string,
  mostLevels = Number.POSITIVE_INFINITY,
): Chart {
  const all = margins.levelsKvar.map((kvar, at) => ({ kvar, shares: margins.sharePct[at]! })).reverse();
  const levels = nearestLimits(all, mostLevels);
  const over = all.filter(({ kvar, shares }) => kvar > 0 && shares.some((share) => share > SOLID_FROM_PCT)).length;
  const heads = margins.ordersH.map((order) => formatNumber(order, 'given'));
  const rows = levels.map(({ kvar, shares }) => [formatNumber(kvar), ...shares.map(formatShare)]);
  const left =
    levels.length < all.length ? say` The ${levels.length} of ${all.length} levels nearest their limits.` : '';
  const axis = { label: '', unit: '', scale: 'linear' as const, from: 0 };
  return {
    id: 'marginMap',
    finding:
      over === 0
        ? say`${name}: every level within its limits`
        : say`${name}: ${over} of ${all.length - 1} levels over a limit`,
    caption: say`Harmonic voltage, % of its limit, worst corner; rows are levels in kvar, columns orders.${left}`,
    sentence: sentenceOf(levels, margins.ordersH),
    x: { ...axis, to: heads.length, ticks: heads.map((text, at) => ({ at: at + 0.5, text })) },
    y: { ...axis, unit: 'kvar', to: rows.length, ticks: rows.map((row, at) => ({ at: at + 0.5, text: row[0]! })) },
    equalScales: false,
    series: [],
    marks: levels.flatMap(({ shares }, row) => shares.map((share, column) => cell(share, { row, column }))),
    table: { columns: ['kvar', ...heads].map((head) => ({ head, right: true })), rows },
  };
}

interface LevelShares {
  kvar: number;
  shares: number[];
}

function sentenceOf(levels: readonly LevelShares[], orders: readonly number[]): string {
  const cells = levels.flatMap(({ kvar, shares }) => shares.map((share, at) => ({ kvar, share, order: orders[at]! })));
  const [first, ...others] = cells;
  if (first === undefined) return say`No order is present.`;
  const worst = others.reduce((most, one) => (one.share > most.share ? one : most), first);
  const order = formatNumber(worst.order, 'given');
  return say`Harmonic voltage as a share of its limit for ${levels.length} levels and ${orders.length} orders: at the most ${formatShare(worst.share)} %, order ${order} with ${formatQuantity(worst.kvar, 'kvar')} connected.`;
}

function nearestLimits(all: LevelShares[], most: number): LevelShares[] {
  if (all.length <= most) return all;
  const greatest = ({ shares }: LevelShares) => Math.max(...shares);
  const between = all
    .slice(1, -1)
    .sort((a, b) => greatest(b) - greatest(a))
    .slice(0, most - 2);
  return [all[0]!, ...between, all.at(-1)!].sort((a, b) => b.kvar - a.kvar);
}

function cell(sharePct: number, at: { row: number; column: number }): Mark {
  return { kind: 'cell', ...at, text: formatShare(sharePct), fill: fillOf(sharePct) };
}

function fillOf(sharePct: number): CellFill {
  if (sharePct > SOLID_FROM_PCT) return 'solid';
  if (sharePct > HATCH_FROM_PCT) return 'hatch';
  return sharePct > QUIET_FROM_PCT ? 'quiet' : 'blank';
}
