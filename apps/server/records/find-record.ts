import { InputProblem } from '#libs/engine/index.js';
import type { Store } from '#libs/store/store.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import type { StoredSite } from '#libs/store/stored-site.js';
import { isId } from '../sites/find-site.js';

/**
 * A load record of a site by its id.
 * @param site as `findSite` gave it, so that it is the actor's to see
 * @throws InputProblem `not-found`
 */
export async function findRecord(store: Store, site: Pick<StoredSite, 'id'>, id: string): Promise<StoredRecord> {
  const siteId = site.id;
  const record = isId(id) ? await store.read((manager) => manager.findOneBy(StoredRecord, { id, siteId })) : null;
  if (record !== null) return record;
  const found = JSON.stringify(id.slice(0, 60));
  throw new InputProblem([{ code: 'not-found', expected: 'a load record of this site', found }]);
}
