import { type MigrationInterface, type QueryRunner, Table, type TableColumnOptions } from 'typeorm';
import { sqlType, type Kind } from '#libs/store/columns.js';

type Columns = Record<string, TableColumnOptions['type'] | Partial<TableColumnOptions>>;
type Foreign = { column: string; table: string; target: string; name: string; onDelete?: 'CASCADE' };

/** Sites, records with their packed columns, revisions with their proposals, jobs. */
export class FirstTables1764547200000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    const type = (kind: Kind) => sqlType(kind, runner.dataSource.options.type);
    await runner.createTable(siteTable(type));
    await runner.createTable(recordTable(type));
    await runner.createTable(recordColumnTable(type));
    await runner.createTable(revisionTable(type));
    await runner.createTable(proposalTable(type));
    await runner.createTable(jobTable(type));
    await runner.createTable(
      new Table({
        name: 'milestone',
        columns: columns({ name: primary(32), reachedAt: type('instant') }),
      }),
    );
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of ['milestone', 'job', 'proposal', 'revision', 'record_column', 'load_record', 'site']) {
      await runner.dropTable(table);
    }
  }
}

type Typed = (kind: Kind) => string;

const ID = { type: 'varchar', length: '36' };
const HASH = { type: 'varchar', length: '64' };

function primary(length: number): Partial<TableColumnOptions> {
  return { type: 'varchar', length: String(length), isPrimary: true };
}

function text(length: number, isNullable = false): Partial<TableColumnOptions> {
  return { type: 'varchar', length: String(length), isNullable };
}

function columns(given: Columns): TableColumnOptions[] {
  return Object.entries(given).map(([name, column]) =>
    typeof column === 'string' ? { name, type: column } : ({ name, ...column } as TableColumnOptions),
  );
}

function foreignKey({ column, table, target, name, onDelete }: Foreign) {
  return {
    name,
    columnNames: [column],
    referencedTableName: table,
    referencedColumnNames: [target],
    ...(onDelete ? { onDelete } : {}),
  };
}

function siteTable(type: Typed): Table {
  return new Table({
    name: 'site',
    columns: columns({
      id: primary(36),
      number: 'integer',
      name: text(400),
      document: type('json'),
      version: 'integer',
      lastRevision: 'integer',
      createdAt: type('instant'),
      updatedAt: type('instant'),
    }),
    indices: [{ name: 'site_number', columnNames: ['number'], isUnique: true }],
  });
}

function recordTable(type: Typed): Table {
  return new Table({
    name: 'load_record',
    columns: columns({
      id: primary(36),
      siteId: ID,
      hash: HASH,
      intervalS: type('double'),
      firstS: type('double'),
      endS: type('double'),
      intervalCount: 'integer',
      repaired: 'integer',
      duplicates: 'integer',
      notes: type('json'),
      summary: type('json'),
      quality: type('json'),
      fileName: text(400, true),
      fileHash: HASH,
      fileBytes: 'integer',
      createdAt: type('instant'),
    }),
    indices: [{ name: 'load_record_site', columnNames: ['siteId'] }],
    foreignKeys: [
      foreignKey({ column: 'siteId', table: 'site', target: 'id', name: 'load_record_site_fk', onDelete: 'CASCADE' }),
    ],
  });
}

function recordColumnTable(type: Typed): Table {
  return new Table({
    name: 'record_column',
    columns: columns({
      recordId: primary(36),
      month: primary(16),
      quantity: primary(16),
      intervals: 'integer',
      scale: { type: type('double'), isNullable: true },
      firstScaled: type('double'),
      bytes: type('bytes'),
    }),
    foreignKeys: [
      foreignKey({
        column: 'recordId',
        table: 'load_record',
        target: 'id',
        name: 'record_column_record_fk',
        onDelete: 'CASCADE',
      }),
    ],
  });
}

function revisionTable(type: Typed): Table {
  return new Table({
    name: 'revision',
    columns: columns({
      id: primary(36),
      siteId: ID,
      number: text(32),
      revision: 'integer',
      kind: text(16),
      recordId: ID,
      recordHash: HASH,
      inputs: 'text',
      engineVersion: text(32),
      contentHash: HASH,
      result: 'text',
      proposed: text(400),
      rival: { type: type('json'), isNullable: true },
      verdict: text(16),
      createdAt: type('instant'),
      author: text(200, true),
      reason: text(2000, true),
    }),
    indices: [
      { name: 'revision_number', columnNames: ['siteId', 'revision'], isUnique: true },
      { name: 'revision_content', columnNames: ['siteId', 'contentHash'], isUnique: true },
      { name: 'revision_record', columnNames: ['recordId'] },
    ],
    foreignKeys: [
      foreignKey({ column: 'siteId', table: 'site', target: 'id', name: 'revision_site_fk', onDelete: 'CASCADE' }),
      // No cascade: a record that a revision was made from cannot be removed alone.
      foreignKey({ column: 'recordId', table: 'load_record', target: 'id', name: 'revision_record_fk' }),
    ],
  });
}

function proposalTable(type: Typed): Table {
  return new Table({
    name: 'proposal',
    columns: columns({ revisionId: primary(36), bytes: type('bytes'), sha256: HASH }),
    foreignKeys: [
      foreignKey({
        column: 'revisionId',
        table: 'revision',
        target: 'id',
        name: 'proposal_revision_fk',
        onDelete: 'CASCADE',
      }),
    ],
  });
}

function jobTable(type: Typed): Table {
  return new Table({
    name: 'job',
    columns: columns({
      id: { type: 'integer', isPrimary: true, isGenerated: true, generationStrategy: 'increment' },
      siteId: ID,
      kind: text(16),
      inputHash: HASH,
      engineVersion: text(32),
      request: type('json'),
      state: text(16),
      attempt: 'integer',
      step: 'integer',
      heartbeatS: type('double'),
      progress: type('double'),
      error: { type: type('json'), isNullable: true },
      revision: { type: 'integer', isNullable: true },
      createdAt: type('instant'),
      finishedAt: { type: type('instant'), isNullable: true },
    }),
    indices: [
      { name: 'job_state', columnNames: ['state', 'id'] },
      { name: 'job_site', columnNames: ['siteId'] },
    ],
    foreignKeys: [
      foreignKey({ column: 'siteId', table: 'site', target: 'id', name: 'job_site_fk', onDelete: 'CASCADE' }),
    ],
  });
}
