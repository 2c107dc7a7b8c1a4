import { zoneTable } from '#libs/contract/time-zone.js';
import { InputProblem, offsetAtS, type Remark, UTC_TABLE, type ZoneTable } from '#libs/engine/index.js';
import { note } from '../note.js';
import { clockTimes, isSteady, orderRows } from './clock-times.js';
import { describeDate } from './date-orders.js';
import { elapsedMoments } from './elapsed-days.js';
import { localToUtc } from './local-times.js';
import type { DateOrder } from './stamp-text.js';
import type { StampedRows } from './stamped-rows.js';

const DAY_S = 86_400;

/** What is known of a file's stamps beside the stamps themselves. */
export interface StampRules {
  order: DateOrder;
  /** what a stamp marks, where header or map say it */
  mark: 'begin' | 'end' | null;
  /** zone of stamps without an offset; null where nobody says */
  zone: string | null;
  /** the zone stands in the header */
  zoneFromHeader: boolean;
  /** clock times are the time passed since midnight, whatever the clock did */
  elapsed: boolean;
  /** takes the moments, where rows are read more than once */
  room?: Float64Array;
}

/** Moments of the rows, before it is known how long an interval is. */
export interface Moments {
  /** UTC, one a row; NaN where the zone's clock never showed the time [s] */
  utcS: Float64Array;
  /** time of a row by its clock, midnights that were moved under the day they begin [s] */
  clockAt: (row: number) => number;
  /** rows stand newest first */
  newestFirst: boolean;
  /** how long after the row before it every row stands [s]; NaN where that is not known to be one length */
  stepS: number;
  /** false where every row has a moment */
  skips: boolean;
  zone: ZoneTable;
  notes: Remark[];
}

/**
 * Turns the stamps of a file into moments.
 * @param rows in file order
 * @param rules what is known of the stamps
 * @param ends whether they mark the ends of intervals
 * @returns moments, with what had to be decided
 * @throws InputProblem where a stamp can't be
 */
export function momentsOf(rows: StampedRows, rules: StampRules, ends: boolean): Moments {
  const clock = clockTimes(rows, rules.order, rules.room);
  if (rows.offsetS !== null) return ownMoments(clock, rows.offsetS);
  const steady = isSteady(clock);
  const zone = zoneOver(rules.zone ?? 'UTC', clock, steady);
  const oneOffset = zone.offsetS.length === 1;
  const notes: Remark[] = [];
  if (rules.zone === null) notes.push(note('zone-assumed-utc', {}));
  else if (rules.zoneFromHeader) notes.push(note('zone-from-header', { zone: rules.zone }));
  if (rules.elapsed) {
    const passedS = rows.clockS.subarray(0, rows.count);
    const utcS = elapsedMoments(clock, passedS, zone);
    return { utcS, clockAt: clockIn(utcS, zone), newestFirst: false, stepS: Number.NaN, skips: true, zone, notes };
  }
  const { newestFirst, movedMidnights } = orderRows(clock, rows, rules.mark !== 'begin', steady);
  const { utcS, doubledRows, onceRows } = localToUtc(clock, newestFirst, zone, ends || movedMidnights > 0);
  if (newestFirst) notes.push(note('rows-newest-first', { rows: rows.count }));
  if (movedMidnights > 0) notes.push(note('midnight-under-ending-day', { rows: movedMidnights }));
  if (doubledRows > 0) notes.push(note('doubled-hour-by-order', { rows: doubledRows }));
  if (onceRows > 0) notes.push(note('doubled-hour-once', { rows: onceRows }));
  const stepS = steady && oneOffset ? utcS[1]! - utcS[0]! : Number.NaN;
  return { utcS, clockAt: clockIn(utcS, zone), newestFirst, stepS, skips: !oneOffset, zone, notes };
}

function clockIn(utcS: Float64Array, zone: ZoneTable): Moments['clockAt'] {
  return (row) => utcS[row]! + offsetAtS(zone, utcS[row]!);
}

function ownMoments(utcS: Float64Array, offsetS: Int32Array): Moments {
  for (let i = 0; i < utcS.length; i++) utcS[i]! -= offsetS[i]!;
  const clockAt = (row: number) => utcS[row]! + offsetS[row]!;
  return { utcS, clockAt, newestFirst: false, stepS: Number.NaN, skips: false, zone: UTC_TABLE, notes: [] };
}

function zoneOver(zone: string, clock: Float64Array, steady: boolean): ZoneTable {
  if (steady) return zoneTable(zone, clock[0]! - 2 * DAY_S, clock[clock.length - 1]! + 2 * DAY_S);
  let fromS = Number.POSITIVE_INFINITY;
  let toS = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < clock.length; i++) {
    const localS = clock[i]!;
    if (localS < fromS) fromS = localS;
    if (localS > toS) toS = localS;
  }
  return zoneTable(zone, fromS - 2 * DAY_S, toS + 2 * DAY_S);
}

/**
 * Whether the stamps of a whole record show that they mark ends: all stand at second 59, some say 24:00, midnights stand under the ending day, or
 * the first is one interval past midnight and the last is midnight.
 * @param rows in file order
 * @param moments of the rows
 * @param grid first and last row in time, and the length of an interval [s]
 * @returns what shows it, or null
 */
export function showsEnds(
  rows: StampedRows,
  moments: Moments,
  grid: { first: number; last: number; intervalS: number },
): string | null {
  if (moments.notes.some(({ code }) => code === 'midnight-under-ending-day')) return 'midnight under the ending day';
  if (rows.lastSeconds) return 'stamps at the last second of an interval';
  if (rows.clockS.subarray(0, rows.count).includes(DAY_S)) return 'a stamp of 24:00';
  const firstS = moments.clockAt(grid.first);
  const lastS = moments.clockAt(grid.last);
  const atMidnight = (localS: number) => ((localS % DAY_S) + DAY_S) % DAY_S === 0;
  return grid.intervalS < DAY_S && lastS > firstS && atMidnight(lastS) && atMidnight(firstS - grid.intervalS)
    ? 'the first stamp one interval past midnight and the last at midnight'
    : null;
}

/**
 * Leaves out rows of a skipped hour that hold nothing, and refuses one that holds a value.
 * @param rows in file order
 * @param moments of the rows
 * @param holdsValue whether a row has any number
 * @returns rows left out
 * @throws InputProblem naming the row
 */
export function skippedRows(rows: StampedRows, moments: Moments, holdsValue: (row: number) => boolean): number {
  if (!moments.skips || !moments.utcS.includes(Number.NaN)) return 0;
  let skipped = 0;
  for (let i = 0; i < rows.count; i++) {
    if (!Number.isNaN(moments.utcS[i]!)) continue;
    if (holdsValue(i)) refuseSkipped(rows, i, moments.zone);
    skipped++;
  }
  return skipped;
}

function refuseSkipped(rows: StampedRows, index: number, zone: ZoneTable): never {
  const clockS = rows.clockS[index]!;
  const two = (part: number) => String(part).padStart(2, '0');
  throw new InputProblem([
    {
      code: 'bad-time',
      path: 'timeZone',
      row: rows.rowNumber[index]!,
      expected: `a time that the clocks of ${zone.zone} showed; where the meter keeps one offset all year, say which by its time zone`,
      found: `${describeDate(rows, index)} ${two(Math.floor(clockS / 3600))}:${two(Math.floor(clockS / 60) % 60)}, in the hour that was skipped`,
    },
  ]);
}
