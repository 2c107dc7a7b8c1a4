import { randomUUID } from 'node:crypto';
import type { FastifyRequest } from 'fastify';
import type { SignIn } from '#libs/contract/people-schema.js';
import { InputProblem } from '#libs/engine/index.js';
import { ApiKey } from '#libs/store/api-key.js';
import { Organisation } from '#libs/store/organisation.js';
import { changePerson, hasAccounts, noPerson, openPerson, organisationsWithPeople } from '#libs/store/people.js';
import { Person } from '#libs/store/person.js';
import { PersonSession } from '#libs/store/person-session.js';
import type { Store } from '#libs/store/store.js';
import { WriteQueue } from '#libs/store/write-queue.js';
import { RefusedRequest } from '../refused-request.js';
import { type Actor, covers, LOCAL_ACTOR, type Role } from './actor.js';
import { Attempts } from './attempts.js';
import { type HashCost, hashPassword, isPassword, PRESENT_COST } from './password-hash.js';
import { isToken, makeToken, tokenHash } from './secret-token.js';
import { readSessionCookie } from './session-cookie.js';

/** So long a session holds; then one signs in again [s]. */
export const SESSION_S = 12 * 3600;

/** How names are compared: what looks equal is equal. */
export const spelledName = (name: string) => name.normalize('NFKC').trim().toLowerCase();

/** How the server is reached. */
export interface Reach {
  /** nobody but this machine reaches it */
  isLocal: boolean;
  /** people reach it over https */
  isSecure: boolean;
}

/** Who is who: sessions, API keys, passwords; and the local user as long as there are no accounts. */
export class Accounts {
  readonly #attempts = new Attempts();
  /** One password is hashed at a time: each takes memory and a thread. */
  readonly #hashing = new WriteQueue();
  /** A hash nobody's password leads to, so that an unknown name takes as long as a wrong password. */
  #nobody: Promise<string> | null = null;
  #areThere = false;

  constructor(
    private readonly store: Store,
    readonly reach: Reach,
    private readonly hashCost: HashCost = PRESENT_COST,
  ) {}

