import { readEpochStamp } from '../time/epoch-stamp.js';
import { readDayFraction, readSerialStamp } from '../time/serial-dates.js';
import { type DateForm, readStamp } from '../time/stamp-text.js';
import { type DateParts, datePartColumns, minuteColumn } from './date-parts.js';
import type { HeaderColumn } from './header-column.js';
import { says, wordsOf } from './header-words.js';

/** Where a row's stamp stands. */
export interface TimeColumns {
  /** column of the stamp, or of the date where `clock` is given; counted from 0 */
  stamp: number;
  /** where year, month and day stand in columns of their own; `stamp` is then that of the year */
  parts: DateParts | null;
  /** column of the clock time beside a date, or −1 */
  clock: number;
  /** column of minutes beside one of hours, which `clock` is then; or −1 */
  minute: number;
  /** column of the interval's end beside its begin, stamp or clock time as the begin is, or −1 */
  end: number;
  /** which end of the interval the words say the stamp marks */
  mark: 'begin' | 'end' | null;
  /** zone the words say the stamps are in */
  zone: string | null;
  /** stamps are a spreadsheet's serial dates */
  serial: boolean;
  /** stamps count seconds or milliseconds since 1970 */
  epoch: boolean;
  /** `clock` counts the hours or intervals of a day in whole numbers */
  counted: boolean;
}

/** What the cells of a column hold. */
export type TimeContent = 'stamp' | 'date' | 'clock' | 'serial' | 'serialDay' | 'epoch' | 'fraction' | null;

/**
 * What a column holds, judged by its first cells.
 * @param cells texts, blank ones left out of the judgement
 */
export function timeContent(cells: readonly string[]): TimeContent {
  const kinds = cells.filter((cell) => cell !== '').map(contentOf);
  if (kinds.length === 0 || kinds.includes(null)) return null;
  // exports drop the clock time at midnight
  if (kinds.includes('stamp')) return kinds.every((kind) => kind === 'stamp' || kind === 'date') ? 'stamp' : null;
  if (kinds.includes('serial'))
    return kinds.every((kind) => kind === 'serial' || kind === 'serialDay') ? 'serial' : null;
  const [first] = kinds;
  return kinds.every((kind) => kind === first) ? (first ?? null) : null;
}

function contentOf(cell: string): TimeContent {
  const stamp = readStamp(cell);
  if (stamp === null) return numberContent(cell);
  if (stamp.dateKey === null) return 'clock';
  return stamp.clockS === null ? 'date' : 'stamp';
}

function numberContent(cell: string): TimeContent {
  if (readSerialStamp(cell) !== null) return /[.,]/.test(cell) ? 'serial' : 'serialDay';
  if (readEpochStamp(cell) !== null) return 'epoch';
  return readDayFraction(cell) === null ? null : 'fraction';
}

/** Contents that only a column named for its time may have: numbers else. */
const NUMBERS: readonly TimeContent[] = ['serial', 'serialDay', 'epoch', 'fraction'];

/**
 * Whether a text is a serial date, taken by itself.
 * @param cell text without surrounding blanks
 */
export function isSerial(cell: string): boolean {
  return readSerialStamp(cell) !== null;
}

/**
 * Whether a text counts seconds or milliseconds since 1970.
 * @param cell text without surrounding blanks
 */
export function isEpoch(cell: string): boolean {
  return readEpochStamp(cell) !== null;
}

/**
 * Whether a text is a date, with or without a clock time.
 * @param cell text without surrounding blanks
 */
export function isDated(cell: string): { dateForm: DateForm } | null {
  const stamp = readStamp(cell);
  return stamp === null || stamp.dateKey === null ? null : stamp;
}

/**
 * Chooses the time columns: by their words, else by what the columns hold.
 * @param columns header
 * @param rows first rows of data, as texts
 * @returns the columns, or null where there is no stamp, or no clock time beside the dates
 */
export function chooseTimeColumns(columns: readonly HeaderColumn[], rows: readonly string[][]): TimeColumns | null {
  const held = new Map<HeaderColumn, TimeContent>();
  for (const column of columns) {
    const content = timeContent(rows.map((row) => row[column.index] ?? ''));
    held.set(column, column.role !== 'time' && NUMBERS.includes(content) ? null : content);
  }
  const named = columns.filter(({ role }) => role === 'time');
  const unused = columns.filter(({ role }) => role === null || role === 'time');
  const counting = unused.filter((column) => countsIntervals(column, rows));
  return (
    chosen(named, held, counting) ??
    chosen(unused, held, counting) ??
    inParts(columns, rows, held) ??
    chosenUnread(named, rows)
  );
}

