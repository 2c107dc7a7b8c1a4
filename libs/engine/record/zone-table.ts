/**
 * A zone's offsets from UTC over a span, as data: the engine never asks a clock or a calendar.
 * Entry k holds from `fromS[k]` (inclusive) to `fromS[k+1]`; the first also holds before its own moment.
 */
export interface ZoneTable {
  /** IANA name or fixed offset the table was made from */
  zone: string;
  /** UTC epoch seconds at which each offset begins, ascending */
  fromS: number[];
  /** local time minus UTC [s] */
  offsetS: number[];
}

/** Offset 0 throughout. */
export const UTC_TABLE: ZoneTable = { zone: 'UTC', fromS: [0], offsetS: [0] };

/**
 * Local time minus UTC at a moment.
 * @param table the zone's offsets
 * @param epochS UTC [s]
 * @returns offset [s]
 */
export function offsetAtS(table: ZoneTable, epochS: number): number {
  let k = table.fromS.length - 1;
  while (k > 0 && table.fromS[k]! > epochS) k--;
  return table.offsetS[k] ?? 0;
}

/** A local calendar date and time of day. */
export interface LocalTime {
  year: number;
  /** 1 … 12 */
  month: number;
  /** 1 … 31 */
  day: number;
  /** 1 Monday … 7 Sunday */
  weekday: number;
  /** seconds since local midnight by the clock */
  secondOfDay: number;
}

/**
 * Calendar date and clock time in the zone (proleptic Gregorian, days counted from 1970-01-01, a Thursday).
 * @param table the zone's offsets
 * @param epochS UTC [s]
 * @returns local date and time
 * @source derived: civil-from-days over 400-year eras of 146 097 days
 */
export function localTime(table: ZoneTable, epochS: number): LocalTime {
  const localS = epochS + offsetAtS(table, epochS);
  const days = Math.floor(localS / 86_400);
  return { ...civilDate(days), weekday: ((((days + 3) % 7) + 7) % 7) + 1, secondOfDay: localS - days * 86_400 };
}

/**
 * Year, month and day of a day number.
 * @param days days since 1970-01-01
 * @returns proleptic Gregorian date
 * @source derived: years run from 1 March so that the leap day is last
 */
export function civilDate(days: number): { year: number; month: number; day: number } {
  const shifted = days + 719_468;
  const era = Math.floor(shifted / 146_097);
  const dayOfEra = shifted - era * 146_097;
  const yearOfEra = Math.floor(
    (dayOfEra - Math.floor(dayOfEra / 1460) + Math.floor(dayOfEra / 36_524) - Math.floor(dayOfEra / 146_096)) / 365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const marchMonth = Math.floor((5 * dayOfYear + 2) / 153);
  const day = dayOfYear - Math.floor((153 * marchMonth + 2) / 5) + 1;
  const month = marchMonth < 10 ? marchMonth + 3 : marchMonth - 9;
  return { year: yearOfEra + era * 400 + (month <= 2 ? 1 : 0), month, day };
}

/**
 * Days from 1970-01-01 to a date; the inverse of `civilDate`.
 * @param year proleptic Gregorian year
 * @param month 1 … 12
 * @param day 1 … 31
 * @returns day number
 */
export function dayNumber(year: number, month: number, day: number): number {
  const marchYear = month <= 2 ? year - 1 : year;
  const era = Math.floor(marchYear / 400);
  const yearOfEra = marchYear - era * 400;
  const dayOfYear = Math.floor((153 * (month > 2 ? month - 3 : month + 9) + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return era * 146_097 + dayOfEra - 719_468;
}

/** The calendar months a record touches, in time order. */
export interface MonthIndex {
  /** "2018-01" … */
  names: string[];
  /** first interval of each month, and n at the end; one entry more than `names` */
  starts: number[];
}

/**
 * Sorts intervals into the local calendar months of their beginnings.
 * @param beginS interval beginnings [s], ascending, length n
 * @param table the site's zone
 * @returns names and where each month begins
 */
export function monthIndex(beginS: Float64Array, table: ZoneTable): MonthIndex {
  const names: string[] = [];
  const starts: number[] = [];
  let dayOfLast = Number.NaN;
  for (let i = 0; i < beginS.length; i++) {
    const localS = beginS[i]! + offsetAtS(table, beginS[i]!);
    const day = Math.floor(localS / 86_400);
    if (day !== dayOfLast) {
      dayOfLast = day;
      const { year, month } = civilDate(day);
      const name = `${String(year).padStart(4, '0')}-${String(month).padStart(2, '0')}`;
      if (names[names.length - 1] !== name) {
        names.push(name);
        starts.push(i);
      }
    }
  }
  return { names, starts: [...starts, beginS.length] };
}
