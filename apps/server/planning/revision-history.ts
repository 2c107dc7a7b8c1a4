import type { EstimateResult, Result } from '#libs/engine/index.js';
import { revisionNumbers } from '#libs/present/revision-numbers.js';
import type { PastRevision } from '#libs/proposal/proposal-frame.js';
import { earlierRevisions } from '#libs/store/earlier-revisions.js';
import type { Store } from '#libs/store/store.js';

/** Revisions that a paper lists besides its own, at most; the latest count. */
const MOST_LISTED = 12;

/**
 * The revisions of a site before one of them, as its paper lists them.
 * @param store the store
 * @param siteId of the site
 * @param before number of the revision whose paper it is
 * @returns the latest of them, the earliest of these first
 */
export async function revisionHistory(store: Store, siteId: string, before: number): Promise<PastRevision[]> {
  const found = await store.read((manager) => earlierRevisions(manager, siteId, before, MOST_LISTED));
  return found.map(({ revision, kind, createdAt, author, reason, contentHash, engineVersion, result }) => ({
    ...{ revision, kind, author, reason, contentHash, engineVersion },
    date: createdAt.toISOString().slice(0, 10),
    numbers: revisionNumbers(JSON.parse(result) as Result | EstimateResult),
  }));
}
