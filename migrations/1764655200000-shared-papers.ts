import { type MigrationInterface, type QueryRunner, Table } from 'typeorm';
import { sqlType } from '#libs/store/columns.js';

/** Tariffs and price books as papers of their own, each an organisation's. */
export class SharedPapers1764655200000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    const { type } = runner.dataSource.options;
    await runner.createTable(
      new Table({
        name: 'paper',
        columns: [
          { name: 'id', type: 'varchar', length: '36', isPrimary: true },
          { name: 'organisationId', type: 'varchar', length: '36', default: "'first'" },
          { name: 'kind', type: 'varchar', length: '16' },
          { name: 'name', type: 'varchar', length: '80' },
          { name: 'version', type: 'integer' },
          { name: 'date', type: 'varchar', length: '10' },
          { name: 'document', type: sqlType('json', type) },
          { name: 'createdAt', type: sqlType('instant', type) },
        ],
        indices: [
          { name: 'paper_version', columnNames: ['organisationId', 'kind', 'name', 'version'], isUnique: true },
        ],
        foreignKeys: [
          {
            name: 'paper_organisation_fk',
            columnNames: ['organisationId'],
            referencedTableName: 'organisation',
            referencedColumnNames: ['id'],
          },
        ],
      }),
    );
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropTable('paper');
  }
}
