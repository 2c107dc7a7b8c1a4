import { weekdayOf } from '../record/local-day.js';

/** Daily values in the order of their days. */
export interface DayValues {
  /** local days since 1970-01-01, ascending */
  day: Int32Array;
  value: Float64Array;
}

/** Where a series of days changed, and how. */
export interface ChangePoint {
  kind: 'step' | 'drift';
  /** first day after a step, days since 1970-01-01; null for a drift */
  day: number | null;
  /** mean before and after a step, and at both ends of a drift */
  before: number;
  after: number;
  /** share of the scatter within weekdays that it explains, 0 … 1 */
  explained: number;
}

/** Days on either side of a step. */
const LEAST_DAYS = 14;
/** A change smaller than this share of the greater mean is no change worth telling. */
const LEAST_SHARE = 0.1;
/** A change explains at least this share of the scatter that the weekdays leave. */
const LEAST_EXPLAINED = 0.3;

/**
 * The day on which a series of days changed its level: of every split with 14 days on either side the one that leaves the
 * least sum of squares, each weekday with a mean of its own and one step common to all. With x = 0 before and 1 after the
 * split, both freed of their weekday's mean, the step is δ = S_xy/S_xx and takes S_xy²/S_xx off the sum of squares. A
 * straight drift, with x the day itself, is fitted in the same way; the one that takes off more is told, where it
 * explains 30 % of what the weekdays leave and the change is a tenth of the greater mean.
 * @param days daily values
 * @returns the change, or null where there is none
 * @source method-reevaluation
 */
export function changePoint({ day, value }: DayValues): ChangePoint | null {
  const n = day.length;
  if (n < 2 * LEAST_DAYS) return null;
  const weeks = weekdays(day, value);
  if (!(weeks.scatter > 0)) return null;
  const step = bestStep(day, value, weeks);
  const drift = driftOf(day, value, weeks);
  const [taken, kind] = step.taken >= drift.taken ? [step.taken, 'step' as const] : [drift.taken, 'drift' as const];
  const { before, after } = kind === 'step' ? step : drift;
  const explained = taken / weeks.scatter;
  const most = Math.max(Math.abs(before), Math.abs(after));
  if (explained < LEAST_EXPLAINED || Math.abs(after - before) < LEAST_SHARE * most) return null;
  return { kind, day: kind === 'step' ? day[step.split]! : null, before, after, explained };
}

interface Weekdays {
  /** by weekday 1 … 7 */
  count: number[];
  mean: number[];
  /** Σ(y − mean of its weekday)² */
  scatter: number;
  overall: number;
}

function weekdays(day: Int32Array, value: Float64Array): Weekdays {
  const count = new Array<number>(8).fill(0);
  const sum = new Array<number>(8).fill(0);
  let total = 0;
  for (let i = 0; i < day.length; i++) {
    const w = weekdayOf(day[i]!);
    count[w]!++;
    sum[w]! += value[i]!;
    total += value[i]!;
  }
  const mean = sum.map((of, w) => (count[w] === 0 ? 0 : of / count[w]!));
  let scatter = 0;
  for (let i = 0; i < day.length; i++) scatter += (value[i]! - mean[weekdayOf(day[i]!)]!) ** 2;
  return { count, mean, scatter, overall: total / day.length };
}

// Walks the split along the days; S_xx = Σ n_w,after·n_w,before/n_w, S_xy = Σ over the days after of y less its weekday's mean.
function bestStep(
  day: Int32Array,
  value: Float64Array,
  weeks: Weekdays,
): { taken: number; split: number; before: number; after: number } {
  const n = day.length;
  const after = weeks.count.slice();
  let sumXy = 0;
  let best = { taken: -1, split: 0, delta: 0 };
  for (let k = 1; k <= n - LEAST_DAYS; k++) {
    const w = weekdayOf(day[k - 1]!);
    after[w]!--;
    sumXy -= value[k - 1]! - weeks.mean[w]!;
    if (k < LEAST_DAYS) continue;
    const sumXx = weeks.count.reduce(
      (sum, of, at) => (of === 0 ? sum : sum + (after[at]! * (of - after[at]!)) / of),
      0,
    );
    const taken = sumXx === 0 ? 0 : (sumXy * sumXy) / sumXx;
    if (taken > best.taken) best = { taken, split: k, delta: sumXx === 0 ? 0 : sumXy / sumXx };
  }
  const share = (n - best.split) / n;
  return {
    taken: best.taken,
    split: best.split,
    before: weeks.overall - best.delta * share,
    after: weeks.overall + best.delta * (1 - share),
  };
}

function driftOf(
  day: Int32Array,
  value: Float64Array,
  weeks: Weekdays,
): { taken: number; before: number; after: number } {
  const meanDay = new Array<number>(8).fill(0);
  for (const of of day) meanDay[weekdayOf(of)]! += of / weeks.count[weekdayOf(of)]!;
  let sumXx = 0;
  let sumXy = 0;
  for (let i = 0; i < day.length; i++) {
    const w = weekdayOf(day[i]!);
    const x = day[i]! - meanDay[w]!;
    sumXx += x * x;
    sumXy += x * (value[i]! - weeks.mean[w]!);
  }
  const slope = sumXx === 0 ? 0 : sumXy / sumXx;
  const half = (slope * (day[day.length - 1]! - day[0]!)) / 2;
  return { taken: slope * sumXy, before: weeks.overall - half, after: weeks.overall + half };
}
