import { dayNumber } from '#libs/engine/index.js';
import { mixedIntervals } from '../record/mixed-intervals.js';
import type { RowProblems } from '../row-problems.js';
import { type CountedClock, settleCounts } from '../time/counted-clock.js';
import { readEpochStamp } from '../time/epoch-stamp.js';
import { readDayFraction, readSerialStamp } from '../time/serial-dates.js';
import { datePartsOf, readStamp, type Stamp } from '../time/stamp-text.js';
import type { StampedRows } from '../time/stamped-rows.js';
import { type DateParts, dateKeyOf } from './date-parts.js';
import type { RowCells } from './row-cells.js';
import type { TimeColumns } from './time-columns.js';

const DAY_S = 86_400;
/** Offsets a single place has had in the life of a meter; more of them are clock times misread. */
const MOST_OFFSETS = 4;

/** Reads the stamps of rows and keeps them, checking that all are written the same way. */
export class RowStamps {
  readonly rows: StampedRows;
  /** how the clock column counts the intervals of a day, once all rows are read; null where it does not */
  counted: CountedClock | null = null;
  readonly #time: TimeColumns;
  readonly #problems: RowProblems;
  readonly #offsets = new Set<number>();
  #dates = 0;
  #firstDateRow = 0;

  constructor(rows: StampedRows, time: TimeColumns, problems: RowProblems) {
    this.rows = rows;
    this.#time = time;
    this.#problems = problems;
  }

  /**
   * The stamp of a row.
   * @param cells the row
   * @returns the stamp, its clock time null where the cell is a date alone; null where there is none
   */
  read(cells: RowCells): Stamp | null {
    const { stamp: column, clock, parts } = this.#time;
    const stamp = parts === null ? this.#stampOf(cells.text(column)) : dateIn(parts, cells);
    if (clock < 0) {
      return stamp === null || stamp.dateKey === null ? null : stamp;
    }
    const beside = this.#time.minute < 0 ? this.#clockOf(cells.text(clock)) : this.#hourAndMinute(cells);
    if (stamp === null || stamp.dateKey === null || beside === null || beside.clockS === null) return null;
    return { ...beside, dateKey: stamp.dateKey, dateForm: stamp.dateForm };
  }

