import { datePartsOf } from '../time/stamp-text.js';
import type { HeaderColumn } from './header-column.js';
import { says, type WordGroup, wordsOf } from './header-words.js';

/** Columns of the parts of a date, counted from 0. */
export interface DateParts {
  year: number;
  month: number;
  day: number;
}

/**
 * Finds a column each for year, month and day, by names that say nothing else and what stands below them.
 * @param columns header
 * @param rows first rows of data, as texts
 * @returns null where one of them is missing, or a cell is no such part
 */
export function datePartColumns(columns: readonly HeaderColumn[], rows: readonly string[][]): DateParts | null {
  const [year, month, day] = (['year', 'month', 'day'] as const).map((part) => partColumn(columns, part));
  if (year === undefined || month === undefined || day === undefined) return null;
  const parts = { year, month, day };
  const dated = rows.filter((row) => row[year] !== '');
  return dated.length > 0 && dated.every((row) => dateKeyOf(parts, (at) => row[at] ?? '') !== null) ? parts : null;
}

/**
 * The column of minutes beside one of hours; −1 where there is none.
 * @param columns header
 */
export function minuteColumn(columns: readonly HeaderColumn[]): number {
  return partColumn(columns, 'minute') ?? -1;
}

/**
 * Whether a cell is a year in a column of years.
 * @param cell text
 * @param column its name
 */
export function isYearCell(cell: string, column: HeaderColumn | undefined): boolean {
  return column !== undefined && isNamed(column, 'year') && /^(?:19|20)\d\d$/.test(cell);
}

/**
 * The date that year, month and day make, as in Stamp.dateKey.
 * @param parts where they stand
 * @param text of a cell of the row
 * @returns null where they make none
 */
export function dateKeyOf({ year, month, day }: DateParts, text: (column: number) => string): number | null {
  const [y, m, d] = [text(year), text(month), text(day)];
  if (!/^(?:19|20)\d\d$/.test(y) || !/^\d{1,2}$/.test(m) || !/^\d{1,2}$/.test(d)) return null;
  const key = Number(y) * 10_000 + Number(m) * 100 + Number(d);
  return datePartsOf(key, 'yearFirst', 'ymd') === null ? null : key;
}

function partColumn(columns: readonly HeaderColumn[], part: WordGroup): number | undefined {
  return columns.find((column) => isNamed(column, part))?.index;
}

function isNamed({ name, unit }: HeaderColumn, part: WordGroup): boolean {
  const words = wordsOf(name);
  return unit === null && words.length > 0 && words.every((word) => says([word], part));
}
