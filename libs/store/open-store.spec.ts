import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { MigrationInterface, QueryRunner } from 'typeorm';
import { afterEach, describe, expect, it } from 'vitest';
import { migrations } from '#migrations/migrations.js';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { type Change, dataSourceFor, readAddress } from './data-source.js';
import { openConnections, openStore } from './open-store.js';
import { insertSite } from './sites.js';
import { checkSqliteConnection, refuseUnsafeSqlite } from './sqlite-checks.js';
import { Store } from './store.js';
import { StoredSite } from './stored-site.js';

const NOW = new Date('2026-01-31T10:20:30.456Z');
const site = (id: string) => ({
  id,
  organisationId: 'first',
  name: 'Alder Works',
  document: { name: 'Alder Works', nested: { b: 1, a: [2] } },
});
const dropping: TestDatabase[] = [];

afterEach(async () => {
  for (const database of dropping.splice(0)) await database.drop();
});

async function fresh(create: () => Promise<TestDatabase>): Promise<string> {
  const database = await create();
  dropping.push(database);
  return database.url;
}

for (const { name, available, create } of databases) {
  describe.runIf(available)(`the schema on ${name}`, () => {
    it('is, after the migrations, exactly what the entities describe', async () => {
      const { writer, reader } = await openConnections(readAddress(await fresh(create)));
      const { upQueries } = await writer.driver.createSchemaBuilder().log();
      expect(upQueries.map(({ query }) => query)).toEqual([]);
      await new Store({ writer, reader, queue: null }).close();
    });

    it('is taken back by the migrations’ own undoing', async () => {
      const { writer, reader } = await openConnections(readAddress(await fresh(create)));
      for (const _ of migrations) await writer.undoLastMigration({ transaction: 'each' });
      expect(await writer.createQueryRunner().hasTable('site')).toBe(false);
      await new Store({ writer, reader, queue: null }).close();
    });

    it('keeps document, name and moment as they were given, over a restart', async () => {
      const url = await fresh(create);
      const first = await openStore(url);
      await first.write((manager) => insertSite(manager, site('a'), NOW));
      await first.close();
      const second = await openStore(url);
      const found = await second.read((manager) => manager.findOneByOrFail(StoredSite, { id: 'a' }));
      expect(JSON.stringify(found.document)).toBe(JSON.stringify(site('a').document));
      expect(found.createdAt.toISOString()).toBe(NOW.toISOString());
      expect([found.number, found.version]).toEqual([1, 1]);
      await second.close();
    });

    it('that is newer than the program stops it before anything is touched', async () => {
      const url = await fresh(create);
      const newer = await openConnections(readAddress(url), [...migrations, AddSomething1900000000000]);
      await new Store({ ...newer, queue: null }).close();
      await expect(openStore(url)).rejects.toThrow(/newer version.*AddSomething1900000000000/);
    });

    it('is migrated once when several servers start at the same moment', async () => {
      const url = await fresh(create);
      const together = name === 'PostgreSQL' ? 4 : 1;
      const stores = await Promise.all(Array.from({ length: together }, () => openStore(url)));
      for (const store of stores) await store.close();
    });
  });
}

describe('a change of schema that fails on SQLite', () => {
  const changes: [Change, RegExp][] = [
    [BreakHalfway1900000000000 as Change, /no such table/],
    [Orphan1900000000000 as Change, /lost their parent/],
    [LoseRows1900000000000 as Change, /milestone had 1 rows and has 0/],
  ];

  it.each(changes)('leaves the file as it was before: %o', async (change, reason) => {
    const dir = mkdtempSync(join(tmpdir(), 'varwright-migrate-'));
    const file = join(dir, 'test.sqlite');
    const store = await openStore(`sqlite:${file}`);
    await store.write((manager) => insertSite(manager, site('a'), NOW));
    await store.write((manager) => manager.query(`INSERT INTO milestone VALUES ('x', '2026-01-31')`));
    await store.close();
    await expect(openConnections({ type: 'better-sqlite3', database: file }, [...migrations, change])).rejects.toThrow(
      reason,
    );
    const again = await openStore(`sqlite:${file}`);
    expect(await again.read((manager) => manager.countBy(StoredSite, {}))).toBe(1);
    expect(await again.read((manager) => manager.query('SELECT name FROM milestone'))).toEqual([{ name: 'x' }]);
    expect(readFileSync(`${file}.before-${change.name}`).subarray(0, 15).toString()).toBe('SQLite format 3');
    await again.close();
    rmSync(dir, { recursive: true });
  });
});

