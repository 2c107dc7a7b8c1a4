import type { ZoneTable } from '#libs/engine/index.js';
import { formatNumber } from '#libs/present/format-number.js';
import { formatMoment } from '#libs/present/local-stamp.js';
import type { Trace } from '../desk/look.js';
import type { TraceView } from './draw-trace.js';

/** A stretch of what is in view; the least and most of it are null where nothing was read. */
export interface TraceRow {
  beginS: number;
  read: number;
  kw: readonly [least: number, most: number] | null;
  kvar: readonly [least: number, most: number] | null;
}

/**
 * What is in view in so few rows that they can be read: single intervals where they fit, else stretches of equal length.
 * @param trace the record on its grid
 * @param view slots in view
 * @param mostRows no more rows than this
 */
export function traceRows(trace: Trace, view: TraceView, mostRows: number): TraceRow[] {
  const from = Math.max(0, Math.floor(view.from));
  const to = Math.min(trace.activeKw.length, Math.ceil(view.to));
  const step = Math.max(1, Math.ceil((to - from) / mostRows));
  const rows: TraceRow[] = [];
  for (let at = from; at < to; at += step) {
    const end = Math.min(to, at + step);
    rows.push({
      beginS: trace.firstS + at * trace.intervalS,
      read: readIn(trace.activeKw, at, end),
      kw: endsIn(trace.activeKw, at, end),
      kvar: endsIn(trace.reactiveKvar, at, end),
    });
  }
  return rows;
}

function readIn(column: Float32Array, from: number, to: number): number {
  let read = 0;
  for (let i = from; i < to; i++) if (!Number.isNaN(column[i]!)) read++;
  return read;
}

function endsIn(column: Float32Array, from: number, to: number): readonly [number, number] | null {
  let least = Number.POSITIVE_INFINITY;
  let most = Number.NEGATIVE_INFINITY;
  for (let i = from; i < to; i++) {
    const value = column[i]!;
    if (value < least) least = value;
    if (value > most) most = value;
  }
  return least <= most ? [least, most] : null;
}

const WIDTH = 960;
const PANE = 150;
const LEFT = 60;

/**
 * The rows as a drawing: kW above, kvar below, from the least to the most of each stretch.
 * @param rows what is in view
 * @param title its finding
 * @param zone the site's clock, which the times below are told by
 */
export function tracePicture(rows: readonly TraceRow[], title: string, zone: ZoneTable): string {
  const panes = (['kw', 'kvar'] as const).map((key, k) =>
    pane(rows, key, {
      top: 20 + k * (PANE + 30),
      unit: key === 'kw' ? 'kW' : 'kvar',
    }),
  );
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${WIDTH}" height="${2 * PANE + 76}" font-family="sans-serif" font-size="12" fill="#14202b"><title>${title}</title><rect width="100%" height="100%" fill="#fbfcfa"/>${panes.join('')}${timesBelow(rows, zone)}</svg>`;
}

/** Where the first, the middle and the last stretch begin. */
function timesBelow(rows: readonly TraceRow[], zone: ZoneTable): string {
  const y = 2 * PANE + 64;
  const last = rows.length - 1;
  const places = [
    { at: 0, x: LEFT, anchor: 'start' },
    {
      at: Math.floor(last / 2),
      x: LEFT + (WIDTH - LEFT) / 2,
      anchor: 'middle',
    },
    { at: last, x: WIDTH - 4, anchor: 'end' },
  ];
  const texts = places.map(({ at, x, anchor }) => {
    const row = rows[at];
    return row === undefined
      ? ''
      : `<text x="${x}" y="${y}" text-anchor="${anchor}">${formatMoment(zone, row.beginS)}</text>`;
  });
  return texts.join('');
}

function pane(rows: readonly TraceRow[], key: 'kw' | 'kvar', { top, unit }: { top: number; unit: string }): string {
  const ends = rows.flatMap((row) => row[key] ?? []);
  const most = Math.max(1, ...ends);
  const least = Math.min(0, ...ends);
  const y = (value: number) => (top + (PANE * (most - value)) / (most - least)).toFixed(1);
  const wide = (WIDTH - LEFT) / Math.max(1, rows.length);
  const bars = rows.map((row, at) => {
    const pair = row[key];
    if (pair === null) return '';
    const x = (LEFT + (at + 0.5) * wide).toFixed(1);
    return `M${x} ${y(Math.min(pair[0], pair[1] - 1e-3 * (most - least)))}V${y(pair[1])}`;
  });
  const words = [most, least].map(
    (value) => `<text x="${LEFT - 8}" y="${y(value)}" text-anchor="end">${formatNumber(value)}</text>`,
  );
  return `${words.join('')}<text x="0" y="${top - 6}">${unit}</text><path d="M${LEFT} ${y(0)}H${WIDTH}" stroke="#14202b"/><path d="${bars.join('')}" stroke="#14202b" stroke-width="${Math.max(0.8, 0.7 * wide).toFixed(1)}"/>`;
}
