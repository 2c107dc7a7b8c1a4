import { randomUUID } from 'node:crypto';
import type { Role } from '#apps/server/people/actor.js';
import { hashPassword } from '#apps/server/people/password-hash.js';
import { makeToken, tokenHash } from '#apps/server/people/secret-token.js';
import { ApiKey } from '#libs/store/api-key.js';
import { openStore } from '#libs/store/open-store.js';
import { insertPerson, organisationNamed } from '#libs/store/people.js';

/** The least that is still a hash: these accounts guard nothing. */
export const CHEAP_HASH = { logN: 4, blockSize: 1, parallel: 1 };

/** Somebody with an account and a key. */
export interface MadePerson {
  id: string;
  organisation: string;
  signInName: string;
  password: string;
  role: Role;
  /** headers of a request in their name */
  headers: Record<string, string>;
}

/**
 * Opens an account for each role in an organisation, straight in the store.
 * @param dbUrl the database, before or while a server uses it
 * @param organisation its name
 * @param roles an account each; an administrator comes first, as the store wants it
 */
export async function makePeople(
  dbUrl: string,
  organisation: string,
  roles: readonly Role[] = ['administrator', 'reviewer', 'planner', 'viewer'],
): Promise<Record<Role, MadePerson>> {
  const store = await openStore(dbUrl);
  const password = `${organisation} knows it well`;
  const hashed = await hashPassword(password, CHEAP_HASH);
  const made = roles.map((role) => ({ role, id: randomUUID(), key: makeToken() }));
  await store.write(async (manager) => {
    const { id: organisationId } = await organisationNamed(manager, randomUUID(), organisation);
    const now = new Date();
    for (const { role, id, key } of made) {
      const person = { id, organisationId, signInName: role, name: `${role} of ${organisation}`, role };
      await insertPerson(manager, { ...person, password: hashed }, now);
      const row = { personId: id, name: 'test', role, keyHash: tokenHash(key), createdAt: now };
      await manager.insert(ApiKey, { ...row, id: randomUUID(), expiresAt: null, revokedAt: null });
    }
  });
  await store.close();
  return Object.fromEntries(
    made.map(({ role, id, key }) => {
      const headers = { authorization: `Bearer ${key}` };
      return [role, { id, organisation, signInName: role, password, role, headers } satisfies MadePerson];
    }),
  ) as unknown as Record<Role, MadePerson>;
}
