import { csvRows } from '#libs/contract/csv-text.js';
import { InputProblem } from '#libs/engine/index.js';
import { MeterBytes } from '../meter-bytes.js';
import { withCellText } from '../sheet/cell-text.js';
import { SpooledFile } from '../spooled-file.js';
import { sheetText } from './read-sheet.js';
import { contextOf } from './read-xlsx.js';
import { SheetCells } from './sheet-cells.js';
import { SheetRows } from './sheet-rows.js';
import { readWorkbook } from './workbook-parts.js';
import { ZipArchive } from './zip-archive.js';

/** A table that is read whole is a small one [bytes of text]. */
const MOST_TEXT_BYTES = 16_777_216;

/**
 * The cells of a workbook's first sheet as texts, numbers with a decimal point.
 * @param source the file
 * @returns rows; empty ones between them kept
 * @throws InputProblem where it is no workbook, damaged, or too large a table
 */
export async function readWorkbookRows(source: AsyncIterable<Uint8Array>): Promise<string[][]> {
  const bytes = await MeterBytes.open(source);
  const file = await SpooledFile.from(bytes);
  try {
    const archive = await ZipArchive.open(file);
    const workbook = await readWorkbook(archive);
    const sheet = workbook.sheets[0]!;
    const context = await contextOf(archive, workbook);
    return await withCellText(async (written) => {
      const path = `sheet ${JSON.stringify(sheet.name.slice(0, 60))}`;
      const rows = new SheetRows(new SheetCells(context, written, path), path);
      return rowsOf(sheetText({ archive, context, options: {} }, sheet, { rows, onRead: () => {} }));
    });
  } finally {
    await file.close();
    await bytes.close();
  }
}

async function rowsOf(text: AsyncIterable<Uint8Array>): Promise<string[][]> {
  const parts: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of text) {
    size += chunk.length;
    parts.push(new Uint8Array(chunk));
    if (size > MOST_TEXT_BYTES) {
      const expected = `a table of at most ${MOST_TEXT_BYTES} bytes`;
      throw new InputProblem([{ code: 'too-large', expected, found: 'a larger one' }]);
    }
  }
  return csvRows(Buffer.concat(parts).toString('utf8')) ?? [];
}
