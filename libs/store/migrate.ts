import { closeSync, copyFileSync, existsSync, fsyncSync, openSync, renameSync, rmSync } from 'node:fs';
import type { DataSource } from 'typeorm';
import { checkSqliteFile } from './sqlite-checks.js';

/** Any number, as long as every process of this program takes the same one. */
const MIGRATION_LOCK = 7_183_501;

/**
 * Brings the schema up to what this program knows. Before SQLite is changed a checked copy is made beside the file;
 * where the change fails the copy is put back and the error is thrown on.
 * @param source initialised data source
 * @param file path of the SQLite file, null on PostgreSQL
 * @throws Error where the schema is newer than the program, or the change fails
 */
export async function migrate(source: DataSource, file: string | null): Promise<void> {
  if (file === null) return migrateLocked(source);
  const pending = await pendingMigrations(source);
  if (pending.length === 0) return;
  const isFresh = (await tablesOf(source)).length === 0;
  const copy = isFresh ? null : await makeCopy(source, `${file}.before-${pending[0]}`);
  try {
    const before = await rowCounts(source);
    await source.runMigrations({ transaction: 'each' });
    await checkSqliteFile(source);
    refuseLostRows(before, await rowCounts(source));
  } catch (error) {
    await source.destroy();
    if (copy !== null) putBack(copy, file);
    throw error;
  }
}

/** On PostgreSQL a migration is a transaction; the lock keeps two servers that start at once apart. */
async function migrateLocked(source: DataSource): Promise<void> {
  const runner = source.createQueryRunner();
  try {
    await runner.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK]);
    if ((await pendingMigrations(source)).length > 0) await source.runMigrations({ transaction: 'each' });
    await runner.query('SELECT pg_advisory_unlock($1)', [MIGRATION_LOCK]);
  } finally {
    await runner.release();
  }
}

/** Names of the migrations still to run, in order. */
async function pendingMigrations(source: DataSource): Promise<string[]> {
  const known = source.migrations.map(nameOf);
  const done = await migrationsDone(source);
  const unknown = done.filter((name) => !known.includes(name));
  if (unknown.length > 0) {
    throw new Error(`the database was made by a newer version of this program (${unknown.join(', ')}); use that one`);
  }
  return known.filter((name) => !done.includes(name));
}

function nameOf(migration: { name?: string; constructor: { name: string } }): string {
  return migration.name ?? migration.constructor.name;
}

async function migrationsDone(source: DataSource): Promise<string[]> {
  const runner = source.createQueryRunner();
  try {
    if (!(await runner.hasTable('migrations'))) return [];
    const rows = (await runner.query('SELECT name FROM migrations ORDER BY id')) as { name: string }[];
    return rows.map(({ name }) => name);
  } finally {
    await runner.release();
  }
}

async function tablesOf(source: DataSource): Promise<string[]> {
  const sql = `SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT LIKE 'sqlite_%' ORDER BY name`;
  const rows = (await source.query(sql)) as { name: string }[];
  return rows.map(({ name }) => name);
}

async function rowCounts(source: DataSource): Promise<Map<string, number>> {
  const counts = new Map<string, number>();
  for (const table of await tablesOf(source)) {
    const [row] = (await source.query(`SELECT count(*) AS n FROM "${table}"`)) as { n: number }[];
    counts.set(table, row?.n ?? 0);
  }
  return counts;
}

/** A change of schema adds; a table that ends with fewer rows was changed by mistake. */
function refuseLostRows(before: Map<string, number>, after: Map<string, number>): void {
  for (const [table, count] of before) {
    const left = after.get(table);
    if (left !== undefined && left < count)
      throw new Error(`${table} had ${count} rows and has ${left} after migrating`);
  }
}

async function makeCopy(source: DataSource, path: string): Promise<string> {
  const part = `${path}.part`;
  rmSync(part, { force: true });
  await source.query('VACUUM INTO ?', [part]);
  flush(part);
  renameSync(part, path);
  return path;
}

function flush(path: string): void {
  const handle = openSync(path, 'r+');
  fsyncSync(handle);
  closeSync(handle);
}

function putBack(copy: string, file: string): void {
  const part = `${file}.part`;
  copyFileSync(copy, part);
  flush(part);
  for (const trace of [`${file}-wal`, `${file}-shm`]) if (existsSync(trace)) rmSync(trace);
  renameSync(part, file);
}
