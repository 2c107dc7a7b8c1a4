import { dayNumber, InputProblem } from '#libs/engine/index.js';
import { describeDate, isDate } from './date-orders.js';
import { type DateOrder, datePartsOf } from './stamp-text.js';
import type { StampedRows } from './stamped-rows.js';

const DAY_S = 86_400;

/**
 * The clock times of the rows as they are written, in seconds since 1970-01-01 00:00 by the same clock.
 * @param rows stamps in parts, in file order
 * @param order of the parts of a date
 * @param room takes the times, if it is given
 * @returns one time a row [s]
 * @throws InputProblem naming the row of a date that does not exist
 */
export function clockTimes(rows: StampedRows, order: DateOrder, room?: Float64Array): Float64Array {
  const { count, dateKey, clockS } = rows;
  const clock = room?.subarray(0, count) ?? new Float64Array(count);
  let known = -1;
  let dayS = 0;
  for (let i = 0; i < count; i++) {
    const key = dateKey[i]!;
    if (key !== known) {
      dayS = DAY_S * dayOf(rows, i, order);
      known = key;
    }
    clock[i] = dayS + clockS[i]!;
  }
  return clock;
}

function dayOf(rows: StampedRows, index: number, order: DateOrder): number {
  const parts = datePartsOf(rows.dateKey[index]!, rows.dateForm!, order);
  if (parts !== null && isDate(parts)) return dayNumber(parts.year, parts.month, parts.day);
  throw new InputProblem([
    {
      code: 'bad-time',
      row: rows.rowNumber[index]!,
      expected: 'a date of the calendar between 1950 and 2150',
      found: describeDate(rows, index),
    },
  ]);
}

/** In which order the rows of a file stand, and what that says about its midnights. */
export interface FileOrder {
  /** the last row is the earliest */
  newestFirst: boolean;
  /** rows stamped 00:00 that belong to the day that ends; their clock times have been moved to the next day */
  movedMidnights: number;
}

/**
 * Finds the direction of the rows and moves midnights written under the ending day: 00:00 behind 23:45 of the same date,
 * with the next date following.
 * @param clock times as written, in file order; changed where midnights are moved
 * @param rows the rows they belong to
 * @param movable false where the stamps are said to mark beginnings
 * @param steady see isSteady
 * @returns what was found
 * @throws InputProblem where some midnights end a day and others begin one
 */
export function orderRows(
  clock: Float64Array,
  rows: StampedRows,
  movable: boolean,
  steady = isSteady(clock),
): FileOrder {
  if (steady) return { newestFirst: false, movedMidnights: 0 };
  const newestFirst = isNewestFirst(clock);
  const found = movable ? midnights(clock, rows, newestFirst) : null;
  const orderly = found !== null && found.descents <= 2 + clock.length / 100;
  if (found === null || !orderly || found.ending.size === 0) return { newestFirst, movedMidnights: 0 };
  const [contradiction] = found.beginning.values();
  if (contradiction !== undefined) refuseMixedMidnights(rows, contradiction);
  let movedMidnights = 0;
  for (let i = 0; i < clock.length; i++) {
    if (rows.clockS[i] !== 0) continue;
    clock[i]! += DAY_S;
    movedMidnights++;
  }
  return { newestFirst, movedMidnights };
}

/**
 * Most files: every row one step after the row before it, so that each midnight begins its day.
 * @param clock times as written, in file order [s]
 */
export function isSteady(clock: Float64Array): boolean {
  const stepS = clock[1]! - clock[0]!;
  if (!(stepS > 0 && stepS < DAY_S)) return false;
  const n = clock.length;
  let i = 1;
  let before = clock[0]!;
  // four at a time, which takes half as long as one by one
  for (; i + 3 < n; i += 4) {
    const a = clock[i]!;
    const b = clock[i + 1]!;
    const c = clock[i + 2]!;
    const d = clock[i + 3]!;
    if (a - before !== stepS || b - a !== stepS || c - b !== stepS || d - c !== stepS) return false;
    before = d;
  }
  for (; i < n; i++) if (clock[i]! - clock[i - 1]! !== stepS) return false;
  return true;
}

function isNewestFirst(clock: Float64Array): boolean {
  let balance = 0;
  for (let i = 1; i < clock.length; i++) balance += Math.sign(clock[i]! - clock[i - 1]!);
  return balance < 0;
}

interface Midnights {
  /** midnights that end a day and stand nowhere as its beginning, each with a row it stands in [s] */
  ending: Map<number, number>;
  beginning: Map<number, number>;
  /** steps back in time that are no midnight */
  descents: number;
}

function midnights(clock: Float64Array, rows: StampedRows, newestFirst: boolean): Midnights {
  const n = clock.length;
  const found: Midnights = { ending: new Map(), beginning: new Map(), descents: 0 };
  const row = (i: number) => (newestFirst ? n - 1 - i : i);
  for (let i = 0; i < n; i++) {
    const here = clock[row(i)]!;
    const before = i > 0 ? clock[row(i - 1)]! : Number.NaN;
    const after = i + 1 < n ? clock[row(i + 1)]! : Number.NaN;
    const kind = rows.clockS[row(i)] === 0 ? midnightKind(here, before, after) : 'none';
    if (kind !== 'none') found[kind].set(here, row(i));
    else if (before > here) found.descents++;
  }
  // a row repeated out of its place is no evidence
  for (const midnight of found.beginning.keys()) found.ending.delete(midnight);
  return found;
}

/** A midnight between a later time of its date and one of another date ends the day, the other way round it begins it. */
function midnightKind(here: number, before: number, after: number): 'ending' | 'beginning' | 'none' {
  const laterBefore = before > here && before < here + DAY_S;
  const laterAfter = after > here && after < here + DAY_S;
  if (laterBefore === laterAfter) return 'none';
  return laterBefore ? 'ending' : 'beginning';
}

function refuseMixedMidnights(rows: StampedRows, index: number): never {
  throw new InputProblem([
    {
      code: 'bad-time',
      row: rows.rowNumber[index]!,
      expected: 'midnight under the ending day, as elsewhere in the file',
      found: `00:00 at the beginning of ${describeDate(rows, index)}`,
    },
  ]);
}
