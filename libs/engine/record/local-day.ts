import { civilDate } from './zone-table.js';

/**
 * A local day as a date.
 * @param day days since 1970-01-01
 * @returns "2026-01-31"
 */
export function localDay(day: number): string {
  const { year, month, day: ofMonth } = civilDate(day);
  return [String(year).padStart(4, '0'), String(month).padStart(2, '0'), String(ofMonth).padStart(2, '0')].join('-');
}

/**
 * Day of the week; 1970-01-01 was a Thursday.
 * @param day days since 1970-01-01
 * @returns 1 Monday … 7 Sunday
 */
export function weekdayOf(day: number): number {
  return ((((day + 3) % 7) + 7) % 7) + 1;
}
