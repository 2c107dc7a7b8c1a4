import { monthSpan } from '../record/month-span.js';
import { civilDate, dayNumber, offsetAtS, type ZoneTable } from '../record/zone-table.js';

/** The times of a record: the part of it that a tariff's calendar looks at. */
export interface RecordSpan {
  /** length of every interval [s] */
  intervalS: number;
  /** UTC epoch seconds of each valid interval's beginning, ascending [s] */
  beginS: Float64Array;
  /** beginning of the first grid slot [s] */
  firstS: number;
  /** end of the last grid slot, exclusive [s] */
  endS: number;
  /** active power as metered, length n, where the record has it: what is added up of it is kept [kW] */
  activeKw?: Float64Array;
}

/** One local calendar month that holds intervals of the record. */
export interface TariffMonth {
  /** "2024-01" */
  name: string;
  /** 1 … 12 */
  month: number;
  /** months since year 0, for counting back */
  monthsSinceYearZero: number;
  /** share of the month between the record's beginning and end, 0 … 1; gaps inside count as covered */
  coverage: number;
  /** its first interval, an index into the record */
  from: number;
  /** the interval after its last */
  end: number;
}

/** A record's intervals by the site's clock and calendar; entries of length n, one an interval. */
export interface TariffCalendar {
  intervalS: number;
  months: TariffMonth[];
  /** local clock of each beginning, as seconds from 1970-01-01 00:00 of that clock [s] */
  localS: Float64Array;
  /** 1 Monday … 7 Sunday, 8 a listed holiday */
  dayKind: Uint8Array;
  /** active power as metered, null where it is not known; no bank at the bus moves it [kW] */
  steadyKw: Float64Array | null;
}

/** Seconds of a calendar day. */
export const DAY_S = 86_400;
const HOLIDAY = 8;

/**
 * Sorts a record's intervals into local months and kinds of day, each by its beginning.
 * @param span the record's times, n intervals
 * @param zone the site's zone over the record and the months it touches
 * @param holidays local dates "2024-12-25"
 * @returns months in time order and one entry an interval
 * @source method-money
 */
export function tariffCalendar(span: RecordSpan, zone: ZoneTable, holidays: readonly string[]): TariffCalendar {
  const n = span.beginS.length;
  const free = new Set(holidays.map(dayOf));
  const localS = new Float64Array(n);
  const dayKind = new Uint8Array(n);
  const months: TariffMonth[] = [];
  let lastDay = Number.NaN;
  let kind = 0;
  for (let i = 0; i < n; i++) {
    const local = span.beginS[i]! + offsetAtS(zone, span.beginS[i]!);
    const day = Math.floor(local / DAY_S);
    if (day !== lastDay) {
      lastDay = day;
      kind = free.has(day) ? HOLIDAY : ((((day + 3) % 7) + 7) % 7) + 1;
      beginMonth(months, day, i, { span, zone });
    }
    localS[i] = local;
    dayKind[i] = kind;
  }
  for (const [k, month] of months.entries()) month.end = months[k + 1]?.from ?? n;
  return { intervalS: span.intervalS, months, localS, dayKind, steadyKw: span.activeKw ?? null };
}

// A month that has begun lasts until the next one does, whatever a clock set back over midnight says.
function beginMonth(months: TariffMonth[], day: number, from: number, of: { span: RecordSpan; zone: ZoneTable }): void {
  const { year, month } = civilDate(day);
  const monthsSinceYearZero = year * 12 + month - 1;
  const last = months[months.length - 1];
  if (last !== undefined && monthsSinceYearZero <= last.monthsSinceYearZero) return;
  const { beginS, endS } = monthSpan(of.zone, year, month);
  const coveredS = Math.min(of.span.endS, endS) - Math.max(of.span.firstS, beginS);
  const name = `${String(year).padStart(4, '0')}-${String(month).padStart(2, '0')}`;
  months.push({ name, month, monthsSinceYearZero, coverage: coveredS / (endS - beginS), from, end: from });
}

function dayOf(date: string): number {
  const [year, month, day] = date.split('-').map(Number);
  return dayNumber(year!, month!, day!);
}
