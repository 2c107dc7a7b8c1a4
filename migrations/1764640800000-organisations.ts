import { type MigrationInterface, type QueryRunner, Table, TableColumn, TableForeignKey, TableIndex } from 'typeorm';
import { sqlType } from '#libs/store/columns.js';
import { refuseWhere, repeated } from './refuse-where.js';

/** What the organisation of a table decides: numbers and names are counted and taken within one. */
const OWNED = [
  { table: 'site', index: 'site_number', column: 'number' },
  { table: 'kept_map', index: 'kept_map_name', column: 'name' },
];

/** Organisations; what stands already belongs to the first. */
export class Organisations1764640800000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.createTable(organisationTable(sqlType('instant', runner.dataSource.options.type)));
    await runner.query(`INSERT INTO organisation (id, name, "createdAt") VALUES ('first', 'main', CURRENT_TIMESTAMP)`);
    for (const { table, index, column } of OWNED) {
      const owner = { name: 'organisationId', type: 'varchar', length: '36', default: "'first'" };
      await runner.addColumn(table, new TableColumn(owner));
      await runner.createForeignKey(table, ownerKey(table));
      await runner.dropIndex(table, index);
      await runner.createIndex(table, uniqueIndex(index, ['organisationId', column]));
    }
  }

  async down(runner: QueryRunner): Promise<void> {
    for (const { table, column } of OWNED) {
      await refuseWhere(runner, table, repeated(table, [column]), 'equal numbers and names in two organisations');
    }
    for (const { table, index, column } of OWNED) {
      await runner.dropIndex(table, index);
      await runner.createIndex(table, uniqueIndex(index, [column]));
      await runner.dropForeignKey(table, `${table}_organisation_fk`);
      await runner.dropColumn(table, 'organisationId');
    }
    await runner.dropTable('organisation');
  }
}

function organisationTable(instant: string): Table {
  return new Table({
    name: 'organisation',
    columns: [
      { name: 'id', type: 'varchar', length: '36', isPrimary: true },
      { name: 'name', type: 'varchar', length: '80' },
      { name: 'createdAt', type: instant },
    ],
    indices: [{ name: 'organisation_name', columnNames: ['name'], isUnique: true }],
  });
}

function ownerKey(table: string): TableForeignKey {
  return new TableForeignKey({
    name: `${table}_organisation_fk`,
    columnNames: ['organisationId'],
    referencedTableName: 'organisation',
    referencedColumnNames: ['id'],
  });
}

function uniqueIndex(name: string, columnNames: string[]): TableIndex {
  return new TableIndex({ name, columnNames, isUnique: true });
}
