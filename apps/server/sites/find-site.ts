import { noSite } from '#libs/store/sites.js';
import type { Store } from '#libs/store/store.js';
import { StoredSite } from '#libs/store/stored-site.js';
import type { Actor } from '../people/actor.js';

const ID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

/** Whether a text can be an id of ours; the database is asked for nothing else. */
export const isId = (text: string) => ID.test(text);

/**
 * A site of the actor's organisation by its id.
 * @throws InputProblem `not-found`, also where it is another organisation's
 */
export async function findSite(store: Store, { organisationId }: Actor, id: string): Promise<StoredSite> {
  const own = { id, organisationId };
  const site = isId(id) ? await store.read((manager) => manager.findOneBy(StoredSite, own)) : null;
  if (site === null) throw noSite(JSON.stringify(id.slice(0, 60)));
  return site;
}
