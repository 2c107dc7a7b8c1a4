import { InputProblem, type Problem, Stopped } from '#libs/engine/index.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { withCellText } from '../sheet/cell-text.js';
import { readSheetText } from '../sheet/read-sheet-text.js';
import { type CellContext, SheetCells } from './sheet-cells.js';
import { SheetRows } from './sheet-rows.js';
import type { Worksheet } from './workbook-parts.js';
import { XmlPart } from './xml-part.js';
import type { ZipArchive } from './zip-archive.js';

/** A workbook that is being read. */
export interface OpenWorkbook {
  archive: ZipArchive;
  context: CellContext;
  options: ReadOptions;
}

/**
 * Reads the record of one sheet by the rules of delimited text, row by row.
 * @param workbook the workbook
 * @param sheet one of its sheets
 * @param onRead hears how many packed bytes of the sheet have been read
 * @returns the record and its quality
 * @throws InputProblem where the sheet holds no record, naming sheet, row and column; Question where it holds several
 */
export async function readSheet(
  workbook: OpenWorkbook,
  sheet: Worksheet,
  onRead: (bytes: number) => void,
): Promise<MeterReading> {
  const map = workbook.options.map ?? {};
  return withCellText(async (written, markless) => {
    const cells = new SheetCells(workbook.context, written, pathOf(sheet));
    const rows = new SheetRows(cells, pathOf(sheet));
    try {
      // the numbers of a sheet have no mark of their own; what the map says of marks is said of texts
      const text = sheetText(workbook, sheet, { rows, onRead });
      return await readSheetText(text, workbook.options, markless ? map : { ...map, decimal: '.' });
    } catch (error) {
      throw error instanceof InputProblem ? ofSheet(error, sheet, cells.uncalculated) : error;
    }
  });
}

/** Rows of a sheet as comma-delimited text, as they are read. */
export async function* sheetText(
  { archive, options }: OpenWorkbook,
  { part }: Worksheet,
  { rows, onRead }: { rows: SheetRows; onRead: (bytes: number) => void },
): AsyncGenerator<Uint8Array> {
  const xml = new XmlPart(part, rows);
  for await (const chunk of archive.part(part, onRead)) {
    if (options.watch?.stopped()) throw new Stopped('the reading was stopped');
    xml.write(chunk);
    if (rows.written.full) yield rows.written.take();
  }
  xml.end();
  yield rows.written.take();
}

/** The sheet of every refusal; a formula without a value may be why a column was not found. */
function ofSheet(refusal: InputProblem, sheet: Worksheet, uncalculated: Problem | null): InputProblem {
  if ('questions' in refusal) return refusal;
  const problems = refusal.problems.map((problem) => ({ path: pathOf(sheet), ...problem, ...wordsOf(problem) }));
  const named = uncalculated === null || problems.some(({ row }) => row === uncalculated.row);
  return new InputProblem(named ? problems : [uncalculated, ...problems]);
}

/** A sheet without a header is no file of an unknown format. */
function wordsOf({ code }: Problem): { expected?: string; found?: string } {
  if (code !== 'unknown-format') return {};
  return { expected: 'a row of column names: time, active and reactive power or energy', found: 'none' };
}

function pathOf({ name }: Worksheet): string {
  return `sheet ${JSON.stringify(name.slice(0, 60))}`;
}
