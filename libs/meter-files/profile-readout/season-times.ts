import { offsetAtS, type ZoneTable } from '#libs/engine/index.js';
import type { Season } from './profile-header.js';

const HOUR_S = 3600;

/**
 * The moment at which a meter's clock showed a time.
 * In a doubled hour summer time is the first pass and standard time the second; without a season the first is taken.
 * @param clockS the clock [s]
 * @param season what the clock showed
 * @param table the zone of standard and summer time
 * @returns UTC [s]; null where the zone's clock never showed that
 */
export function momentOf(clockS: number, season: Season, table: ZoneTable): number | null {
  if (season === 'utc') return clockS;
  if (table.offsetS.length === 1) {
    // a fixed offset is standard time; a clock in summer time runs an hour ahead of it
    return clockS - table.offsetS[0]! - (season === 'summer' ? HOUR_S : 0);
  }
  const moments = [...new Set(table.offsetS)]
    .map((offsetS) => ({ momentS: clockS - offsetS, offsetS }))
    .filter(({ momentS, offsetS }) => offsetAtS(table, momentS) === offsetS)
    .map(({ momentS }) => momentS)
    .sort((a, b) => a - b);
  if (moments.length === 0) return null;
  return season === 'standard' ? moments[moments.length - 1]! : moments[0]!;
}
