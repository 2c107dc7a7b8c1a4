import { InputProblem } from '#libs/engine/index.js';
import { Revision } from '#libs/store/revision.js';
import type { Store } from '#libs/store/store.js';
import type { Actor } from '../people/actor.js';
import { pathNumber } from '../path-number.js';
import { findSite } from '../sites/find-site.js';

/** Where a revision stands in a path. */
export interface RevisionPath {
  siteId: string;
  revision: string;
}

/**
 * A revision of a site that is the actor's to see.
 * @throws InputProblem `not-found`
 */
export async function findRevision(store: Store, actor: Actor, { siteId, revision }: RevisionPath): Promise<Revision> {
  const { id } = await findSite(store, actor, siteId);
  const number = pathNumber(revision, 'revision');
  const found = await store.read((manager) => manager.findOneBy(Revision, { siteId: id, revision: number }));
  if (found !== null) return found;
  throw new InputProblem([{ code: 'not-found', expected: 'a revision of this site', found: `${number}` }]);
}
