import type { MeterMap } from '#libs/contract/meter-map.js';
import type { Remark } from '#libs/engine/index.js';
import { note } from '../note.js';
import { RowSet } from '../row-set.js';
import { isRecordForm } from '../write-record-csv.js';
import type { CsvLayout } from './csv-layout.js';
import type { CsvFile, CsvMeaning, FillerNumbers, ReadRows } from './csv-meaning.js';

/** Numbers that programs write where they have none: nines, and the ends of whole numbers of 16 and 32 bits. */
const FILLERS = new Set([
  999, 9999, 99_999, 999_999, 9_999_999, 99_999_999, 999_999_999, 9_999_999_999, 999.9, 999.99, 9999.9, 9999.99,
  99_999.9, 99_999.99, 32_767, 32_768, 65_535, 2_147_483_647, 2_147_483_648, 4_294_967_295,
]);
const LEAST = 999;
/** A number more than so many times as large as any other of its column does not belong to it. */
const FAR_TIMES = 3;
/** As near to the one before or behind it, a number goes on as its column does. */
const NEAR_RATIO = 0.2;

/**
 * Takes out numbers that stand for a missing value: below zero where nothing else of the column is, and beyond three times
 * anything else. Another that has no neighbour like it stays and has to be asked about, but for a run of them that lies
 * between two like it, one on either side. A record in the program's own form
 * leaves out what is missing, and has none.
 * @param reader rows as read; what is taken out becomes NaN
 * @param layout its columns
 * @param map what a person says
 */
export function takeFillers(reader: ReadRows, layout: CsvLayout, { fillers }: MeterMap): FillerNumbers {
  const found: FillerNumbers = { taken: 0, value: 0, columns: [], open: null };
  const used = new Set(layout.choices.flatMap(({ columns }) => columns.map(({ column }) => column)));
  if (fillers === 'values' || isRecordForm(layout.names)) return found;
  for (const [k, column] of reader.columns.entries()) {
    const values = reader.rows.values[k]!.subarray(0, reader.rows.count);
    if (!used.has(column) || !holdsFiller(values)) continue;
    const before = found.taken;
    const open = takeFrom(values, found, fillers === 'missing');
    if (open.size > 0) found.open = (found.open ?? new Map<number, RowSet>()).set(k, open);
    if (found.taken > before) found.columns.push(column);
  }
  return found;
}

/**
 * What is worth saying of them: those that were taken out, and those that may be values as well but leave no record if
 * they are, so that nobody is asked.
 * @param file its rows and what was taken out
 * @param meaning what the file is read under
 */
export function fillerNotes({ layout: { names }, fillers, reader }: CsvFile, meaning: CsvMeaning): Remark[] {
  const wanted = new Set(meaning.choice.columns.map(({ column }) => column));
  const open = [...(meaning.fillers === 'missing' ? (fillers.open ?? []) : [])]
    .map(([k, rows]) => ({ k, rows, column: reader.columns[k]! }))
    .filter(({ column }) => wanted.has(column));
  const values = open.reduce((sum, { rows }) => sum + rows.size, fillers.taken);
  if (values === 0) return [];
  const [first] = open;
  const value = fillers.taken > 0 ? fillers.value : reader.rows.values[first!.k]![[...first!.rows][0]!]!;
  const columns = [...new Set([...fillers.columns, ...open.map(({ column }) => column)])];
  const listed = columns.map((column) => names[column] || `column ${column + 1}`).join(', ');
  return [note('fillers-left-out', { values, value, columns: listed })];
}

/** Every file passes it: four small numbers at a time are passed over, which takes half as long as one by one. */
function holdsFiller(values: Float64Array): boolean {
  const n = values.length;
  for (let row = 0; row < n; row++) {
    while (row + 3 < n && isSmall(values[row]!, values[row + 1]!) && isSmall(values[row + 2]!, values[row + 3]!))
      row += 4;
    if (row < n && isFiller(values[row]!)) return true;
  }
  return false;
}

function isSmall(a: number, b: number): boolean {
  return a < LEAST && a > -LEAST && b < LEAST && b > -LEAST;
}

function isFiller(value: number): boolean {
  return (value >= LEAST || value <= -LEAST) && FILLERS.has(Math.abs(value));
}

function takeFrom(values: Float64Array, found: FillerNumbers, all: boolean): RowSet {
  const open = new RowSet();
  const range = rangeOf(values);
  let run: Run = { from: 0, end: 0, before: Number.NaN, after: Number.NaN };
  for (let row = 0; row < values.length; row++) {
    const value = values[row]!;
    if (!isFiller(value)) continue;
    if (row >= run.end) run = runFrom(values, row);
    if (all || isOutside(value, range)) {
      if (found.taken++ === 0) found.value = value;
      values[row] = Number.NaN;
    } else if (!goesOn(value, row, run)) open.add(row);
  }
  return open;
}

/** Such numbers on end. */
interface Run {
  from: number;
  /** row behind the last */
  end: number;
  /** the numbers on either side; NaN where there is none */
  before: number;
  after: number;
}

function runFrom(values: Float64Array, from: number): Run {
  let end = from + 1;
  while (end < values.length && isFiller(values[end]!)) end++;
  return { from, end, before: values[from - 1] ?? Number.NaN, after: values[end] ?? Number.NaN };
}

/** Below zero where no other number is, and far from all others. */
function isOutside(value: number, { least, most }: { least: number; most: number }): boolean {
  return value < 0 && !(least < 0) && Math.abs(value) > FAR_TIMES * Math.max(most, -least);
}

/** Least and greatest of the other numbers; both 0 where there are none but zeros. */
function rangeOf(values: Float64Array): { least: number; most: number } {
  let [least, most] = [0, 0];
  for (const value of values) {
    if (isFiller(value)) continue;
    if (value < least) least = value;
    if (value > most) most = value;
  }
  return { least, most };
}

/**
 * Whether the column goes on with a number: a neighbour that is no such number itself is about as large, or the column
 * passes through it, however long it stands still there, as a register does.
 */
function goesOn(value: number, row: number, { from, end, before, after }: Run): boolean {
  const [behind, ahead] = [isNear(value, before), isNear(value, after)];
  if ((behind && row === from) || (ahead && row === end - 1)) return true;
  return behind && ahead && before <= value === value <= after;
}

function isNear(value: number, beside: number): boolean {
  return Math.abs(beside - value) <= NEAR_RATIO * Math.abs(value);
}
