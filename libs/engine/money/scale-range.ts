import type { PointsScale, Scale, StepsScale } from './papers.js';
import { around, exactly, type Range } from './range.js';
import { boundedPct, scalePct } from './scale.js';

/** A scale read off over a range of power factors. */
export type PctRange = (powerFactor: Range) => Range;

/**
 * Reads a scale as a function of a range: where its per cent lies, at the least and at the most, for every λ within.
 * A scale that falls as λ rises is exact; any other is bounded by what its bands can add up to.
 * @param scale points, steps or ratio
 * @returns per cent [%] over a range of λ
 * @source derived: a falling function takes its extremes at the ends of a range
 */
export function scaleRange(scale: Scale): PctRange {
  const at = scalePct(scale);
  if (scale.form === 'steps') return (factor) => stepsRange(scale, at, factor);
  if (falls(scale)) return ({ lo, hi }) => (lo === hi ? exactly(at(lo)) : { lo: at(hi), hi: at(lo) });
  const most = scale.form === 'points' ? greatestPct(scale) : Number.POSITIVE_INFINITY;
  return ({ lo, hi }) => (lo === hi ? exactly(at(lo)) : { lo: boundedPct(scale, -most), hi: boundedPct(scale, most) });
}

// Every step whose beginning lies within, and those at both ends.
function stepsRange(scale: StepsScale, at: (powerFactor: number) => number, factor: Range): Range {
  const within = scale.steps.filter(({ from }) => from > factor.lo && from <= factor.hi);
  return around(at(factor.lo), at(factor.hi), ...within.map(({ from }) => at(from)));
}

function falls(scale: Scale): boolean {
  if (scale.form === 'ratio') return scale.belowPct >= 0 && scale.abovePct >= 0;
  if (scale.form === 'steps') return false;
  const below = (scale.below ?? []).map(({ pctPerPoint }) => pctPerPoint);
  const above = (scale.above ?? []).map(({ pctPerPoint }) => -pctPerPoint);
  const rising = (rates: number[]): boolean => rates.every((rate, k) => rate >= (k === 0 ? 0 : rates[k - 1]!));
  const added = (rates: number[]): boolean => rates.every((rate) => rate >= 0);
  const side = scale.cumulative === false ? rising : added;
  return side(below) && side(above);
}

function greatestPct(scale: PointsScale): number {
  const rates = [...(scale.below ?? []), ...(scale.above ?? [])].map(({ pctPerPoint }) => Math.abs(pctPerPoint));
  // at most 100 points, and one more for each band that counts a part of one
  return Math.max(0, ...rates) * (101 + rates.length);
}
