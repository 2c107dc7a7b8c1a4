import { type Remark, remark } from '../problem.js';
import { percentile } from '../quantity/percentile.js';
import type { HourlyLoad } from './hourly-load.js';
import { localDay, weekdayOf } from './local-day.js';
import type { ZoneTable } from './zone-table.js';

const SIDE_DAYS = 21;
const LEAST_DAYS = 5;
/** The day must be further off than this, by the clock, before an hour is looked for: share of its own swing. */
const LEAST_OFF = 0.15;
/** A shift by an hour must take away more than half of what is off. */
const MENDED_SHARE = 0.5;

/**
 * Changes of the clock at which the working day moves by an hour against it: the stamps did not follow the clock of the
 * zone, or the plant does not.
 * @param load by the hour, no longer
 * @param zone the site's zone
 * @returns one remark or none, of the first such change
 * @source method-record-signs
 */
export function clockSign(load: HourlyLoad, zone: ZoneTable): Remark[] {
  const first = load.beginS[0]!;
  const last = load.beginS[load.beginS.length - 1]!;
  let found: { day: number; shiftH: number } | null = null;
  let [changes, shifted] = [0, 0];
  for (let k = 1; k < zone.fromS.length; k++) {
    const changeS = zone.fromS[k]!;
    if (changeS <= first || changeS > last || Math.abs(zone.offsetS[k]! - zone.offsetS[k - 1]!) !== 3600) continue;
    const day = Math.floor((changeS + zone.offsetS[k]!) / 86_400);
    const before = typicalDay(load, day - SIDE_DAYS, day);
    const after = typicalDay(load, day + 1, day + 1 + SIDE_DAYS);
    if (before === null || after === null) continue;
    changes++;
    const shiftH = shiftBetween(before, after);
    if (shiftH === 0) continue;
    shifted++;
    found ??= { day, shiftH };
  }
  if (found === null) return [];
  const values = { date: localDay(found.day), shifted, changes };
  return [found.shiftH > 0 ? remark('sign.dayLater', values) : remark('sign.dayEarlier', values)];
}

/** Medians by the hour of the local clock over working days, as shares of their mean; null where days are too few. */
function typicalDay(load: HourlyLoad, fromDay: number, toDay: number): Float64Array | null {
  const byHour: number[][] = Array.from({ length: 24 }, () => []);
  for (let i = firstOf(load.day, fromDay); i < load.day.length && load.day[i]! < toDay; i++) {
    if (weekdayOf(load.day[i]!) <= 5) byHour[load.hour[i]!]!.push(load.activeKw[i]!);
  }
  if (byHour.some((values) => values.length < LEAST_DAYS)) return null;
  const typical = Float64Array.from(byHour, (values) => percentile(Float64Array.from(values).sort(), 0.5));
  const mean = typical.reduce((sum, kw) => sum + kw, 0) / 24;
  return mean > 0 ? typical.map((kw) => kw / mean) : null;
}

function firstOf(days: Int32Array, day: number): number {
  let low = 0;
  let high = days.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (days[middle]! < day) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** By how many hours the second day runs later than the first: −1, 0 or 1. */
function shiftBetween(before: Float64Array, after: Float64Array): number {
  const swing = before.reduce((sum, share) => sum + Math.abs(share - 1), 0);
  const off = (shiftH: number) =>
    before.reduce((sum, share, hour) => sum + Math.abs(share - after[(hour + shiftH + 24) % 24]!), 0);
  const still = off(0);
  if (still < LEAST_OFF * swing) return 0;
  const shiftH = off(1) < off(-1) ? 1 : -1;
  return off(shiftH) < MENDED_SHARE * still ? shiftH : 0;
}
