import { csvRows } from '#libs/contract/csv-text.js';
import { InputProblem } from '#libs/engine/index.js';
import { MeterBytes } from '../meter-bytes.js';
import { withCellText } from '../sheet/cell-text.js';
import { SpooledFile } from '../spooled-file.js';
import { type OpenWorkbook, sheetText } from './read-sheet.js';
import { contextOf } from './read-xlsx.js';
import { SheetCells } from './sheet-cells.js';
import { SheetRows } from './sheet-rows.js';
import { readWorkbook, type Worksheet } from './workbook-parts.js';
import { ZipArchive } from './zip-archive.js';

/** A table that is read whole is a small one [bytes of text]. */
const MOST_TEXT_BYTES = 16_777_216;

/** Bytes at hand as a source. */
export async function* oneChunk(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  yield bytes;
}

/** A sheet as rows of texts. */
export interface SheetRead {
  name: string;
  rows: string[][];
}

/**
 * The cells of a workbook's first sheet as texts, numbers with a decimal point.
 * @param source the file
 * @returns rows; empty ones between them kept
 * @throws InputProblem where it is no workbook, damaged, or too large a table
 */
export async function readWorkbookRows(source: AsyncIterable<Uint8Array>): Promise<string[][]> {
  const [first] = await readSheets(source, ([sheet]) => [sheet!]);
  return first!.rows;
}

/**
 * The cells of every sheet of a workbook as texts, numbers with a decimal point.
 * @param source the file
 * @returns sheets in their order
 * @throws InputProblem where it is no workbook, damaged, or too large
 */
export function readWorkbookTables(source: AsyncIterable<Uint8Array>): Promise<SheetRead[]> {
  return readSheets(source, (sheets) => sheets);
}

async function readSheets(
  source: AsyncIterable<Uint8Array>,
  wanted: (sheets: readonly Worksheet[]) => readonly Worksheet[],
): Promise<SheetRead[]> {
  const bytes = await MeterBytes.open(source);
  const file = await SpooledFile.from(bytes);
  try {
    const archive = await ZipArchive.open(file);
    const workbook = await readWorkbook(archive);
    const context = await contextOf(archive, workbook);
    const read: SheetRead[] = [];
    let left = MOST_TEXT_BYTES;
    for (const sheet of wanted(workbook.sheets)) {
      const { rows, size } = await readCells({ archive, context, options: {} }, sheet, left);
      read.push({ name: sheet.name, rows });
      left -= size;
    }
    return read;
  } finally {
    await file.close();
    await bytes.close();
  }
}

function readCells(workbook: OpenWorkbook, sheet: Worksheet, mostBytes: number): Promise<TextRows> {
  return withCellText((written) => {
    const path = `sheet ${JSON.stringify(sheet.name.slice(0, 60))}`;
    const rows = new SheetRows(new SheetCells(workbook.context, written, path), path);
    return rowsOf(sheetText(workbook, sheet, { rows, onRead: () => {} }), mostBytes);
  });
}

interface TextRows {
  rows: string[][];
  /** of their text [bytes] */
  size: number;
}

async function rowsOf(text: AsyncIterable<Uint8Array>, mostBytes: number): Promise<TextRows> {
  const parts: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of text) {
    size += chunk.length;
    parts.push(new Uint8Array(chunk));
    if (size > mostBytes) {
      const expected = `tables of at most ${MOST_TEXT_BYTES} bytes`;
      throw new InputProblem([{ code: 'too-large', expected, found: 'larger ones' }]);
    }
  }
  return { rows: csvRows(Buffer.concat(parts).toString('utf8')) ?? [], size };
}
