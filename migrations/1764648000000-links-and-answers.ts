import { type MigrationInterface, type QueryRunner, Table, type TableColumnOptions } from 'typeorm';
import { type Kind, sqlType } from '#libs/store/columns.js';

type Typed = (kind: Kind) => string;

/** Links to one revision, and answers kept under idempotency keys. */
export class LinksAndAnswers1764648000000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    const type: Typed = (kind) => sqlType(kind, runner.dataSource.options.type);
    await runner.createTable(linkTable(type));
    await runner.createTable(answerTable(type));
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropTable('kept_answer');
    await runner.dropTable('revision_link');
  }
}

function text(name: string, length: number): TableColumnOptions {
  return { name, type: 'varchar', length: String(length) };
}

function linkTable(type: Typed): Table {
  return new Table({
    name: 'revision_link',
    columns: [
      { ...text('id', 36), isPrimary: true },
      text('revisionId', 36),
      text('tokenHash', 64),
      text('madeBy', 200),
      { name: 'createdAt', type: type('instant') },
      { name: 'expiresAt', type: type('instant') },
      { name: 'revokedAt', type: type('instant'), isNullable: true },
    ],
    indices: [
      { name: 'revision_link_revision', columnNames: ['revisionId'] },
      { name: 'revision_link_token', columnNames: ['tokenHash'], isUnique: true },
    ],
    foreignKeys: [
      {
        name: 'revision_link_revision_fk',
        columnNames: ['revisionId'],
        referencedTableName: 'revision',
        referencedColumnNames: ['id'],
        onDelete: 'CASCADE',
      },
    ],
  });
}

function answerTable(type: Typed): Table {
  return new Table({
    name: 'kept_answer',
    columns: [
      { ...text('organisationId', 36), isPrimary: true },
      { ...text('personId', 36), isPrimary: true },
      { ...text('key', 200), isPrimary: true },
      text('claim', 36),
      text('fingerprint', 64),
      { name: 'status', type: 'integer', isNullable: true },
      { name: 'headers', type: type('json'), isNullable: true },
      { name: 'body', type: 'text', isNullable: true },
      { name: 'createdAt', type: type('instant') },
    ],
  });
}
