import type { MeterMap } from '#libs/contract/meter-map.js';
import type { QuestionReading } from '#libs/contract/question.js';
import { buildColumns, type RecordColumns } from '../record/build-columns.js';
import type { IntervalGrid } from '../record/interval-grid.js';
import { ColumnsPrint, ReadingShown } from '../record/reading-shown.js';
import { type CountedRows, columnFacts } from './column-facts.js';
import type { CsvFile, CsvMeaning } from './csv-meaning.js';
import { placedRows, stampRules } from './csv-reading.js';
import { csvSources } from './csv-sources.js';
import { meantColumns } from './raw-columns.js';

/** Rows at a time; more than are looked at to tell the last digit of a column. */
const PART_ROWS = 8192;

/** Memory that the readings of a file take their turns in, so that it is taken up once. */
export class ReadingRoom {
  #moments = new Float64Array(0);
  #column = new Float64Array(0);
  readonly #parts: Float64Array[] = [];
  #given = 0;
  /** rows of the file in a part, and where they stand there */
  readonly rows = new Int32Array(PART_ROWS + 1);
  readonly rowNumber = new Int32Array(PART_ROWS + 1);

  /**
   * Moments of the rows.
   * @param rows of the file
   */
  moments(rows: number): Float64Array {
    if (this.#moments.length < rows) this.#moments = new Float64Array(rows);
    return this.#moments;
  }

  /**
   * One column of the file.
   * @param rows of the file
   */
  column(rows: number): Float64Array {
    if (this.#column.length < rows) this.#column = new Float64Array(rows);
    return this.#column;
  }

  /** A column for a part of the rows, all 0, until the next part begins. */
  readonly part = (length: number): Float64Array => {
    this.#parts[this.#given] ??= new Float64Array(PART_ROWS + 1);
    return this.#parts[this.#given++]!.subarray(0, length).fill(0);
  };

  nextPart(): void {
    this.#given = 0;
  }
}

const IN_ORDER = Int32Array.from({ length: PART_ROWS + 1 }, (_, i) => i);

/** What is told of a reading, and a print by which it is known again. */
export interface ShownUnder {
  /** @param map what settles it this way */
  reading: (map: MeterMap) => QuestionReading;
  print: string;
}

/**
 * Reads the rows under one of several meanings for what a question tells of it. The record's columns are made part by part
 * and dropped: together with the file's own they would take up twice its memory.
 * @param file what was read
 * @param meaning what its open points are taken to mean
 * @param room memory to read in
 * @throws InputProblem where the file can't have this meaning; of its problems at least one
 */
export function shownUnder(file: CsvFile, meaning: CsvMeaning, room: ReadingRoom): ShownUnder {
  const shown = new ReadingShown();
  const print = new ColumnsPrint();
  for (const columns of partsUnder(file, meaning, room)) {
    shown.take(columns);
    print.take(columns);
  }
  return { reading: (map) => shown.reading(map), print: print.text() };
}

function* partsUnder(file: CsvFile, meaning: CsvMeaning, room: ReadingRoom): Generator<RecordColumns> {
  const { reader, map } = file;
  const { rows } = reader;
  const { missing } = reader.qualities.byMeaning(meaning.quality);
  const meant = meantColumns(file, meaning, missing);
  const rules = { ...stampRules(file, meaning), room: room.moments(rows.count) };
  const { moments, grid, ends } = placedRows(file, rules, { meant, keep: meaning.keep, only: false });
  const column = meant.every(({ isAsRead }) => isAsRead) ? undefined : room.column(rows.count);
  let facts = columnFacts(meant, meaning, countedRows(grid, rows.rowNumber), column);
  // a register's reading ends one interval and begins the next
  const shared = facts.registers.size > 0 ? 1 : 0;
  const { intervalS } = grid;
  for (const part of partsOf(grid, rows.count, shared, room)) {
    const utcS = gathered(part, room, (row) => moments.utcS[row]!);
    const rowNumber = room.rowNumber.subarray(0, part.length);
    for (let i = 0; i < part.length; i++) rowNumber[i] = rows.rowNumber[part[i]!]!;
    const raw = meant.map((one) => ({ ...one, values: gathered(part, room, one.at) }));
    const kept = IN_ORDER.subarray(0, part.length);
    const placed = { grid: { kept, intervalS }, utcS, rowNumber, ends, only: false, fresh: room.part };
    const found = csvSources(raw, meaning, placed, facts);
    facts = { ...facts, slackKva: found.workedOut?.slackKva ?? null };
    const ordered = { ...placed, intervalS, kept: found.kept, shiftS: ends ? intervalS : 0 };
    yield buildColumns(ordered, found.sources, found.workedOut === null && map.sign === 'leadingPositive').columns;
  }
}

/** Rows that count are listed only where someone looks at them. */
function countedRows(grid: IntervalGrid, rowNumber: Int32Array): CountedRows {
  return {
    get kept() {
      return grid.kept;
    },
    rowNumber,
    intervalS: grid.intervalS,
  };
}

/** Rows of the file in time order, a part at a time; each part begins a new turn of the room. */
function* partsOf(grid: IntervalGrid, rows: number, shared: number, room: ReadingRoom): Generator<Int32Array> {
  const count = grid.isEveryRow ? rows : grid.kept.length;
  for (let from = 0; from < count; from += PART_ROWS) {
    room.nextPart();
    const part = room.rows.subarray(0, Math.min(PART_ROWS + shared, count - from));
    for (let i = 0; i < part.length; i++) part[i] = grid.isEveryRow ? from + i : grid.kept[from + i]!;
    yield part;
  }
}

function gathered(part: Int32Array, room: ReadingRoom, at: (row: number) => number): Float64Array {
  const column = room.part(part.length);
  for (let i = 0; i < part.length; i++) column[i] = at(part[i]!);
  return column;
}
