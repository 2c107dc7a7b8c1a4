import { type MigrationInterface, type QueryRunner, TableColumn, TableIndex } from 'typeorm';
import { refuseWhere, repeated } from './refuse-where.js';

const CONTENT = { name: 'revision_content', columnNames: ['siteId', 'contentHash'] };

/** A revision that has ended stands in the way of the same inputs no more, nor does one on another sheet or in another language. */
export class PaperForms1764662400000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await runner.addColumn(
      'revision',
      new TableColumn({ name: 'paperForm', type: 'varchar', length: '60', isNullable: true }),
    );
    await runner.dropIndex('revision', CONTENT.name);
    await runner.createIndex('revision', new TableIndex(CONTENT));
  }

  async down(runner: QueryRunner): Promise<void> {
    const why = 'revisions of equal inputs on other papers, or after one that has ended';
    await refuseWhere(runner, 'revision', repeated('revision', CONTENT.columnNames), why);
    await runner.dropIndex('revision', CONTENT.name);
    await runner.createIndex('revision', new TableIndex({ ...CONTENT, isUnique: true }));
    await runner.dropColumn('revision', 'paperForm');
  }
}
