import { type EntityManager, IsNull } from 'typeorm';
import { InputProblem } from '#libs/engine/index.js';
import { Revision } from './revision.js';
import { RevisionLink } from './revision-link.js';

/** A link that leads nowhere: never made, expired and revoked are one. */
export function noLink(): InputProblem {
  return new InputProblem([{ code: 'not-found', expected: 'a link that holds', found: 'none' }]);
}

/** The links of a revision, the newest first; those that hold no more too. */
export function linksOf(manager: EntityManager, revisionId: string): Promise<RevisionLink[]> {
  return manager.find(RevisionLink, { where: { revisionId }, order: { createdAt: 'DESC', id: 'ASC' } });
}

/**
 * What a link shows.
 * @param tokenHash SHA-256 of its token
 * @param now moment of asking
 * @throws InputProblem `not-found` where it does not hold
 */
export async function linkedRevision(
  manager: EntityManager,
  tokenHash: string,
  now: Date,
): Promise<{ link: RevisionLink; revision: Revision }> {
  const link = await manager.findOneBy(RevisionLink, { tokenHash, revokedAt: IsNull() });
  if (link === null || link.expiresAt <= now) throw noLink();
  return { link, revision: await manager.findOneByOrFail(Revision, { id: link.revisionId }) };
}

/**
 * Revokes a link of a revision; one that was revoked stays so since then.
 * @throws InputProblem `not-found` where the revision has none of this id
 */
export async function revokeLink(
  manager: EntityManager,
  own: Pick<RevisionLink, 'id' | 'revisionId'>,
  now: Date,
): Promise<void> {
  if (!(await manager.existsBy(RevisionLink, { ...own }))) throw noLink();
  await manager.update(RevisionLink, { ...own, revokedAt: IsNull() }, { revokedAt: now });
}
