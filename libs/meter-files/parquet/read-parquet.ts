import { InputProblem, type Problem, Stopped } from '#libs/engine/index.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { type CellText, withCellText } from '../sheet/cell-text.js';
import { readingOf, readSheetText } from '../sheet/read-sheet-text.js';
import { quotedCell, SheetText } from '../sheet/sheet-text.js';
import { SpooledFile } from '../spooled-file.js';
import { type ColumnChunk, ColumnPages } from './column-pages.js';
import { PageError } from './page-error.js';
import { type Footer, type NamedColumn, rangeOf, readFooter } from './parquet-footer.js';
import { type ValueText, valueText } from './value-text.js';

const SPOOL_SHARE = 0.2;
/** Rows from a few bytes can be many: so much text is the most that is made of a file [bytes]. */
const MOST_TEXT_BYTES = 2_147_483_648;
/** The names are row 1, as in a sheet. */
const HEADER_ROW = 1;

/**
 * Reads Parquet: its named columns as rows of a sheet, the names being row 1, one row group after the other.
 * @param source the file
 * @param options what is said about it
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, Question where it can be read in several ways
 */
export async function readParquet(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  source.isShareOfWork(SPOOL_SHARE);
  const file = await SpooledFile.from(source);
  try {
    const footer = await readFooter(file);
    return await readRows(file, footer, options);
  } finally {
    await file.close();
  }
}

/** A column and how its values are written; null where it holds no reading: it then stands there without name and values. */
interface WrittenColumn extends NamedColumn {
  text: ValueText | null;
}

async function readRows(file: SpooledFile, footer: Footer, options: ReadOptions): Promise<MeterReading> {
  const map = { ...options.map, headerRow: HEADER_ROW };
  return withCellText(async (cells, markless) => {
    const columns = footer.columns.map((column) => ({ ...column, text: textFor(column, cells) }));
    const leftOut = columns.filter(({ text }) => text === null);
    try {
      const text = textOf(file, { groups: footer.groups, columns, options });
      const reading = await readSheetText(text, options, markless ? map : { ...map, decimal: '.' });
      const left = leftOut.map(({ element }) => element.name).join(', ');
      const notes = leftOut.length === 0 ? [] : [note('parquet-columns-left-out', { columns: left.slice(0, 300) })];
      return readingOf(reading, 'parquet', notes);
    } catch (error) {
      throw error instanceof InputProblem ? withLeftOut(error, leftOut) : error;
    }
  });
}

function textFor({ element, leaf }: NamedColumn, cells: CellText): ValueText | null {
  return leaf < 0 ? null : valueText(element, cells);
}

/** A column that is not found may be one that was left out. */
function withLeftOut(refusal: InputProblem, leftOut: readonly WrittenColumn[]): InputProblem {
  if ('questions' in refusal || leftOut.length === 0 || !refusal.code.startsWith('no-')) return refusal;
  const problems = leftOut.slice(0, 10).map(
    ({ element, leaf }): Problem => ({
      code: 'not-supported-yet',
      path: `column ${JSON.stringify(element.name.slice(0, 60))}`,
      expected: 'one value a row: a number, a text, or a stamp in milli-, micro- or nanoseconds',
      found: leaf < 0 ? 'a list or a group' : (element.type ?? 'no type'),
    }),
  );
  return new InputProblem([...refusal.problems, ...problems]);
}

interface Rows {
  groups: Footer['groups'];
  columns: readonly WrittenColumn[];
  options: ReadOptions;
}

async function* textOf(file: SpooledFile, { groups, columns, options }: Rows): AsyncGenerator<Uint8Array> {
  const written = new SheetText();
  written.add(
    HEADER_ROW,
    columns.map(({ element, text }) => (text === null ? '' : quotedCell(element.name))),
  );
  const whole = groups.reduce((sum, { num_rows: rows }) => sum + Number(rows), 0) || 1;
  let textBytes = 0;
  const goOn = () => {
    if (options.watch?.stopped()) throw new Stopped('the reading was stopped');
    options.watch?.report(SPOOL_SHARE + (1 - SPOOL_SHARE) * Math.min(1, written.row / whole));
  };
  for (const group of groups) {
    goOn();
    for await (const _ of groupRows(file, { group, columns, written })) {
      goOn();
      const chunk = written.take();
      textBytes += chunk.length;
      refuseText(textBytes, written.row);
      yield chunk;
    }
  }
  goOn();
  yield written.take();
}

/** Writes the rows of a row group; stops whenever there is enough text for a chunk. */
async function* groupRows(
  file: SpooledFile,
  {
    group,
    columns,
    written,
  }: { group: Footer['groups'][number]; columns: readonly WrittenColumn[]; written: SheetText },
): AsyncGenerator<void> {
  let left = Number(group.num_rows);
  const rows = left;
  const pages = columns.map(({ text, ...column }) =>
    text === null ? null : new ColumnPages(file, chunkOf(group, column, text), rows),
  );
  while (left > 0) {
    let ready = left;
    for (const [index, page] of pages.entries()) {
      if (page === null) continue;
      await inColumn(columns, { index, row: written.row + 1 }, () => page.open());
      ready = Math.min(ready, page.ready);
    }
    for (let i = 0; i < ready; i++) {
      const line = pages.map((page) => page?.take());
      written.add(written.row + 1, line);
      if (written.full) yield;
    }
    left -= ready;
  }
  for (const [index, page] of pages.entries()) {
    if (page !== null) await inColumn(columns, { index, row: written.row + 1 }, () => page.end());
  }
}

function chunkOf(group: Footer['groups'][number], { element, leaf }: NamedColumn, text: ValueText): ColumnChunk {
  return {
    ...rangeOf(group, leaf),
    physical: { type: element.type ?? '', length: element.type_length ?? 0 },
    optional: element.repetition_type !== 'REQUIRED',
    codec: group.columns[leaf]!.meta_data!.codec,
    text,
  };
}

/** Names column and row of a page that is not what it says. */
async function inColumn(
  columns: readonly WrittenColumn[],
  { index, row }: { index: number; row: number },
  work: () => Promise<void>,
): Promise<void> {
  try {
    await work();
  } catch (error) {
    if (!(error instanceof PageError)) throw error;
    const expected = `whole pages of the column ${JSON.stringify(columns[index]!.element.name.slice(0, 60))}`;
    throw new InputProblem([{ code: 'unreadable', row, column: index + 1, expected, found: error.message }]);
  }
}

function refuseText(textBytes: number, row: number): void {
  if (textBytes <= MOST_TEXT_BYTES) return;
  const expected = `at most ${MOST_TEXT_BYTES} bytes of values`;
  throw new InputProblem([{ code: 'too-large', row, expected, found: 'more' }]);
}
