import { dayNumber, type ZoneTable } from './zone-table.js';

const DAY_S = 86_400;

/** A local calendar month as a span of UTC. */
export interface MonthSpan {
  /** first moment [s] */
  beginS: number;
  /** end, exclusive [s] */
  endS: number;
}

/**
 * Beginning and end of a calendar month by the site's clock: a month in which the clock changes has an hour more or less.
 * @param zone the site's zone over the month
 * @param year proleptic Gregorian year
 * @param month 1 … 12
 * @returns the span
 */
export function monthSpan(zone: ZoneTable, year: number, month: number): MonthSpan {
  const next = month === 12 ? dayNumber(year + 1, 1, 1) : dayNumber(year, month + 1, 1);
  return { beginS: utcOfLocalS(zone, dayNumber(year, month, 1) * DAY_S), endS: utcOfLocalS(zone, next * DAY_S) };
}

// First moment at which the local clock shows `localS` or later.
function utcOfLocalS(zone: ZoneTable, localS: number): number {
  for (let k = 0; k < zone.fromS.length; k++) {
    const fromS = k === 0 ? Number.NEGATIVE_INFINITY : zone.fromS[k]!;
    const atS = Math.max(fromS, localS - zone.offsetS[k]!);
    if (k === zone.fromS.length - 1 || atS < zone.fromS[k + 1]!) return atS;
  }
  return localS;
}
