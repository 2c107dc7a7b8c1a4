import type { EntityManager } from 'typeorm';
import { createLoadRecord, InputProblem, type LoadRecord } from '#libs/engine/index.js';
import { columnName, type MonthColumn, packRecord, type RequiredColumn } from './pack-record.js';
import { unpackColumnInto } from './packed-column.js';
import { RecordColumn } from './record-column.js';
import type { Store } from './store.js';
import { StoredRecord } from './stored-record.js';

/** What is kept beside a record's own columns. */
export type RecordFacts = Pick<
  StoredRecord,
  'id' | 'siteId' | 'hash' | 'summary' | 'quality' | 'fileName' | 'fileHash' | 'fileBytes' | 'fileHeader' | 'createdAt'
> &
  Partial<Pick<StoredRecord, 'revision' | 'previousId'>>;

/** A year of seven columns goes in one; either database takes more than thirty times the parameters this makes. */
const ROWS_A_STATEMENT = 100;

/**
 * Stores a record with its columns; call it inside one write.
 * @param manager the write's manager
 * @param facts what is kept beside the columns
 * @param record the record
 * @param columns its packed columns
 */
export async function insertRecord(
  manager: EntityManager,
  facts: RecordFacts,
  record: LoadRecord,
  columns: MonthColumn[] = packRecord(record),
): Promise<void> {
  await manager.insert(StoredRecord, {
    ...facts,
    intervalS: record.intervalS,
    firstS: record.firstS,
    endS: record.endS,
    intervalCount: record.beginS.length,
    repaired: record.repaired,
    duplicates: record.duplicates,
    notes: [...record.notes],
  });
  for (let at = 0; at < columns.length; at += ROWS_A_STATEMENT) {
    const rows = columns.slice(at, at + ROWS_A_STATEMENT);
    await manager.insert(
      RecordColumn,
      rows.map((column) => ({ recordId: facts.id, ...column, bytes: Buffer.from(column.bytes) })),
    );
  }
}

/**
 * Makes sure that a record is the latest revision and stays so until the write ends; call it before inserting the next.
 * @param store the store
 * @param manager the write's manager
 * @param previous the revision that is to be extended
 * @throws InputProblem `not-found` where it was removed, `stale` where somebody else has extended it
 */
export async function holdLatest(
  store: Pick<Store, 'skipsLocked'>,
  manager: EntityManager,
  previous: Pick<StoredRecord, 'id' | 'revision'>,
): Promise<void> {
  const { id, revision } = previous;
  const search = manager.createQueryBuilder(StoredRecord, 'record').where('record.id = :id', { id });
  if (store.skipsLocked) search.setLock('pessimistic_write');
  const expected = 'a load record that is there';
  if ((await search.getOne()) === null) throw new InputProblem([{ code: 'not-found', expected, found: id }]);
  if (!(await manager.existsBy(StoredRecord, { previousId: id }))) return;
  const found = `revision ${revision}, which was extended already`;
  throw new InputProblem([{ code: 'stale', expected: 'the latest revision of the record', found }]);
}

/**
 * The record as it was stored, to the bit.
 * @returns null where there is none of this id
 */
export async function readRecord(manager: EntityManager, id: string): Promise<LoadRecord | null> {
  const stored = await manager.findOneBy(StoredRecord, { id });
  if (stored === null) return null;
  const rows = await manager.find(RecordColumn, { where: { recordId: id }, order: { month: 'ASC' } });
  const columns = new Map<string, Float64Array>();
  for (const quantity of new Set(rows.map((row) => row.quantity))) {
    const months = rows.filter((row) => row.quantity === quantity);
    columns.set(quantity, joined(months, stored.intervalCount, quantity));
  }
  const column = (name: RequiredColumn) => {
    const values = columns.get(name);
    if (values === undefined) throw new Error(`record ${id} has no column ${name}`);
    return values;
  };
  const standby = columns.get('standby');
  return createLoadRecord({
    intervalS: stored.intervalS,
    beginS: column('beginS'),
    activeKw: column('activeKw'),
    laggingKvar: column('laggingKvar'),
    leadingKvar: column('leadingKvar'),
    voltageV: columns.get('voltageV') ?? null,
    connectedKvar: columns.get('connectedKvar') ?? null,
    standby: standby === undefined ? null : Uint8Array.from(standby),
    repaired: stored.repaired,
    duplicates: stored.duplicates,
    notes: stored.notes,
  });
}

function joined(months: RecordColumn[], intervals: number, quantity: string): Float64Array {
  const values = new Float64Array(intervals);
  let at = 0;
  for (const month of months) {
    if (at + month.intervals > intervals) throw new Error(`column ${quantity} holds more than ${intervals} values`);
    unpackColumnInto(month, columnName(month), values.subarray(at, at + month.intervals));
    at += month.intervals;
  }
  if (at !== intervals) throw new Error(`column ${quantity} holds ${at} values, not ${intervals}`);
  return values;
}
