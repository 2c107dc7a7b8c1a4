import { type MigrationInterface, type QueryRunner, Table, TableIndex } from 'typeorm';
import { sqlType } from '#libs/store/columns.js';

const ID = { type: 'varchar', length: '36' };
const HASH = { type: 'varchar', length: '64' };

/** The chained log, where each revision's review stands, and the papers that were issued. */
export class Reviews1764651600000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.createTable(auditTable());
    await runner.createTable(reviewTable());
    await runner.createTable(issuedTable(sqlType('bytes', runner.dataSource.options.type)));
    await runner.createIndex('proposal', new TableIndex({ name: 'proposal_sha256', columnNames: ['sha256'] }));
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropIndex('proposal', 'proposal_sha256');
    for (const table of ['issued_paper', 'review', 'audit_entry']) await runner.dropTable(table);
  }
}

function auditTable(): Table {
  return new Table({
    name: 'audit_entry',
    columns: [
      { name: 'sequence', type: 'integer', isPrimary: true },
      { name: 'revisionId', ...ID },
      { name: 'content', type: 'text' },
      { name: 'previousHash', ...HASH },
      { name: 'hash', ...HASH },
    ],
    indices: [{ name: 'audit_entry_revision', columnNames: ['revisionId'] }],
  });
}

function reviewTable(): Table {
  return new Table({
    name: 'review',
    columns: [
      { name: 'revisionId', ...ID, isPrimary: true },
      { name: 'state', type: 'varchar', length: '16' },
      { name: 'version', type: 'integer' },
      { name: 'lastSequence', type: 'integer' },
    ],
    foreignKeys: [{ ...toRevision('review_revision_fk'), onDelete: 'CASCADE' }],
  });
}

function issuedTable(bytes: string): Table {
  return new Table({
    name: 'issued_paper',
    columns: [
      { name: 'revisionId', ...ID, isPrimary: true },
      { name: 'bytes', type: bytes },
      { name: 'sha256', ...HASH },
    ],
    indices: [{ name: 'issued_paper_sha256', columnNames: ['sha256'] }],
    foreignKeys: [toRevision('issued_paper_revision_fk')],
  });
}

function toRevision(name: string) {
  return { name, columnNames: ['revisionId'], referencedTableName: 'revision', referencedColumnNames: ['id'] };
}
