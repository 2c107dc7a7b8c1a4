import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { FirstTables1764547200000 } from '#migrations/1764547200000-first-tables.js';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { madeRecord } from '../../test/support/made-record.js';
import { readAddress } from './data-source.js';
import { openConnections, openStore } from './open-store.js';
import { packRecord } from './pack-record.js';
import { RecordColumn } from './record-column.js';
import { holdLatest, insertRecord, type RecordFacts, readRecord } from './records.js';
import { deleteSite, insertSite } from './sites.js';
import { Store } from './store.js';
import { StoredRecord } from './stored-record.js';

const NOW = new Date('2026-01-31T10:20:30.456Z');
const record = madeRecord({ activeKw: [1, 2, 3], reactiveKvar: [1, -1, 0] });
const facts = (id: string, previous?: { id: string; revision: number }): RecordFacts => ({
  id,
  siteId: 's1',
  hash: 'a'.repeat(64),
  summary: {} as RecordFacts['summary'],
  quality: {},
  fileName: `${id}.csv`,
  fileHash: 'b'.repeat(64),
  fileBytes: 12,
  fileHeader: null,
  createdAt: NOW,
  ...(previous === undefined ? {} : { previousId: previous.id, revision: previous.revision + 1 }),
});

for (const { name, available, create } of databases) {
  describe.runIf(available)(`a record that is extended, on ${name}`, () => {
    let database: TestDatabase;

    beforeEach(async () => {
      database = await create();
    });
    afterEach(() => database.drop());

    const opened = async () => {
      const store = await openStore(database.url);
      await store.write((manager) =>
        insertSite(manager, { id: 's1', organisationId: 'first', name: 'Site', document: {} }, NOW),
      );
      await store.write((manager) => insertRecord(manager, facts('r1'), record));
      return store;
    };
    const extend = (store: Store, id: string, previous: { id: string; revision: number }) =>
      store.write(async (manager) => {
        await holdLatest(store, manager, previous);
        await insertRecord(manager, facts(id, previous), record);
      });

    it('keeps its earlier revision, to the bit', async () => {
      const store = await opened();
      await extend(store, 'r2', { id: 'r1', revision: 1 });
      expect(await store.read((manager) => readRecord(manager, 'r1'))).toStrictEqual(record);
      const stored = await store.read((manager) => manager.find(StoredRecord, { order: { revision: 'ASC' } }));
      expect(stored.map(({ id, revision, previousId }) => [id, revision, previousId])).toEqual([
        ['r1', 1, null],
        ['r2', 2, 'r1'],
      ]);
      await store.close();
    });

    it('is extended once, whoever tries at the same moment', async () => {
      const store = await opened();
      const ends = await Promise.allSettled(
        ['r2', 'r3', 'r4'].map((id) => extend(store, id, { id: 'r1', revision: 1 })),
      );
      expect(ends.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected', 'rejected']);
      for (const end of ends) if (end.status === 'rejected') expect(end.reason).toMatchObject({ code: 'stale' });
      await expect(extend(store, 'r5', { id: 'none', revision: 1 })).rejects.toMatchObject({ code: 'not-found' });
      await store.close();
    });

    it('is not extended twice by a writer that does not ask: the database itself refuses', async () => {
      const store = await opened();
      const previous = { id: 'r1', revision: 1 };
      await extend(store, 'r2', previous);
      const unasked = store.write((manager) => insertRecord(manager, facts('r3', previous), record));
      await expect(unasked).rejects.toThrow(/unique/i);
      await store.close();
    });

    it('goes with its site, all revisions at once', async () => {
      const store = await opened();
      await extend(store, 'r2', { id: 'r1', revision: 1 });
      await store.write((manager) => deleteSite(manager, 's1', null));
      expect(await store.read((manager) => manager.count(StoredRecord))).toBe(0);
      expect(await store.read((manager) => manager.count(RecordColumn))).toBe(0);
      await store.close();
    });

    it('was stored before there were revisions, and is the first of its own, its columns untouched', async () => {
      const before = await openConnections(readAddress(database.url), [FirstTables1764547200000]);
      await before.writer.query(
        `INSERT INTO site (id, number, name, document, version, "lastRevision", "createdAt", "updatedAt")
         VALUES ('s1', 1, 'Site', '{}', 1, 0, '2026-01-31', '2026-01-31')`,
      );
      await before.writer.query(
        `INSERT INTO load_record (id, "siteId", hash, "intervalS", "firstS", "endS", "intervalCount", repaired, duplicates,
           notes, summary, quality, "fileName", "fileHash", "fileBytes", "createdAt")
         VALUES ('r1', 's1', '', 900, ${record.firstS}, ${record.endS}, 3, 0, 0, '[]', '{}', '{}', NULL, '', 1, '2026-01-31')`,
      );
      for (const column of packRecord(record)) {
        await before.writer.manager.insert(RecordColumn, {
          recordId: 'r1',
          ...column,
          bytes: Buffer.from(column.bytes),
        });
      }
      await new Store({ ...before, queue: null }).close();
      const store = await openStore(database.url);
      expect(await store.read((manager) => readRecord(manager, 'r1'))).toStrictEqual(record);
      const stored = await store.read((manager) => manager.findOneByOrFail(StoredRecord, { id: 'r1' }));
      expect(stored).toMatchObject({ revision: 1, previousId: null, fileHeader: null });
      await store.close();
    });
  });
}
