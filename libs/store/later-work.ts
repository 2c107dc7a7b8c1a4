import { type EntityManager, MoreThan } from 'typeorm';
import { ReviewStanding } from './review-standing.js';
import { Revision } from './revision.js';
import { StoredRecord } from './stored-record.js';

/**
 * The next revision of the same kind and site that was not withdrawn, and is no draft of the same on another paper.
 * @returns its number, null where there is none
 */
export async function laterRevision(
  manager: EntityManager,
  { siteId, kind, revision, contentHash }: Revision,
): Promise<number | null> {
  const later = await manager
    .createQueryBuilder(Revision, 'revision')
    .leftJoin(ReviewStanding, 'standing', 'standing.revisionId = revision.id')
    .where('revision.siteId = :siteId AND revision.kind = :kind AND revision.revision > :revision', {
      ...{ siteId, kind, revision },
    })
    .andWhere("(standing.state IS NULL OR standing.state <> 'withdrawn')")
    .andWhere("(revision.contentHash <> :contentHash OR standing.state IN ('approved', 'superseded'))", { contentHash })
    .orderBy('revision.revision')
    .getOne();
  return later?.revision ?? null;
}

/** Whether the site got a load record after a revision was made. */
export function hasLaterRecord(manager: EntityManager, { siteId, createdAt }: Revision): Promise<boolean> {
  return manager.existsBy(StoredRecord, { siteId, createdAt: MoreThan(createdAt) });
}

/**
 * Approved revisions of the same kind and site, other than one.
 * @returns those that an approval of it puts out of use
 */
export function approvedBeside(manager: EntityManager, { siteId, kind, id }: Revision): Promise<Revision[]> {
  return manager
    .createQueryBuilder(Revision, 'revision')
    .innerJoin(ReviewStanding, 'standing', 'standing.revisionId = revision.id')
    .where('revision.siteId = :siteId AND revision.kind = :kind AND revision.id <> :id', { siteId, kind, id })
    .andWhere("standing.state = 'approved'")
    .orderBy('revision.revision')
    .getMany();
}
