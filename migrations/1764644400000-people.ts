import { type MigrationInterface, type QueryRunner, Table, type TableColumnOptions } from 'typeorm';
import { type Kind, sqlType } from '#libs/store/columns.js';

type Typed = (kind: Kind) => string;

/** Accounts, their sessions and their API keys. */
export class People1764644400000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    const type: Typed = (kind) => sqlType(kind, runner.dataSource.options.type);
    await runner.createTable(personTable(type));
    await runner.createTable(sessionTable(type));
    await runner.createTable(keyTable(type));
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const table of ['api_key', 'person_session', 'person']) await runner.dropTable(table);
  }
}

function text(name: string, length: number): TableColumnOptions {
  return { name, type: 'varchar', length: String(length) };
}

function personTable(type: Typed): Table {
  return new Table({
    name: 'person',
    columns: [
      { ...text('id', 36), isPrimary: true },
      text('organisationId', 36),
      text('signInName', 80),
      text('name', 200),
      text('role', 16),
      text('password', 255),
      { name: 'version', type: 'integer' },
      { name: 'createdAt', type: type('instant') },
      { name: 'updatedAt', type: type('instant') },
      { name: 'closedAt', type: type('instant'), isNullable: true },
    ],
    indices: [{ name: 'person_sign_in', columnNames: ['organisationId', 'signInName'], isUnique: true }],
    foreignKeys: [
      {
        name: 'person_organisation_fk',
        columnNames: ['organisationId'],
        referencedTableName: 'organisation',
        referencedColumnNames: ['id'],
      },
    ],
  });
}

function sessionTable(type: Typed): Table {
  return new Table({
    name: 'person_session',
    columns: [
      { ...text('tokenHash', 64), isPrimary: true },
      text('personId', 36),
      { name: 'createdAt', type: type('instant') },
      { name: 'expiresAt', type: type('instant') },
    ],
    indices: [{ name: 'person_session_person', columnNames: ['personId'] }],
    foreignKeys: [personKey('person_session_person_fk')],
  });
}

function keyTable(type: Typed): Table {
  return new Table({
    name: 'api_key',
    columns: [
      { ...text('id', 36), isPrimary: true },
      text('personId', 36),
      text('name', 80),
      text('role', 16),
      text('keyHash', 64),
      { name: 'createdAt', type: type('instant') },
      { name: 'expiresAt', type: type('instant'), isNullable: true },
      { name: 'revokedAt', type: type('instant'), isNullable: true },
    ],
    indices: [
      { name: 'api_key_person', columnNames: ['personId'] },
      { name: 'api_key_hash', columnNames: ['keyHash'], isUnique: true },
    ],
    foreignKeys: [personKey('api_key_person_fk')],
  });
}

function personKey(name: string) {
  return {
    name,
    columnNames: ['personId'],
    referencedTableName: 'person',
    referencedColumnNames: ['id'],
    onDelete: 'CASCADE',
  };
}
