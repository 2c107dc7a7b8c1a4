import { zoneTable } from '#libs/contract/time-zone.js';
import type { Remark } from '#libs/engine/index.js';
import { note } from '../note.js';
import { type BuiltColumns, buildColumns } from '../record/build-columns.js';
import type { ReadResult } from '../record/close-reading.js';
import { gridRows, type IntervalGrid, isSame } from '../record/interval-grid.js';
import { type Moments, momentsOf, type StampRules, showsEnds, skippedRows } from '../time/moments.js';
import type { CsvFile, CsvMeaning } from './csv-meaning.js';
import { quantityNotes } from './csv-notes.js';
import { columnFacts } from './column-facts.js';
import { csvSources } from './csv-sources.js';
import { type MeantColumn, meantColumns, wholeColumn } from './raw-columns.js';

/**
 * Makes a record of the rows under one meaning. They are read under no other afterwards: their columns may become the
 * record's.
 * @param file what was read
 * @param meaning what its open points are taken to mean
 * @param room takes the moments, one a row
 * @returns columns and notes
 * @throws InputProblem where the file can't have this meaning
 */
export function readUnder(file: CsvFile, meaning: CsvMeaning, room: Float64Array): ReadResult {
  const { reader, map } = file;
  const { missing, estimated, unknown } = reader.qualities.byMeaning(meaning.quality);
  const meant = meantColumns(file, meaning, missing);
  const rules = { ...stampRules(file, meaning), room };
  const placed = { meant, keep: meaning.keep, only: true };
  const { moments, grid, ends, because, skipped } = placedRows(file, rules, placed);
  const { rowNumber } = reader.rows;
  const { kept, intervalS } = grid;
  const zone = siteZone(file, moments, grid);
  const facts = columnFacts(meant, meaning, { kept, rowNumber, intervalS });
  const raw = meant.map((column) => ({ ...column, values: wholeColumn(column) }));
  const found = csvSources(raw, meaning, { grid, utcS: moments.utcS, rowNumber, ends, only: true }, facts);
  const ordered = {
    intervalS: grid.intervalS,
    kept: found.kept,
    isEveryRow: grid.isEveryRow && found.kept === kept,
    utcS: moments.utcS,
    shiftS: ends ? grid.intervalS : 0,
    rowNumber,
    spare: true,
  };
  // the columns of a day are no columns of one quantity
  const sources = file.layout.days === null ? found.sources : found.sources.map((one) => ({ ...one, column: 0 }));
  const built = buildColumns(ordered, sources, found.workedOut === null && map.sign === 'leadingPositive');
  // a register's readings are moments, whichever end of an interval other columns may mean
  const assumed = rules.mark === null && Number.isNaN(reader.rows.spanS) && found.registers.length < meant.length;
  const notes = [
    ...moments.notes,
    ...(ends && because !== null ? [note('stamps-mark-ends', { because })] : []),
    ...(!ends && assumed ? [note('stamps-assumed-beginnings', {})] : []),
    ...rowNotes(grid, built, { skipped, own: reader.rows.offsetS !== null, keep: meaning.keep }),
    ...(missing.size > 0 ? [note('values-flagged-missing', { rows: missing.size })] : []),
    ...(estimated.size > 0 ? [note('values-estimated', { rows: estimated.size })] : []),
    ...(unknown.rows > 0 ? [note('qualities-unknown', { codes: unknown.codes.join(', '), rows: unknown.rows })] : []),
    ...quantityNotes(file, meaning, { found, built }),
  ];
  const left =
    skipped + built.withoutValue + grid.overruled + reader.headers.count + reader.totals.count + reader.texts.count;
  const counts = { format: 'csv', rowsRead: reader.rows.count, rejectedRows: left };
  return { columns: built.columns, duplicates: grid.duplicates, notes, counts, zone };
}

/**
 * What is known of the stamps under one meaning.
 * @param file what was read
 * @param meaning what its open points are taken to mean
 */
export function stampRules({ layout, map, options, reader }: CsvFile, { order, days }: CsvMeaning): StampRules {
  const said = options.timeZone ?? map.timeZone ?? null;
  const zoneFromHeader = said === null && layout.time.zone !== null;
  const zone = said ?? layout.time.zone ?? options.siteTimeZone ?? null;
  const ranged = layout.days !== null || (!Number.isNaN(reader.rows.spanS) && map.stamp === undefined);
  const { counted } = reader;
  const elapsed = (layout.days !== null || counted !== null) && days === 'elapsed';
  return { order, mark: ranged || counted?.first === 1 ? 'begin' : layout.time.mark, zone, zoneFromHeader, elapsed };
}

/** The rows of a file in time. */
export interface Placed {
  moments: Moments;
  grid: IntervalGrid;
  ends: boolean;
  /** what shows that stamps mark ends, where no word says it */
  because: string | null;
  /** rows of an hour that the clock skipped */
  skipped: number;
}

/**
 * Puts rows in time order on one grid.
 * @param file what was read
 * @param rules what is known of its stamps
 * @param meaning its columns, which of two rows of one moment counts, and whether no other meaning is looked at
 * @throws InputProblem where a stamp can't be, or rows are on no grid
 */
export function placedRows(
  { reader }: CsvFile,
  rules: StampRules,
  { meant, keep, only }: { meant: readonly MeantColumn[]; keep: 'first' | 'last' | undefined; only: boolean },
): Placed {
  const { rows } = reader;
  const agree = (a: number, b: number) => meant.every(({ at }) => isSame(at(a), at(b)));
  const placed = (ends: boolean) => {
    const moments = momentsOf(rows, rules, ends);
    const skipped = skippedRows(rows, moments, (row) => meant.some(({ at }) => !Number.isNaN(at(row))));
    // dates are not looked at again where the rows are placed once
    const once = only && (rules.mark !== null || moments.zone.offsetS.length === 1);
    const spare = once ? rows.dateKey : undefined;
    const { utcS, stepS } = moments;
    const moment = { utcS, rowNumber: rows.rowNumber, agree, spanS: rows.spanS, stepS, spare };
    return { moments, skipped, grid: gridRows(moment, keep) };
  };
  const first = placed(rules.mark === 'end');
  if (rules.mark !== null) return { ...first, ends: rules.mark === 'end', because: null };
  const bounds = { ...outermost(first.grid, rows.count), intervalS: first.grid.intervalS };
  const because = showsEnds(rows, first.moments, bounds);
  if (because === null) return { ...first, ends: false, because };
  // an interval's end is read otherwise than its beginning where a clock changes only
  if (first.moments.zone.offsetS.length === 1) return { ...first, ends: true, because };
  return { ...placed(true), ends: true, because };
}

function outermost(grid: IntervalGrid, rows: number): { first: number; last: number } {
  if (grid.isEveryRow) return { first: 0, last: rows - 1 };
  return { first: grid.kept[0]!, last: grid.kept[grid.kept.length - 1]! };
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

function siteZone({ options }: CsvFile, moments: Moments, grid: IntervalGrid) {
  const { siteTimeZone } = options;
  if (siteTimeZone === undefined || grid.kept.length === 0) return moments.zone;
  const firstS = moments.utcS[grid.kept[0]!]!;
  const lastS = moments.utcS[grid.kept[grid.kept.length - 1]!]!;
  return zoneTable(siteTimeZone, firstS - 86_400, lastS + 2 * 86_400);
}
