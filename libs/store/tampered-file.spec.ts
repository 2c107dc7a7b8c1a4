// One bit of the database file itself altered, on pages of tables and indexes. What counts is what is stored, so a flip
// that nobody sees must have left every stored value as it was; the rows are read back by a connection of its own.
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { DataSource } from 'typeorm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { chance } from '../../test/support/chance.js';
import { approve, storedRevision } from '../../test/support/reviewed-revision.js';
import { runs, SEED } from '../../test/support/soak.js';
import { dataSourceFor, readAddress } from './data-source.js';
import { openStore } from './open-store.js';
import { registerFaults } from './register.js';
import { checkSqliteFile } from './sqlite-checks.js';

const FLIPS = runs(40, 500);
/** What a review, its plan and its papers rest on. */
const TABLES = ['audit_entry', 'review', 'issued_paper', 'proposal', 'revision', 'record', 'record_column'];

type Look = (source: DataSource) => Promise<boolean>;
const fileIsDamaged: Look = (source) =>
  checkSqliteFile(source).then(
    () => false,
    () => true,
  );
const registerIsAltered: Look = async ({ manager }) => (await registerFaults(manager)).length > 0;

const opened = (file: string) => dataSourceFor(readAddress(`sqlite:${file}`), 'read').initialize();

describe(`a bit of the database file altered, ${FLIPS} times (seed ${SEED})`, () => {
  const dir = mkdtempSync(join(tmpdir(), 'varwright-flips-'));
  const whole = join(dir, 'whole.sqlite');
  const altered = join(dir, 'altered.sqlite');
  let bytes: Buffer;
  let places: number[];

  beforeAll(async () => {
    const store = await openStore(`sqlite:${join(dir, 'live.sqlite')}`);
    for (const id of ['mill', 'forge', 'press']) await approve(store, await storedRevision(store, id));
    await store.close();
    const live = await opened(join(dir, 'live.sqlite'));
    await live.query('VACUUM INTO ?', [whole]);
    await live.destroy();
    bytes = readFileSync(whole);
    places = await placesInUse();
  }, 60_000);

  afterAll(() => rmSync(dir, { recursive: true, force: true }));

  /** Offsets of the bytes in use on pages of these tables and their indexes: headers, cell pointers, cells, overflow. */
  async function placesInUse(): Promise<number[]> {
    const source = await opened(whole);
    const pages: { start: number; size: number; unused: number; kind: string }[] = await source.query(
      `SELECT pgoffset AS start, pgsize AS size, unused, pagetype AS kind FROM dbstat
       JOIN sqlite_schema ON sqlite_schema.name = dbstat.name WHERE tbl_name IN (${TABLES.map(() => '?').join(', ')})`,
      TABLES,
    );
    await source.destroy();
    const span = (from: number, to: number) => Array.from({ length: Math.max(0, to - from) }, (_, k) => from + k);
    return pages.flatMap(({ start, size, unused, kind }) => {
      if (kind === 'overflow') return span(start, start + size - unused);
      const pointers = start + (kind === 'internal' ? 12 : 8);
      const cells = bytes.readUInt16BE(start + 3);
      return [...span(start, pointers + 2 * cells), ...span(start + bytes.readUInt16BE(start + 5), start + size)];
    });
  }

  function writeAltered(run: number): void {
    const random = chance(SEED + run);
    const copy = Buffer.from(bytes);
    const at = random.oneOf(places);
    copy[at] = copy[at]! ^ (1 << random.whole(0, 7));
    writeFileSync(altered, copy);
  }

  /** Every stored value of these tables, or what reading them led to. */
  async function storedIn(file: string): Promise<string> {
    const source = await opened(file);
    try {
      const tables: unknown[] = [];
      for (const table of TABLES) tables.push(await source.query(`SELECT * FROM "${table}"`));
      return JSON.stringify(tables);
    } catch (error) {
      return String(error);
    } finally {
      await source.destroy();
    }
  }

  async function isFound(file: string, looks: readonly Look[]): Promise<boolean> {
    const source = await opened(file).catch(() => null);
    if (source === null) return true;
    try {
      for (const look of looks) if (await look(source)) return true;
      return false;
    } catch {
      return true; // it can't be read any more
    } finally {
      await source.destroy();
    }
  }

  it('is found by the file’s own check or by the register, unless every stored value is as it was', async () => {
    const sound = await storedIn(whole);
    const missed: number[] = [];
    let found = 0;
    for (let run = 0; run < FLIPS; run++) {
      writeAltered(run);
      if (await isFound(altered, [fileIsDamaged, registerIsAltered])) found++;
      else if ((await storedIn(altered)) !== sound) missed.push(run);
    }
    expect(missed).toEqual([]);
    expect(found).toBeGreaterThanOrEqual(0.95 * FLIPS);
    expect(await isFound(whole, [fileIsDamaged, registerIsAltered])).toBe(false);
  }, 300_000);

  it('is mostly missed by the file’s own check alone: the control', async () => {
    let found = 0;
    for (let run = 0; run < 20; run++) {
      writeAltered(run);
      if (await isFound(altered, [fileIsDamaged])) found++;
    }
    expect(found).toBeLessThan(15);
  });
});
