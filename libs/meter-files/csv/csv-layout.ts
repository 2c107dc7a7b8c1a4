import type { MeterMap } from '#libs/contract/meter-map.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { columnsNamed, namesOf } from './column-candidates.js';
import { type ColumnChoice, columnChoices } from './column-choice.js';
import type { CsvView } from './csv-view.js';
import { isYearCell } from './date-parts.js';
import { type DayLayout, dayLayout } from './day-layout.js';
import { daySlots } from './day-slots.js';
import type { HeaderColumn } from './header-column.js';
import { headerColumns } from './header-sets.js';
import { isUnitRow, withCellUnits, withUnit } from './header-units.js';
import { headerWindows } from './header-windows.js';
import { type LongLayout, longLayout } from './long-layout.js';
import { type NumberCell, readNumberText } from './number-cell.js';
import { RowCells } from './row-cells.js';
import { isTextRow } from './row-shape.js';
import { type SideColumns, sideColumns } from './side-columns.js';
import { chooseTimeColumns, isDated, isEpoch, isSerial, type TimeColumns } from './time-columns.js';
import { statedRatios } from './transformer-ratio.js';

/** How the rows of a delimited file are to be read. */
export interface CsvLayout {
  /** byte between cells */
  delimiter: number;
  /** names of the columns, units of a second header row put behind them; empty texts where the file has no header */
  names: string[];
  /** row of the names, counted from 1; 0 where there is none */
  headerRow: number;
  /** rows of data begin behind this one */
  lastHeaderRow: number;
  time: TimeColumns;
  choices: ColumnChoice[];
  header: readonly HeaderColumn[];
  /** transformer ratios stated above the data, in the names or in a column of their own */
  ratios: readonly number[];
  side: SideColumns;
  /** columns of the hours of a day in a file of one row a day */
  days: DayLayout | null;
  /** columns of channel and number in a file of one row a channel and moment */
  long: LongLayout | null;
}

interface Row {
  cells: string[];
  /** counted from 1 */
  number: number;
}

interface Candidate {
  delimiter: number;
  row: Row;
  lastHeaderRow: number;
  header: HeaderColumn[];
  before: Row[];
  data: Row[];
  score: number;
}

const DELIMITERS = [';', '\t', '|', ','] as const;
/** Rows of a view that are looked at for a header before anything else is tried. */
const LOOK_ROWS = 40;
const SAMPLE_ROWS = 24;
/** A row of more cells neither names columns nor belongs to a meter. */
const MOST_COLUMNS = 1000;
/** Added to the score of a header with a dated row behind it, and again where that row is as wide. */
const FOLLOWED = 500;

/** A layout and the view whose rows it counts from. */
export interface FoundLayout {
  layout: CsvLayout;
  from: CsvView;
}

/**
 * Finds the header row and what its columns mean: near the beginning, where most files have it, else where dates begin.
 * @param view the bytes read so far, and the row of the file they begin with
 * @param map what a person says
 * @returns the layout, or null where there is no header among these rows
 * @throws InputProblem where a column that is needed is missing
 */
export function findLayout(view: CsvView, map: MeterMap): FoundLayout | null {
  const near = bestCandidate(view, LOOK_ROWS, map);
  if (near !== null && near.score >= FOLLOWED) return { layout: layoutOf(near, map), from: view };
  for (const from of headerWindows(view)) {
    const found = bestCandidate(from, Number.POSITIVE_INFINITY, map);
    if (found !== null && found.score >= FOLLOWED) return { layout: layoutOf(found, map), from };
  }
  return near !== null && isFinal(near, view) ? { layout: layoutOf(near, map), from: view } : null;
}

function bestCandidate(view: CsvView, most: number, map: MeterMap): Candidate | null {
  const separators = map.separator === undefined ? DELIMITERS : [map.separator];
  return separators
    .flatMap((separator) => candidatesAt(rowsOf(view, separator, most), separator, map))
    .reduce<Candidate | null>((a, b) => (a === null || b.score > a.score ? b : a), null);
}

/** A header whose data are not dated is taken where there is nothing more to read, or the data are as wide as it is. */
function isFinal({ data, header }: Candidate, { ended }: CsvView): boolean {
  return ended || data[0]?.cells.length === header.length;
}

/**
 * Why rows that look like data can't be read: no row names their columns, or one does in words that say nothing.
 * @param view the bytes read so far
 * @returns null where nothing looks like data
 */
