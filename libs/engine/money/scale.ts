import type { PointsScale, RatioScale, Scale, StepsScale } from './papers.js';
import { roundAmount } from './round-amount.js';

/** A point of power factor. */
const POINT = 0.01;
/** Points this near to a whole number are that number. */
const WHOLE_WIDTH = 1e-9;

/** A scale ready to be read off: per cent [%] at a power factor. */
export type PctAt = (powerFactor: number | null) => number;

/**
 * Reads a scale as a function: per cent at a power factor, + is a surcharge, rounded to `pctDecimals`, then held within
 * `minPct` and `maxPct`; 0 where there is no energy and so no power factor.
 * @param scale points, steps or ratio
 * @returns per cent [%] at λ
 * @source method-money
 */
export function scalePct(scale: Scale): PctAt {
  const form = formPct(scale);
  return (powerFactor) => (powerFactor === null ? 0 : boundedPct(scale, form(powerFactor)));
}

/**
 * Roundings and bounds of a scale.
 * @param scale any form
 * @param pct what the form gives [%]
 * @returns rounded, then held within the bounds [%]
 * @source method-money
 */
export function boundedPct(scale: Scale, pct: number): number {
  const rounded = roundAmount(pct, scale.pctDecimals ?? null);
  return Math.min(
    Math.max(rounded, scale.minPct ?? Number.NEGATIVE_INFINITY),
    scale.maxPct ?? Number.POSITIVE_INFINITY,
  );
}

function formPct(scale: Scale): (powerFactor: number) => number {
  switch (scale.form) {
    case 'points':
      return pointsPct(scale);
    case 'steps':
      return stepsPct(scale);
    case 'ratio':
      return ratioPct(scale);
  }
}

function stepsPct(scale: StepsScale): (powerFactor: number) => number {
  return (powerFactor) => {
    let pct = 0;
    for (const step of scale.steps) {
      if (step.from <= powerFactor) pct = step.pct;
    }
    return pct;
  };
}

function ratioPct(scale: RatioScale): (powerFactor: number) => number {
  return (powerFactor) => {
    const excess = scale.reference / powerFactor - 1;
    return excess * (excess > 0 ? scale.belowPct : scale.abovePct);
  };
}

/** A band on one side of the reference. */
interface Band {
  /** the factor at which it ends */
  limit: number;
  /** how far from the reference that is */
  end: number;
  pctPerPoint: number;
}

function pointsPct(scale: PointsScale): (powerFactor: number) => number {
  const { reference } = scale;
  const below = (scale.below ?? []).map(({ downTo, pctPerPoint }): Band => {
    return { limit: downTo, end: reference - downTo, pctPerPoint };
  });
  const above = (scale.above ?? []).map(({ upTo, pctPerPoint }): Band => {
    return { limit: upTo, end: upTo - reference, pctPerPoint };
  });
  const count = scale.count ?? 'exact';
  const bandPct = scale.cumulative === false ? wholePct : slicesPct;
  // Above the reference a part of a point earns nothing, whichever way parts are counted below it.
  return (powerFactor) =>
    powerFactor < reference
      ? bandPct(
          below,
          reference - powerFactor,
          below.findIndex(({ limit }) => powerFactor >= limit),
          count,
        )
      : bandPct(
          above,
          powerFactor - reference,
          above.findIndex(({ limit }) => powerFactor <= limit),
          count === 'exact' ? 'exact' : 'whole',
        );
}

type Count = 'exact' | 'orPart' | 'whole';

function slicesPct(bands: readonly Band[], away: number, _holding: number, count: Count): number {
  let pct = 0;
  let begin = 0;
  for (const band of bands) {
    if (away > begin) pct += points(Math.min(away, band.end) - begin, count) * band.pctPerPoint;
    begin = band.end;
  }
  return pct;
}

// Beyond the last band the points end with it, as they do where the bands are added up.
function wholePct(bands: readonly Band[], away: number, holding: number, count: Count): number {
  const band = bands[holding < 0 ? bands.length - 1 : holding];
  return band === undefined ? 0 : points(Math.min(away, band.end), count) * band.pctPerPoint;
}

function points(width: number, count: Count): number {
  const exact = width / POINT;
  if (count === 'exact') return exact;
  return count === 'orPart' ? Math.ceil(exact - WHOLE_WIDTH) : Math.floor(exact + WHOLE_WIDTH);
}