  /**
   * Keeps a stamp at an index, or notes why it can't stand there.
   * @param index row of `rows`
   * @param stamp what was read
   * @param cells the row, for its end column
   */
  keep(index: number, stamp: Stamp, cells: RowCells): void {
    const { rows } = this;
    const row = rows.rowNumber[index]!;
    if (stamp.clockS === null && this.#dates++ === 0) this.#firstDateRow = row;
    rows.dateForm ??= stamp.dateForm;
    if (stamp.dateForm !== rows.dateForm) this.#refuse(row, 'a date written as in the rows before', cells);
    rows.dateKey[index] = stamp.dateKey!;
    rows.clockS[index] = stamp.clockS ?? 0;
    this.#keepOffset(index, stamp.offsetS, cells);
    const spanS = this.#spanOf(stamp, cells);
    if (spanS !== null) this.#keepSpan(row, spanS, stamp.offsetS !== null);
  }

  /** A date alone is midnight in files that drop the clock time there; beside midnights written out it is a broken stamp. */
  end(): void {
    if (this.#time.counted && this.rows.count > 0) this.#settleCounts();
    this.#roundLastSeconds();
    if (this.#dates === 0) return;
    if (this.#dates === this.rows.count) {
      this.#refuseShared(this.#time.stamp, 'a clock time beside the date, where a day has several rows');
    }
    const midnights = this.rows.clockS.subarray(0, this.rows.count).filter((clockS) => clockS === 0).length;
    if (midnights === this.#dates) return;
    const expected = 'a date and a time, as in other rows of midnight';
    const place = { row: this.#firstDateRow, column: this.#time.stamp + 1 };
    this.#problems.add({ code: 'bad-time', ...place, expected, found: 'a date alone' });
  }

  /** Stamps that all stand at second 59 name the last second of an interval: its end is the minute that follows. */
  #roundLastSeconds(): void {
    const clockS = this.rows.clockS.subarray(0, this.rows.count);
    if (clockS.length === 0 || !clockS.every((second) => second % 60 === 59)) return;
    for (let i = 0; i < clockS.length; i++) clockS[i]!++;
    this.rows.lastSeconds = true;
  }

  #settleCounts(): void {
    const { rows } = this;
    let least = Number.POSITIVE_INFINITY;
    let most = 0;
    for (const number of rows.clockS.subarray(0, rows.count)) {
      least = Math.min(least, number);
      most = Math.max(most, number);
    }
    const counted = settleCounts(rows);
    if (counted !== null) {
      this.counted = counted === 'clock' ? null : counted;
      this.#refuseShared(this.#time.clock, 'a clock time with minutes, where an hour has several rows');
      return;
    }
    const expected = 'hours 1 to 24 or 0 to 23, or intervals of a day counted alike, such as 1 to 48 or 1 to 96';
    const place = { row: rows.rowNumber[0]!, column: this.#time.clock + 1 };
    this.#problems.add({
      code: 'bad-time',
      ...place,
      expected,
      found: `${least} to ${most}`,
    });
  }

  /** Dates without clock times say when a day is, and hours when an hour is, not when in it a row is. */
  #refuseShared(column: number, expected: string): void {
    const { dateKey, clockS, rowNumber, count } = this.rows;
    let shared = 0;
    for (let i = 1; i < count; i++) if (dateKey[i] === dateKey[i - 1] && clockS[i] === clockS[i - 1]) shared++;
    if (shared < count / 2) return;
    const found = `${shared + 1} rows of ${count} without one`;
    this.#problems.add({ code: 'bad-time', row: rowNumber[0]!, column: column + 1, expected, found });
  }

  #stampOf(text: string): Stamp | null {
    if (this.#time.epoch) return readEpochStamp(text);
    return (this.#time.serial ? readSerialStamp(text) : null) ?? readStamp(text);
  }

  #clockOf(text: string): Stamp | null {
    const { serial, counted } = this.#time;
    const bare = { dateKey: null, dateForm: 'yearFirst' as const, offsetS: null, untilS: null };
    if (counted) return /^\d{1,4}$/.test(text) ? { ...bare, clockS: Number(text) } : null;
    const clockS = serial ? readDayFraction(text) : null;
    return clockS === null ? readStamp(text) : { ...bare, clockS };
  }

  #hourAndMinute(cells: RowCells): Stamp | null {
    const [hour, minute] = [cells.text(this.#time.clock), cells.text(this.#time.minute)];
    if (!/^\d{1,2}$/.test(hour) || !/^\d{1,2}$/.test(minute)) return null;
    return readStamp(`${hour.padStart(2, '0')}:${minute.padStart(2, '0')}`);
  }

  #refuse(row: number, expected: string, cells: RowCells): void {
    const { stamp, clock } = this.#time;
    const found = [stamp, clock].filter((column) => column >= 0).map((column) => cells.text(column));
    this.#problems.add({
      code: 'bad-time',
      row,
      column: stamp + 1,
      expected,
      found: `"${found.join(' ').slice(0, 60)}"`,
    });
  }

  #keepOffset(index: number, offsetS: number | null, cells: RowCells): void {
    const { rows } = this;
    const row = rows.rowNumber[index]!;
    if (index === 0 && offsetS !== null) rows.offsetS = new Int32Array(rows.rowNumber.length);
    if ((offsetS === null) !== (rows.offsetS === null)) {
      this.#refuse(
        row,
        offsetS === null
          ? 'a stamp with its offset, as in the rows before'
          : 'a stamp without an offset, as in the rows before',
        cells,
      );
      return;
    }
    if (offsetS === null || rows.offsetS === null) return;
    this.#offsets.add(offsetS);
    if (this.#offsets.size > MOST_OFFSETS)
      this.#refuse(row, `at most ${MOST_OFFSETS} different offsets from UTC`, cells);
    rows.offsetS[index] = offsetS;
  }

  /** The stamp or clock time of the interval's end; at second 59 it is the last second of the interval. */
  #endOf({ clockS }: Stamp, cells: RowCells): Stamp | null {
    const { end } = this.#time;
    if (end < 0) return null;
    const read = this.#stampOf(cells.text(end)) ?? this.#clockOf(cells.text(end));
    if (read === null || read.clockS === null) return read;
    return read.clockS % 60 === 59 && (clockS ?? 0) % 60 === 0 ? { ...read, clockS: read.clockS + 1 } : read;
  }

  /** From begin to end as far as the row states both [s]. */
  #spanOf(stamp: Stamp, cells: RowCells): number | null {
    if (stamp.untilS !== null) return modulo(stamp.untilS - (stamp.clockS ?? 0), DAY_S) || DAY_S;
    const until = this.#endOf(stamp, cells);
    if (until === null || (until.clockS === null && until.dateKey === null)) return null;
    const clockS = (until.clockS ?? 0) - (stamp.clockS ?? 0) - ((until.offsetS ?? 0) - (stamp.offsetS ?? 0));
    if (until.dateKey !== null && until.dateForm === 'yearFirst' && stamp.dateForm === 'yearFirst') {
      return (dayOf(until) - dayOf(stamp)) * DAY_S + clockS;
    }
    return modulo(clockS, DAY_S) || DAY_S;
  }

  #keepSpan(row: number, spanS: number, absolute: boolean): void {
    const { rows } = this;
    if (Number.isNaN(rows.spanS)) rows.spanS = spanS;
    if (spanS === rows.spanS) return;
    // where clocks change, the local end is off by that change
    const off = Math.abs(modulo(spanS - rows.spanS + DAY_S / 2, DAY_S) - DAY_S / 2);
    if (!absolute && (off === 3600 || off === 1800)) return;
    this.#problems.add(mixedIntervals(row, rows.spanS, spanS));
  }
}

function dateIn(parts: DateParts, cells: RowCells): Stamp | null {
  const dateKey = dateKeyOf(parts, (column) => cells.text(column));
  return dateKey === null
    ? null
    : {
        dateKey,
        dateForm: 'yearFirst',
        clockS: null,
        offsetS: null,
        untilS: null,
      };
}

function dayOf(stamp: Stamp): number {
  const parts = datePartsOf(stamp.dateKey!, 'yearFirst', 'ymd')!;
  return dayNumber(parts.year, parts.month, parts.day);
}

function modulo(value: number, by: number): number {
  return ((value % by) + by) % by;
}
