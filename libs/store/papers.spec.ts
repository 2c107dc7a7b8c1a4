import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { openStore } from './open-store.js';
import { FIRST_ORGANISATION } from './organisation.js';
import { findPaper, insertPaper } from './papers.js';
import type { Store } from './store.js';

const NOW = new Date('2026-01-31T10:20:30.456Z');

const own = { organisationId: FIRST_ORGANISATION, kind: 'tariff', name: 'Works tariff' } as const;

for (const { name, available, create } of databases) {
  describe.runIf(available)(`shared papers on ${name}`, () => {
    let database: TestDatabase;
    let store: Store;
    const insert = (id: string, after: number | null, document: object = { b: 1, a: 2 }) =>
      store.write((manager) => insertPaper(manager, { id, ...own, date: '2026-01-01', document, after }, NOW));
    const find = (version?: number) =>
      store.read((manager) => findPaper(manager, { ...own, version }, 'papers.tariff'));

    beforeEach(async () => {
      database = await create();
      store = await openStore(database.url);
    });

    afterEach(async () => {
      await store.close();
      await database.drop();
    });

    it('are found by name: the latest, or the version asked for, letter for letter', async () => {
      await insert('a', null);
      await insert('b', 1, { a: 3 });
      expect(await find()).toMatchObject({ id: 'b', version: 2, document: { a: 3 } });
      const first = await find(1);
      expect(first).toMatchObject({ id: 'a', version: 1, date: '2026-01-01', createdAt: NOW });
      expect(JSON.stringify(first.document)).toBe('{"b":1,"a":2}');
      await expect(find(3)).rejects.toMatchObject({ code: 'not-found' });
      const prices = store.read((manager) => findPaper(manager, { ...own, kind: 'prices' }, 'papers.prices'));
      await expect(prices).rejects.toMatchObject({ problems: [{ code: 'not-found', path: 'papers.prices' }] });
    });

    it('follow one another, also where two follow the same one at the same moment', async () => {
      await expect(insert('a', 1)).rejects.toMatchObject({ code: 'stale' });
      await insert('a', null);
      await expect(insert('b', null)).rejects.toMatchObject({ code: 'conflict' });
      const ends = await Promise.allSettled(['b', 'c', 'd'].map((id) => insert(id, 1)));
      expect(ends.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected', 'rejected']);
      for (const end of ends) if (end.status === 'rejected') expect(end.reason).toMatchObject({ code: 'stale' });
    });
  });
}
