import type { MeterMap } from './meter-map.js';

/**
 * Two maps as one; columns and units are merged one by one.
 * @param base what was said before
 * @param over what is said now: it wins
 */
export function mergedMap(base: MeterMap, over: MeterMap): MeterMap {
  const merged: MeterMap = { ...base, ...over };
  if (base.columns !== undefined && over.columns !== undefined) merged.columns = { ...base.columns, ...over.columns };
  if (base.units !== undefined && over.units !== undefined) merged.units = { ...base.units, ...over.units };
  return merged;
}
