import type { QueryRunner } from 'typeorm';

/**
 * Keeps a change from being taken back while rows are there that the schema before it cannot hold.
 * @param runner of the migration
 * @param table table of the rows
 * @param condition SQL, true for a row that would be lost or would break the schema
 * @param why what the earlier schema has no room for
 * @throws Error with the number of rows, before anything is touched
 */
export async function refuseWhere(runner: QueryRunner, table: string, condition: string, why: string): Promise<void> {
  const [row] = (await runner.query(`SELECT count(*) AS n FROM "${table}" WHERE ${condition}`)) as { n: number }[];
  const count = Number(row?.n ?? 0);
  if (count > 0) {
    throw new Error(`${count} rows of ${table} stand in the way of the earlier schema: ${why}. Nothing was changed.`);
  }
}

/**
 * SQL that is true for rows whose columns are not unique.
 * @param table the table
 * @param columns of the unique index that is to come back
 */
export function repeated(table: string, columns: readonly string[]): string {
  const list = columns.map((name) => `"${name}"`).join(', ');
  return `(${list}) IN (SELECT ${list} FROM "${table}" GROUP BY ${list} HAVING count(*) > 1)`;
}
