import { Question, type QuestionReading } from '#libs/contract/question.js';
import { InputProblem, type Problem, type Remark } from '#libs/engine/index.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { closeReading } from '../record/close-reading.js';
import { strangeFile } from '../unknown-format.js';
import { type CsvLayout, findLayout, untoldColumns } from './csv-layout.js';
import type { CsvFile } from './csv-meaning.js';
import { DayRows } from './day-rows.js';
import { takeFillers } from './filler-numbers.js';
import { LongRows } from './long-rows.js';
import { type MeterReader, MeterRows, MOST_SHOWN } from './meter-rows.js';
import { QuickRows } from './quick-rows.js';
import { LONGEST_ROW_BYTES, RowBuffer } from './row-buffer.js';
import { RowCells } from './row-cells.js';
import type { RowReader } from './row-reader.js';
import { firstReading, settleMeaning } from './settle-meaning.js';
import { ReadingRoom } from './shown-reading.js';

/** A header is looked for in so much of the file at once; what lies before it is dropped [bytes]. */
const VIEW_BYTES = 262_144;

/** Which lane the rows go through: the quick one as far as it goes, or the general one alone. */
export type Lane = 'quick' | 'general';

/** How a file is read; the record does not depend on it. */
export interface Ways {
  /** the general lane alone gives the same record, slower */
  lane: Lane;
  /** rows that are kept while it is open which of several meters is meant */
  mostShown: number;
}

const USUAL_WAYS: Ways = { lane: 'quick', mostShown: MOST_SHOWN };

/**
 * Reads delimited text.
 * @param source the file
 * @param options what is said about it
 * @param ways how it is read
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, Question where it can be read in several ways
 */
export async function readCsv(
  source: MeterBytes,
  options: ReadOptions,
  ways: Partial<Ways> = {},
): Promise<MeterReading> {
  const map = options.map ?? {};
  const buffer = new RowBuffer(source);
  const layout = await layoutOf(buffer, options, source.head);
  const file = { layout, map, options };
  const read =
    layout.days === null ? await meterRead(buffer, file, { ...USUAL_WAYS, ...ways }) : await daysRead(buffer, file);
  const result = settleMeaning(read.file);
  const notes = [...fileNotes(source, read.file), ...read.notes];
  return closeReading({ ...result, notes: [...notes, ...result.notes] }, map);
}

type UnreadFile = Omit<CsvFile, 'reader' | 'fillers'>;

interface Read {
  file: CsvFile;
  notes: Remark[];
}

/** Rows of intervals, of one meter or of several. */
async function meterRead(buffer: RowBuffer, file: UnreadFile, { lane, mostShown }: Ways): Promise<Read> {
  const { layout, map } = file;
  const rows = new MeterRows(layout, map, mostShown);
  await readRows(buffer, layout, rows, {
    quickReader: lane === 'general' || rows.first instanceof LongRows ? null : rows.first,
    sizeBytes: file.options.sizeBytes ?? 0,
  });
  const { readers, meters, shownTo } = rows.close();
  const [reader] = readers.values();
  if (reader === undefined || reader.rows.count === 0) refuseEmpty();
  if (readers.size > 1) askWhichMeter(file, readers, { meters, shownTo });
  const notes = map.meter === undefined ? [] : [note('meter-chosen', { meter: map.meter, others: meters - 1 })];
  return { file: fileOf(file, reader), notes };
}

/** A file with the rows of one meter, whose layout may be known only now. */
function fileOf(file: UnreadFile, reader: MeterReader): CsvFile {
  const layout = reader instanceof LongRows ? reader.layoutOf(file.map) : file.layout;
  return { ...file, layout, reader, fillers: takeFillers(reader, layout, file.map) };
}

