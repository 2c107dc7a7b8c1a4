import type { EstimateResult, Result } from '#libs/engine/index.js';
import { Job } from '#libs/store/job.js';
import { Revision } from '#libs/store/revision.js';
import type { Store } from '#libs/store/store.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import { StoredSite } from '#libs/store/stored-site.js';
import type { Actor } from '../people/actor.js';

/** A revision with its result read. */
export interface ShownRevision extends Omit<Revision, 'result' | 'inputs'> {
  result: Result | EstimateResult;
  /** names of the loads that inject harmonic current */
  distorting: string[];
}

/** What the page shows. */
export interface SiteView {
  site: StoredSite | null;
  revision: ShownRevision | null;
  /** the latest job of the site */
  job: Job | null;
  records: number;
  others: Pick<StoredSite, 'id' | 'name'>[];
}

/**
 * Gathers what the page shows of a site.
 * @param store the store
 * @param actor whose organisation's sites it shows
 * @param siteId which site; absent, the first
 */
export async function siteView(store: Store, { organisationId }: Actor, siteId?: string): Promise<SiteView> {
  const sites = await store.read((manager) =>
    manager.find(StoredSite, { where: { organisationId }, order: { number: 'ASC' } }),
  );
  const site = (siteId === undefined ? sites[0] : sites.find(({ id }) => id === siteId)) ?? null;
  const others = sites.filter((other) => other !== site).map(({ id, name }) => ({ id, name }));
  if (site === null) return { site, revision: null, job: null, records: 0, others };
  const own = { siteId: site.id };
  const [revision, job, records] = await Promise.all([
    store.read((manager) => manager.findOneBy(Revision, { ...own, revision: site.lastRevision })),
    store.read((manager) => manager.findOne(Job, { where: own, order: { id: 'DESC' } })),
    store.read((manager) => manager.countBy(StoredRecord, own)),
  ]);
  return { site, revision: revision === null ? null : shown(revision), job, records, others };
}

function shown({ result, inputs, ...rest }: Revision): ShownRevision {
  const { site } = JSON.parse(inputs) as { site: { loads?: { distorting?: { name: string }[] } } };
  const distorting = (site.loads?.distorting ?? []).map(({ name }) => name);
  return { ...rest, result: JSON.parse(result) as ShownRevision['result'], distorting };
}
