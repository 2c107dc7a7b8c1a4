import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { KeptMap } from './kept-map.js';
import { deleteKeptMap, insertKeptMap, replaceKeptMap } from './kept-maps.js';
import { openStore } from './open-store.js';
import type { Store } from './store.js';

const NOW = new Date('2026-01-31T10:20:30.456Z');
const content = (name: string, organisationId = 'first') => ({
  organisationId,
  name,
  map: { units: { active: 'W' }, columns: { time: 2 } },
  header: null,
});

for (const { name: database, available, create } of databases) {
  describe.runIf(available)(`answers kept under a name on ${database}`, () => {
    let own: TestDatabase;
    let store: Store;
    const insert = (id: string, name: string) =>
      store.write((manager) => insertKeptMap(manager, id, content(name), NOW));
    const replace = (id: string, version: number, name: string) =>
      store.write((manager) => replaceKeptMap(manager, { id, version }, content(name), NOW));

    beforeEach(async () => {
      own = await create();
      store = await openStore(own.url);
    });

    afterEach(async () => {
      await store.close();
      await own.drop();
    });

    it('come back as they were given', async () => {
      const row = await insert('a', 'Main meter');
      expect(await store.read((manager) => manager.findOneBy(KeptMap, { id: 'a' }))).toEqual(row);
      expect(row).toMatchObject({ ...content('Main meter'), version: 1 });
    });

    it('have a name of their own, also where two ask for it at the same moment', async () => {
      const ends = await Promise.allSettled(['a', 'b', 'c'].map((id) => insert(id, 'Main meter')));
      expect(ends.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected', 'rejected']);
      for (const end of ends) {
        if (end.status === 'rejected') expect(end.reason).toMatchObject({ code: 'conflict' });
      }
      await insert('d', 'Other meter');
      await expect(replace('d', 1, 'Main meter')).rejects.toMatchObject({ code: 'conflict' });
    });

    it('are replaced and removed by whoever saw the version that stands', async () => {
      await insert('a', 'Main meter');
      await replace('a', 1, 'Main meter');
      await expect(replace('a', 1, 'Late')).rejects.toMatchObject({ code: 'stale' });
      await expect(store.write((manager) => deleteKeptMap(manager, 'a', 1))).rejects.toMatchObject({ code: 'stale' });
      await store.write((manager) => deleteKeptMap(manager, 'a', 2));
      await expect(replace('a', 2, 'Gone')).rejects.toMatchObject({ code: 'not-found' });
      await expect(store.write((manager) => deleteKeptMap(manager, 'a', null))).rejects.toMatchObject({
        code: 'not-found',
      });
    });
  });
}
