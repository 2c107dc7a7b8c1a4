import type { MigrationInterface, QueryRunner } from 'typeorm';
import { refuseWhere } from './refuse-where.js';

const COLUMNS = ['recordId', 'recordHash'];

/** A revision may stand on the site's own estimate in place of a load record. */
export class EstimatedRevisions1764637200000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    await allowAbsent(runner, true);
  }

  async down(runner: QueryRunner): Promise<void> {
    await refuseWhere(runner, 'revision', '"recordId" IS NULL', 'revisions without a record');
    await allowAbsent(runner, false);
  }
}

async function allowAbsent(runner: QueryRunner, isNullable: boolean): Promise<void> {
  for (const name of COLUMNS) {
    const table = await runner.getTable('revision');
    const column = table?.findColumnByName(name);
    if (column === undefined) throw new Error(`no column ${name} of revision`);
    const changed = column.clone();
    changed.isNullable = isNullable;
    await runner.changeColumn('revision', column, changed);
  }
}
