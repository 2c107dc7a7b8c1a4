import type { EntityManager } from 'typeorm';
import type { ReviewState } from '#libs/review/review.js';
import { askedPaperOf, paperFormOf } from './paper-form.js';
import { ProposalFile } from './proposal-file.js';
import { ReviewStanding } from './review-standing.js';
import { Revision } from './revision.js';
import { StoredSite } from './stored-site.js';

/** What a list of sites shows of each one's latest revision. */
export type RevisionMark = Pick<Revision, 'siteId' | 'revision' | 'kind' | 'verdict' | 'createdAt' | 'proposed'> & {
  /** where its review stands */
  state: ReviewState;
};

/** The latest revision of every site of an organisation that has one. */
export async function latestRevisions(manager: EntityManager, organisationId: string): Promise<RevisionMark[]> {
  const rows = await manager
    .createQueryBuilder(Revision, 'revision')
    .innerJoin(StoredSite, 'site', 'site.id = revision.siteId AND site.lastRevision = revision.revision')
    .leftJoinAndMapOne('revision.standing', ReviewStanding, 'standing', 'standing.revisionId = revision.id')
    .select(['siteId', 'revision', 'kind', 'verdict', 'createdAt', 'proposed', 'id'].map((name) => `revision.${name}`))
    .addSelect('standing')
    .where('site.organisationId = :organisationId', { organisationId })
    .getMany();
  return (rows as (Revision & { standing?: ReviewStanding | null })[]).map(
    ({ siteId, revision, kind, verdict, createdAt, proposed, standing }) => ({
      ...{ siteId, revision, kind, verdict, createdAt, proposed },
      state: standing?.state ?? 'draft',
    }),
  );
}

/** A revision that has not got its number yet, and the proposal made for that number. */
export interface NewRevision {
  revision: Revision;
  proposal: Omit<ProposalFile, 'revisionId'>;
}

/** What a revision is known by within its site: what it was made from, and how its paper looks. */
export type RevisionKey = Pick<Revision, 'siteId' | 'contentHash' | 'paperForm'>;

/**
 * The revision that equal inputs have led to, on an equal paper. One that was withdrawn or superseded stands no more: the
 * same inputs make the next one.
 * @returns the latest, null where there is none
 */
export async function standingRevision(
  manager: EntityManager,
  { siteId, contentHash, paperForm }: RevisionKey,
): Promise<Revision | null> {
  const standing = await manager
    .createQueryBuilder(Revision, 'revision')
    .leftJoin(ReviewStanding, 'standing', 'standing.revisionId = revision.id')
    .where('revision.siteId = :siteId AND revision.contentHash = :contentHash', { siteId, contentHash })
    .andWhere("(standing.state IS NULL OR standing.state NOT IN ('withdrawn', 'superseded'))")
    .orderBy('revision.revision', 'DESC')
    .getMany();
  for (const revision of standing) {
    // Revisions from before their paper's form was kept have none, whatever it was: the job that made them knows.
    const form = revision.paperForm ?? paperFormOf(await askedPaperOf(manager, revision));
    if (form === paperForm) return revision;
  }
  return null;
}

/**
 * Adds a revision under the number its proposal was made for, if that number is still the next one.
 * Equal inputs on an equal paper are one revision: where it stands already, it is left as it is.
 * @param manager the write's manager
 * @param added the revision, numbered one above the site's last, and its proposal
 * @returns the revision that stands; null where the number was taken meanwhile or the site is gone
 */
export async function insertRevision(manager: EntityManager, added: NewRevision): Promise<Revision | null> {
  const { siteId, revision: number } = added.revision;
  const standing = await standingRevision(manager, added.revision);
  if (standing !== null) return standing;
  const next = { id: siteId, lastRevision: number - 1 };
  const { affected } = await manager.update(StoredSite, next, { lastRevision: number });
  if (affected !== 1) return null;
  await manager.insert(Revision, added.revision);
  await manager.insert(ProposalFile, { revisionId: added.revision.id, ...added.proposal });
  return added.revision;
}
