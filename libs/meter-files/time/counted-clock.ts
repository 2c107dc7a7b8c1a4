import type { StampedRows } from './stamped-rows.js';

const DAY_S = 86_400;
/** Intervals of a day that files count: an hour, half of one, a quarter, ten, five and one minutes. */
const COUNTS = [24, 48, 96, 144, 288, 1440];

/** How a column counts the intervals of each day. */
export interface CountedClock {
  perDay: number;
  /** the number of a day's first interval */
  first: 0 | 1;
  /** a day has a further hour where clocks go back, so the count follows the time passed since midnight */
  hasFurtherHour: boolean;
}

/**
 * Turns the whole numbers beside the dates of all rows into the beginnings of intervals since midnight: counts 1 to 24 or
 * 0 to 23 of an hour and the like, or clock times without a mark such as 15, 30, 45, 100.
 * @param rows whose `clockS` hold the numbers as written
 * @returns how intervals are counted; `clock` for clock times; null where the numbers are neither
 */
export function settleCounts(rows: StampedRows): CountedClock | 'clock' | null {
  const numbers = rows.clockS.subarray(0, rows.count);
  let least = Number.POSITIVE_INFINITY;
  let most = 0;
  for (const number of numbers) {
    if (number < least) least = number;
    if (number > most) most = number;
  }
  if (most > 100 && most <= 2400 && numbers.every((number) => number % 100 < 60)) {
    for (let i = 0; i < numbers.length; i++)
      numbers[i] = Math.floor(numbers[i]! / 100) * 3600 + (numbers[i]! % 100) * 60;
    return 'clock';
  }
  const first = least === 0 ? 0 : 1;
  const last = most - first + 1;
  const perDay = COUNTS.find((count) => last === count || last === (count / 24) * 25);
  if (perDay === undefined) return null;
  for (let i = 0; i < numbers.length; i++) numbers[i] = (numbers[i]! - first) * (DAY_S / perDay);
  return { perDay, first, hasFurtherHour: last > perDay };
}
