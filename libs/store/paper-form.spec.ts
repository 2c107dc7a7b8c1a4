import { afterEach, describe, expect, it } from 'vitest';
import { migrations } from '#migrations/migrations.js';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { readAddress } from './data-source.js';
import { openConnections } from './open-store.js';
import { standingRevision } from './revisions.js';
import { Store } from './store.js';

const HASH = 'a1'.repeat(32);
const dropping: TestDatabase[] = [];
afterEach(async () => {
  for (const database of dropping.splice(0)) await database.drop();
});

const FORMS = migrations.findIndex(({ name }) => name.startsWith('PaperForms'));

for (const { name, available, create } of databases) {
  describe.runIf(available)(`how a paper looks, on ${name}`, () => {
    async function opened(url: string, upTo: number): Promise<Store> {
      return new Store({ ...(await openConnections(readAddress(url), migrations.slice(0, upTo))), queue: null });
    }

    it('is told by its job where a revision stood before forms were kept', async () => {
      const database = await create();
      dropping.push(database);
      const before = await opened(database.url, FORMS);
      await before.write(async (manager) => {
        await manager.query(SITE);
        await manager.query(revision(1));
        await manager.query(
          `INSERT INTO job ("publicId", "siteId", "kind", "inputHash", "engineVersion", "request", "state", "attempt", "step", "heartbeatS", "progress", "revision", "createdAt")
           VALUES ('j', 's', 'plan', '${HASH}', '0.1.0', '{"paper":"Letter","language":"de"}', 'done', 1, 2, 0, 1, 1, '2026-01-31')`,
        );
      });
      await before.close();
      const after = await opened(database.url, migrations.length);
      const standing = (paperForm: string | null) =>
        after.read((manager) => standingRevision(manager, { siteId: 's', contentHash: HASH, paperForm }));
      expect((await standing('Letter de'))?.revision).toBe(1);
      expect([await standing(null), await standing('de')]).toEqual([null, null]);
      // one of a job that asked for nothing is in English on A4
      await after.write((manager) => manager.query(revision(2)));
      expect((await standing(null))?.revision).toBe(2);
      await after.close();
    });

    it('is not taken back while equal inputs stand on two papers, and nothing is lost by trying', async () => {
      const database = await create();
      dropping.push(database);
      const { writer, reader } = await openConnections(readAddress(database.url), migrations.slice(0, FORMS + 1));
      await writer.query(SITE);
      for (const count of [1, 2]) await writer.query(revision(count));
      const undone = writer.undoLastMigration({ transaction: 'each' });
      await expect(undone).rejects.toThrow(
        '2 rows of revision stand in the way of the earlier schema: revisions of equal',
      );
      await writer.query(`DELETE FROM revision WHERE "revision" = 2`);
      await writer.undoLastMigration({ transaction: 'each' });
      expect(await writer.createQueryRunner().hasColumn('revision', 'paperForm')).toBe(false);
      await new Store({ writer, reader, queue: null }).close();
    });
  });
}

const SITE = `INSERT INTO site ("id", "number", "name", "document", "version", "lastRevision", "createdAt", "updatedAt")
  VALUES ('s', 1, 'Alder Works', '{"name":"Alder Works"}', 1, 2, '2026-01-31', '2026-01-31')`;

function revision(count: number): string {
  return `INSERT INTO revision ("id", "siteId", "number", "revision", "kind", "inputs", "engineVersion", "contentHash", "result", "proposed", "verdict", "createdAt")
    VALUES ('r${count}', 's', 'P-0001', ${count}, 'plan', '{}', '0.1.0', '${HASH}', '{}', 'no bank', 'watch', '2026-01-31')`;
}
