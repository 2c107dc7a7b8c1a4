import type { LoadRecord } from './load-record.js';
import { dayNumber, localTime, offsetAtS, type ZoneTable } from './zone-table.js';

/** How much of a local calendar month a record holds. */
export interface MonthCoverage {
  /** "2018-01" */
  month: string;
  /** intervals of the whole month, hours that are skipped or doubled counted as they are */
  intervalsExpected: number;
  /** intervals with a value, repaired ones included */
  intervals: number;
  /** share of the month that has a value [%] */
  coveredPct: number;
}

const DAY_S = 86_400;

/**
 * Coverage of every local month from a record's beginning to its end; its first and last month count whole, so a record
 * that begins in the middle of a month covers half of it.
 * @param record beginnings and their length
 * @param zone the site's zone; it should reach a month beyond the record
 * @returns one entry a month, in time order
 */
export function monthCoverage({ beginS, intervalS }: Pick<LoadRecord, 'beginS' | 'intervalS'>, zone: ZoneTable) {
  const months: MonthCoverage[] = [];
  if (beginS.length === 0) return months;
  const lastS = beginS[beginS.length - 1]!;
  let { year, month } = localTime(zone, beginS[0]!);
  let fromS = monthBeginS(zone, year, month);
  while (fromS <= lastS) {
    const name = `${String(year).padStart(4, '0')}-${String(month).padStart(2, '0')}`;
    [year, month] = month === 12 ? [year + 1, 1] : [year, month + 1];
    const toS = monthBeginS(zone, year, month);
    const intervals = firstAtOrAfter(beginS, toS) - firstAtOrAfter(beginS, fromS);
    const intervalsExpected = Math.max(intervals, Math.round((toS - fromS) / intervalS));
    months.push({ month: name, intervalsExpected, intervals, coveredPct: (100 * intervals) / intervalsExpected });
    fromS = toS;
  }
  return months;
}

function monthBeginS(zone: ZoneTable, year: number, month: number): number {
  const localS = dayNumber(year, month, 1) * DAY_S;
  return localS - offsetAtS(zone, localS - offsetAtS(zone, localS));
}

function firstAtOrAfter(beginS: Float64Array, momentS: number): number {
  let low = 0;
  let high = beginS.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (beginS[middle]! < momentS) low = middle + 1;
    else high = middle;
  }
  return low;
}
