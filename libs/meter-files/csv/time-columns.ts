import { type DateForm, readStamp } from '../time/stamp-text.js';
import type { HeaderColumn } from './header-column.js';

/** Where a row's stamp stands. */
export interface TimeColumns {
  /** column of the stamp, or of the date where `clock` is given; counted from 0 */
  stamp: number;
  /** column of the clock time beside a date, or −1 */
  clock: number;
  /** column of the interval's end beside its begin, stamp or clock time as the begin is, or −1 */
  end: number;
  /** which end of the interval the words say the stamp marks */
  mark: 'begin' | 'end' | null;
  /** zone the words say the stamps are in */
  zone: string | null;
}

/** What the cells of a column hold. */
export type TimeContent = 'stamp' | 'date' | 'clock' | null;

/**
 * What a column holds, judged by its first cells.
 * @param cells texts, blank ones left out of the judgement
 */
export function timeContent(cells: readonly string[]): TimeContent {
  const kinds = cells.filter((cell) => cell !== '').map(contentOf);
  if (kinds.length === 0 || kinds.includes(null)) return null;
  // exports drop the clock time at midnight
  if (kinds.includes('stamp')) return kinds.includes('clock') ? null : 'stamp';
  const [first] = kinds;
  return kinds.every((kind) => kind === first) ? (first ?? null) : null;
}

function contentOf(cell: string): TimeContent {
  const stamp = readStamp(cell);
  if (stamp === null) return null;
  if (stamp.dateKey === null) return 'clock';
  return stamp.clockS === null ? 'date' : 'stamp';
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
  for (const column of columns) held.set(column, timeContent(rows.map((row) => row[column.index] ?? '')));
  const named = columns.filter(({ role }) => role === 'time');
  const unused = columns.filter(({ role }) => role === null || role === 'time');
  return chosen(named, held) ?? chosen(unused, held) ?? chosenUnread(named, rows);
}

function chosen(columns: readonly HeaderColumn[], held: Map<HeaderColumn, TimeContent>): TimeColumns | null {
  const holding = (content: TimeContent) => columns.filter((column) => held.get(column) === content);
  const stamps = beginAndEnd(holding('stamp'));
  if (stamps !== null) return { stamp: stamps.at.index, clock: -1, ...rest(stamps, null) };
  const dates = beginAndEnd(holding('date'));
  const clocks = beginAndEnd(holding('clock'));
  if (dates === null || clocks === null) return null;
  return { stamp: dates.at.index, clock: clocks.at.index, ...rest(clocks, dates.at) };
}

function rest(found: { at: HeaderColumn; end: HeaderColumn | null }, date: HeaderColumn | null) {
  return {
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

/** A column named for its stamps whose first cells can't be read: its rows are then refused one by one. */
function chosenUnread(named: readonly HeaderColumn[], rows: readonly string[][]): TimeColumns | null {
  const found = beginAndEnd(named.filter(({ index }) => rows.some((row) => isDated(row[index] ?? '')?.dateForm)));
  return found === null ? null : { stamp: found.at.index, clock: -1, ...rest(found, null) };
}
