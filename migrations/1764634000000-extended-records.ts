import {
  type MigrationInterface,
  type QueryRunner,
  Table,
  TableColumn,
  type TableColumnOptions,
  TableForeignKey,
  TableIndex,
} from 'typeorm';
import { sqlType } from '#libs/store/columns.js';

/** Records with revisions, answers kept under a name, imports as jobs. */
export class ExtendedRecords1764634000000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    const { type } = runner.dataSource.options;
    await runner.addColumns(
      'load_record',
      RECORD_COLUMNS.map((column) => new TableColumn(column)),
    );
    await runner.createIndex(
      'load_record',
      new TableIndex({ name: 'load_record_previous', columnNames: ['previousId'], isUnique: true }),
    );
    await runner.createForeignKey('load_record', previousKey());
    await runner.addColumns('job', [
      new TableColumn({ name: 'recordId', type: 'varchar', length: '36', isNullable: true }),
      new TableColumn({ name: 'startedS', type: sqlType('double', type), isNullable: true }),
    ]);
    await runner.createTable(keptMapTable(type));
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropTable('kept_map');
    await runner.dropColumns('job', ['startedS', 'recordId']);
    await runner.dropForeignKey('load_record', 'load_record_previous_fk');
    await runner.dropIndex('load_record', 'load_record_previous');
    await runner.dropColumns('load_record', ['fileHeader', 'previousId', 'revision']);
  }
}

const RECORD_COLUMNS: TableColumnOptions[] = [
  { name: 'revision', type: 'integer', default: '1' },
  { name: 'previousId', type: 'varchar', length: '36', isNullable: true },
  { name: 'fileHeader', type: 'varchar', length: '64', isNullable: true },
];

function previousKey(): TableForeignKey {
  return new TableForeignKey({
    name: 'load_record_previous_fk',
    columnNames: ['previousId'],
    referencedTableName: 'load_record',
    referencedColumnNames: ['id'],
  });
}

function keptMapTable(type: string): Table {
  return new Table({
    name: 'kept_map',
    columns: [
      { name: 'id', type: 'varchar', length: '36', isPrimary: true },
      { name: 'name', type: 'varchar', length: '80' },
      { name: 'map', type: sqlType('json', type) },
      { name: 'header', type: 'varchar', length: '64', isNullable: true },
      { name: 'version', type: 'integer' },
      { name: 'createdAt', type: sqlType('instant', type) },
      { name: 'updatedAt', type: sqlType('instant', type) },
    ],
    indices: [
      { name: 'kept_map_name', columnNames: ['name'], isUnique: true },
      { name: 'kept_map_header', columnNames: ['header'] },
    ],
  });
}
