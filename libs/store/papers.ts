import type { EntityManager } from 'typeorm';
import { InputProblem } from '#libs/engine/index.js';
import { Paper, type PaperKind } from './paper.js';

/** A paper as it is given: `after` is the version it follows, null for the first of its name. */
export type NewPaper = Pick<Paper, 'id' | 'organisationId' | 'kind' | 'name' | 'date' | 'document'> & {
  after: number | null;
};

/** Under what a paper is found. */
export type PaperKey = Pick<Paper, 'organisationId' | 'kind' | 'name'>;

/** What a paper is called among people. */
const KIND_WORDS: Record<PaperKind, string> = { tariff: 'a shared tariff', prices: 'a shared price book' };

/**
 * Adds the next version of a paper; call it inside a write.
 * @param manager the write's manager
 * @param given the paper
 * @param now moment of creation
 * @returns the version as it is kept
 * @throws InputProblem `conflict` where the name is taken and no version is followed, `stale` where another came first
 */
export async function insertPaper(manager: EntityManager, { after, ...given }: NewPaper, now: Date): Promise<Paper> {
  await waitForVersions(manager);
  const latest = (await latestPaper(manager, given))?.version ?? 0;
  if (after === null && latest > 0) {
    const expected = `a name that no other has, or "after" with the latest version, ${latest}`;
    throw new InputProblem([{ code: 'conflict', path: 'name', expected, found: JSON.stringify(given.name) }]);
  }
  if (after !== null && after !== latest) {
    throw new InputProblem([
      { code: 'stale', path: 'after', expected: `version ${latest}`, found: `version ${after}` },
    ]);
  }
  const row: Paper = { ...given, version: latest + 1, createdAt: now };
  await manager.insert(Paper, row);
  return row;
}

/**
 * A paper by its name.
 * @param manager of a read or a write
 * @param reference whose it is, its kind and name, and the version where one is asked for
 * @param path of the reference, for a refusal
 * @throws InputProblem `not-found`
 */
export async function findPaper(
  manager: EntityManager,
  reference: PaperKey & { version?: number | undefined },
  path: string,
): Promise<Paper> {
  const { organisationId, kind, name, version } = reference;
  const found =
    version === undefined
      ? await latestPaper(manager, reference)
      : await manager.findOneBy(Paper, { organisationId, kind, name, version });
  if (found !== null) return found;
  const told = version === undefined ? JSON.stringify(name) : `${JSON.stringify(name)}, version ${version}`;
  throw new InputProblem([{ code: 'not-found', path, expected: `${KIND_WORDS[kind]} that exists`, found: told }]);
}

function latestPaper(manager: EntityManager, { organisationId, kind, name }: PaperKey): Promise<Paper | null> {
  return manager.findOne(Paper, { where: { organisationId, kind, name }, order: { version: 'DESC' } });
}

/** Any number of this program's own, other than its other locks. */
const VERSION_LOCK = 7_183_504;

/** On SQLite writes take turns anyway; on PostgreSQL two could take one version at the same moment. */
async function waitForVersions(manager: EntityManager): Promise<void> {
  if (manager.dataSource.options.type !== 'postgres') return;
  await manager.query('SELECT pg_advisory_xact_lock($1)', [VERSION_LOCK]);
}
