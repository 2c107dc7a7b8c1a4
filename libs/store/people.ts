import { type EntityManager, IsNull, Not } from 'typeorm';
import { InputProblem } from '#libs/engine/index.js';
import { ApiKey } from './api-key.js';
import { Organisation } from './organisation.js';
import { Person } from './person.js';
import { PersonSession } from './person-session.js';
import { StaleVersion } from './stale-version.js';

/** The role an organisation is never left without. */
const ADMINISTRATOR = 'administrator';

/** What is said of a person when the account is opened. */
export type NewPerson = Pick<Person, 'id' | 'organisationId' | 'signInName' | 'name' | 'role' | 'password'>;

/** What may be changed of an account. */
export type PersonChange = Partial<Pick<Person, 'name' | 'role' | 'password' | 'closedAt'>>;

/** A person that is not there. */
export function noPerson(found: string): InputProblem {
  return new InputProblem([{ code: 'not-found', expected: 'a person that exists', found }]);
}

/** The organisation of this name, made where there is none; call it inside a write. */
export async function organisationNamed(manager: EntityManager, id: string, name: string): Promise<Organisation> {
  await waitForPeople(manager);
  const standing = await manager.findOneBy(Organisation, { name });
  if (standing !== null) return standing;
  const row: Organisation = { id, name, createdAt: new Date() };
  await manager.insert(Organisation, row);
  return row;
}

/**
 * Opens an account; call it inside a write.
 * @param manager the write's manager
 * @param person who
 * @param now moment of opening
 * @throws InputProblem `conflict` where the name is taken, or the first account of all is no administrator's
 */
export async function insertPerson(manager: EntityManager, person: NewPerson, now: Date): Promise<Person> {
  await waitForPeople(manager);
  const { organisationId, signInName } = person;
  if (await manager.existsBy(Person, { organisationId, signInName })) {
    const expected = 'a sign-in name nobody in this organisation has or had';
    throw new InputProblem([{ code: 'conflict', path: 'signInName', expected, found: JSON.stringify(signInName) }]);
  }
  const row: Person = { ...person, version: 1, createdAt: now, updatedAt: now, closedAt: null };
  await manager.insert(Person, row);
  await refuseWithoutAdministrator(manager, organisationId);
  return row;
}

/**
 * Changes an account if it still has the version that was seen. A new password, role or end of the account ends its
 * sessions; the end of an account revokes its keys.
 * @param manager the write's manager
 * @param seen whose account, and the version that was seen
 * @param change what becomes of it
 * @param now moment of the change
 * @throws InputProblem `not-found`, `stale`, or `conflict` where the last administrator would go
 */
export async function changePerson(
  manager: EntityManager,
  seen: Pick<Person, 'id' | 'organisationId' | 'version'>,
  change: PersonChange,
  now: Date,
): Promise<Person> {
  await waitForPeople(manager);
  const { id, organisationId, version } = seen;
  const own = { id, organisationId };
  const { affected } = await manager.update(
    Person,
    { ...own, version },
    { ...change, version: version + 1, updatedAt: now },
  );
  const person = await manager.findOneBy(Person, own);
  if (person === null) throw noPerson(id);
  if (affected !== 1) throw new StaleVersion(version, person.version);
  await refuseWithoutAdministrator(manager, organisationId);
  if (Object.keys(change).some((key) => key !== 'name')) await manager.delete(PersonSession, { personId: id });
  if (person.closedAt !== null) {
    await manager.update(ApiKey, { personId: id, revokedAt: IsNull() }, { revokedAt: now });
  }
  return person;
}

/** Whether anybody has an account on this server. */
export function hasAccounts(manager: EntityManager): Promise<boolean> {
  return manager.existsBy(Person, { id: Not(IsNull()) });
}

/** Who signs in under a name; null where the account was closed or never was. */
export function openPerson(
  manager: EntityManager,
  name: Pick<Person, 'organisationId' | 'signInName'>,
): Promise<Person | null> {
  return manager.findOneBy(Person, { ...name, closedAt: IsNull() });
}

/**
 * The API keys of some people, the newest first.
 * @param owners whose: an organisation's, or one person's of it
 */
export function keysOf(
  manager: EntityManager,
  owners: Pick<Person, 'organisationId'> & Partial<Pick<Person, 'id'>>,
): Promise<ApiKey[]> {
  return manager
    .createQueryBuilder(ApiKey, 'apiKey')
    .innerJoin(Person, 'person', 'person.id = apiKey.personId')
    .where('person.organisationId = :organisationId', { organisationId: owners.organisationId })
    .andWhere(owners.id === undefined ? '1 = 1' : 'person.id = :id', { id: owners.id ?? null })
    .orderBy('apiKey.createdAt', 'DESC')
    .addOrderBy('apiKey.id')
    .getMany();
}

/** Revokes an API key; one that was revoked stays so since then. */
export async function revokeKey(manager: EntityManager, id: string, now: Date): Promise<void> {
  await manager.update(ApiKey, { id, revokedAt: IsNull() }, { revokedAt: now });
}

/** Organisations somebody has an account in, by id. */
export async function organisationsWithPeople(manager: EntityManager): Promise<string[]> {
  const rows = await manager
    .createQueryBuilder(Person, 'person')
    .select('person.organisationId', 'id')
    .distinct(true)
    .getRawMany<{ id: string }>();
  return rows.map(({ id }) => id);
}

/** Whether some organisation has somebody who may manage its accounts. */
export function hasAdministrator(manager: EntityManager): Promise<boolean> {
  return manager.existsBy(Person, { role: ADMINISTRATOR, closedAt: IsNull() });
}

async function refuseWithoutAdministrator(manager: EntityManager, organisationId: string): Promise<void> {
  if (await manager.existsBy(Person, { organisationId, role: ADMINISTRATOR, closedAt: IsNull() })) return;
  const expected = 'an administrator who can still sign in';
  throw new InputProblem([{ code: 'conflict', path: 'role', expected, found: 'none in this organisation' }]);
}

/** Any number of this program's own, other than its other locks. */
const PEOPLE_LOCK = 7_183_504;

/** On SQLite writes take turns anyway; on PostgreSQL the last two administrators could close each other's account. */
async function waitForPeople(manager: EntityManager): Promise<void> {
  if (manager.dataSource.options.type !== 'postgres') return;
  await manager.query('SELECT pg_advisory_xact_lock($1)', [PEOPLE_LOCK]);
}
