import type { DataSource } from 'typeorm';

/** Releases of SQLite that are not trusted with data: before the mending of a corruption in WAL mode, and a withdrawn one. */
const OLDEST = [3, 51, 3];
const WITHDRAWN = [[3, 52, 0]];

/**
 * Refuses a release of SQLite that can damage a file.
 * @param version for example "3.53.2"
 * @throws Error naming the version
 */
export function refuseUnsafeSqlite(version: string): void {
  const parts = version.split('.').map(Number);
  const isOld = compare(parts, OLDEST) < 0;
  const isWithdrawn = WITHDRAWN.some((bad) => compare(parts, bad) === 0);
  if (isOld || isWithdrawn || !parts.every(Number.isInteger)) {
    throw new Error(`SQLite ${version} can damage its file; ${OLDEST.join('.')} or later is needed, not 3.52.0`);
  }
}

function compare(a: number[], b: number[]): number {
  for (let i = 0; i < 3; i++) {
    const difference = (a[i] ?? 0) - (b[i] ?? 0);
    if (difference !== 0) return difference;
  }
  return 0;
}

/** What a connection that writes must be set to; read back, because some settings give way without a word. */
const SETTINGS: [pragma: string, expected: string | number][] = [
  ['journal_mode', 'wal'],
  ['synchronous', 2],
  ['foreign_keys', 1],
  ['busy_timeout', 5000],
];

/**
 * Reads the connection's version and settings back.
 * @throws Error naming what is not as it must be
 */
export async function checkSqliteConnection(source: DataSource): Promise<void> {
  const [row] = (await source.query('SELECT sqlite_version() AS version')) as { version: string }[];
  refuseUnsafeSqlite(row?.version ?? 'unknown');
  for (const [pragma, expected] of SETTINGS) {
    const found = await readPragma(source, pragma);
    if (found !== expected) throw new Error(`SQLite has ${pragma} = ${found}, expected ${expected}`);
  }
}

async function readPragma(source: DataSource, pragma: string): Promise<unknown> {
  const [row] = (await source.query(`PRAGMA ${pragma}`)) as Record<string, unknown>[];
  return Object.values(row ?? {})[0];
}

/**
 * Looks for damage: rows whose parent is missing, broken pages.
 * @throws Error with the first finding
 */
export async function checkSqliteFile(source: DataSource): Promise<void> {
  const orphans = (await source.query('PRAGMA foreign_key_check')) as { table: string; parent: string }[];
  if (orphans[0] !== undefined) {
    throw new Error(`${orphans.length} rows lost their parent, the first in ${orphans[0].table}`);
  }
  const found = await readPragma(source, 'integrity_check');
  if (found !== 'ok') throw new Error(`the database file is damaged: ${found}`);
}
