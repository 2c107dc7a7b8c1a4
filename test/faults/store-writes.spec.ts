import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readAddress } from '#libs/store/data-source.js';
import { Milestone } from '#libs/store/milestone.js';
import { openConnections } from '#libs/store/open-store.js';
import { type Connections, Store } from '#libs/store/store.js';
import { databases, type TestDatabase } from '../support/databases.js';

const NOW = new Date('2026-01-31T00:00:00Z');
const WRITES = 50;
const pause = () => new Promise((resolve) => setTimeout(resolve, Math.random() * 3));

/** Half of the writes fail after they have written; the acknowledged half must stand, the failed half must not. */
async function mixedWrites(store: Store): Promise<{ acknowledged: string[]; stored: string[] }> {
  const write = (name: string, fails: boolean) =>
    store.write(async (manager) => {
      await pause();
      await manager.insert(Milestone, { name, reachedAt: NOW });
      await pause();
      if (fails) throw new Error('undo this');
    });
  const asked = Array.from({ length: WRITES }, (_, i) => ({ name: `write ${i}`, fails: i % 2 === 1 }));
  const ends = await Promise.allSettled(asked.map(({ name, fails }) => write(name, fails)));
  const acknowledged = asked.filter((_, i) => ends[i]!.status === 'fulfilled').map(({ name }) => name);
  const rows = await store.read((manager) => manager.find(Milestone));
  return { acknowledged: acknowledged.sort(), stored: rows.map(({ name }) => name).sort() };
}

for (const { name, available, create } of databases) {
  describe.runIf(available)(`fifty writes at once on ${name}`, () => {
    let database: TestDatabase;
    let connections: Connections;

    beforeEach(async () => {
      database = await create();
      connections = await openConnections(readAddress(database.url));
    });

    afterEach(async () => {
      await new Store(connections).close();
      await database.drop();
    });

    it('keep every acknowledged write and no other', async () => {
      const { acknowledged, stored } = await mixedWrites(new Store(connections));
      expect(acknowledged).toHaveLength(WRITES / 2);
      expect(stored).toEqual(acknowledged);
    });

    it.runIf(name === 'SQLite')('lose writes without the queue, which shows that the test above can fail', async () => {
      const open = { ...connections, queue: { run: <T>(work: () => Promise<T>) => work() } };
      const { acknowledged, stored } = await mixedWrites(new Store(open));
      expect(stored).not.toEqual(acknowledged);
    });

    it('nested in one another belong together, and the inner may fail alone', async () => {
      const store = new Store(connections);
      const put = (name: string) => store.write((manager) => manager.insert(Milestone, { name, reachedAt: NOW }));
      await store.write(async () => {
        await put('outer');
        await Promise.all([put('inner 1'), put('inner 2')]);
        const failing = store.write(async () => {
          await put('inner 3');
          throw new Error('only this');
        });
        await expect(failing).rejects.toThrow('only this');
      });
      const failing = store.write(async () => {
        await put('inner 4');
        throw new Error('all of it');
      });
      await expect(failing).rejects.toThrow('all of it');
      const rows = await store.read((manager) => manager.find(Milestone, { order: { name: 'ASC' } }));
      expect(rows.map((row) => row.name)).toEqual(['inner 1', 'inner 2', 'outer']);
    });

    it('begun by work that outlives its transaction become transactions of their own', async () => {
      const store = new Store(connections);
      let later: Promise<unknown> | undefined;
      await store.write(async () => {
        later = pause()
          .then(pause)
          .then(() => store.write((manager) => manager.insert(Milestone, { name: 'later', reachedAt: NOW })));
      });
      await later;
      expect(await store.read((manager) => manager.count(Milestone))).toBe(1);
    });

    it('show a reader nothing before they are committed', async () => {
      const store = new Store(connections);
      let seen = -1;
      await store.write(async (manager) => {
        await manager.insert(Milestone, { name: 'a', reachedAt: NOW });
        seen = await store.read((reader) => reader.count(Milestone));
      });
      expect(seen).toBe(0);
      expect(await store.read((reader) => reader.count(Milestone))).toBe(1);
    });
  });
}
