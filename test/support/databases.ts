import { randomUUID } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import pg from 'pg';
import { inject } from 'vitest';
import { SOAKED } from './soak.js';

/** A database of its own for one test, and the way to be rid of it. */
export interface TestDatabase {
  /** `sqlite:/path/to/file` or `postgres://…/name`. */
  url: string;
  drop: () => Promise<void>;
}

/** The databases every test of storage runs on; PostgreSQL only where the machine has it. */
export const databases: { name: 'SQLite' | 'PostgreSQL'; available: boolean; create: () => Promise<TestDatabase> }[] = [
  { name: 'SQLite', available: true, create: createSqlite },
  { name: 'PostgreSQL', available: inject('postgresUrl') !== null, create: createPostgres },
];

/**
 * The databases of a test that goes over HTTP and asks the store for nothing the tests of the store itself do not ask on
 * both: SQLite in the usual run, both in the long one.
 */
export const usualDatabases = SOAKED ? databases : databases.slice(0, 1);

async function createSqlite(): Promise<TestDatabase> {
  const dir = mkdtempSync(join(tmpdir(), 'varwright-sqlite-'));
  return {
    url: `sqlite:${join(dir, 'test.sqlite')}`,
    drop: async () => rmSync(dir, { recursive: true, force: true }),
  };
}

async function createPostgres(): Promise<TestDatabase> {
  const name = `test_${randomUUID().replaceAll('-', '')}`;
  await administer(`CREATE DATABASE ${name}`);
  return {
    url: new URL(`/${name}`, serverUrl()).href,
    drop: () => administer(`DROP DATABASE IF EXISTS ${name} WITH (FORCE)`),
  };
}

function serverUrl(): string {
  const url = inject('postgresUrl');
  if (url === null) throw new Error('no PostgreSQL in this test run');
  return url;
}

async function administer(statement: string): Promise<void> {
  const client = new pg.Client({ connectionString: serverUrl() });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}
