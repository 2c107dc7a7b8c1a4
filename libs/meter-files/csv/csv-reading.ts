import type { MeterMap } from '#libs/contract/meter-map.js';
import { zoneTable } from '#libs/contract/time-zone.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import type { ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { type BuiltColumns, buildColumns, QUANTITIES, type QuantitySource } from '../record/build-columns.js';
import type { ReadResult } from '../record/close-reading.js';
import { gridRows, type IntervalGrid } from '../record/interval-grid.js';
import { type Moments, momentsOf, type StampRules, showsEnds, skippedRows } from '../time/moments.js';
import type { DateOrder } from '../time/stamp-text.js';
import type { ColumnChoice } from './column-choice.js';
import type { CsvLayout } from './csv-layout.js';
import { type DecimalSign, KEPT_COLUMNS, thousands } from './decimal-mark.js';
import type { RowReader } from './row-reader.js';

/** One way of reading whatever the file leaves open. */
export interface CsvMeaning {
  choice: ColumnChoice;
  decimal: DecimalSign | null;
  order: DateOrder;
  keep: 'first' | 'last' | undefined;
}

/** A file whose rows have been read, before their meaning is settled. */
export interface CsvFile {
  layout: CsvLayout;
  reader: RowReader;
  map: MeterMap;
  options: ReadOptions;
}

/**
 * Makes a record of the rows under one meaning.
 * @param file what was read
 * @param meaning what its open points are taken to mean
 * @param only whether the rows are read under no other, so that their columns may become the record's
 * @returns columns and notes
 * @throws InputProblem where the file can't have this meaning
 */
export function readUnder(file: CsvFile, meaning: CsvMeaning, only = false): ReadResult {
  const { reader, map } = file;
  const sources = sourcesOf(file, meaning, only);
  const rules = stampRules(file, meaning.order);
  const { moments, grid, ends, because, skipped } = placedRows(file, rules, { sources, keep: meaning.keep });
  const shiftS = ends ? grid.intervalS : 0;
  const ordered = {
    intervalS: grid.intervalS,
    kept: grid.kept,
    utcS: moments.utcS,
    shiftS,
    rowNumber: reader.rows.rowNumber,
  };
  refuseRegisters(sources, grid.kept);
  const built = buildColumns(ordered, sources, map.sign === 'leadingPositive');
  const notes = [
    ...moments.notes,
    ...(ends && because !== null ? [note('stamps-mark-ends', { because })] : []),
    ...(!ends && rules.mark === null && Number.isNaN(reader.rows.spanS) ? [note('stamps-assumed-beginnings', {})] : []),
    ...rowNotes(grid, built, { skipped, own: reader.rows.offsetS !== null, keep: meaning.keep }),
    ...quantityNotes(file, meaning.choice, built),
  ];
  const left = skipped + built.withoutValue + grid.overruled + reader.headers.count + reader.totals.count;
  const counts = { format: 'csv', rowsRead: reader.rows.count, rejectedRows: left };
  return { columns: built.columns, duplicates: grid.duplicates, notes, counts, zone: siteZone(file, moments, grid) };
}

function stampRules({ layout, map, options, reader }: CsvFile, order: DateOrder): StampRules {
  const said = options.timeZone ?? map.timeZone ?? null;
  const zoneFromHeader = said === null && layout.time.zone !== null;
  const zone = said ?? layout.time.zone ?? options.siteTimeZone ?? null;
  const ranged = !Number.isNaN(reader.rows.spanS) && map.stamp === undefined;
  return { order, mark: ranged ? 'begin' : layout.time.mark, zone, zoneFromHeader };
}

interface Placed {
  moments: Moments;
  grid: IntervalGrid;
  ends: boolean;
  /** what shows that stamps mark ends, where no word says it */
  because: string | null;
  /** rows of an hour that the clock skipped */
  skipped: number;
}

function placedRows(
  { reader }: CsvFile,
  rules: StampRules,
  { sources, keep }: { sources: QuantitySource[]; keep: 'first' | 'last' | undefined },
): Placed {
  const { rows } = reader;
  const values = sources.map((source) => source.values);
  const placed = (ends: boolean) => {
    const moments = momentsOf(rows, rules, ends);
    const skipped = skippedRows(rows, moments, (row) => values.some((column) => !Number.isNaN(column[row]!)));
    const moment = { utcS: moments.utcS, rowNumber: rows.rowNumber, values, spanS: rows.spanS };
    return { moments, skipped, grid: gridRows(moment, keep) };
  };
  const first = placed(rules.mark === 'end');
  if (rules.mark !== null) return { ...first, ends: rules.mark === 'end', because: null };
  const { kept, intervalS } = first.grid;
  const bounds = { first: kept[0]!, last: kept[kept.length - 1]!, intervalS };
  const because = showsEnds(rows, first.moments, bounds);
  if (because === null) return { ...first, ends: false, because };
  return { ...placed(true), ends: true, because };
}

function sourcesOf({ reader }: CsvFile, { choice, decimal }: CsvMeaning, only: boolean): QuantitySource[] {
  const values = valuesUnder(reader, decimal);
  const spare = only && new Set(choice.columns.map(({ column }) => column)).size === choice.columns.length;
  return choice.columns.map(({ quantity, column, unit }) => ({
    quantity,
    values: values[reader.columns.indexOf(column)]!,
    energy: unit.energy,
    times: unit.times,
    over: unit.over,
    column: column + 1,
    spare,
  }));
}

