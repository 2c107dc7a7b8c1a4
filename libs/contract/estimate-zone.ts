import type { Site, ZoneTable } from '#libs/engine/index.js';
import { zoneTable } from './time-zone.js';

const MARGIN_S = 40 * 86_400;

/**
 * The offsets of a site's zone over the months of its bills, and more than a month on either side. Whoever hashes a
 * plan's inputs takes this one, so that equal inputs have equal hashes.
 * @param site a site with an estimate
 * @returns the table; without bills that of one moment
 * @throws InputProblem where the months lie outside 1600 to 9998, or too far apart
 */
export function estimateZone({ timeZone, estimate }: Pick<Site, 'timeZone' | 'estimate'>): ZoneTable {
  const begins = (estimate?.bills ?? []).map(({ month }) => Date.parse(`${month}-01T00:00:00Z`) / 1000);
  if (begins.length === 0) return zoneTable(timeZone, 0, 0);
  return zoneTable(timeZone, Math.min(...begins) - MARGIN_S, Math.max(...begins) + 2 * MARGIN_S);
}