describe('what the store stands on', () => {
  it.each(['3.51.2', '3.44.0', '3.52.0', '2.8.17', 'unknown'])('refuses SQLite %s', (version) => {
    expect(() => refuseUnsafeSqlite(version)).toThrow(/can damage its file/);
  });

  it.each(['3.51.3', '3.52.1', '3.53.2', '4.0.0'])('takes SQLite %s', (version) => {
    expect(() => refuseUnsafeSqlite(version)).not.toThrow();
  });

  it.each(['mysql://root:secret@h/x', 'sqlite::memory:', 'sqlite://host/file', '/var/x'])(
    'refuses %s without repeating a password',
    (url) => {
      expect(() => readAddress(url)).toThrow(/begins with sqlite:/);
      expect(() => readAddress(url)).not.toThrow(/secret/);
    },
  );

  it.each([
    ['synchronous = NORMAL', /synchronous = 1, expected 2/],
    ['foreign_keys = OFF', /foreign_keys = 0, expected 1/],
    ['busy_timeout = 0', /busy_timeout = 0, expected 5000/],
    ['journal_mode = DELETE', /journal_mode = delete, expected wal/],
  ])('is read back: %s would be noticed', async (pragma, reason) => {
    const source = await dataSourceFor(readAddress(await fresh(databases[0]!.create))).initialize();
    await checkSqliteConnection(source);
    await source.query(`PRAGMA ${pragma}`);
    await expect(checkSqliteConnection(source)).rejects.toThrow(reason);
    await source.destroy();
  });

  it('is a transaction that takes the right to write at its beginning', async () => {
    const address = readAddress(await fresh(databases[0]!.create));
    const store = new Store(await openConnections(address));
    const other = await dataSourceFor(address).initialize();
    await other.query('PRAGMA busy_timeout = 0');
    await store.write(async () => {
      await expect(other.query(`INSERT INTO milestone VALUES ('x', '2026-01-31')`)).rejects.toThrow(/locked/);
    });
    await other.query(`INSERT INTO milestone VALUES ('x', '2026-01-31')`);
    await other.destroy();
    await store.close();
  });

  it('cannot write over the connection that reads', async () => {
    const { reader, writer } = await openConnections(readAddress(await fresh(databases[0]!.create)));
    await expect(reader.manager.query(`INSERT INTO milestone VALUES ('x', '2026-01-31')`)).rejects.toThrow(/readonly/);
    await new Store({ writer, reader, queue: null }).close();
  });

  it('does not know how to create tables without migrations', async () => {
    expect(dataSourceFor(readAddress('sqlite:/nowhere/x')).options.synchronize).toBe(false);
  });
});

class AddSomething1900000000000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query('CREATE TABLE something (id integer)');
  }
  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TABLE something');
  }
}

class BreakHalfway1900000000000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query('DELETE FROM site');
    await runner.query('DELETE FROM nowhere');
  }
  async down(): Promise<void> {}
}

class Orphan1900000000000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query(
      `INSERT INTO job ("siteId", kind, "inputHash", "engineVersion", request, state, attempt, step, "heartbeatS", progress, "createdAt")
       VALUES ('nobody', 'plan', '', '', '{}', 'queued', 0, 0, 0, 0, '2026-01-31')`,
    );
  }
  async down(): Promise<void> {}
}

class LoseRows1900000000000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.query('DELETE FROM milestone');
  }
  async down(): Promise<void> {}
}
