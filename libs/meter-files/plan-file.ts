import { csvText, type TableCell } from '#libs/contract/csv-text.js';
import { DOCUMENT_HEADS, documentRows } from '#libs/contract/document-rows.js';
import type { PlanDocument } from '#libs/contract/plan-document.js';
import { type NamedTable, type TableForm, tableCsv, tablesWorkbook } from './write-tables.js';

/** Name of the sheet that holds a plan whole. */
export const DOCUMENT_SHEET = 'document';

/** What a row of a calculation sheet says of the plan it belongs to, beside its own figure. */
export const SEAL_HEADS = ['form', 'contentHash', 'sheetHash'] as const;

/**
 * A plan as a file that is taken back to the same hash: its document letter for letter as JSON, every value by its path as
 * text, its parts as sheets and the document as the last of them.
 * @param document from `planDocument`
 * @param tables its parts
 * @param form of the file
 */
export function planFile(document: PlanDocument, tables: readonly NamedTable[], form: TableForm): Buffer {
  if (form === 'json') return Buffer.from(`${JSON.stringify(document)}\n`);
  const rows = documentRows(document);
  if (form === 'csv') return Buffer.from(csvText(rows));
  return tablesWorkbook([...tables, { name: DOCUMENT_SHEET, heads: DOCUMENT_HEADS, rows: rows.slice(1) }]);
}

/**
 * A calculation sheet as a file that is taken back to the same hash; each row names the plan it belongs to.
 * @param document from `calculationDocument`
 * @param table its figures as rows
 * @param form of the file
 */
export function calculationFile(document: PlanDocument, table: NamedTable, form: TableForm): Buffer {
  if (form === 'json') return Buffer.from(`${JSON.stringify(document)}\n`);
  const seal = document.frozen as Record<string, TableCell>;
  const sealed = SEAL_HEADS.map((head) => seal[head]!);
  const whole = {
    name: table.name,
    heads: [...table.heads, ...SEAL_HEADS],
    rows: table.rows.map((row) => [...row, ...sealed]),
  };
  return form === 'csv' ? Buffer.from(tableCsv(whole)) : tablesWorkbook([whole]);
}
