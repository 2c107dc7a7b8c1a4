import { type Remark, remark } from '../problem.js';
import { percentile } from '../quantity/percentile.js';
import type { HourlyLoad } from './hourly-load.js';
import { localDay, weekdayOf } from './local-day.js';

const NIGHT_UNTIL_H = 5;
const DAY_FROM_H = 8;
const DAY_UNTIL_H = 17;
/** Nights and days needed before they say anything. */
const LEAST_DAYS = 7;
/** Most of the nights or days must say the same. */
const MOST_SHARE = 0.6;
const LEAST_KVAR_SHARE = 0.05;
/** A night that is no quieter than the day is not low load. */
const QUIET_SHARE = 0.7;

/**
 * kvar of a sign that asks for a reason: leading on most nights, at low load, while the days lag; or leading on most
 * working days, when the load is high.
 * @param load by the hour, no longer
 * @returns one remark or none
 * @source method-record-signs
 */
export function kvarSigns(load: HourlyLoad): Remark[] {
  const nights = means(load, (hour) => hour < NIGHT_UNTIL_H);
  const days = means(load, (hour, weekday) => hour >= DAY_FROM_H && hour < DAY_UNTIL_H && weekday <= 5);
  if (nights.kw.length < LEAST_DAYS || days.kw.length < LEAST_DAYS) return [];
  const [nightKvar, dayKvar] = [middle(nights.kvar), middle(days.kvar)];
  const [nightKw, dayKw] = [middle(nights.kw), middle(days.kw)];
  const least = LEAST_KVAR_SHARE * Math.abs(dayKvar);
  const nightsPct = sharePct(nights.kvar, (kvar) => kvar < -least);
  const quiet = nightKw < QUIET_SHARE * dayKw;
  if (quiet && dayKvar > 0 && nightsPct >= 100 * MOST_SHARE && sharePct(days.kvar, (kvar) => kvar > 0) >= 50) {
    return [remark('sign.leadsAtNight', { nightsPct, nightKvar, dayKvar })];
  }
  const daysPct = sharePct(days.kvar, (kvar) => kvar < 0);
  const heavy = quiet && -dayKvar > LEAST_KVAR_SHARE * dayKw && dayKvar <= nightKvar;
  return heavy && daysPct >= 100 * MOST_SHARE ? [remark('sign.leadsByDay', { daysPct, dayKvar, dayKw })] : [];
}

function means(load: HourlyLoad, isIn: (hour: number, weekday: number) => boolean) {
  const kw: number[] = [];
  const kvar: number[] = [];
  let [count, sumKw, sumKvar] = [0, 0, 0];
  for (let i = 0; i <= load.day.length; i++) {
    if (i > 0 && count > 0 && load.day[i] !== load.day[i - 1]) {
      kw.push(sumKw / count);
      kvar.push(sumKvar / count);
      [count, sumKw, sumKvar] = [0, 0, 0];
    }
    if (i === load.day.length || !isIn(load.hour[i]!, weekdayOf(load.day[i]!))) continue;
    count++;
    sumKw += load.activeKw[i]!;
    sumKvar += load.reactiveKvar[i]!;
  }
  return { kw, kvar };
}

const LOST_FROM = 0.55;
const LOST_TO = 0.75;
const LOST_HOURS = 24;

/**
 * A mean of three voltages that falls to about two thirds for a day or longer: one of them is gone from the meter.
 * @param load by the hour
 * @returns one remark or none, of the first time
 * @source method-record-signs
 */
export function voltageSigns(load: HourlyLoad): Remark[] {
  const { voltageV, day } = load;
  if (voltageV === null || voltageV.length < LOST_HOURS) return [];
  const usualV = percentile(voltageV.slice().sort(), 0.5);
  let from = 0;
  for (let i = 0; i <= voltageV.length; i++) {
    const share = i === voltageV.length ? 1 : voltageV[i]! / usualV;
    if (share >= LOST_FROM && share <= LOST_TO) continue;
    if (i - from >= LOST_HOURS) {
      const foundV = percentile(voltageV.slice(from, i).sort(), 0.5);
      return [remark('sign.voltageLost', { date: localDay(day[from]!), usualV, foundV, hours: i - from })];
    }
    from = i + 1;
  }
  return [];
}

function sharePct(values: readonly number[], is: (value: number) => boolean): number {
  return (100 * values.filter(is).length) / values.length;
}

function middle(values: readonly number[]): number {
  return percentile(Float64Array.from(values).sort(), 0.5);
}
