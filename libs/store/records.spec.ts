import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { createLoadRecord, type LoadRecord, type RecordSummary, remark } from '#libs/engine/index.js';
import { databases, type TestDatabase } from '../../test/support/databases.js';
import { firstForm } from '../../test/support/first-form.js';
import { readAddress } from './data-source.js';
import { openConnections, openStore } from './open-store.js';
import { packRecord } from './pack-record.js';
import { RecordColumn } from './record-column.js';
import { insertRecord, type RecordFacts, readRecord } from './records.js';
import { insertSite } from './sites.js';
import { Store } from './store.js';
import { StoredRecord } from './stored-record.js';
import { StoredSite } from './stored-site.js';

const NOW = new Date('2026-01-31T10:20:30.456Z');
const FACTS: RecordFacts = {
  id: 'r1',
  siteId: 's1',
  hash: 'a'.repeat(64),
  summary: { maxKw: 0.1 + 0.2 } as RecordSummary,
  quality: { rows: 3 },
  fileName: 'year.csv',
  fileHash: 'b'.repeat(64),
  fileBytes: 12,
  fileHeader: null,
  createdAt: NOW,
};

/** Fourteen months of quarter hours with gaps, every optional column, values of many kinds. */
function awkwardRecord(): LoadRecord {
  const slots = Array.from({ length: 40_000 }, (_, i) => i).filter((i) => i % 97 !== 5);
  const at = (f: (slot: number) => number) => Float64Array.from(slots, f);
  return createLoadRecord({
    intervalS: 900,
    beginS: at((slot) => 1_735_689_600 + slot * 900),
    activeKw: at((slot) => Math.round(4000 * Math.sin(slot / 9)) / 10),
    laggingKvar: at((slot) => Math.abs(Math.sin(slot)) / 3),
    leadingKvar: at((slot) => (slot % 50 === 0 ? 1e-300 : 0)),
    voltageV: at((slot) => 398 + (slot % 7) / 10),
    connectedKvar: at((slot) => (slot % 4) * 12.5),
    standby: Uint8Array.from(slots, (slot) => (slot % 1000 < 3 ? 1 : 0)),
    repaired: 3,
    duplicates: 2,
    notes: [remark('zone.assumed', { zone: 'UTC', share: 0.1 + 0.2 }, { unit: 's' })],
  });
}

for (const { name, available, create } of databases) {
  describe.runIf(available)(`a load record on ${name}`, () => {
    let database: TestDatabase;
    let store: Store;

    beforeEach(async () => {
      database = await create();
      store = await openStore(database.url);
      await store.write((manager) =>
        insertSite(manager, { id: 's1', organisationId: 'first', name: 'Site', document: {} }, NOW),
      );
    });

    afterEach(async () => {
      await store.close();
      await database.drop();
    });

    it('comes back to the bit, over a restart', async () => {
      const record = awkwardRecord();
      await store.write((manager) => insertRecord(manager, FACTS, record));
      await store.close();
      store = await openStore(database.url);
      const back = await store.read((manager) => readRecord(manager, 'r1'));
      expect(back).toStrictEqual(record);
      const stored = await store.read((manager) => manager.findOneByOrFail(StoredRecord, { id: 'r1' }));
      expect(stored).toMatchObject(FACTS);
      expect(stored.createdAt.getTime()).toBe(NOW.getTime());
    });

    it('that an earlier version stored is read, to the bit', async () => {
      const record = awkwardRecord();
      const months = packRecord(record);
      const at: Record<string, number> = {};
      const earlier = months.map(({ month, quantity, intervals, scale }) => {
        const from = at[quantity] ?? 0;
        at[quantity] = from + intervals;
        const values = record[quantity as 'activeKw' | 'standby']!.slice(from, from + intervals);
        return { month, quantity, ...firstForm(Float64Array.from(values), scale) };
      });
      await store.write((manager) => insertRecord(manager, FACTS, record, earlier));
      expect(await store.read((manager) => readRecord(manager, 'r1'))).toStrictEqual(record);
    });

    it('is stored a month and a quantity a row', async () => {
      await store.write((manager) => insertRecord(manager, FACTS, awkwardRecord()));
      expect(await store.read((manager) => manager.count(RecordColumn))).toBe(7 * 14);
    });

    it('leaves nothing behind when its import fails half way', async () => {
      const record = awkwardRecord();
      const failing = store.write(async (manager) => {
        await insertRecord(manager, FACTS, record);
        throw new Error('the disk is full');
      });
      await expect(failing).rejects.toThrow('the disk is full');
      expect(await store.read((manager) => manager.count(StoredRecord))).toBe(0);
      expect(await store.read((manager) => manager.count(RecordColumn))).toBe(0);
    });

    it('leaves a part behind without its transaction, which shows that the test above can fail', async () => {
      const { writer, reader } = await openConnections(readAddress(database.url));
      const months = packRecord(awkwardRecord());
      const broken = { ...months[20]!, month: months[0]!.month, quantity: months[0]!.quantity };
      const columns = [...months.slice(0, 20), broken];
      await expect(insertRecord(writer.manager, FACTS, awkwardRecord(), columns)).rejects.toThrow();
      expect(await store.read((manager) => manager.count(StoredRecord))).toBe(1);
      expect(await store.read((manager) => manager.count(RecordColumn))).toBe(0);
      await new Store({ writer, reader, queue: null }).close();
    });

    it('goes with its site', async () => {
      await store.write((manager) => insertRecord(manager, FACTS, awkwardRecord()));
      await store.write((manager) => manager.delete(StoredSite, { id: 's1' }));
      expect(await store.read((manager) => manager.count(RecordColumn))).toBe(0);
    });

    it('that was damaged in the database is refused rather than read', async () => {
      await store.write((manager) => insertRecord(manager, FACTS, awkwardRecord()));
      await store.write((manager) => manager.delete(RecordColumn, { month: '2025-03', quantity: 'activeKw' }));
      await expect(store.read((manager) => readRecord(manager, 'r1'))).rejects.toThrow(/activeKw holds \d+ values/);
    });

    it('whose months were exchanged in the database is refused', async () => {
      await store.write((manager) => insertRecord(manager, FACTS, awkwardRecord()));
      await store.write(async (manager) => {
        for (const [from, to] of [
          ['2025-03', 'kept'],
          ['2025-05', '2025-03'],
          ['kept', '2025-05'],
        ] as const)
          await manager.update(RecordColumn, { month: from, quantity: 'activeKw' }, { month: to });
      });
      await expect(store.read((manager) => readRecord(manager, 'r1'))).rejects.toThrow(/activeKw 2025-03 is damaged/);
    });

    it('of no known id is null', async () => {
      expect(await store.read((manager) => readRecord(manager, 'none'))).toBeNull();
    });
  });
}
