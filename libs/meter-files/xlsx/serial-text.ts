import { plainDecimal } from '../sheet/plain-decimal.js';
import { clockText, dateText } from '../sheet/stamp-parts.js';

/** What the number format of a cell shows of a serial: its date, its clock time, or both. */
export interface DateStyle {
  date: boolean;
  time: boolean;
}

const DAY_S = 86_400;
/** A serial comes within so much of the whole second it was computed from [s]. */
const NEAR_S = 0.05;
/** 9999-12-31 is the last day there is. */
const MOST_DAYS = 2_958_466;
/** 1970-01-01 counted from the day before each system's day 1. */
const EPOCH_1900 = 25_569;
const EPOCH_1904 = 24_107;
/** The 1900 system has a 29 February 1900, which never was; days before it lie one further on. */
const FALSE_LEAP_DAY = 60;

/**
 * A serial number with a date style as the wall time it shows (ECMA-376 part 1, 18.17.4.1: days since 1900 or 1904).
 * @param serial days and their fraction
 * @param style what the number format shows
 * @param since1904 which of the two systems the workbook has
 * @returns a date, a clock time or both; the number itself where it is no date
 */
export function serialText(serial: number, style: DateStyle, since1904: boolean): string {
  if (!(serial >= 0 && serial < MOST_DAYS)) return plainDecimal(serial);
  const exactS = serial * DAY_S;
  const nearestS = Math.round(exactS);
  const momentS = Math.abs(exactS - nearestS) <= NEAR_S ? nearestS : Math.round(exactS * 1000) / 1000;
  const day = Math.floor(momentS / DAY_S);
  const clockS = momentS - day * DAY_S;
  const clockAlone = style.time && !style.date;
  if (clockAlone && momentS === DAY_S) return clockText(DAY_S);
  if (day === 0 && (clockS > 0 || style.time)) return clockText(clockS);
  const date = dayText(day, since1904);
  return clockS === 0 && !style.time ? date : `${date} ${clockText(clockS)}`;
}

function dayText(day: number, since1904: boolean): string {
  if (since1904) return dateText(day - EPOCH_1904);
  if (day === FALSE_LEAP_DAY) return '1900-02-29';
  return dateText(day - EPOCH_1900 + (day < FALSE_LEAP_DAY ? 1 : 0));
}
