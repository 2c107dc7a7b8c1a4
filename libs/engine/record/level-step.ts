import { percentile } from '../quantity/percentile.js';

/** Weeks looked at on either side of a step, and the least that must be there. */
const SIDE_WEEKS = 8;
const LEAST_WEEKS = 5;
/** A step is a change of level by this ratio … */
const STEP_RATIO = 1.4;
/** … that leaves half of itself free between the two sides, one odd week a side aside. */
const CLEAR_SHARE = 0.5;
/** The four weeks next to it must show a like change as they stand, or the step is another's, or a passing one. */
const NEAR_WEEKS = 4;
const NEAR_SHARE = { from: 0.5, to: 1.6 };

/** A season drifts no faster than this a week; what does is a step in one of the sides. */
const MOST_DRIFT = 0.04;

/** Levels before and after the beginning of a week. */
export interface Levels {
  before: number;
  after: number;
}

/** A change of level between two weeks. */
export interface LevelStep extends Levels {
  /** the first week at the new level */
  week: number;
}

/**
 * The weeks at which a weekly figure changes its level for good. Up to eight weeks on either side are taken, less the
 * drift that both sides share; their medians differ by 1.4 or more and by `least`, and the weeks of the two sides stay
 * apart by half the change, one week a side excepted. A season drifts and a shutdown passes: neither is a step.
 * @param weekly one value a week, NaN where the week is too full of gaps
 * @param least changes smaller than this count for nothing, same unit as `weekly`
 * @returns the steps, at least eight weeks apart, in time order
 * @source method-record-signs
 */
export function levelSteps(weekly: Float64Array, least: number): LevelStep[] {
  const found: (LevelStep & { spread: number })[] = [];
  for (let week = 1; week < weekly.length; week++) {
    const sides = sidesOf(weekly, week);
    if (sides === null) continue;
    const levels = middlesOf(sides);
    if (!isStep(levels, least) || !standApart(sides, levels) || !isNear(sides, levels)) continue;
    const spread = spreadOf(sides.before, levels.before) + spreadOf(sides.after, levels.after);
    found.push({ week, ...levels, spread: spread / Math.abs(levels.after - levels.before) });
  }
  found.sort((a, b) => a.spread - b.spread);
  const kept: LevelStep[] = [];
  for (const { week, before, after } of found) {
    if (kept.every((other) => Math.abs(other.week - week) >= SIDE_WEEKS)) kept.push({ week, before, after });
  }
  return kept.sort((a, b) => a.week - b.week);
}

/**
 * Levels on both sides of a week's beginning, the drift they share taken out.
 * @param weekly one value a week, NaN where the week is too full of gaps
 * @param week the first week after
 * @returns medians, or null where a side has less than five weeks
 * @source method-record-signs
 */
export function levelsAt(weekly: Float64Array, week: number): Levels | null {
  const sides = sidesOf(weekly, week);
  return sides === null ? null : middlesOf(sides);
}

/** Values of both sides, ascending, and the change between the weeks next to the boundary as they stand. */
interface Sides extends Record<keyof Levels, Float64Array> {
  nearChange: number;
}

interface Point {
  /** weeks from the boundary, which lies half a week from its neighbours */
  at: number;
  value: number;
}

function sidesOf(weekly: Float64Array, week: number): Sides | null {
  const before: Point[] = [];
  const after: Point[] = [];
  for (let k = 0; k < SIDE_WEEKS; k++) {
    pushPoint(before, -k - 0.5, weekly[week - 1 - k]);
    pushPoint(after, k + 0.5, weekly[week + k]);
  }
  if (before.length < LEAST_WEEKS || after.length < LEAST_WEEKS) return null;
  const drift = sharedDrift(slopeOf(before), slopeOf(after), usual(before, after));
  const level = (side: readonly Point[]) => Float64Array.from(side, ({ at, value }) => value - drift * at).sort();
  const near = (side: readonly Point[]) =>
    percentile(Float64Array.from(side.slice(0, NEAR_WEEKS), ({ value }) => value).sort(), 0.5);
  return { before: level(before), after: level(after), nearChange: near(after) - near(before) };
}

function pushPoint(side: Point[], at: number, value: number | undefined): void {
  if (value !== undefined && !Number.isNaN(value)) side.push({ at, value });
}

/** Median of the slopes between all pairs: a few odd weeks don't turn it. */
function slopeOf(side: readonly Point[]): number {
  const slopes = new Float64Array((side.length * (side.length - 1)) / 2);
  let count = 0;
  for (let a = 0; a < side.length; a++) {
    for (let b = a + 1; b < side.length; b++) {
      slopes[count++] = (side[b]!.value - side[a]!.value) / (side[b]!.at - side[a]!.at);
    }
  }
  return percentile(slopes.sort(), 0.5);
}

// What only one side does is no drift of the whole.
function sharedDrift(before: number, after: number, level: number): number {
  const drift = Math.abs(before) < Math.abs(after) ? before : after;
  return before * after <= 0 || Math.abs(drift) > MOST_DRIFT * level ? 0 : drift;
}

function usual(before: readonly Point[], after: readonly Point[]): number {
  return percentile(Float64Array.from([...before, ...after], ({ value }) => Math.abs(value)).sort(), 0.5);
}

function middlesOf({ before, after }: Sides): Levels {
  return { before: percentile(before, 0.5), after: percentile(after, 0.5) };
}

function isStep({ before, after }: Levels, least: number): boolean {
  if (Math.abs(after - before) < least) return false;
  if (before * after <= 0) return true;
  const ratio = after / before;
  return ratio >= STEP_RATIO || ratio <= 1 / STEP_RATIO;
}

function standApart({ before, after }: Sides, levels: Levels): boolean {
  const [low, high] = levels.after > levels.before ? [before, after] : [after, before];
  return high[1]! - low[low.length - 2]! >= CLEAR_SHARE * Math.abs(levels.after - levels.before);
}

function isNear({ nearChange }: Sides, { before, after }: Levels): boolean {
  const share = nearChange / (after - before);
  return share >= NEAR_SHARE.from && share <= NEAR_SHARE.to;
}

function spreadOf(values: Float64Array, centre: number): number {
  return values.reduce((sum, value) => sum + Math.abs(value - centre), 0) / values.length;
}
