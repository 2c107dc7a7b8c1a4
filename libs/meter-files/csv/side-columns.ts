import type { MeterMap } from '#libs/contract/meter-map.js';
import { columnsNamed } from './column-candidates.js';
import type { ColumnChoice } from './column-choice.js';
import type { HeaderColumn } from './header-column.js';
import { isQualityCode } from './quality-codes.js';

/** Columns that say something of a row or of the value beside them, counted from 0. */
export interface SideColumns {
  /** together they name the meter a row belongs to; empty where the file has one meter */
  meter: number[];
  quality: number[];
  /** columns called a status whose numbers are not understood */
  unread: number[];
}

/**
 * Finds the columns that name meters and qualities, by their names and what they hold.
 * @param header the columns
 * @param sample first rows of data, as texts
 * @param choices the columns of numbers
 * @param map what a person says
 */
export function sideColumns(
  header: readonly HeaderColumn[],
  sample: readonly string[][],
  choices: readonly ColumnChoice[],
  map: MeterMap,
): SideColumns {
  const said = (name: 'meter' | 'quality') => {
    const columns = map.columns?.[name];
    return columns === undefined ? null : columnsNamed(header, columns, `columns.${name}`).map(({ index }) => index);
  };
  const held = (column: HeaderColumn) => sample.map((cells) => cells[column.index] ?? '').filter((cell) => cell !== '');
  const quality = header.filter((column) => isQuality(column, held(column)));
  const status = header.filter(({ role }) => role === 'quality');
  const unread = status.filter((column) => held(column).length > 0 && held(column).every((cell) => /^\d+$/.test(cell)));
  return {
    meter: said('meter') ?? header.filter((column) => isMeter(column, held(column))).map(({ index }) => index),
    quality: said('quality') ?? besideUsed(quality, header, choices),
    unread: said('quality') === null ? unread.map(({ index }) => index) : [],
  };
}

/** A bare “meter” that holds another text in every row names none. */
function isMeter({ role, name }: HeaderColumn, cells: readonly string[]): boolean {
  if (role !== 'meter') return false;
  const named = /\p{L}[^\p{L}]+\p{L}|\p{Ll}\p{Lu}/u.test(name.trim());
  return named || cells.length < 4 || new Set(cells).size < cells.length;
}

/** Called so, or a column of letters with next to no name, such as the Q beside a value. */
function isQuality({ role, name, unit }: HeaderColumn, cells: readonly string[]): boolean {
  if (!cells.every(isQualityCode)) return false;
  if (role === 'quality') return true;
  return cells.length > 0 && unit === null && role !== 'time' && name.replace(/[^\p{L}]/gu, '').length <= 2;
}

/** One column of qualities speaks for the whole row, several for the value to the left of each. */
function besideUsed(
  quality: readonly HeaderColumn[],
  header: readonly HeaderColumn[],
  choices: readonly ColumnChoice[],
): number[] {
  const indexes = quality.map(({ index }) => index);
  if (quality.length < 2) return indexes;
  const used = new Set(choices.flatMap(({ columns }) => columns.map(({ column }) => column)));
  return indexes.filter((index) => {
    const left = header.findLast((column) => column.index < index && !indexes.includes(column.index));
    return left === undefined || left.role === 'time' || used.has(left.index);
  });
}
