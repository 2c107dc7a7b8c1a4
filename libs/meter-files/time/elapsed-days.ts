import type { ZoneTable } from '#libs/engine/index.js';
import { localToUtc } from './local-times.js';

const DAY_S = 86_400;

/**
 * Moments of rows that say a day and the time passed since its midnight: in a day of 23 or 25 hours that is not the clock's.
 * @param clock midnight by the clock and the time passed, one a row [s]
 * @param passedS time passed since midnight, one a row [s]
 * @param zone offsets over the whole span
 * @returns UTC, one a row [s]; NaN where the day has ended by then
 */
export function elapsedMoments(clock: Float64Array, passedS: Int32Array, zone: ZoneTable): Float64Array {
  const utcS = new Float64Array(clock.length);
  const known = new Map<number, readonly [beginS: number, endS: number]>();
  for (let i = 0; i < clock.length; i++) {
    const midnightS = clock[i]! - passedS[i]!;
    let day = known.get(midnightS);
    if (day === undefined) {
      const both = Float64Array.of(midnightS, midnightS + DAY_S);
      const moments = localToUtc(both, false, zone, false).utcS;
      day = [moments[0]!, moments[1]!];
      known.set(midnightS, day);
    }
    const atS = day[0] + passedS[i]!;
    utcS[i] = atS < day[1] ? atS : Number.NaN;
  }
  return utcS;
}
