import type { ProposalFrame } from '#libs/proposal/proposal-frame.js';
import type { Revision } from '#libs/store/revision.js';
import type { Store } from '#libs/store/store.js';
import { revisionHistory } from './revision-history.js';

/** What a paper says of the revision it is of. */
export type Framed = Pick<
  Revision,
  'siteId' | 'number' | 'revision' | 'author' | 'reason' | 'contentHash' | 'recordHash' | 'engineVersion' | 'createdAt'
>;

/**
 * The frame of a revision's draft: number, hashes, reason and date, and the revisions before it.
 * @param store the store
 * @param revision stored, or about to be
 */
export async function frameOf(store: Store, framed: Framed): Promise<ProposalFrame> {
  const { siteId, number, revision, author, reason, contentHash, recordHash, engineVersion, createdAt } = framed;
  return {
    ...{ number, revision, state: 'draft, not reviewed', preparedBy: author, contentHash, recordHash, engineVersion },
    ...{ reason, date: createdAt.toISOString().slice(0, 10) },
    history: await revisionHistory(store, siteId, revision),
  };
}
