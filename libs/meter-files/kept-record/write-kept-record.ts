import { csvLine } from '#libs/contract/csv-text.js';
import { InputProblem, type LoadRecord } from '#libs/engine/index.js';
import { writeWorkbook } from '../xlsx/write-workbook.js';
import { KEPT_HEAD, keptRows, presentColumns } from './kept-record.js';

/** Forms in which a record is kept. */
export const KEPT_FORMS = ['json', 'csv', 'xlsx'] as const;
export type KeptForm = (typeof KEPT_FORMS)[number];

/** Rows of text are gathered into pieces of about this many characters. */
const PIECE = 65_536;
/** A sheet holds 1 048 576 rows; some stand before the intervals. */
const MOST_SHEET_ROWS = 1_000_000;

/**
 * A record to be kept outside and taken back without losing a bit: its columns, repairs, repeats and notes.
 * @param record the record
 * @param form JSON, comma-separated text or a workbook of one sheet
 * @returns the file in pieces
 * @throws InputProblem where a sheet can't hold so many rows
 */
export function* keptRecordChunks(record: LoadRecord, form: KeptForm): Generator<Uint8Array> {
  if (form === 'xlsx' && record.beginS.length > MOST_SHEET_ROWS) {
    const found = `${record.beginS.length}`;
    throw new InputProblem([
      { code: 'too-large', expected: `at most ${MOST_SHEET_ROWS} intervals in a workbook`, found },
    ]);
  }
  if (form === 'xlsx') yield writeWorkbook([{ name: 'record', rows: keptRows(record) }]);
  else yield* pieces(form === 'csv' ? csvLines(record) : jsonParts(record));
}

/**
 * The same as one file.
 * @param record the record
 * @param form of the file
 * @throws InputProblem where a sheet can't hold so many rows
 */
export function keptBytes(record: LoadRecord, form: KeptForm): Buffer {
  return Buffer.concat([...keptRecordChunks(record, form)]);
}

function* csvLines(record: LoadRecord): Generator<string> {
  for (const row of keptRows(record)) yield csvLine(row);
}

function* jsonParts(record: LoadRecord): Generator<string> {
  const { intervalS, repaired, duplicates, notes } = record;
  const head = JSON.stringify({ [KEPT_HEAD[0]]: KEPT_HEAD[1], intervalS, repaired, duplicates, notes });
  yield `${head.slice(0, -1)},"columns":{`;
  for (const [at, name] of presentColumns(record).entries()) {
    yield `${at === 0 ? '' : ','}${JSON.stringify(name)}:[`;
    const column = record[name]!;
    for (let i = 0; i < column.length; i++) yield i === 0 ? String(column[i]) : `,${column[i]}`;
    yield ']';
  }
  yield '}}\n';
}

function* pieces(texts: Iterable<string>): Generator<Uint8Array> {
  const encoder = new TextEncoder();
  let text = '';
  for (const one of texts) {
    text += one;
    if (text.length < PIECE) continue;
    yield encoder.encode(text);
    text = '';
  }
  yield encoder.encode(text);
}
