import {
  DataSource,
  type DataSourceOptions,
  type MigrationInterface,
  type QueryRunner,
  type ReplicationMode,
} from 'typeorm';
import { migrations } from '#migrations/migrations.js';
import { ApiKey } from './api-key.js';
import { AuditEntry } from './audit-entry.js';
import { type Dialect, speakDialect } from './columns.js';
import { IssuedPaper } from './issued-paper.js';
import { Job } from './job.js';
import { KeptAnswer } from './kept-answer.js';
import { KeptMap } from './kept-map.js';
import { Milestone } from './milestone.js';
import { Organisation } from './organisation.js';
import { Person } from './person.js';
import { PersonSession } from './person-session.js';
import { Paper } from './paper.js';
import { ProposalFile } from './proposal-file.js';
import { RecordColumn } from './record-column.js';
import { ReviewStanding } from './review-standing.js';
import { Revision } from './revision.js';
import { RevisionLink } from './revision-link.js';
import { StoredRecord } from './stored-record.js';
import { StoredSite } from './stored-site.js';

const ENTITIES = [
  ...[Organisation, Person, PersonSession, ApiKey, RevisionLink, KeptAnswer],
  ...[StoredSite, StoredRecord, RecordColumn, Revision, ProposalFile, Job, Milestone, KeptMap],
  ...[AuditEntry, ReviewStanding, IssuedPaper, Paper],
];
const BUSY_MS = 5000;

/** Where the data is kept. */
export type Address = { type: 'better-sqlite3'; database: string } | { type: 'postgres'; url: string };

/**
 * Reads a database address.
 * @param url `sqlite:path/to/file`, or `postgres://user@host:port/name`
 * @throws Error where it is neither; the message holds no password
 */
export function readAddress(url: string): Address {
  if (/^postgres(ql)?:\/\//.test(url)) return { type: 'postgres', url };
  const database = /^sqlite:(?!\/\/)(.+)$/.exec(url)?.[1];
  if (database !== undefined && database !== ':memory:') return { type: 'better-sqlite3', database };
  const scheme = /^[a-z0-9+]{1,20}:/i.exec(url)?.[0] ?? 'no scheme';
  throw new Error(`a database address begins with sqlite: (and a file) or postgres://, found ${scheme}`);
}

/** A change of the schema, as the ORM takes it. */
export type Change = new () => MigrationInterface;

/** A data source whose entities speak the dialect of its database, and whose SQLite transactions begin as writers. */
export class DualDataSource extends DataSource {
  protected override async buildMetadatas(): Promise<void> {
    speakDialect(this.options.type as Dialect);
    await super.buildMetadatas();
  }

  override createQueryRunner(mode?: ReplicationMode): QueryRunner {
    const runner = super.createQueryRunner(mode);
    if (this.options.type === 'better-sqlite3') beginImmediately(runner);
    return runner;
  }
}

const immediate = new WeakSet<QueryRunner>();

/** A deferred transaction that later wants to write can be refused at once, however long the busy timeout is. */
function beginImmediately(runner: QueryRunner): void {
  if (immediate.has(runner)) return;
  immediate.add(runner);
  const query = runner.query.bind(runner) as (sql: string, ...rest: unknown[]) => Promise<unknown>;
  runner.query = ((sql: string, ...rest: unknown[]) =>
    query(sql === 'BEGIN TRANSACTION' ? 'BEGIN IMMEDIATE' : sql, ...rest)) as QueryRunner['query'];
}

/**
 * A data source that is not initialised yet.
 * @param address where the data is
 * @param mode `read` opens SQLite so that writing fails
 * @param changes the changes of schema it knows
 */
export function dataSourceFor(
  address: Address,
  mode: 'write' | 'read' = 'write',
  changes: readonly Change[] = migrations,
): DualDataSource {
  const known = { entities: ENTITIES, migrations: [...changes], synchronize: false };
  return new DualDataSource({ ...connectionOf(address, mode), ...known });
}

function connectionOf(address: Address, mode: 'write' | 'read'): DataSourceOptions {
  if (address.type === 'postgres') {
    return { type: 'postgres', url: address.url, applicationName: 'varwright', poolSize: 10 };
  }
  return {
    type: 'better-sqlite3',
    database: address.database,
    readonly: mode === 'read',
    fileMustExist: mode === 'read',
    enableWAL: mode === 'write',
    timeout: BUSY_MS,
    // Write-ahead logging would otherwise come with synchronous = NORMAL, which can lose what was acknowledged.
    prepareDatabase: (db: { pragma: (text: string) => unknown }) => {
      db.pragma(`busy_timeout = ${BUSY_MS}`);
      db.pragma('synchronous = FULL');
    },
  };
}
