import { InputProblem, type Remark } from '#libs/engine/index.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { closeReading } from '../record/close-reading.js';
import { QUANTITIES } from '../record/build-columns.js';
import { type CsvLayout, findLayout, looksTabular } from './csv-layout.js';
import { LONGEST_ROW_BYTES, RowBuffer } from './row-buffer.js';
import { RowCells } from './row-cells.js';
import { RowReader } from './row-reader.js';
import { settleMeaning } from './settle-meaning.js';

/** A header is looked for in so much of the file at once; what lies before it is dropped [bytes]. */
const VIEW_BYTES = 262_144;

/**
 * Reads delimited text.
 * @param source the file
 * @param options what is said about it
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, Question where it can be read in several ways
 */
export async function readCsv(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  const map = options.map ?? {};
  const buffer = new RowBuffer(source);
  const layout = await layoutOf(buffer, options);
  const reader = new RowReader(layout, map);
  await readRows(buffer, layout, reader);
  reader.problems.refuse();
  if (reader.rows.count === 0) {
    throw new InputProblem([{ code: 'empty-file', expected: 'rows of data under the header', found: 'none' }]);
  }
  const result = settleMeaning({ layout, reader, map, options });
  return closeReading({ ...result, notes: [...fileNotes(source, layout, reader), ...result.notes] }, map);
}

async function layoutOf(buffer: RowBuffer, { map = {} }: ReadOptions): Promise<CsvLayout> {
  let tabular = false;
  for (;;) {
    while (buffer.end - buffer.start < VIEW_BYTES && (await buffer.more()));
    const layout = findLayout(buffer, map);
    if (layout !== null) return layout;
    tabular ||= looksTabular(buffer);
    if (buffer.ended) break;
    dropRows(buffer);
  }
  if (tabular) {
    const expected = 'a header row that names the columns, or a map that numbers them';
    throw new InputProblem([{ code: 'no-active-column', row: 1, expected, found: 'rows of data without names' }]);
  }
  const expected = 'a meter file: delimited text under a header row, or NEM12';
  throw new InputProblem([{ code: 'unknown-format', expected, found: 'a file without a row of column names' }]);
}

/** Drops what has been looked at, but for the last rows: the header may be among them and its data behind them. */
function dropRows(buffer: RowBuffer): void {
  const { bytes, rowEnd, end } = buffer;
  let keep = end;
  for (let rows = 0; rows < 4 && keep > buffer.start; rows++) keep = bytes.lastIndexOf(rowEnd, keep - 1);
  if (keep <= buffer.start) {
    buffer.refuseEndlessRow();
    return;
  }
  for (let at = buffer.start; at <= keep; at++) if (bytes[at] === rowEnd) buffer.rowsBefore++;
  buffer.start = keep + 1;
}

async function readRows(buffer: RowBuffer, layout: CsvLayout, reader: RowReader): Promise<void> {
  const cells = new RowCells();
  const marks = { delimiter: layout.delimiter, rowEnd: buffer.rowEnd };
  do {
    for (;;) {
      const next = cells.split(buffer.bytes, buffer.start, buffer.end, marks);
      if (next < 0) break;
      buffer.start = next;
      buffer.rowsBefore++;
      if (buffer.rowsBefore > layout.lastHeaderRow) reader.take(cells, buffer.rowsBefore);
    }
    if (buffer.end - buffer.start > LONGEST_ROW_BYTES) buffer.refuseEndlessRow();
  } while (await buffer.more());
  if (buffer.end > buffer.start) refuseOpenQuote(buffer.rowsBefore + 1);
}

function refuseOpenQuote(row: number): never {
  const expected = 'a closing quotation mark';
  throw new InputProblem([{ code: 'unreadable', row, expected, found: 'the end of the file' }]);
}

function fileNotes(source: MeterBytes, layout: CsvLayout, { headers, totals }: RowReader): Remark[] {
  const [choice] = layout.choices;
  const columns = choice!.columns.toSorted((a, b) => QUANTITIES.indexOf(a.quantity) - QUANTITIES.indexOf(b.quantity));
  const named = columns.map(({ quantity, column }) => `${quantity} ${layout.names[column] || column + 1}`);
  return [
    ...(layout.choices.length === 1 ? [note('file-read-as', { format: 'csv', columns: named.join('; ') })] : []),
    ...(source.encoding === 'utf-8' ? [] : [note('encoding-converted', { encoding: source.encoding })]),
    ...(layout.headerRow > 1 ? [note('rows-before-header', { rows: layout.headerRow - 1 })] : []),
    ...(headers.count > 0 ? [note('header-repeated', { rows: headers.count })] : []),
    ...(totals.count > 0 ? [note('total-rows-left-out', { rows: totals.count })] : []),
  ];
}
