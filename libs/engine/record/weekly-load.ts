import { percentile } from '../quantity/percentile.js';
import type { HourlyLoad } from './hourly-load.js';

/** A record by the week of seven days, counted from its first local day; NaN where less than five days have a value. */
export interface WeeklyLoad {
  firstDay: number;
  meanKw: Float64Array;
  /** 10 % of the week's hours are under it [kW] */
  baseKw: Float64Array;
  /** 5 % of the week's hours are over it [kW] */
  peakKw: Float64Array;
  meanKvar: Float64Array;
}

/** Means by the local day, NaN where the day has no value. */
export interface DailyLoad {
  firstDay: number;
  meanKw: Float64Array;
  meanKvar: Float64Array;
}

const LEAST_HOURS = 120;

/**
 * Weekly figures of a record; a block of seven days holds every weekday once.
 * @param load by the hour
 * @param stepHours length of an entry of `load` [h]
 * @returns one entry a week
 */
export function weeklyLoad(load: HourlyLoad, stepHours: number): WeeklyLoad {
  const firstDay = load.day[0]!;
  const weeks = Math.floor((load.day[load.day.length - 1]! - firstDay) / 7) + 1;
  const blank = () => new Float64Array(weeks).fill(Number.NaN);
  const weekly: WeeklyLoad = { firstDay, meanKw: blank(), baseKw: blank(), peakKw: blank(), meanKvar: blank() };
  let from = 0;
  for (let week = 0; week < weeks; week++) {
    let to = from;
    while (to < load.day.length && load.day[to]! < firstDay + 7 * (week + 1)) to++;
    if ((to - from) * stepHours >= LEAST_HOURS) {
      const sorted = load.activeKw.slice(from, to).sort();
      weekly.meanKw[week] = meanOf(sorted);
      weekly.baseKw[week] = percentile(sorted, 0.1);
      weekly.peakKw[week] = percentile(sorted, 0.95);
      weekly.meanKvar[week] = meanOf(load.reactiveKvar.subarray(from, to));
    }
    from = to;
  }
  return weekly;
}

/**
 * Daily means of a record.
 * @param load by the hour
 * @returns one entry a local day
 */
export function dailyLoad(load: HourlyLoad): DailyLoad {
  const firstDay = load.day[0]!;
  const days = load.day[load.day.length - 1]! - firstDay + 1;
  const hours = new Float64Array(days);
  const daily: DailyLoad = { firstDay, meanKw: new Float64Array(days), meanKvar: new Float64Array(days) };
  for (let i = 0; i < load.day.length; i++) {
    const day = load.day[i]! - firstDay;
    hours[day]!++;
    daily.meanKw[day]! += load.activeKw[i]!;
    daily.meanKvar[day]! += load.reactiveKvar[i]!;
  }
  for (let day = 0; day < days; day++) {
    daily.meanKw[day]! /= hours[day]!;
    daily.meanKvar[day]! /= hours[day]!;
  }
  return daily;
}

/**
 * The day on which a daily figure takes its new level: where the days before it lie closest to the medians of their
 * weekday before the step, the days from it on to those after.
 * @param daily one mean a day
 * @param week the week the step was found at
 * @returns days after the first
 */
export function dayOfStep(daily: Float64Array, week: number): number {
  const fromDay = 7 * (week - 1);
  const toDay = Math.min(daily.length, 7 * (week + 1));
  const before = weekdayMedians(daily, Math.max(0, fromDay - 56), fromDay);
  const after = weekdayMedians(daily, toDay, Math.min(daily.length, toDay + 56));
  let cost = 0;
  let least = Number.POSITIVE_INFINITY;
  let best = fromDay;
  // moving the cut past a day takes its distance from the new level off and puts the one from the old level on
  for (let day = fromDay; day < toDay; day++) {
    if (cost < least) {
      least = cost;
      best = day;
    }
    const value = daily[day]!;
    if (!Number.isNaN(value)) cost += Math.abs(value - before[day % 7]!) - Math.abs(value - after[day % 7]!);
  }
  return cost < least ? toDay : best;
}

function weekdayMedians(daily: Float64Array, fromDay: number, toDay: number): number[] {
  return Array.from({ length: 7 }, (_, weekday) => {
    const values: number[] = [];
    for (let day = fromDay; day < toDay; day++) {
      if (day % 7 === weekday && !Number.isNaN(daily[day]!)) values.push(daily[day]!);
    }
    return values.length === 0 ? 0 : percentile(Float64Array.from(values).sort(), 0.5);
  });
}

function meanOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
