import { operate } from '../plan/study.js';
import { settleBank, settleControl } from '../plan/settle-bank.js';
import { tanFromPowerFactor } from '../quantity/power-factor.js';
import { localDay } from '../record/local-day.js';
import type { LoadRecord } from '../record/load-record.js';
import { offsetAtS, type ZoneTable } from '../record/zone-table.js';
import { targetKw } from '../requirement/need.js';
import { type ChangePoint, changePoint, type DayValues } from './change-point.js';
import type { Ground } from './weigh-stages.js';

/** Daily series in which a change is looked for. */
export const DAY_SERIES = ['activeKw', 'needKvar', 'shortKvar'] as const;

/** A change in one of the series, by date. */
export interface DatedChange extends Omit<ChangePoint, 'day'> {
  /** mean kW at the bus, mean kvar needed at the bus, mean kvar at the meter beyond the target's */
  series: (typeof DAY_SERIES)[number];
  unit: 'kW' | 'kvar';
  /** first day after a step "2026-01-31"; null for a drift */
  date: string | null;
}

/** One month of either record. */
export interface SinceMonth {
  month: string;
  record: 'before' | 'after';
  /** as metered */
  powerFactorMetered: number | null;
  /** with the bank of its site simulated on it */
  powerFactorWithBank: number | null;
  neededKvar: number;
}

/** Since when a bank no longer does what it should. */
export interface SinceWhen {
  months: SinceMonth[];
  /** first month below the target with the bank working, after the last one that met it; null where the last one meets it */
  firstMonthOut: string | null;
  /** where the months of that are from: metered with the bank switching, or simulated */
  monthsBy: 'metered' | 'simulated';
  changes: DatedChange[];
}

/** A day counts where it has this share of its intervals. */
const DAY_SHARE = 0.75;

/**
 * Locates a change in two records of one site, the later record counting where they overlap: months beside the target,
 * the first month out of it, and the day on which load, need or shortfall changed.
 * @param before earlier site and record
 * @param after later site and record
 * @returns months in time order and the changes found
 * @source method-reevaluation
 */
export function sinceWhen(before: Ground, after: Ground): SinceWhen {
  const later = monthsOf(after, 'after');
  const covered = new Set(later.map(({ month }) => month));
  const months = [...monthsOf(before, 'before').filter(({ month }) => !covered.has(month)), ...later].sort((a, b) =>
    a.month < b.month ? -1 : 1,
  );
  const state = after.study.site.recordedBank.state;
  const monthsBy = state === 'none' || state === 'out' ? 'simulated' : 'metered';
  return {
    months,
    firstMonthOut: firstOut(months, monthsBy, after.study.site.targetPowerFactor),
    monthsBy,
    changes: DAY_SERIES.flatMap((series) => dated(series, joined(dayValues(before, series), dayValues(after, series)))),
  };
}

function monthsOf(ground: Ground, record: 'before' | 'after'): SinceMonth[] {
  const { study, site } = ground;
  const withBank = new Map<string, number | null>();
  if (site.bank !== undefined) {
    const { bank } = settleBank(site.bank, site.frequencyHz);
    const { months } = operate(study, bank, settleControl(site.control, bank, study.site).control);
    for (const { month, powerFactorLagging } of months) withBank.set(month, powerFactorLagging);
  }
  return study.requirement.months.map(({ month, powerFactorLagging, neededKvar }) => ({
    month,
    record,
    powerFactorMetered: powerFactorLagging,
    powerFactorWithBank: withBank.get(month) ?? null,
    neededKvar,
  }));
}

function firstOut(months: readonly SinceMonth[], by: SinceWhen['monthsBy'], target: number): string | null {
  let first: string | null = null;
  for (const { month, powerFactorMetered, powerFactorWithBank } of months) {
    const factor = by === 'metered' ? powerFactorMetered : powerFactorWithBank;
    if (factor === null) continue;
    if (factor >= target * (1 - 1e-12)) first = null;
    else first ??= month;
  }
  return first;
}

function dated(series: DatedChange['series'], values: DayValues): DatedChange[] {
  const found = changePoint(values);
  if (found === null) return [];
  const { day, ...rest } = found;
  return [{ series, unit: series === 'activeKw' ? 'kW' : 'kvar', date: day === null ? null : localDay(day), ...rest }];
}

function dayValues({ study }: Ground, series: DatedChange['series']): DayValues {
  const { record, zone } = study;
  return dailyMeans(record, zone, columnOf(study, series));
}

function columnOf(study: Ground['study'], series: DatedChange['series']): Float64Array {
  const { record, load, needKvar, target } = study;
  if (series === 'activeKw') return load.activeKw;
  if (series === 'needKvar') return needKvar;
  const tan = tanFromPowerFactor(target.powerFactor);
  return record.activeKw.map((kw, i) =>
    Math.max(0, record.laggingKvar[i]! - record.leadingKvar[i]! - targetKw(kw, target.onExport) * tan),
  );
}

function dailyMeans({ beginS, intervalS }: LoadRecord, zone: ZoneTable, column: Float64Array): DayValues {
  const least = (DAY_SHARE * 86_400) / Math.min(intervalS, 86_400);
  const days: number[] = [];
  const values: number[] = [];
  let [day, sum, count] = [Number.NaN, 0, 0];
  const close = (): void => {
    if (count < least) return;
    days.push(day);
    values.push(sum / count);
  };
  for (let i = 0; i < beginS.length; i++) {
    const of = Math.floor((beginS[i]! + offsetAtS(zone, beginS[i]!)) / 86_400);
    if (of !== day) {
      close();
      [day, sum, count] = [of, 0, 0];
    }
    sum += column[i]!;
    count++;
  }
  close();
  return { day: Int32Array.from(days), value: Float64Array.from(values) };
}

function joined(before: DayValues, after: DayValues): DayValues {
  const byDay = new Map<number, number>();
  for (const { day, value } of [before, after]) for (const [i, of] of day.entries()) byDay.set(of, value[i]!);
  const days = Int32Array.from(byDay.keys()).sort();
  return { day: days, value: Float64Array.from(days, (of) => byDay.get(of)!) };
}
