import { canonicalJson } from '#libs/contract/canonical-json.js';
import type { FrozenPlanMark } from '#libs/review/review-act.js';
import { sha256 } from './audit-log.js';
import type { Revision } from './revision.js';

/**
 * SHA-256 over everything that is stored of a revision: what an approval freezes.
 * @param revision as it is stored
 */
export function planHash(revision: Revision): string {
  const { id, siteId, number, revision: count, kind, recordId, recordHash } = revision;
  const { inputs, engineVersion, contentHash, result, proposed, rival, verdict, author, reason, paperForm } = revision;
  const createdAt = revision.createdAt.toISOString();
  // Named one by one: a column added later must not change what stands in the log already.
  return sha256(
    canonicalJson({
      ...{ form: 'plan 1', id, siteId, number, revision: count, kind, recordId, recordHash, inputs },
      ...{ engineVersion, contentHash, result, proposed, rival, verdict, createdAt, author, reason },
      ...(paperForm === null ? {} : { paperForm }),
    }),
  );
}

/**
 * The mark by which a revision and a paper of it are known again.
 * @param revision as it is stored
 * @param paper its bytes
 */
export function frozenMark(revision: Revision, paper: Uint8Array): FrozenPlanMark {
  return { planHash: planHash(revision), paper: { sha256: sha256(paper), bytes: paper.length } };
}
