import { createHash } from 'node:crypto';
import type { MeterMap } from '#libs/contract/meter-map.js';
import type { QuestionReading } from '#libs/contract/question.js';
import type { RecordColumns } from './build-columns.js';

const SHOWN_ROWS = 3;

/**
 * A reading as a question shows it: greatest kW, imported kWh and the first intervals in UTC, kW, lagging and leading kvar.
 * @param map what settles it this way
 * @param columns what would come of it
 */
export function shownReading(map: MeterMap, columns: RecordColumns): QuestionReading {
  const { intervalS, beginS, activeKw, laggingKvar, leadingKvar } = columns;
  let maxKw = activeKw[0] ?? 0;
  let sumKw = 0;
  for (const kw of activeKw) {
    if (kw > maxKw) maxKw = kw;
    sumKw += Math.max(kw, 0);
  }
  const firstRows = Array.from(beginS.subarray(0, SHOWN_ROWS), (momentS, i) => [
    utcStamp(momentS),
    String(activeKw[i]),
    String(laggingKvar[i]),
    String(leadingKvar[i]),
  ]);
  return { map, maxKw, activeKwh: (sumKw * intervalS) / 3600, firstRows };
}

/**
 * A moment as an ISO 8601 stamp in UTC, to the second.
 * @param momentS UTC [s]
 */
export function utcStamp(momentS: number): string {
  const iso = new Date(momentS * 1000).toISOString();
  return momentS === Math.floor(momentS) ? `${iso.slice(0, -5)}Z` : iso;
}

/**
 * Whether two readings make one record.
 * @param a columns of the first
 * @param b columns of the second
 */
export function sameColumns(a: RecordColumns, b: RecordColumns): boolean {
  return (
    a.intervalS === b.intervalS &&
    same(a.beginS, b.beginS) &&
    same(a.activeKw, b.activeKw) &&
    same(a.laggingKvar, b.laggingKvar) &&
    same(a.leadingKvar, b.leadingKvar) &&
    same(a.voltageV, b.voltageV) &&
    same(a.connectedKvar, b.connectedKvar) &&
    same(a.standby, b.standby)
  );
}

function same(a: Float64Array | Uint8Array | null, b: Float64Array | Uint8Array | null): boolean {
  if (a === null || b === null) return a === b;
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
}

const PRINTED_AT_ONCE = 8192;

/**
 * A print of a reading's columns, equal where two readings make one record and as good as never elsewhere.
 * @param columns of the reading
 */
export function columnsPrint(columns: RecordColumns): string {
  const hash = createHash('sha256');
  const { intervalS, beginS, activeKw, laggingKvar, leadingKvar, voltageV, connectedKvar, standby } = columns;
  hash.update(`${intervalS}`);
  const part = new Float64Array(PRINTED_AT_ONCE);
  for (const column of [beginS, activeKw, laggingKvar, leadingKvar, voltageV, connectedKvar, standby]) {
    hash.update(column === null ? 'none' : `${column.length}`);
    if (column === null) continue;
    for (let from = 0; from < column.length; from += PRINTED_AT_ONCE) {
      const count = Math.min(PRINTED_AT_ONCE, column.length - from);
      // adding 0 makes 0 of −0, which is the same number
      for (let i = 0; i < count; i++) part[i] = column[from + i]! + 0;
      hash.update(part.subarray(0, count));
    }
  }
  return hash.digest('hex');
}
