import { randomUUID } from 'node:crypto';
import { type MigrationInterface, type QueryRunner, TableColumn, TableIndex } from 'typeorm';

/** Jobs get a name that says nothing of how many there are; a number would tell one organisation of another's work. */
export class JobNames1764658800000 implements MigrationInterface {
  async up(runner: QueryRunner): Promise<void> {
    const column = { name: 'publicId', type: 'varchar', length: '36', default: "''" };
    await runner.addColumn('job', new TableColumn(column));
    const jobs: { id: number }[] = await runner.query('SELECT id FROM job');
    // digits and a name of our own making: nothing from outside goes into the text
    for (const { id } of jobs) await runner.query(`UPDATE job SET "publicId" = '${randomUUID()}' WHERE id = ${id}`);
    await runner.createIndex('job', new TableIndex({ name: 'job_public', columnNames: ['publicId'], isUnique: true }));
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.dropIndex('job', 'job_public');
    await runner.dropColumn('job', 'publicId');
  }
}
