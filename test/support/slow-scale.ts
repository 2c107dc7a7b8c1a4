import type { PointsScale, Scale } from '#libs/engine/index.js';

/** A bill's rounding. */
export function slowRound(x: number, decimals: number | null): number {
  if (decimals === null) return x;
  const tens = Number(`1e${decimals}`);
  const whole = Math.floor(Math.abs(x) * tens + 0.5 + 0.000001);
  return whole === 0 ? 0 : (Math.sign(x) * whole) / tens;
}

/**
 * A scale's per cent, band by band.
 * @param scale the scale
 * @param factor λ, or null
 * @returns per cent
 */
export function slowPct(scale: Scale, factor: number | null): number {
  if (factor === null) return 0;
  let pct = formPct(scale, factor);
  if (scale.pctDecimals !== undefined) pct = slowRound(pct, scale.pctDecimals);
  if (scale.minPct !== undefined && pct < scale.minPct) pct = scale.minPct;
  if (scale.maxPct !== undefined && pct > scale.maxPct) pct = scale.maxPct;
  return pct;
}

function formPct(scale: Scale, factor: number): number {
  if (scale.form === 'steps') {
    const reached = scale.steps.filter(({ from }) => from <= factor);
    return reached.length === 0 ? 0 : reached[reached.length - 1]!.pct;
  }
  if (scale.form === 'ratio') {
    const x = scale.reference / factor - 1;
    return x > 0 ? x * scale.belowPct : x * scale.abovePct;
  }
  const side =
    factor < scale.reference
      ? (scale.below ?? []).map((band) => ({ limit: band.downTo, rate: band.pctPerPoint }))
      : (scale.above ?? []).map((band) => ({ limit: band.upTo, rate: band.pctPerPoint }));
  return scale.cumulative === false ? wholeSide(scale, side, factor) : addedSide(scale, side, factor);
}

type Side = { limit: number; rate: number }[];

function isPast(scale: PointsScale, factor: number, limit: number): boolean {
  return factor < scale.reference ? factor < limit : factor > limit;
}

function counted(scale: PointsScale, factor: number, from: number, to: number): number {
  const points = Math.abs(to - from) * 100;
  if (scale.count === undefined || scale.count === 'exact') return points;
  const up = scale.count === 'orPart' && factor < scale.reference;
  return up ? Math.ceil(points - 1e-9) : Math.floor(points + 1e-9);
}

function wholeSide(scale: PointsScale, side: Side, factor: number): number {
  if (side.length === 0) return 0;
  const held = side.find(({ limit }) => !isPast(scale, factor, limit));
  const last = side[side.length - 1]!;
  const end = held === undefined ? last.limit : factor;
  return counted(scale, factor, scale.reference, end) * (held ?? last).rate;
}

function addedSide(scale: PointsScale, side: Side, factor: number): number {
  let pct = 0;
  let from = scale.reference;
  for (const { limit, rate } of side) {
    const past = isPast(scale, factor, limit);
    pct += counted(scale, factor, from, past ? limit : factor) * rate;
    if (!past) break;
    from = limit;
  }
  return pct;
}
