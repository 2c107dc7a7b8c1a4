import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { RecordSummary } from '#libs/engine/index.js';
import { openStore } from '#libs/store/open-store.js';
import { insertRecord, readRecord } from '#libs/store/records.js';
import { insertSite } from '#libs/store/sites.js';
import type { Store } from '#libs/store/store.js';
import { buildTwin, canBuild } from './c-twin.js';
import { insistEqual, ms } from './compare-twins.js';
import { madeUpMinutes, madeUpMinutesRecord } from './made-up-minutes.js';
import { median } from './stopwatch.js';

const WRITE_LIMIT = 0.3;
const READ_LIMIT = 0.35;
const SIZE_LIMIT_BYTES = 2_500_000;
const ROUNDS = 5;
/** The first of them, on either side, is not counted. */
const RUNS = 3;

const record = madeUpMinutesRecord(madeUpMinutes());
const n = record.beginS.length;

/** Stores a year of minutes and reads it back, against a row an interval through SQLite's own interface in C. */
export async function benchStore(): Promise<boolean> {
  const dir = mkdtempSync(join(tmpdir(), 'varwright-bench-'));
  const file = join(dir, 'store.db');
  try {
    await opened(file, (store) =>
      store.write((manager) =>
        insertSite(manager, { id: 's', organisationId: 'first', name: 'Site', document: {} }, new Date(0)),
      ),
    );
    const sizeMet = await benchSize(file);
    return (await opened(file, benchTimes)) && sizeMet;
  } finally {
    rmSync(dir, { recursive: true });
  }
}

async function opened<T>(file: string, work: (store: Store) => Promise<T>): Promise<T> {
  const store = await openStore(`sqlite:${file}`);
  try {
    return await work(store);
  } finally {
    await store.close();
  }
}

/** Measured on the file when it is closed, with nothing left in the write-ahead log. */
async function benchSize(file: string): Promise<boolean> {
  const before = statSync(file).size;
  await opened(file, (store) => insert(store, 'size'));
  const took = statSync(file).size - before;
  const met = took <= SIZE_LIMIT_BYTES;
  const said = `${(took / 1e6).toFixed(2)} MB on disk, at most ${SIZE_LIMIT_BYTES / 1e6}`;
  console.log(`a year of minutes stored, ${n} intervals, three decimals: ${said}: ${met ? 'met' : 'MISSED'}`);
  return met;
}

async function benchTimes(store: Store): Promise<boolean> {
  const twin = canBuild('sqlite3.h') ? buildTwin('store-rows', ['sqlite3']) : null;
  const [writesNs, readsNs, twinWritesNs, twinReadsNs]: number[][] = [[], [], [], []];
  try {
    const input = columns(record);
    for (let round = 0; round < ROUNDS; round++) {
      for (let run = 0; run < RUNS; run++) {
        const id = `${round}-${run}`;
        writesNs!.push(await tookNs(() => insert(store, id)));
        readsNs!.push(await tookNs(() => readBack(store, id)));
      }
      if (twin === null) continue;
      const { partsNs, output } = twin.run(input, RUNS);
      insistEqual('a year of minutes stored', columns(await readBack(store, `${round}-0`)), output);
      twinWritesNs!.push(partsNs[0]!);
      twinReadsNs!.push(partsNs[1]!);
    }
  } finally {
    twin?.remove();
  }
  const written = said('written durably', median(writesNs!), twin && median(twinWritesNs!), WRITE_LIMIT);
  return said('read back', median(readsNs!), twin && median(twinReadsNs!), READ_LIMIT) && written;
}

function said(what: string, ns: number, twinNs: number | null, limit: number): boolean {
  if (twinNs === null) {
    console.log(`a year of minutes ${what}: ${ms(ns)}; ratio skipped, no sqlite3.h or no C compiler here`);
    return true;
  }
  const met = ns / twinNs <= limit;
  const ratio = `${(ns / twinNs).toFixed(2)} × C, at most ${limit}: ${met ? 'met' : 'MISSED'}`;
  console.log(`a year of minutes ${what}: ${ms(ns)}, a row an interval in C ${ms(twinNs)}; ${ratio}`);
  return met;
}

async function tookNs(work: () => Promise<unknown>): Promise<number> {
  const start = process.hrtime.bigint();
  await work();
  return Number(process.hrtime.bigint() - start);
}

function insert(store: Store, id: string): Promise<void> {
  const facts = { id, siteId: 's', hash: '', summary: {} as RecordSummary, quality: {}, createdAt: new Date(0) };
  const file = { fileName: null, fileHeader: null, fileHash: '', fileBytes: 0 };
  return store.write((manager) => insertRecord(manager, { ...facts, ...file }, record));
}

async function readBack(store: Store, id: string) {
  const back = await store.read((manager) => readRecord(manager, id));
  if (back === null) throw new Error(`record ${id} was not stored`);
  return back;
}

function columns({ beginS, activeKw, laggingKvar, leadingKvar }: typeof record): Float64Array {
  return Float64Array.from([beginS, activeKw, laggingKvar, leadingKvar].flatMap((column) => Array.from(column)));
}
