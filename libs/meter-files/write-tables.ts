import { csvText, type TableCell } from '#libs/contract/csv-text.js';
import { writeWorkbook } from './xlsx/write-workbook.js';

/** A table with the names of its columns. */
export interface NamedTable {
  name: string;
  heads: readonly string[];
  rows: readonly (readonly TableCell[])[];
}

/** Forms in which tables go out. */
export const TABLE_FORMS = ['json', 'csv', 'xlsx'] as const;
export type TableForm = (typeof TABLE_FORMS)[number];

/**
 * One table as comma-separated text, its heads first.
 * @param table heads and rows
 */
export function tableCsv({ heads, rows }: NamedTable): string {
  return csvText([heads, ...rows]);
}

/**
 * Tables as a workbook, a sheet each, heads first.
 * @param tables their names unlike each other
 */
export function tablesWorkbook(tables: readonly NamedTable[]): Buffer {
  return writeWorkbook(tables.map(({ name, heads, rows }) => ({ name, rows: [heads, ...rows] })));
}
