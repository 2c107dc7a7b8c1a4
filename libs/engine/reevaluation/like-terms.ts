import { Total } from '../quantity/compensated-sum.js';
import { energyPowerFactor } from '../quantity/power-factor.js';
import type { LoadRecord } from '../record/load-record.js';
import { localTime, monthIndex, type ZoneTable } from '../record/zone-table.js';

/** A record and the clock of its site. */
export interface ClockedRecord {
  record: LoadRecord;
  zone: ZoneTable;
}

/** A record by the day, whatever its length. */
export interface RecordTerms {
  beginS: number;
  endS: number;
  /** valid intervals, as days */
  days: number;
  activeKwhPerDay: number;
  laggingKvarhPerDay: number;
  leadingKvarhPerDay: number;
  powerFactorLagging: number | null;
  maxKw: number;
}

/** The same hours of the week in every record, each hour counting once. */
export interface SameHours {
  /** hours of the week that every record has, of 168 */
  hours: number;
  /** one entry a record */
  activeKw: number[];
  reactiveKvar: number[];
}

/** A calendar month that every record has, whatever its year. */
export interface SameMonth {
  /** 1 … 12 */
  month: number;
  /** one entry a record */
  activeKwhPerDay: number[];
  powerFactorLagging: (number | null)[];
}

/** Several records of one site on like terms. */
export interface LikeTerms {
  records: RecordTerms[];
  sameHours: SameHours | null;
  sameMonths: SameMonth[];
}

const WEEK_HOURS = 168;

/**
 * Compares records of one site on like terms: energies by the day, means over the hours of the week that all of them
 * have, and the calendar months that all of them have.
 * @param given records with their clocks, in any order
 * @returns one entry a record in each list
 * @source method-reevaluation
 */
export function likeTerms(given: readonly ClockedRecord[]): LikeTerms {
  return {
    records: given.map(({ record }) => termsOf(record)),
    sameHours: sameHours(given.map(weekOf)),
    sameMonths: sameMonths(given.map(calendarMonths)),
  };
}

/** Running sums of a part of a record. */
interface Sums {
  intervals: number;
  active: Total;
  lagging: Total;
  leading: Total;
}

function newSums(): Sums {
  return { intervals: 0, active: new Total(), lagging: new Total(), leading: new Total() };
}

function add(sums: Sums, record: LoadRecord, i: number): void {
  sums.intervals++;
  sums.active.add(Math.max(record.activeKw[i]!, 0));
  sums.lagging.add(record.laggingKvar[i]!);
  sums.leading.add(record.leadingKvar[i]!);
}

function termsOf(record: LoadRecord): RecordTerms {
  const sums = newSums();
  let maxKw = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < record.beginS.length; i++) {
    add(sums, record, i);
    maxKw = Math.max(maxKw, record.activeKw[i]!);
  }
  const mean = (total: Total): number => total.value / sums.intervals;
  return {
    beginS: record.firstS,
    endS: record.endS,
    days: (sums.intervals * record.intervalS) / 86_400,
    activeKwhPerDay: 24 * mean(sums.active),
    laggingKvarhPerDay: 24 * mean(sums.lagging),
    leadingKvarhPerDay: 24 * mean(sums.leading),
    powerFactorLagging: energyPowerFactor(sums.active.value, sums.lagging.value),
    maxKw,
  };
}

interface Week {
  count: Float64Array;
  kw: Float64Array;
  kvar: Float64Array;
}

function weekOf({ record, zone }: ClockedRecord): Week {
  const week = {
    count: new Float64Array(WEEK_HOURS),
    kw: new Float64Array(WEEK_HOURS),
    kvar: new Float64Array(WEEK_HOURS),
  };
  for (let i = 0; i < record.beginS.length; i++) {
    const { weekday, secondOfDay } = localTime(zone, record.beginS[i]!);
    const slot = (weekday - 1) * 24 + Math.floor(secondOfDay / 3600);
    week.count[slot]!++;
    week.kw[slot]! += record.activeKw[i]!;
    week.kvar[slot]! += record.laggingKvar[i]! - record.leadingKvar[i]!;
  }
  return week;
}

function sameHours(weeks: readonly Week[]): SameHours | null {
  const slots = Array.from({ length: WEEK_HOURS }, (_, slot) => slot).filter((slot) =>
    weeks.every(({ count }) => count[slot]! > 0),
  );
  if (slots.length === 0) return null;
  const mean = (week: Week, column: Float64Array): number =>
    slots.reduce((sum, slot) => sum + column[slot]! / week.count[slot]!, 0) / slots.length;
  return {
    hours: slots.length,
    activeKw: weeks.map((week) => mean(week, week.kw)),
    reactiveKvar: weeks.map((week) => mean(week, week.kvar)),
  };
}

function calendarMonths({ record, zone }: ClockedRecord): Map<number, Sums> {
  const { names, starts } = monthIndex(record.beginS, zone);
  const months = new Map<number, Sums>();
  for (const [m, name] of names.entries()) {
    const month = Number(name.slice(5));
    const sums = months.get(month) ?? newSums();
    for (let i = starts[m]!; i < starts[m + 1]!; i++) add(sums, record, i);
    months.set(month, sums);
  }
  return months;
}

function sameMonths(given: readonly Map<number, Sums>[]): SameMonth[] {
  const months = [...(given[0]?.keys() ?? [])].filter((month) => given.every((of) => of.has(month)));
  return months
    .sort((a, b) => a - b)
    .map((month) => {
      const sums = given.map((of) => of.get(month)!);
      return {
        month,
        activeKwhPerDay: sums.map(({ active, intervals }) => (24 * active.value) / intervals),
        powerFactorLagging: sums.map(({ active, lagging }) => energyPowerFactor(active.value, lagging.value)),
      };
    });
}