export function untoldColumns(view: CsvView): Problem | null {
  for (const separator of DELIMITERS) {
    const rows = rowsOf(view, separator, SAMPLE_ROWS);
    const isData = ({ cells }: Row) =>
      cells.length > 1 && cells.some((cell) => isDated(cell) !== null) && cells.some(isNumber);
    const at = rows.findIndex(isData);
    if (at < 0) continue;
    const above = rows[at - 1];
    const named = above !== undefined && mayName(above) && above.cells.length === rows[at]!.cells.length;
    const found = named ? namesOf(headerColumns(above.cells)) : 'rows of data without names';
    const expected = named
      ? 'names that say active and reactive power or energy, or a map that numbers the columns'
      : 'a header row that names the columns, or a map that numbers them';
    return { code: 'no-active-column', row: named ? above.number : rows[at]!.number, expected, found };
  }
  return null;
}

function rowsOf(view: CsvView, separator: string, most: number): Row[] {
  const cells = new RowCells();
  const marks = { delimiter: separator.charCodeAt(0), rowEnd: view.rowEnd };
  const rows: Row[] = [];
  let at = view.start;
  while (rows.length < most && at < view.end) {
    at = cells.split(view.bytes, at, view.end, marks);
    if (at < 0) break;
    const texts = cells.count > MOST_COLUMNS ? [] : cells.texts();
    rows.push({ cells: texts, number: view.rowsBefore + rows.length + 1 });
  }
  return rows;
}

function candidatesAt(rows: Row[], separator: string, map: MeterMap): Candidate[] {
  const delimiter = separator.charCodeAt(0);
  if (map.headerRow === 0) return headless(rows, delimiter, map);
  const found: Candidate[] = [];
  for (const [index, row] of rows.entries()) {
    if (map.headerRow === undefined ? !mayName(row) && !namesDay(row) : row.number !== map.headerRow) continue;
    found.push(...candidateAt(rows, index, delimiter, map));
    if ((found.at(-1)?.score ?? 0) >= 2 * FOLLOWED) break;
  }
  return found;
}

function headless(rows: Row[], delimiter: number, { columns }: MeterMap): Candidate[] {
  const time = columns?.time ?? columns?.date;
  const isTime = (cell: string, column: number) =>
    isDated(cell) !== null || (column + 1 === time && (isSerial(cell) || isEpoch(cell)));
  const row = rows.find(({ cells }) => cells.some(isTime));
  if (row === undefined) return [];
  const header = headerColumns(row.cells.map(() => ''));
  const number = row.number - 1;
  const data = rows.filter((other) => other.number > number);
  return [
    {
      delimiter,
      row: { cells: header.map(() => ''), number: 0 },
      lastHeaderRow: number,
      header,
      before: [],
      data,
      score: row.cells.length,
    },
  ];
}

/** A row that holds a date or a number names no columns. */
function mayName({ cells }: Row): boolean {
  return (
    cells.length > 1 && cells.some((cell) => cell !== '') && !cells.some((cell) => isNumber(cell) || isDated(cell))
  );
}

/** Hours may be numbered. */
function namesDay({ cells }: Row): boolean {
  return cells.length >= 24 && !cells.some((cell) => isDated(cell)) && daySlots(cells, undefined) !== null;
}

function candidateAt(rows: Row[], index: number, delimiter: number, map: MeterMap): Candidate[] {
  const row = rows[index]!;
  const under = rows[index + 1];
  const hasUnits = under !== undefined && mayName(under) && isUnitRow(under.cells, row.cells);
  const names = hasUnits ? row.cells.map((name, column) => withUnit(name, under.cells[column])) : row.cells;
  const data = dataBehind(rows, index + (hasUnits ? 2 : 1));
  const header = withCellUnits(
    headerColumns(names),
    data.map(({ cells }) => cells),
  );
  const roles = header.filter(({ role }) => role !== null);
  const said = map.headerRow !== undefined || map.columns !== undefined;
  const long = () =>
    longLayout(
      header,
      data.map(({ cells }) => cells),
    ) !== null;
  if (!said && !namesDay(row) && (roles.length < 2 || roles.every(({ role }) => role === 'time')) && !long()) return [];
  const lastHeaderRow = row.number + (hasUnits ? 1 : 0);
  const followed = data[0]?.cells.some((cell, column) => isDatedCell(cell, header[column])) === true;
  const asWide = followed && data[0]!.cells.length === header.length;
  const score = roles.length + (followed ? FOLLOWED : 0) + (asWide ? FOLLOWED : 0);
  return [{ delimiter, row, lastHeaderRow, header, before: rows.slice(0, index), data, score }];
}

