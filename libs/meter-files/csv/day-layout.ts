import type { MeterMap } from '#libs/contract/meter-map.js';
import { columnsNamed } from './column-candidates.js';
import { type DaySlots, daySlots } from './day-slots.js';
import { type HeaderColumn, readHeaderColumn } from './header-column.js';
import { isHeaderRow } from './row-shape.js';
import { chooseTimeColumns, isSerial, type TimeColumns, timeContent } from './time-columns.js';

/** Where a file of one row a day has what. */
export interface DayLayout extends DaySlots {
  /** columns whose cells say what a row holds, such as its unit; counted from 0 */
  labels: number[];
  /** what stands above the header and may say it for the rows below */
  title: string;
}

/**
 * Whether a file has a row a day, with the hours or quarter hours as its columns, and where it has what.
 * @param found names of the columns and the rows above them
 * @param rows first rows of data, as texts
 * @param map what a person says
 * @returns null where it has no such columns, or no column of dates alone
 */
export function dayLayout(
  {
    header,
    before,
  }: {
    header: readonly HeaderColumn[];
    before: readonly { cells: string[] }[];
  },
  rows: readonly string[][],
  map: MeterMap,
): { time: TimeColumns; days: DayLayout } | null {
  const names = header.map(({ name }) => name);
  const found = daySlots(names, map.stamp);
  if (found === null) return null;
  // lines between blocks and their headers are no days
  const sample = rows.filter((row) => row.filter((cell) => cell !== '').length > 3 && !isHeaderRow(row, names));
  const slotColumns = new Set(found.slots.map(({ column }) => column));
  const beside = header.filter(({ index }) => !slotColumns.has(index));
  const time = dateColumn(beside, header, sample, map);
  if (time === null) return null;
  const labels = beside
    .filter(({ index, role }) => role === 'meter' || sample.some((cells) => saysQuantity(cells[index] ?? '')))
    .map(({ index }) => index);
  const titles = before.map(({ cells }) => cells.join(' ').trim()).filter(saysQuantity);
  return {
    time: { ...time, mark: found.mark },
    days: { ...found, labels: labels.filter((index) => index !== time.stamp), title: titles.at(-1) ?? '' },
  };
}

/**
 * Whether a text says what numbers are: a unit, or a quantity of the trade.
 * @param text a cell or a row
 */
export function saysQuantity(text: string): boolean {
  if (text === '' || text.length > 200) return false;
  const { role, unit } = readHeaderColumn(text, 0);
  return unit !== null || (role !== null && !['time', 'meter', 'quality', 'standby'].includes(role));
}

function dateColumn(
  beside: readonly HeaderColumn[],
  header: readonly HeaderColumn[],
  sample: readonly string[][],
  map: MeterMap,
): TimeColumns | null {
  const said = map.columns?.date ?? map.columns?.time;
  const isDay = ({ index, role }: HeaderColumn) => {
    const cells = sample.map((row) => row[index] ?? '');
    const content = timeContent(cells);
    if (content === 'date') return true;
    if (content === 'stamp')
      return cells.every((cell) => cell === '' || /[ t]0?0[:.]?00(?:[:.]?00)?(?:\.0+)?$/i.test(cell));
    return content === 'serialDay' && (role === 'time' || said !== undefined);
  };
  const columns =
    said === undefined
      ? beside
      : columnsNamed(header, said, map.columns?.date === undefined ? 'columns.time' : 'columns.date');
  const days = columns.filter(isDay);
  const at = days.find(({ role }) => role === 'time') ?? days[0];
  if (at === undefined) return null;
  // a clock time beside the date makes rows of intervals
  const chosen = chooseTimeColumns(beside, sample);
  if (chosen !== null && chosen.clock >= 0) return null;
  const serial = sample.some((row) => isSerial(row[at.index] ?? ''));
  const plain = { parts: null, minute: -1, epoch: false, counted: false };
  return {
    stamp: at.index,
    clock: -1,
    end: -1,
    mark: null,
    zone: at.zone,
    serial,
    ...plain,
  };
}