  /** Whether the local user needs no account. */
  async areNone(): Promise<boolean> {
    if (this.#areThere || !this.reach.isLocal) return false;
    this.#areThere = await this.store.read(hasAccounts);
    return !this.#areThere;
  }

  /** Who makes a request; null where it is nobody known. */
  async recognise({ headers }: Pick<FastifyRequest, 'headers'>): Promise<Actor | null> {
    const { authorization, cookie } = headers;
    if (authorization !== undefined) return this.#byKey(/^Bearer (\S+)$/i.exec(authorization)?.[1] ?? '');
    const token = readSessionCookie(cookie, this.reach.isSecure);
    const actor = token === null ? null : await this.#bySession(token);
    if (actor !== null) return actor;
    return (await this.areNone()) ? LOCAL_ACTOR : null;
  }

  /**
   * Begins a session.
   * @returns its token, for the cookie, and who signed in
   * @throws RefusedRequest 401 where the three do not belong together, 429 after too many tries
   */
  async signIn({ organisation, signInName, password }: SignIn): Promise<{ token: string; actor: Actor }> {
    const organisationId = await this.#organisationOf(organisation ?? '');
    const name = spelledName(signInName);
    const tried = JSON.stringify([organisationId, name]);
    this.#attempts.count(tried, Date.now());
    const person = await this.store.read((manager) => openPerson(manager, { organisationId, signInName: name }));
    this.#nobody ??= hashPassword(makeToken(), this.hashCost);
    const stored = person?.password ?? (await this.#nobody);
    const isRight = await this.#hashing.run(() => isPassword(password, stored));
    if (person === null || !isRight) throw notSignedIn();
    this.#attempts.forget(tried);
    const token = makeToken();
    await this.store.write((manager) => manager.insert(PersonSession, sessionRow(token, person.id)));
    return { token, actor: actorFor(person) };
  }

  /** Ends the session of a request, if it has one. */
  async signOut({ headers }: Pick<FastifyRequest, 'headers'>): Promise<void> {
    const token = readSessionCookie(headers.cookie, this.reach.isSecure);
    if (token === null || !isToken(token)) return;
    await this.store.write((manager) => manager.delete(PersonSession, { tokenHash: tokenHash(token) }));
  }

  /**
   * Asks for the password again, where a session alone is not enough. The local user has none and passes.
   * @throws RefusedRequest 403 where it is not theirs, 429 after too many tries
   */
  async confirm({ personId, organisationId }: Actor, password: string): Promise<void> {
    if (personId === LOCAL_ACTOR.personId) return;
    const person = await this.store.read((manager) => manager.findOneBy(Person, { id: personId, organisationId }));
    if (person === null) throw noPerson(personId);
    const tried = JSON.stringify([organisationId, person.signInName]);
    this.#attempts.count(tried, Date.now());
    if (!(await this.#hashing.run(() => isPassword(password, person.password)))) {
      const problem = { code: 'usage', path: 'password', expected: 'your password', found: 'another' } as const;
      throw new RefusedRequest(403, 'Not your password', problem);
    }
    this.#attempts.forget(tried);
  }

  /** A password as it is stored. */
  hash(password: string): Promise<string> {
    return this.#hashing.run(() => hashPassword(password, this.hashCost));
  }

  /** Gives a person another password, which ends their sessions, and begins a session for who changed their own. */
  async changeOwnPassword(actor: Actor, present: string, password: string): Promise<string> {
    refuseLocal(actor);
    await this.confirm(actor, present);
    const hashed = await this.hash(password);
    const token = makeToken();
    await this.store.write(async (manager) => {
      const { version } = await manager.findOneByOrFail(Person, { id: actor.personId });
      const seen = { id: actor.personId, organisationId: actor.organisationId, version };
      await changePerson(manager, seen, { password: hashed }, new Date());
      await manager.insert(PersonSession, sessionRow(token, actor.personId));
    });
    return token;
  }

  /**
   * Makes an API key in the actor's name.
   * @returns the key, which is not kept, and its row
   * @throws RefusedRequest 403 where it were to do more than its maker
   */
  async makeKey(actor: Actor, { name, role = actor.role, days }: { name: string; role?: Role; days?: number }) {
    refuseLocal(actor);
    if (!covers(actor.role, role)) {
      const problem = { code: 'out-of-range', path: 'role', expected: `at most ${actor.role}`, found: role } as const;
      throw new RefusedRequest(403, 'Not in your role', problem);
    }
    const key = makeToken();
    const now = Date.now();
    const row: ApiKey = {
      ...{ id: randomUUID(), personId: actor.personId, name, role, keyHash: tokenHash(key) },
      createdAt: new Date(now),
      expiresAt: days === undefined ? null : new Date(now + days * 86_400_000),
      revokedAt: null,
    };
    await this.store.write((manager) => manager.insert(ApiKey, row));
    return { key, row };
  }

  async #bySession(token: string): Promise<Actor | null> {
    if (!isToken(token)) return null;
    const own = { tokenHash: tokenHash(token) };
    const session = await this.store.read((manager) => manager.findOneBy(PersonSession, own));
    if (session === null || session.expiresAt.getTime() <= Date.now()) return null;
    const person = await this.#person(session.personId);
    return person === null ? null : actorFor(person);
  }

  async #byKey(key: string): Promise<Actor | null> {
    if (!isToken(key)) return null;
    const row = await this.store.read((manager) => manager.findOneBy(ApiKey, { keyHash: tokenHash(key) }));
    if (row === null || row.revokedAt !== null) return null;
    if (row.expiresAt !== null && row.expiresAt.getTime() <= Date.now()) return null;
    const person = await this.#person(row.personId);
    if (person === null) return null;
    const own = actorFor(person);
    const role = row.role as Role;
    return { ...own, role: covers(own.role, role) ? role : own.role };
  }

  async #person(id: string): Promise<Person | null> {
    const person = await this.store.read((manager) => manager.findOneBy(Person, { id }));
    return person?.closedAt === null ? person : null;
  }

  /** By its name, or the only one anybody could mean; the empty text belongs to none. */
  async #organisationOf(name: string): Promise<string> {
    if (name.trim() === '') {
      const ids = await this.store.read(organisationsWithPeople);
      return ids.length === 1 ? ids[0]! : '';
    }
    const named = { name: spelledName(name) };
    return (await this.store.read((manager) => manager.findOneBy(Organisation, named)))?.id ?? '';
  }
}

/** A person as they act. */
function actorFor({ id, name, role, organisationId }: Person): Actor {
  return { personId: id, name, role: role as Role, organisationId };
}

function sessionRow(token: string, personId: string): PersonSession {
  const now = Date.now();
  const expiresAt = new Date(now + SESSION_S * 1000);
  return { tokenHash: tokenHash(token), personId, createdAt: new Date(now), expiresAt };
}

function refuseLocal({ personId }: Actor): void {
  if (personId !== LOCAL_ACTOR.personId) return;
  throw new InputProblem([{ code: 'conflict', expected: 'an account', found: 'the local user, who has none' }]);
}

function notSignedIn(): RefusedRequest {
  const expected = 'an organisation, a sign-in name and a password that belong together';
  return new RefusedRequest(401, 'Not signed in', { code: 'usage', expected, found: 'others' });
}
