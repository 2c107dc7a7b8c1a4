import { canonicalJson } from '#libs/contract/canonical-json.js';
import type { PlanInputs } from '#libs/contract/plan-content.js';
import { ENGINE_VERSION, InputProblem } from '#libs/engine/index.js';
import type { Staleness } from '#libs/review/refusals.js';
import { hasLaterRecord, laterRevision } from '#libs/store/later-work.js';
import type { Revision } from '#libs/store/revision.js';
import type { Store } from '#libs/store/store.js';
import type { StoredSite } from '#libs/store/stored-site.js';
import { siteWithPapers } from '../papers/site-with-papers.js';

/**
 * What the site has moved on to since a revision was made.
 * @param store the store
 * @param site as it stands
 * @param revision of the site
 * @returns null where it is still the plan of the site as it stands
 */
export async function stalenessOf(store: Store, site: StoredSite, revision: Revision): Promise<Staleness | null> {
  const later = await store.read((manager) => laterRevision(manager, revision));
  if (later !== null) return { why: 'laterRevision', found: `revision ${later}` };
  if (revision.engineVersion !== ENGINE_VERSION) return { why: 'engineChanged', found: `engine ${ENGINE_VERSION}` };
  if (!(await isSameSite(store, site, revision)))
    return { why: 'siteChanged', found: `version ${site.version} of the site` };
  const hasRecord = await store.read((manager) => hasLaterRecord(manager, revision));
  return hasRecord ? { why: 'recordChanged', found: 'one that came after the plan' } : null;
}

// A later version of a shared paper is a change of the site too, unless the site names the version.
async function isSameSite(store: Store, stored: StoredSite, { inputs }: Revision): Promise<boolean> {
  const { site: frozen } = JSON.parse(inputs) as PlanInputs;
  try {
    const site = await siteWithPapers(store, stored, undefined);
    // Where the file gives no date, the day the plan was asked for was filled in.
    return canonicalJson({ ...site, asOf: site.asOf ?? frozen.asOf }) === canonicalJson(frozen);
  } catch (error) {
    if (error instanceof InputProblem) return false;
    throw error;
  }
}
