import { type Remark, remark } from '../problem.js';
import { percentile } from '../quantity/percentile.js';
import type { HourlyLoad } from './hourly-load.js';
import { type LevelStep, levelSteps, levelsAt } from './level-step.js';
import { localDay } from './local-day.js';
import { type DailyLoad, dailyLoad, dayOfStep, type WeeklyLoad, weeklyLoad } from './weekly-load.js';

/** A change below this share of the record's usual weekly peak is none. */
const LEAST_SHARE = 0.1;
/** kvar below this share of the mean kW say nothing of a phase. */
const LEAST_KVAR_SHARE = 0.05;
const STEADY_RATIO = 1.25;
/** Two of three balanced phases carry 2/3; with one of three turned round, 2/3 − 1/3. Loads are never quite balanced. */
const TWO_THIRDS = { from: 0.6, to: 0.73 };
const ONE_THIRD = { from: 0.27, to: 0.4 };

/**
 * Steps in the level of kW or kvar, each a question; one in which everything falls to two thirds or a third is asked as
 * a phase that the meter lost, or that is turned round.
 * @param load by the hour
 * @param stepHours length of an entry of `load` [h]
 * @returns remarks in time order
 * @source method-record-signs
 */
export function stepSigns(load: HourlyLoad, stepHours: number): Remark[] {
  const weekly = weeklyLoad(load, stepHours);
  const daily = dailyLoad(load);
  const usualKw = medianOf(weekly.peakKw);
  const leastKw = LEAST_SHARE * Math.abs(usualKw);
  const active = earliestOf([
    ...levelSteps(weekly.meanKw, leastKw).map((step) => ({ ...step, of: 'mean' as const })),
    ...levelSteps(weekly.peakKw, leastKw).map((step) => ({ ...step, of: 'peak' as const })),
    ...levelSteps(weekly.baseKw, leastKw).map((step) => ({ ...step, of: 'base' as const })),
  ]);
  const reactive = levelSteps(weekly.meanKvar, Math.max(leastKw / 2, LEAST_KVAR_SHARE * Math.abs(usualKw)));
  const found = active.map((step) => activeSign(weekly, daily, step));
  const alone = reactive.filter(
    ({ week }) => active.every((other) => Math.abs(other.week - week) > 2) && isSteady(weekly.meanKw, week),
  );
  return [...found, ...alone.map((step) => reactiveSign(daily, step))];
}

/** kvar that follow a busier or slacker time of kW are no step of their own. */
function isSteady(weeklyKw: Float64Array, week: number): boolean {
  const ratio = ratioAt(weeklyKw, week);
  return ratio <= STEADY_RATIO && ratio >= 1 / STEADY_RATIO;
}

type ActiveStep = LevelStep & { of: 'mean' | 'peak' | 'base' };

/** The same step shows in several figures within a few weeks: the mean's is kept, then the peak's. */
function earliestOf(steps: readonly ActiveStep[]): ActiveStep[] {
  const kept: ActiveStep[] = [];
  for (const step of steps) if (kept.every(({ week }) => Math.abs(week - step.week) > 2)) kept.push(step);
  return kept.sort((a, b) => a.week - b.week);
}

function activeSign(weekly: WeeklyLoad, daily: DailyLoad, step: ActiveStep): Remark {
  const day = dayOfStep(daily.meanKw, step.week);
  const date = localDay(daily.firstDay + day);
  const phase = phaseOf(weekly, step.week);
  if (phase !== null) return phaseSign(phase, date);
  const { of, before, after } = step;
  return remark('sign.stepKw', { of, date, beforeKw: before, afterKw: after });
}

function reactiveSign(daily: DailyLoad, { week, before, after }: LevelStep): Remark {
  const date = localDay(daily.firstDay + dayOfStep(daily.meanKvar, week));
  return remark('sign.stepKvar', { date, beforeKvar: before, afterKvar: after });
}

interface Phase {
  turned: boolean;
  /** the fault ends at the step instead of beginning there */
  ends: boolean;
  kwPct: number;
  kvarPct: number;
}

/** Whether base, mean and peak of kW and the kvar all change by the ratio a lost or turned phase would give. */
function phaseOf(weekly: WeeklyLoad, week: number): Phase | null {
  const all = [weekly.meanKw, weekly.meanKvar, weekly.peakKw, weekly.baseKw].map((figure) => ratioAt(figure, week));
  const meanKw = medianOf(weekly.meanKw);
  if (Math.abs(medianOf(weekly.meanKvar)) < LEAST_KVAR_SHARE * Math.abs(meanKw)) return null;
  const within = (ratios: readonly number[], { from, to }: { from: number; to: number }) =>
    ratios.every((ratio) => ratio >= from && ratio <= to);
  const inverse = all.map((ratio) => 1 / ratio);
  const [ends, ratios] = all[0]! > 1 ? [true, inverse] : [false, all];
  const turned = within(ratios, ONE_THIRD);
  if (!turned && !within(ratios, TWO_THIRDS)) return null;
  return { turned, ends, kwPct: 100 * ratios[0]!, kvarPct: 100 * ratios[1]! };
}

function phaseSign({ turned, ends, kwPct, kvarPct }: Phase, date: string): Remark {
  const values = { date, kwPct, kvarPct };
  if (turned) return ends ? remark('sign.phaseTurnedUntil', values) : remark('sign.phaseTurned', values);
  return ends ? remark('sign.phaseLostUntil', values) : remark('sign.phaseLost', values);
}

function ratioAt(weekly: Float64Array, week: number): number {
  const levels = levelsAt(weekly, week);
  return levels === null ? 1 : levels.after / levels.before;
}

/** Median of the weeks that have a value; 0 where none has. */
function medianOf(weekly: Float64Array): number {
  const known = weekly.filter((value) => !Number.isNaN(value)).sort();
  return known.length === 0 ? 0 : percentile(known, 0.5);
}