/** A row a day; the rows themselves say what they hold. */
async function daysRead(buffer: RowBuffer, { layout, map, options }: UnreadFile): Promise<Read> {
  const days = layout.days!;
  const reader = new DayRows(layout, days, map);
  await readRows(buffer, layout, reader, { quickReader: null, sizeBytes: 0 });
  const notes = [
    note('days-in-columns', { columns: days.slots.length }),
    ...(days.mark === null ? [note('stamps-assumed-beginnings', {})] : []),
  ];
  const settled = reader.layoutOf(map);
  if (reader.rows.count === 0) refuseEmpty();
  const fillers = takeFillers(reader, settled, map);
  return { file: { layout: settled, reader, map, options, fillers }, notes };
}

function refuseEmpty(): never {
  throw new InputProblem([{ code: 'empty-file', expected: 'rows of data under the header', found: 'none' }]);
}

/** A reading for each meter; a meter that can't be read as the file stands has none. */
function askWhichMeter(
  file: UnreadFile,
  readers: Map<string, MeterReader>,
  { meters, shownTo }: { meters: number; shownTo: number },
): never {
  const readings: QuestionReading[] = [];
  const room = new ReadingRoom();
  let failed: InputProblem | undefined;
  for (const [meter, reader] of readers) {
    const first = firstOf(file, reader, room);
    if (first instanceof InputProblem) failed ??= first;
    else readings.push(first.reading({ meter }));
  }
  if (readings.length === 0) throw failed!;
  const part = shownTo === 0 ? '' : `; what it would give is worked out from the rows up to ${shownTo}`;
  throw new Question([{ id: 'meter', about: `which of the ${meters} meters in the file is read${part}`, readings }]);
}

function firstOf(file: UnreadFile, reader: MeterReader, room: ReadingRoom) {
  try {
    return firstReading(fileOf(file, reader), room);
  } catch (problem) {
    if (problem instanceof InputProblem) return problem;
    throw problem;
  }
}

async function layoutOf(buffer: RowBuffer, { map = {} }: ReadOptions, head: Uint8Array): Promise<CsvLayout> {
  let untold: Problem | null = null;
  for (;;) {
    while (isShort(buffer) && (await buffer.more())) buffer.refuseEndlessRow();
    const found = findLayout(buffer, map);
    if (found !== null) {
      buffer.start = found.from.start;
      buffer.rowsBefore = found.from.rowsBefore;
      return found.layout;
    }
    untold ??= untoldColumns(buffer);
    if (buffer.ended) break;
    dropRows(buffer);
    await moreRows(buffer);
  }
  if (untold !== null) throw new InputProblem([untold]);
  const expected = 'a meter file: delimited text under a header row, or NEM12';
  throw new InputProblem([strangeFile(head, { expected, found: 'a file without a row of column names' })]);
}

/** Reads on until a further row is whole: in a row that only grows there is nothing new to look for. */
async function moreRows(buffer: RowBuffer): Promise<void> {
  const before = buffer.end - buffer.start;
  do {
    if (!(await buffer.more())) return;
    buffer.refuseEndlessTail();
  } while (buffer.bytes.lastIndexOf(buffer.rowEnd, buffer.end - 1) < buffer.start + before);
}

/** Too little to look for a header in, or not one whole row. */
function isShort({ bytes, start, end, rowEnd }: RowBuffer): boolean {
  return end - start < VIEW_BYTES || bytes.lastIndexOf(rowEnd, end - 1) < start;
}

/** Drops what has been looked at, but for the last rows: the header may be among them and its data behind them. */
function dropRows(buffer: RowBuffer): void {
  const { bytes, rowEnd, end } = buffer;
  let keep = end;
  for (let rows = 0; rows < 4 && keep > buffer.start; rows++) keep = bytes.lastIndexOf(rowEnd, keep - 1);
  if (keep <= buffer.start) return;
  for (let at = buffer.start; at <= keep; at++) if (bytes[at] === rowEnd) buffer.rowsBefore++;
  buffer.start = keep + 1;
}

interface RowTaker {
  take(cells: RowCells, rowNumber: number): void;
}