/** A column named for the hours or intervals of a day that holds whole numbers. */
function countsIntervals({ name, index }: HeaderColumn, rows: readonly string[][]): boolean {
  if (!says(wordsOf(name), 'count')) return false;
  const cells = rows.map((row) => row[index] ?? '').filter((cell) => cell !== '');
  return cells.length > 0 && cells.every((cell) => /^\d{1,4}$/.test(cell));
}

function chosen(
  columns: readonly HeaderColumn[],
  held: Map<HeaderColumn, TimeContent>,
  counting: readonly HeaderColumn[],
): TimeColumns | null {
  const holding = (...contents: TimeContent[]) => columns.filter((column) => contents.includes(held.get(column)!));
  const isSerialColumn = (column: HeaderColumn) => NUMBERS.includes(held.get(column)!);
  const stamps = beginAndEnd(holding('stamp')) ?? beginAndEnd(holding('serial'));
  if (stamps !== null)
    return {
      stamp: stamps.at.index,
      clock: -1,
      ...rest(stamps, null, isSerialColumn(stamps.at)),
    };
  const epochs = beginAndEnd(holding('epoch'));
  if (epochs !== null)
    return {
      stamp: epochs.at.index,
      clock: -1,
      ...rest(epochs, null, false),
      epoch: true,
    };
  const dates = beginAndEnd(holding('date', 'serialDay'));
  if (dates === null) return null;
  const serial = isSerialColumn(dates.at);
  const clocks = beginAndEnd(serial ? holding('clock', 'fraction') : holding('clock'));
  const counts = clocks === null ? beginAndEnd([...counting]) : null;
  if (counts !== null) {
    return {
      stamp: dates.at.index,
      clock: counts.at.index,
      ...rest(counts, dates.at, serial),
      end: -1,
      counted: true,
    };
  }
  if (clocks === null) return serial ? { stamp: dates.at.index, clock: -1, ...rest(dates, null, true) } : null;
  return { stamp: dates.at.index, clock: clocks.at.index, ...rest(clocks, dates.at, serial) };
}

function rest(found: { at: HeaderColumn; end: HeaderColumn | null }, date: HeaderColumn | null, serial: boolean) {
  return {
    serial,
    parts: null,
    minute: -1,
    epoch: false,
    counted: false,
    end: found.end?.index ?? -1,
    mark: found.at.mark ?? date?.mark ?? null,
    zone: found.at.zone ?? date?.zone ?? null,
  };
}

function beginAndEnd(columns: HeaderColumn[]): { at: HeaderColumn; end: HeaderColumn | null } | null {
  const begin = columns.find(({ mark }) => mark === 'begin');
  const end = columns.find(({ mark }) => mark === 'end');
  if (begin !== undefined) return { at: begin, end: end ?? null };
  const at = end ?? columns[0];
  return at === undefined ? null : { at, end: null };
}

/** Year, month and day apart, beside a clock time, hours and minutes, or a column that counts. */
function inParts(
  columns: readonly HeaderColumn[],
  rows: readonly string[][],
  held: Map<HeaderColumn, TimeContent>,
): TimeColumns | null {
  const parts = datePartColumns(columns, rows);
  if (parts === null) return null;
  const dates = new Set(Object.values(parts));
  const beside = columns.filter(({ index }) => !dates.has(index));
  const clocks = beginAndEnd(beside.filter((column) => held.get(column) === 'clock'));
  const at = { stamp: parts.year, parts };
  if (clocks !== null) return { ...rest(clocks, null, false), ...at, clock: clocks.at.index };
  const minute = minuteColumn(beside);
  const hours = beginAndEnd(beside.filter((column) => column.index !== minute && countsIntervals(column, rows)));
  if (hours === null) return null;
  return {
    ...rest(hours, null, false),
    ...at,
    clock: hours.at.index,
    end: -1,
    minute,
    counted: minute < 0,
  };
}

/** A column named for its stamps whose first cells can't be read: its rows are then refused one by one. */
function chosenUnread(named: readonly HeaderColumn[], rows: readonly string[][]): TimeColumns | null {
  const found = beginAndEnd(named.filter(({ index }) => rows.some((row) => isDated(row[index] ?? '')?.dateForm)));
  return found === null ? null : { stamp: found.at.index, clock: -1, ...rest(found, null, false) };
}
