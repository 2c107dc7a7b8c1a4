import type { Site } from '#libs/engine/index.js';
import { localDate } from './time-zone.js';

/**
 * A site with its date fixed: where it says none, the day it is now in its zone.
 * @param site a site as read
 * @param nowS the moment of asking, UTC [s]
 * @returns the site whose result no longer depends on when it is computed
 */
export function frozenSite(site: Site, nowS: number): Site & { asOf: string } {
  return { ...site, asOf: site.asOf ?? localDate(site.timeZone, nowS) };
}