/** Reads every row; those of the usual shape by the quick lane where there is a reader for it. */
async function readRows(
  buffer: RowBuffer,
  layout: CsvLayout,
  taker: RowTaker,
  { quickReader, sizeBytes }: { quickReader: RowReader | null; sizeBytes: number },
): Promise<void> {
  const plan = quickReader?.quickPlan() ?? null;
  const quick = plan === null || quickReader === null ? null : new QuickRows(quickReader.rows, plan);
  const lanes = { taker, quickReader, quick, cells: new RowCells() };
  // what lies before the header holds no rows
  const beforeBytes = buffer.takenBytes;
  do {
    takeRows(buffer, layout, lanes);
    const rows = quickReader?.rows;
    if (rows !== undefined)
      rows.likelyRows = likelyRows(rows.count, buffer.takenBytes - beforeBytes, sizeBytes - beforeBytes);
    if (buffer.end - buffer.start > LONGEST_ROW_BYTES) buffer.refuseEndlessRow();
  } while (await buffer.more());
  if (buffer.end > buffer.start) refuseOpenQuote(buffer.rowsBefore + 1);
}

/** Rows of the whole file if it goes on as it began, with a little to spare. */
function likelyRows(rows: number, takenBytes: number, sizeBytes: number): number {
  return takenBytes > 0 && sizeBytes > 0 ? Math.ceil((rows / takenBytes) * sizeBytes * 1.03) : 0;
}

interface Lanes {
  taker: RowTaker;
  quickReader: RowReader | null;
  quick: QuickRows | null;
  cells: RowCells;
}

/** Takes every whole row of the buffer: as far as it goes by the quick lane, the row that stops it by the general one. */
function takeRows(buffer: RowBuffer, layout: CsvLayout, { taker, quickReader, quick, cells }: Lanes): void {
  const marks = { delimiter: layout.delimiter, rowEnd: buffer.rowEnd };
  for (;;) {
    quick?.takeFrom(buffer, quickReader!.mark.sign);
    const next = cells.split(buffer.bytes, buffer.start, buffer.end, marks);
    if (next < 0) return;
    buffer.start = next;
    buffer.rowsBefore++;
    if (buffer.rowsBefore <= layout.lastHeaderRow) continue;
    const before = quickReader?.rows.count ?? 0;
    taker.take(cells, buffer.rowsBefore);
    if (quick !== null && quickReader!.rows.count > before) quick.learn(cells);
  }
}

function refuseOpenQuote(row: number): never {
  const expected = 'a closing quotation mark';
  throw new InputProblem([{ code: 'unreadable', row, expected, found: 'the end of the file' }]);
}

function fileNotes(source: MeterBytes, { layout, reader }: CsvFile): Remark[] {
  const { headers, totals, texts } = reader;
  const encoding = source.encoding === 'utf-8' && !isUtf8(source.head) ? 'windows-1252' : source.encoding;
  return [
    ...(encoding === 'utf-8' ? [] : [note('encoding-converted', { encoding })]),
    ...(layout.headerRow > 1 ? [note('rows-before-header', { rows: layout.headerRow - 1 })] : []),
    ...(headers.count > 0 ? [note('header-repeated', { rows: headers.count })] : []),
    ...(layout.side.unread.length > 0
      ? [note('quality-not-read', { columns: layout.side.unread.map((column) => layout.names[column]).join(', ') })]
      : []),
    ...(layout.time.serial ? [note('serial-dates', {})] : []),
    ...(reader.counted === null
      ? []
      : [note('intervals-counted', { column: layout.names[layout.time.clock] ?? '', perDay: reader.counted.perDay })]),
    ...(totals.count > 0 ? [note('total-rows-left-out', { rows: totals.count })] : []),
    ...(texts.count > 0 ? [note('text-rows-left-out', { rows: texts.count, first: texts.first })] : []),
  ];
}

/** Eight-bit codes are told by bytes that are no UTF-8; the head may end within a letter. */
function isUtf8(head: Uint8Array): boolean {
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(head, { stream: true });
    return true;
  } catch {
    return false;
  }
}
