import { documentRows } from '#libs/contract/document-rows.js';
import { csvText } from '#libs/contract/csv-text.js';
import { type NamedTable, type TableForm, tableCsv, tablesWorkbook } from './write-tables.js';

/**
 * A plan as a file: its result letter for letter as JSON, every value by its path as text, its parts as sheets.
 * @param result plan or judgement
 * @param tables its parts
 * @param form of the file
 */
export function planFile(result: unknown, tables: readonly NamedTable[], form: TableForm): Buffer {
  if (form === 'json') return Buffer.from(`${JSON.stringify(result)}\n`);
  return form === 'csv' ? Buffer.from(csvText(documentRows(result))) : tablesWorkbook(tables);
}

/**
 * A calculation sheet as a file.
 * @param figures of the result
 * @param table the same as rows
 * @param form of the file
 */
export function calculationFile(figures: unknown, table: NamedTable, form: TableForm): Buffer {
  if (form === 'json') return Buffer.from(`${JSON.stringify({ figures })}\n`);
  return form === 'csv' ? Buffer.from(tableCsv(table)) : tablesWorkbook([table]);
}
