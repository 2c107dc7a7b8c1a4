import { csvRows, csvText, unguarded } from '#libs/contract/csv-text.js';
import { areDocumentRows, DOCUMENT_HEADS, documentFromRows, documentRows } from '#libs/contract/document-rows.js';
import { InputProblem } from '#libs/engine/index.js';
import { isXlsx } from './format-starts.js';
import type { TableForm } from './write-tables.js';
import { oneChunk, readWorkbookRows } from './xlsx/read-workbook-rows.js';
import { writeWorkbook } from './xlsx/write-workbook.js';

/**
 * A document of plain JSON as a file that is read back to the same document.
 * @param document as it was given
 * @param form JSON, comma-separated text or a workbook
 */
export function documentFile(document: unknown, form: TableForm): Buffer {
  if (form === 'json') return Buffer.from(`${JSON.stringify(document, null, 2)}\n`);
  const rows = documentRows(document);
  return form === 'csv' ? Buffer.from(csvText(rows)) : writeWorkbook([{ name: 'site', rows }]);
}

/**
 * Whether bytes are a document as rows: a workbook, or text that begins with the heads of its columns.
 * @param bytes of the file
 */
export function isDocumentRows(bytes: Uint8Array): boolean {
  const start = Buffer.from(bytes.subarray(0, 64))
    .toString('utf8')
    .replace(/^\ufeff/, '');
  return isXlsx(bytes) || start.startsWith(DOCUMENT_HEADS.join(','));
}

/**
 * The document that was written as rows.
 * @param bytes of the file
 * @returns the document
 * @throws InputProblem where it is no such file, naming every row that can't be understood
 */
export async function readDocumentRows(bytes: Uint8Array): Promise<unknown> {
  const rows = isXlsx(bytes) ? await readWorkbookRows(oneChunk(bytes)) : textRows(bytes);
  if (rows !== null && areDocumentRows(rows)) return documentFromRows(rows);
  const expected = `rows under ${DOCUMENT_HEADS.join(', ')}, every quote closed`;
  throw new InputProblem([{ code: 'unreadable', expected, found: 'others' }]);
}

/**
 * Rows of comma-separated text; only there are texts guarded.
 * @param bytes of the file
 * @returns cells as texts, null where a quote is never closed
 */
export function textRows(bytes: Uint8Array): string[][] | null {
  const text = Buffer.from(bytes)
    .toString('utf8')
    .replace(/^\ufeff/, '');
  return csvRows(text)?.map((row) => row.map(unguarded)) ?? null;
}