function isDatedCell(cell: string, column: HeaderColumn | undefined): boolean {
  if (isDated(cell) !== null || isYearCell(cell, column)) return true;
  return column?.role === 'time' && (isSerial(cell) || isEpoch(cell));
}

/** The first rows from an index on that hold more than a line of text. */
function dataBehind(rows: Row[], from: number): Row[] {
  const data: Row[] = [];
  for (let i = from; i < rows.length && data.length < SAMPLE_ROWS; i++) {
    if (rows[i]!.cells.some((cell) => cell !== '') && !isTextRow(rows[i]!.cells)) data.push(rows[i]!);
  }
  return data;
}

function layoutOf(found: Candidate, map: MeterMap): CsvLayout {
  const { delimiter, row, lastHeaderRow, header } = found;
  const names = header.map(({ name }) => name);
  const sample = found.data.map(({ cells }) => cells);
  const ratios = statedRatios([...found.before.map(({ cells }) => cells.join(' ')), ...ratioColumns(names, sample)]);
  const file = { delimiter, names, headerRow: row.number, lastHeaderRow, header, ratios };
  const day = dayLayout(found, sample, map);
  if (day !== null) return { ...file, ...day, choices: [], side: { meter: [], quality: [], unread: [] }, long: null };
  const time = mappedTime(header, map, sample) ?? chooseTimeColumns(header, sample);
  if (time === null && sample.length === 0) {
    throw new InputProblem([{ code: 'empty-file', expected: 'rows of data under the header', found: 'none' }]);
  }
  if (time === null) {
    const expected = 'a column of dates and times';
    const listed = names.join(', ').slice(0, 300);
    throw new InputProblem([
      { code: 'no-time-column', row: row.number || 1, expected, found: listed === '' ? 'none' : listed },
    ]);
  }
  const long = longLayout(header, sample);
  if (long !== null) {
    const side = sideColumns(header, sample, [], map);
    return { ...file, time: { ...time, mark: map.stamp ?? time.mark }, choices: [], side, days: null, long };
  }
  const choices = columnChoices(header, map, row.number);
  refuseDataBefore(found, time, choices);
  const mark = map.stamp ?? time.mark;
  const side = sideColumns(header, sample, choices, map);
  return { ...file, time: { ...time, mark }, choices, side, days: null, long };
}

/** Names with the first cell behind each: a column may repeat the ratio in every row. */
function ratioColumns(names: readonly string[], sample: readonly string[][]): string[] {
  return names.map((name, index) => `${name} ${sample[0]?.[index] ?? ''}`);
}

/** Rows of data above the header would be lost as if they were a preamble. */
function refuseDataBefore({ before, header }: Candidate, time: TimeColumns, choices: ColumnChoice[]): void {
  const [choice] = choices;
  const isData = ({ cells }: Row) =>
    cells.length === header.length &&
    isDated(cells[time.stamp] ?? '') !== null &&
    choice!.columns.every(({ column }) => isNumber(cells[column] ?? ''));
  const data = before.find(isData);
  if (data === undefined) return;
  const expected = 'the names of the columns above the first row of data';
  throw new InputProblem([{ code: 'unreadable', row: data.number, expected, found: 'data' }]);
}

function mappedTime(header: readonly HeaderColumn[], map: MeterMap, sample: readonly string[][]): TimeColumns | null {
  const { time, date, clock } = map.columns ?? {};
  const stamp = time ?? date;
  if (stamp === undefined) return null;
  const [at] = columnsNamed(header, stamp, time === undefined ? 'columns.date' : 'columns.time');
  const beside = clock === undefined ? undefined : columnsNamed(header, clock, 'columns.clock')[0];
  return {
    stamp: at!.index,
    parts: null,
    minute: -1,
    clock: beside?.index ?? -1,
    end: -1,
    mark: beside?.mark ?? at!.mark,
    zone: beside?.zone ?? at!.zone,
    serial: sample.some((cells) => isSerial(cells[at!.index] ?? '')),
    epoch: sample.some((cells) => isEpoch(cells[at!.index] ?? '')),
    counted: beside !== undefined && sample.every((cells) => /^\d{1,3}$/.test(cells[beside.index] ?? '1')),
  };
}

function isNumber(text: string): boolean {
  if (text === '') return false;
  const cell: NumberCell = { form: 'wrong', value: 0 };
  readNumberText(text, cell);
  return cell.form !== 'wrong' && cell.form !== 'missing';
}
