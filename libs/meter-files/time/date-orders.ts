import { InputProblem } from '#libs/engine/index.js';
import { type DateOrder, datePartsOf } from './stamp-text.js';
import type { StampedRows } from './stamped-rows.js';

/**
 * The orders of day, month and year that every date of the file can have.
 * @param rows dates as read
 * @param given what the map says
 * @returns at least one order; several where the dates leave it open
 * @throws InputProblem where dates contradict each other, or the map
 */
export function dateOrders(rows: StampedRows, given: DateOrder | undefined): DateOrder[] {
  if (rows.dateForm === null || rows.dateForm === 'yearFirst') return ['ymd'];
  if (rows.dateForm === 'dotted') return [given ?? 'dmy'];
  const orders: DateOrder[] = rows.dateForm === 'slashed' ? ['dmy', 'mdy'] : ['dmy', 'mdy', 'ymd'];
  const wanted = given === undefined ? orders : [given];
  const broken = wanted.map((order) => firstImpossible(rows, order));
  const possible = wanted.filter((_, index) => broken[index] === -1);
  if (possible.length > 0) return possible;
  const last = broken.reduce((latest, index) => Math.max(latest, index), 0);
  throw new InputProblem([
    {
      code: 'bad-time',
      row: rows.rowNumber[last]!,
      expected:
        given === undefined
          ? 'dates with day and month in one order through the whole file'
          : `a date in the order ${given}`,
      found: describeDate(rows, last),
    },
  ]);
}

/** Index of the first row whose date has no such day and month, or −1. */
function firstImpossible(rows: StampedRows, order: DateOrder): number {
  let known = -1;
  for (let i = 0; i < rows.count; i++) {
    const dateKey = rows.dateKey[i]!;
    if (dateKey === known) continue;
    known = dateKey;
    const parts = datePartsOf(dateKey, rows.dateForm!, order);
    if (parts === null || !isDate(parts)) return i;
  }
  return -1;
}

const EARLIEST_YEAR = 1950;
const LATEST_YEAR = 2150;
const MONTH_DAYS = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];

/**
 * Whether there is such a date, within the life of meters.
 * @param parts year, month 1 … 12, day 1 … 31
 */
export function isDate({ year, month, day }: { year: number; month: number; day: number }): boolean {
  if (year < EARLIEST_YEAR || year > LATEST_YEAR || month < 1 || month > 12 || day < 1) return false;
  const leap = month === 2 && year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
  return day <= MONTH_DAYS[month - 1]! + (leap ? 1 : 0);
}

/** The parts of a row's date as they stand. */
export function describeDate(rows: StampedRows, index: number): string {
  const dateKey = rows.dateKey[index]!;
  const [head, middle, tail] = [Math.floor(dateKey / 10_000), Math.floor(dateKey / 100) % 100, dateKey % 100];
  const two = (part: number) => String(part).padStart(2, '0');
  if (rows.dateForm === 'yearFirst') return `${head}-${two(middle)}-${two(tail)}`;
  if (rows.dateForm === 'short') return `${two(head)}/${two(middle)}/${two(tail)}`;
  const mark = rows.dateForm === 'dotted' ? '.' : '/';
  return `${two(middle)}${mark}${two(tail)}${mark}${head}`;
}
