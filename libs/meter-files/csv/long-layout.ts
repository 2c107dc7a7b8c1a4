import { saysQuantity } from './day-layout.js';
import { readHeaderColumn, type HeaderColumn } from './header-column.js';
import { says, wordsOf } from './header-words.js';
import { type NumberCell, readNumberText } from './number-cell.js';
import { readUnit } from './unit-text.js';

/** Where a file that has a row for each channel and moment has what; columns counted from 0. */
export interface LongLayout {
  /** names what the row's number is */
  channel: number;
  value: number;
  /** unit of the row's number, or −1 */
  unit: number;
}

/**
 * Whether a file has a row for each channel and moment: a column whose cells name quantities, and one of numbers.
 * @param header the columns
 * @param rows first rows of data, as texts
 * @returns null where it has not, or where its columns name quantities themselves
 */
export function longLayout(header: readonly HeaderColumn[], rows: readonly string[][]): LongLayout | null {
  const held = (index: number) => rows.map((row) => row[index] ?? '').filter((cell) => cell !== '');
  const free = header.filter(
    ({ role }) => role === null || (role !== 'time' && role !== 'meter' && role !== 'quality'),
  );
  const units = free.filter(
    ({ index }) => held(index).length > 0 && held(index).some((cell) => readUnit(cell) !== null),
  );
  const unit = units.find(({ name, index }) => says(wordsOf(name), 'unit') && held(index).every(isWord)) ?? null;
  const channel = free.find((one) => one !== unit && isChannel(one, held(one.index)));
  if (channel === undefined) return null;
  const numbers = free.filter((one) => one !== unit && one !== channel && held(one.index).some(isNumber));
  const named = numbers.filter(({ name }) => says(wordsOf(name), 'value'));
  const [value, ...others] = named.length > 0 ? named : numbers;
  if (value === undefined || others.length > 0) return null;
  // a column of kW beside one that names registers is a file of one row a moment
  if (numbers.some((one) => one !== value && one.role !== null)) return null;
  return { channel: channel.index, value: value.index, unit: unit?.index ?? -1 };
}

/**
 * Whether a channel holds what a record may be made of.
 * @param name of the channel, its unit behind it
 */
export function isMeasured(name: string): boolean {
  return saysQuantity(name) && readHeaderColumn(name, 0).role !== null;
}

function isChannel({ name }: HeaderColumn, cells: readonly string[]): boolean {
  if (cells.length === 0 || !cells.some(isMeasured) || cells.some(isNumber)) return false;
  return says(wordsOf(name), 'channel') || cells.every(isMeasured);
}

function isWord(cell: string): boolean {
  return /\p{L}|%|°/u.test(cell) && !isNumber(cell);
}

function isNumber(cell: string): boolean {
  const read: NumberCell = { form: 'missing', value: 0 };
  readNumberText(cell, read);
  return read.form !== 'missing' && read.form !== 'wrong';
}
