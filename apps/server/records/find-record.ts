import { InputProblem } from '#libs/engine/index.js';
import type { Store } from '#libs/store/store.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import { isId } from '../sites/find-site.js';

/**
 * A load record of a site by its id.
 * @throws InputProblem `not-found`
 */
export async function findRecord(store: Store, siteId: string, id: string): Promise<StoredRecord> {
  const record = isId(id) ? await store.read((manager) => manager.findOneBy(StoredRecord, { id, siteId })) : null;
  if (record !== null) return record;
  const found = JSON.stringify(id.slice(0, 60));
  throw new InputProblem([{ code: 'not-found', expected: 'a load record of this site', found }]);
}
