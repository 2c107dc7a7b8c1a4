import { dayNumber, localTime, offsetAtS, type ZoneTable } from '#libs/engine/index.js';
import { GAP } from './format-number.js';
import { formatClock, monthLetters } from './local-stamp.js';

/** A round moment on an axis of time. */
export interface TimeTick {
  /** UTC [s] */
  atS: number;
  text: string;
}

const DAY_S = 86_400;
/** Steps between ticks that a clock or a calendar knows [s]; beyond them, months. */
const STEPS_S = [60, 300, 900, 1800, 3600, 7200, 10_800, 21_600, 43_200, DAY_S, 2 * DAY_S, 7 * DAY_S];
const MONTH_STEPS = [1, 2, 3, 6, 12, 24, 60];

/**
 * Ticks of an axis of time at round moments of the local clock: minutes, hours, days, then months.
 * @param zone the site's offsets
 * @param span from and to, UTC [s]
 * @param most greatest number of ticks wanted
 * @returns ticks within the span, ascending
 */
export function timeTicks(zone: ZoneTable, { fromS, toS }: { fromS: number; toS: number }, most: number): TimeTick[] {
  const least = (toS - fromS) / Math.max(1, most);
  const stepS = STEPS_S.find((step) => step >= least);
  const locals = stepS === undefined ? monthStops(zone, fromS, toS, least) : clockStops(zone, fromS, toS, stepS);
  return locals
    .map((localS) => ({ atS: utcOf(zone, localS, fromS), localS }))
    .filter(({ atS }) => atS >= fromS && atS <= toS)
    .map(({ atS }) => ({ atS, text: stepS === undefined ? monthText(zone, atS) : clockText(zone, atS) }));
}

/** An hour that a change of the clock leaves out or doubles shifts a tick by that hour, and its text says so. */
function utcOf(zone: ZoneTable, localS: number, nearS: number): number {
  return localS - offsetAtS(zone, localS - offsetAtS(zone, nearS));
}

function clockStops(zone: ZoneTable, fromS: number, toS: number, stepS: number): number[] {
  const first = Math.ceil((fromS + offsetAtS(zone, fromS)) / stepS);
  const last = Math.floor((toS + offsetAtS(zone, toS)) / stepS);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => (first + k) * stepS);
}

function monthStops(zone: ZoneTable, fromS: number, toS: number, least: number): number[] {
  const months = MONTH_STEPS.find((step) => step * 31 * DAY_S >= least) ?? MONTH_STEPS.at(-1)!;
  const countOf = (s: number) => {
    const { year, month } = localTime(zone, s);
    return 12 * year + month - 1;
  };
  const first = Math.ceil(countOf(fromS) / months);
  const last = Math.floor(countOf(toS) / months);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, k) => {
    const count = (first + k) * months;
    return dayNumber(Math.floor(count / 12), (count % 12) + 1, 1) * DAY_S;
  });
}

function monthText(zone: ZoneTable, atS: number): string {
  const { year, month } = localTime(zone, atS);
  const letters = monthLetters(`${year}-${month}`);
  return month === 1 ? `${letters}${GAP}${year}` : letters;
}

function clockText(zone: ZoneTable, atS: number): string {
  const { year, month, day, secondOfDay } = localTime(zone, atS);
  return secondOfDay === 0 ? `${day}${GAP}${monthLetters(`${year}-${month}`)}` : formatClock(secondOfDay);
}
