import type { EntityManager } from 'typeorm';
import { InputProblem } from '#libs/engine/index.js';
import { IssuedPaper } from './issued-paper.js';
import { Revision } from './revision.js';
import { StaleVersion } from './stale-version.js';
import { StoredSite } from './stored-site.js';

/** A site that is not there. */
export function noSite(id: string): InputProblem {
  return new InputProblem([{ code: 'not-found', expected: 'a site that exists', found: id }]);
}

/**
 * Adds a site under the next number of its organisation; call it inside a write.
 * @param manager the write's manager
 * @param site id, organisation, name and document
 * @param now moment of creation
 */
export async function insertSite(
  manager: EntityManager,
  site: Pick<StoredSite, 'id' | 'organisationId' | 'name' | 'document'>,
  now: Date,
): Promise<StoredSite> {
  await waitForNumber(manager);
  const { last } = (await manager
    .createQueryBuilder(StoredSite, 'site')
    .select('MAX(site.number)', 'last')
    .where('site.organisationId = :organisationId', { organisationId: site.organisationId })
    .getRawOne<{ last: number | null }>()) ?? { last: null };
  const row: StoredSite = {
    ...site,
    number: (last ?? 0) + 1,
    version: 1,
    lastRevision: 0,
    createdAt: now,
    updatedAt: now,
  };
  await manager.insert(StoredSite, row);
  return row;
}

/** Any number of this program's own, other than the lock of the migrations. */
const NUMBER_LOCK = 7_183_502;

/** On SQLite writes take turns anyway; on PostgreSQL two new sites would see the same last number. */
async function waitForNumber(manager: EntityManager): Promise<void> {
  if (manager.dataSource.options.type !== 'postgres') return;
  await manager.query('SELECT pg_advisory_xact_lock($1)', [NUMBER_LOCK]);
}

/**
 * Replaces a site's document if it still has the version the client saw: one compare-and-swap.
 * @param manager the write's manager
 * @param site id, name and document
 * @param seen version the client saw
 * @param now moment of the change
 * @returns the new version
 * @throws InputProblem `not-found`, or `stale` where somebody else was first
 */
export async function replaceSite(
  manager: EntityManager,
  site: Pick<StoredSite, 'id' | 'name' | 'document'>,
  seen: number,
  now: Date,
): Promise<number> {
  const { affected } = await manager.update(
    StoredSite,
    { id: site.id, version: seen },
    { name: site.name, document: site.document, version: seen + 1, updatedAt: now },
  );
  if (affected === 1) return seen + 1;
  const current = await manager.findOneBy(StoredSite, { id: site.id });
  if (current === null) throw noSite(site.id);
  throw new StaleVersion(seen, current.version);
}

/**
 * Removes a site with its records, revisions, proposals and jobs.
 * @param manager the write's manager
 * @param id the site
 * @param seen version the client saw, null where it does not say
 * @throws InputProblem `not-found`, `stale`, or `conflict` where a paper of it was issued
 */
export async function deleteSite(manager: EntityManager, id: string, seen: number | null): Promise<void> {
  const current = await manager.findOneBy(StoredSite, { id });
  if (current === null) throw noSite(id);
  if (seen !== null && current.version !== seen) throw new StaleVersion(seen, current.version);
  await refuseIssued(manager, id);
  await manager.delete(StoredSite, { id });
}

/** What was issued stays to be downloaded and verified, and its site with it. */
async function refuseIssued(manager: EntityManager, siteId: string): Promise<void> {
  const issued = await manager
    .createQueryBuilder(IssuedPaper, 'paper')
    .innerJoin(Revision, 'revision', 'revision.id = paper.revisionId')
    .where('revision.siteId = :siteId', { siteId })
    .getCount();
  if (issued === 0) return;
  const found = `${issued}, which are kept for ever`;
  throw new InputProblem([{ code: 'conflict', expected: 'a site without approved papers', found }]);
}
