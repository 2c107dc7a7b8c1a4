import { zoneTable } from '#libs/contract/time-zone.js';
import type { Remark } from '#libs/engine/index.js';
import { note } from '../note.js';
import { type BuiltColumns, buildColumns } from '../record/build-columns.js';
import type { ReadResult } from '../record/close-reading.js';
import { gridRows, type IntervalGrid } from '../record/interval-grid.js';
import { type Moments, momentsOf, type StampRules, showsEnds, skippedRows } from '../time/moments.js';
import type { CsvFile, CsvMeaning } from './csv-meaning.js';
import { quantityNotes } from './csv-notes.js';
import { csvSources, rawColumns } from './csv-sources.js';

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
  const { missing, estimated, unknown } = reader.qualities.byMeaning(meaning.quality);
  const raw = rawColumns(file, meaning, missing);
  const rules = stampRules(file, meaning);
  const placed = placedRows(file, rules, {
    values: raw.map(({ values }) => values),
    keep: meaning.keep,
    only,
  });
  const { moments, grid, ends, because, skipped } = placed;
  const { rowNumber } = reader.rows;
  const found = csvSources(raw, meaning, { grid, utcS: moments.utcS, rowNumber, ends, only });
  const ordered = {
    intervalS: grid.intervalS,
    kept: found.kept,
    utcS: moments.utcS,
    shiftS: ends ? grid.intervalS : 0,
    rowNumber,
  };
  // the columns of a day are no columns of one quantity
  const sources = file.layout.days === null ? found.sources : found.sources.map((one) => ({ ...one, column: 0 }));
  const built = buildColumns(ordered, sources, found.workedOut === null && map.sign === 'leadingPositive');
  // a register's readings are moments, whichever end of an interval other columns may mean
  const assumed = rules.mark === null && Number.isNaN(reader.rows.spanS) && found.registers.length < raw.length;
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
  const left = skipped + built.withoutValue + grid.overruled + reader.headers.count + reader.totals.count;
  const counts = { format: 'csv', rowsRead: reader.rows.count, rejectedRows: left };
  return { columns: built.columns, duplicates: grid.duplicates, notes, counts, zone: siteZone(file, moments, grid) };
}

function stampRules({ layout, map, options, reader }: CsvFile, { order, days }: CsvMeaning): StampRules {
  const said = options.timeZone ?? map.timeZone ?? null;
  const zoneFromHeader = said === null && layout.time.zone !== null;
  const zone = said ?? layout.time.zone ?? options.siteTimeZone ?? null;
  const ranged = layout.days !== null || (!Number.isNaN(reader.rows.spanS) && map.stamp === undefined);
  const elapsed = layout.days !== null && days === 'elapsed';
  return { order, mark: ranged ? 'begin' : layout.time.mark, zone, zoneFromHeader, elapsed };
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
  { values, keep, only }: { values: Float64Array[]; keep: 'first' | 'last' | undefined; only: boolean },
): Placed {
  const { rows } = reader;
  const placed = (ends: boolean) => {
    const moments = momentsOf(rows, rules, ends);
    const skipped = skippedRows(rows, moments, (row) => values.some((column) => !Number.isNaN(column[row]!)));
    // dates are not looked at again where the rows are placed once
    const once = only && (rules.mark !== null || moments.zone.offsetS.length === 1);
    const spare = once ? rows.dateKey : undefined;
    const moment = { utcS: moments.utcS, rowNumber: rows.rowNumber, values, spanS: rows.spanS, spare };
    return { moments, skipped, grid: gridRows(moment, keep) };
  };
  const first = placed(rules.mark === 'end');
  if (rules.mark !== null) return { ...first, ends: rules.mark === 'end', because: null };
  const { kept, intervalS } = first.grid;
  const bounds = { first: kept[0]!, last: kept[kept.length - 1]!, intervalS };
  const because = showsEnds(rows, first.moments, bounds);
  if (because === null) return { ...first, ends: false, because };
  // an interval's end is read otherwise than its beginning where a clock changes only
  if (first.moments.zone.offsetS.length === 1) return { ...first, ends: true, because };
  return { ...placed(true), ends: true, because };
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
