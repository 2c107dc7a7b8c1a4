import { type EntityManager, Not } from 'typeorm';
import { InputProblem } from '#libs/engine/index.js';
import { KeptMap } from './kept-map.js';
import { StaleVersion } from './stale-version.js';

/** What a client says of kept answers. */
export type KeptMapContent = Pick<KeptMap, 'organisationId' | 'name' | 'map' | 'header'>;

/** Kept answers that are not there. */
export function noKeptMap(found: string): InputProblem {
  return new InputProblem([{ code: 'not-found', expected: 'kept answers that exist', found }]);
}

/**
 * Keeps answers under a name; call it inside a write.
 * @param manager the write's manager
 * @param id of the new row
 * @param content organisation, name, map and the header they were made for
 * @param now moment of creation
 * @throws InputProblem `conflict` where the name is taken
 */
export async function insertKeptMap(
  manager: EntityManager,
  id: string,
  content: KeptMapContent,
  now: Date,
): Promise<KeptMap> {
  await waitForNames(manager);
  await refuseTakenName(manager, id, content);
  const row: KeptMap = { id, ...content, version: 1, createdAt: now, updatedAt: now };
  await manager.insert(KeptMap, row);
  return row;
}

/**
 * Replaces kept answers if they still have the version the client saw: one compare-and-swap.
 * @param manager the write's manager
 * @param seen id and version the client saw
 * @param content organisation, name, map and header
 * @param now moment of the change
 * @throws InputProblem `not-found`, `conflict` where the name is taken, `stale` where somebody else was first
 */
export async function replaceKeptMap(
  manager: EntityManager,
  seen: Pick<KeptMap, 'id' | 'version'>,
  content: KeptMapContent,
  now: Date,
): Promise<void> {
  await waitForNames(manager);
  await refuseTakenName(manager, seen.id, content);
  const { affected } = await manager.update(
    KeptMap,
    { id: seen.id, version: seen.version },
    { ...content, version: seen.version + 1, updatedAt: now },
  );
  if (affected !== 1) throw await changedMeanwhile(manager, seen);
}

/**
 * Removes kept answers.
 * @param manager the write's manager
 * @param id which
 * @param version the client saw, null where it does not say
 * @throws InputProblem `not-found` or `stale`
 */
export async function deleteKeptMap(manager: EntityManager, id: string, version: number | null): Promise<void> {
  const { affected } = await manager.delete(KeptMap, version === null ? { id } : { id, version });
  if (affected !== 1) throw await changedMeanwhile(manager, { id, version: version ?? 0 });
}

async function changedMeanwhile(manager: EntityManager, { id, version }: Pick<KeptMap, 'id' | 'version'>) {
  const current = await manager.findOneBy(KeptMap, { id });
  if (current === null) return noKeptMap(id);
  return new StaleVersion(version, current.version);
}

async function refuseTakenName(
  manager: EntityManager,
  id: string,
  { organisationId, name }: KeptMapContent,
): Promise<void> {
  if (!(await manager.existsBy(KeptMap, { organisationId, name, id: Not(id) }))) return;
  const expected = 'a name that no kept answers have yet';
  throw new InputProblem([{ code: 'conflict', path: 'name', expected, found: JSON.stringify(name) }]);
}

/** Any number of this program's own, other than its other locks. */
const NAME_LOCK = 7_183_503;

/** On SQLite writes take turns anyway; on PostgreSQL two could take one name at the same moment. */
async function waitForNames(manager: EntityManager): Promise<void> {
  if (manager.dataSource.options.type !== 'postgres') return;
  await manager.query('SELECT pg_advisory_xact_lock($1)', [NAME_LOCK]);
}
