import { describe, expect, it } from 'vitest';
import { migrations } from '#migrations/migrations.js';
import { databases } from '../../test/support/databases.js';
import { readAddress } from './data-source.js';
import { Job } from './job.js';
import { openConnections } from './open-store.js';
import { Store } from './store.js';

const HASH = 'a1'.repeat(32);

for (const { name, available, create } of databases) {
  describe.runIf(available)(`jobs that stood before jobs had names, on ${name}`, () => {
    it('get one each, which says nothing of how many there are', async () => {
      const database = await create();
      const open = async (upTo: number) =>
        new Store({ ...(await openConnections(readAddress(database.url), migrations.slice(0, upTo))), queue: null });
      const before = await open(migrations.findIndex(({ name }) => name.startsWith('JobNames')));
      await before.write(async (manager) => {
        await manager.query(
          `INSERT INTO site ("id", "number", "name", "document", "version", "lastRevision", "createdAt", "updatedAt")
           VALUES ('s', 1, 'Alder Works', '{"name":"Alder Works"}', 1, 0, '2026-01-31', '2026-01-31')`,
        );
        for (const _ of [1, 2]) {
          await manager.query(
            `INSERT INTO job ("siteId", "kind", "inputHash", "engineVersion", "request", "state", "attempt", "step", "heartbeatS", "progress", "createdAt")
             VALUES ('s', 'plan', '${HASH}', '0.1.0', '{}', 'done', 1, 2, 0, 1, '2026-01-31')`,
          );
        }
      });
      await before.close();
      const after = await open(migrations.length);
      const names = (await after.read((manager) => manager.find(Job))).map(({ publicId }) => publicId);
      expect(new Set(names).size).toBe(2);
      for (const publicId of names) expect(publicId).toMatch(/^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/);
      await after.close();
      await database.drop();
    });
  });
}