/** The columns, numbers whose only mark divides thousands put right. */
function valuesUnder({ rows, mark }: RowReader, decimal: DecimalSign | null): Float64Array[] {
  const divided = decimal === ',' ? mark.openDots : decimal === '.' ? mark.openCommas : [];
  const values = rows.values.map((column) => column.subarray(0, rows.count));
  const own = new Set<number>();
  for (const kept of divided) {
    const k = kept % KEPT_COLUMNS;
    if (!own.has(k)) values[k] = values[k]!.slice();
    own.add(k);
    const index = (kept - k) / KEPT_COLUMNS;
    values[k]![index] = thousands(values[k]![index]!);
  }
  return values;
}

/** Rows from which on a column that never falls is taken for a register's reading. */
const REGISTER_ROWS = 200;

/** Energies of intervals rise and fall; a column that only rises, in small steps, is the reading of a register. */
function refuseRegisters(sources: readonly QuantitySource[], kept: Int32Array): void {
  for (const { values, energy, column } of sources) {
    if (!energy || !isRegister(values, kept)) continue;
    const expected = 'the energy of each interval';
    throw new InputProblem([
      { code: 'not-supported-yet', column, expected, found: 'the rising reading of a register' },
    ]);
  }
}

function isRegister(values: Float64Array, kept: Int32Array): boolean {
  let first = Number.NaN;
  let last = Number.NaN;
  let count = 0;
  for (let i = 0; i < kept.length; i++) {
    const value = values[kept[i]!]!;
    if (Number.isNaN(value)) continue;
    if (value < last) return false;
    if (count === 0) first = value;
    last = value;
    count++;
  }
  return count >= REGISTER_ROWS && last > first && first * (count - 1) >= 10 * (last - first);
}

function rowNotes(
  grid: IntervalGrid,
  built: BuiltColumns,
  { skipped, own, keep }: { skipped: number; own: boolean; keep: 'first' | 'last' | undefined },
): Remark[] {
  const notes: Remark[] = [];
  // stamps that carry their offset may stand in any order
  if (grid.misplaced > 0 && !own) notes.push(note('rows-put-in-order', { rows: grid.misplaced }));
  if (grid.duplicates > 0) notes.push(note('duplicates-dropped', { rows: grid.duplicates }));
  if (grid.overruled > 0) notes.push(note('conflicting-rows-settled', { rows: grid.overruled, kept: keep ?? '' }));
  if (skipped > 0) notes.push(note('skipped-hour-left-out', { rows: skipped }));
  if (built.withoutValue > 0) notes.push(note('intervals-without-value', { intervals: built.withoutValue }));
  return notes;
}

function quantityNotes({ layout, map }: CsvFile, choice: ColumnChoice, built: BuiltColumns): Remark[] {
  const leadingPositive = map.sign === 'leadingPositive';
  const named = (column: number) => layout.names[column] || `column ${column + 1}`;
  const inOrder = choice.columns.toSorted((a, b) => QUANTITIES.indexOf(a.quantity) - QUANTITIES.indexOf(b.quantity));
  const read = inOrder.map(({ quantity, column }) => `${quantity} ${named(column)}`);
  const notes: Remark[] = [note('file-read-as', { format: 'csv', columns: read.join('; ') })];
  const listed = (columns: number[]) => columns.map(named).join(', ');
  const mega = choice.columns.filter(({ unit }) => unit.smallMega).map(({ column }) => column);
  if (mega.length > 0) notes.push(note('unit-read-as-mega', { columns: listed(mega) }));
  const reactive = choice.columns.filter(({ quantity }) => ['reactive', 'lagging', 'leading'].includes(quantity));
  const watts = reactive.filter(({ unit }) => unit.family !== 'reactive').map(({ column }) => column);
  if (watts.length > 0) notes.push(note('reactive-in-kilowatt', { columns: listed(watts) }));
  const has = (quantity: string) => choice.columns.find((column) => column.quantity === quantity);
  if (has('reactive') !== undefined) {
    notes.push(
      built.negativeReactive > 0
        ? note('reactive-sign-taken', {
            lagging: leadingPositive ? 'negative' : 'positive',
            negative: built.negativeReactive,
          })
        : note('reactive-never-leading', {}),
    );
  } else if (has('leading') === undefined) notes.push(note('leading-not-recorded', {}));
  const exported = has('exported');
  if (exported !== undefined) notes.push(note('export-subtracted', { column: named(exported.column) }));
  const voltage = has('voltage');
  if (voltage !== undefined) notes.push(note('voltage-taken-line-to-line', { column: named(voltage.column) }));
  return notes;
}

function siteZone({ options }: CsvFile, moments: Moments, grid: IntervalGrid) {
  const { siteTimeZone } = options;
  if (siteTimeZone === undefined || grid.kept.length === 0) return moments.zone;
  const firstS = moments.utcS[grid.kept[0]!]!;
  const lastS = moments.utcS[grid.kept[grid.kept.length - 1]!]!;
  return zoneTable(siteTimeZone, firstS - 86_400, lastS + 2 * 86_400);
}
