import type { ProposalFrame } from '#libs/proposal/proposal-frame.js';
import { askedPaperOf } from '#libs/store/paper-form.js';
import type { Revision } from '#libs/store/revision.js';
import type { Store } from '#libs/store/store.js';
import type { FrozenPlan } from './plan-request.js';
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

/** What the paper looks like, so far as it was asked for. */
type Sheet = Pick<ProposalFrame, 'paper' | 'language' | 'logo'>;

/** The same, as a request names them. */
type AskedSheet = Pick<FrozenPlan, 'paper' | 'language' | 'logo'>;

/** Sheet, language and logo, where they were asked for. */
export function sheetOf({ paper, language, logo }: AskedSheet): Sheet {
  return {
    ...(paper === undefined ? {} : { paper }),
    ...(language === undefined ? {} : { language }),
    ...(logo === undefined ? {} : { logo: new Uint8Array(Buffer.from(logo, 'base64')) }),
  };
}

/** Sheet, language and logo a stored revision was asked for with, as they were asked for. */
export async function askedSheetOf(store: Store, revision: Revision): Promise<AskedSheet> {
  return (await store.read((manager) => askedPaperOf(manager, revision))) as AskedSheet;
}

/** The same, as a paper's frame takes it. */
export async function sheetOfRevision(store: Store, revision: Revision): Promise<Sheet> {
  return sheetOf(await askedSheetOf(store, revision));
}
