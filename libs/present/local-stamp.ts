import { dayNumber, localTime, type ZoneTable } from '#libs/engine/index.js';
import { GAP } from './format-number.js';
import { say, words } from './language.js';

const MONTHS = words(['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']);
const WEEKDAYS = words(['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday']);

/**
 * A moment by the site's clock.
 * @param zone the site's offsets
 * @param epochS UTC [s]
 * @returns "1 Jan 2025 00:00", seconds only where there are any
 */
export function formatMoment(zone: ZoneTable, epochS: number): string {
  return `${formatDay(zone, epochS)} ${formatClock(localTime(zone, epochS).secondOfDay)}`;
}

/**
 * The local calendar day of a moment.
 * @param zone the site's offsets
 * @param epochS UTC [s]
 * @returns "22 Nov 2018"
 */
export function formatDay(zone: ZoneTable, epochS: number): string {
  const { year, month, day } = localTime(zone, epochS);
  return dated(day, MONTHS[month - 1]!, year);
}

function dated(day: number, month: string, year: number | string): string {
  return say`${day}\u00a0${month}\u00a0${year}`;
}

/**
 * The local day of a moment with its weekday.
 * @param zone the site's offsets
 * @param epochS UTC [s]
 * @returns "Thursday 22 Nov 2018"
 */
export function formatWeekday(zone: ZoneTable, epochS: number): string {
  return `${WEEKDAYS[localTime(zone, epochS).weekday - 1]} ${formatDay(zone, epochS)}`;
}

/**
 * A time of day by the 24-hour clock.
 * @param secondOfDay seconds since local midnight [s]
 * @returns "09:30", or "09:30:15" where there are seconds
 */
export function formatClock(secondOfDay: number): string {
  const whole = Math.floor(secondOfDay);
  const two = (value: number) => String(value).padStart(2, '0');
  const clock = `${two(Math.floor(whole / 3600))}:${two(Math.floor(whole / 60) % 60)}`;
  return whole % 60 === 0 ? clock : `${clock}:${two(whole % 60)}`;
}

/**
 * A date for people.
 * @param date "2018-11-22"
 * @returns "22 Nov 2018"
 */
export function formatDate(date: string): string {
  const [year = '', month = '', day = ''] = date.split('-');
  return dated(Number(day), MONTHS[Number(month) - 1] ?? month, year);
}

/**
 * A month's name for people.
 * @param month "2018-01"
 * @returns "Jan 2018"
 */
export function formatMonth(month: string): string {
  const [year = '', number = ''] = month.split('-');
  return `${MONTHS[Number(number) - 1] ?? month}${GAP}${year}`;
}

/**
 * A month's three letters, for a narrow axis.
 * @param month "2018-01"
 * @returns "Jan"
 */
export function monthLetters(month: string): string {
  return MONTHS[Number(month.split('-')[1]) - 1] ?? month;
}

/**
 * A length of time in the largest units that hold it whole.
 * @param lengthS length, rounded up to a whole second [s]
 * @returns "45 s", "15 min", "6 min 12 s", "2 h 5 min"
 */
export function formatLength(lengthS: number): string {
  const whole = Math.ceil(lengthS - 1e-6);
  if (whole < 120 && whole % 60 !== 0) return `${whole}${GAP}s`;
  const parts = [
    [Math.floor(whole / 3600), 'h'],
    [Math.floor(whole / 60) % 60, 'min'],
    [whole % 60, 's'],
  ] as const;
  const shown = parts.filter(([amount]) => amount > 0);
  return shown.length === 0 ? `0${GAP}s` : shown.map(([amount, unit]) => `${amount}${GAP}${unit}`).join(GAP);
}

/**
 * UTC epoch seconds of the local midnight that begins a moment's day.
 * @param zone the site's offsets
 * @param epochS UTC [s]
 * @returns UTC [s] of the day's first second by the offset then in force
 */
export function dayBeginS(zone: ZoneTable, epochS: number): number {
  const { year, month, day, secondOfDay } = localTime(zone, epochS);
  const guessS = epochS - secondOfDay;
  const clockS = localTime(zone, guessS);
  const shiftedDays = dayNumber(clockS.year, clockS.month, clockS.day) - dayNumber(year, month, day);
  return guessS - shiftedDays * 86_400 - clockS.secondOfDay;
}
