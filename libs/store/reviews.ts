import { type EntityManager, In } from 'typeorm';
import { InputProblem } from '#libs/engine/index.js';
import { type Attempt, refusals } from '#libs/review/refusals.js';
import { afterEvent, newReview, type Review, type ReviewState, reviewOf } from '#libs/review/review.js';
import { appendEvent, entriesOf, eventOf } from './audit-log.js';
import { ReviewStanding } from './review-standing.js';
import type { Revision } from './revision.js';
import { StaleVersion } from './stale-version.js';

/** A review with the version a client's If-Match is held against. */
export interface VersionedReview {
  review: Review;
  version: number;
}

type Numbered = Pick<Revision, 'id' | 'siteId' | 'number' | 'revision'>;

/** Where the review of a revision stands; one that nobody has touched is a draft of version 0. */
export async function readReview(manager: EntityManager, revisionId: string): Promise<VersionedReview> {
  const standing = await manager.findOneBy(ReviewStanding, { revisionId });
  const entries = await entriesOf(manager, revisionId);
  // A line written between the two reads belongs to the next version.
  const seen = entries.filter(({ sequence }) => sequence <= (standing?.lastSequence ?? 0));
  return { review: reviewOf(seen.map(eventOf)), version: standing?.version ?? 0 };
}

/** Where each of some revisions stands, by its id; one nobody has touched is missing. */
export async function statesOf(
  manager: EntityManager,
  revisions: readonly Pick<Revision, 'id'>[],
): Promise<Map<string, ReviewState>> {
  const rows = await manager.findBy(ReviewStanding, { revisionId: In(revisions.map(({ id }) => id)) });
  return new Map(rows.map(({ revisionId, state }) => [revisionId, state]));
}

/** An act as it is asked for: who, what, when, and the version they saw. */
export interface AskedAct extends Attempt {
  now: Date;
  /** null where the caller is the program itself */
  seen: number | null;
}

/**
 * Carries an act out: checks it against the rules, writes the line of the log and where the review now stands.
 * @param manager the write's manager
 * @param revision whose review it is
 * @param asked who wants to do what
 * @returns the review after it
 * @throws InputProblem `stale` where somebody was first, else the reasons why the act is not possible
 */
export async function carryOut(manager: EntityManager, revision: Numbered, asked: AskedAct): Promise<VersionedReview> {
  const { by, act, now, seen } = asked;
  const standing = await beginStanding(manager, revision.id);
  const stale = seen !== null && seen !== standing.version;
  if (stale) throw new StaleVersion(seen, standing.version);
  const review = reviewOf((await entriesOf(manager, revision.id)).map(eventOf));
  const problems = refusals(review, asked);
  if (problems.length > 0) throw new InputProblem(problems);
  const event = { at: now.toISOString(), by, act };
  const after = afterEvent(review, event);
  const { sequence } = await appendEvent(manager, revision, event);
  const { affected } = await manager.update(
    ReviewStanding,
    { revisionId: revision.id, version: standing.version },
    { state: after.state, version: standing.version + 1, lastSequence: sequence },
  );
  if (affected !== 1) throw new StaleVersion(standing.version, standing.version + 1);
  return { review: after, version: standing.version + 1 };
}

/** Revisions made before there were reviews have no row yet; two may ask for it at once. */
async function beginStanding(manager: EntityManager, revisionId: string): Promise<ReviewStanding> {
  const { state } = newReview();
  const first: ReviewStanding = { revisionId, state, version: 0, lastSequence: 0 };
  await manager.createQueryBuilder().insert().into(ReviewStanding).values(first).orIgnore().execute();
  const isPostgres = manager.dataSource.options.type === 'postgres';
  // Held until the write ends, so that two acts on one revision take turns.
  const lock = isPostgres ? { lock: { mode: 'pessimistic_write' as const } } : {};
  return manager.findOneOrFail(ReviewStanding, { where: { revisionId }, ...lock });
}
