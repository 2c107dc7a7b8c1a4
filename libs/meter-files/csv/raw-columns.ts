import { intervalsAnHour } from '../record/intervals-an-hour.js';
import { RowSet } from '../row-set.js';
import type { QuantityColumn } from './column-choice.js';
import type { CsvFile, CsvMeaning, ReadRows } from './csv-meaning.js';
import { type DecimalSign, thousands } from './decimal-mark.js';

/** A column of a file in the meaning it is read under. */
export interface RawColumn extends QuantityColumn {
  values: Float64Array;
}

/** A column as it was read, and what its numbers are under a meaning: no second column is made of them. */
export interface MeantColumn extends RawColumn {
  /** its cells say lagging or leading */
  isSided: boolean;
  /** no number is another one than was read */
  isAsRead: boolean;
  /** number of a row, NaN where it has none */
  at(row: number): number;
}

/**
 * The columns of a file under one meaning.
 * @param file what was read
 * @param meaning what it is taken to mean
 * @param missing rows whose quality says that they hold no value
 */
export function meantColumns(
  { reader, fillers: { open } }: CsvFile,
  { choice, decimal, fillers }: CsvMeaning,
  missing: RowSet = new RowSet(),
): MeantColumn[] {
  return choice.columns.map((column) => {
    const k = reader.columns.indexOf(column.column);
    const without = [missing, ...(fillers === 'missing' && open?.has(k) ? [open.get(k)!] : [])];
    const isSided = reader.sided.has(column.column);
    return { ...column, isSided, ...meantValues(reader, k, decimal, without) };
  });
}

function meantValues(
  { rows, mark }: Pick<ReadRows, 'rows' | 'mark'>,
  k: number,
  decimal: DecimalSign | null,
  without: readonly RowSet[],
): Pick<MeantColumn, 'values' | 'isAsRead' | 'at'> {
  const values = rows.values[k]!.subarray(0, rows.count);
  const divided = (decimal === ',' ? mark.openDots : decimal === '.' ? mark.openCommas : null)?.rows[k];
  if (divided === undefined && without.every(({ size }) => size === 0))
    return { values, isAsRead: true, at: (row) => values[row]! };
  const number = (row: number) => (divided?.has(row) ? thousands(values[row]!) : values[row]!);
  return {
    values,
    isAsRead: false,
    at: (row) => (without.some((rows) => rows.has(row)) ? Number.NaN : number(row)),
  };
}

/**
 * A column under its meaning as a whole: the one that was read where nothing differs.
 * @param column the column
 * @param room takes the numbers where they differ
 */
export function wholeColumn(column: MeantColumn, room?: Float64Array): Float64Array {
  if (column.isAsRead) return column.values;
  const whole = room?.subarray(0, column.values.length) ?? new Float64Array(column.values.length);
  for (let row = 0; row < whole.length; row++) whole[row] = column.at(row);
  return whole;
}

/**
 * All columns of numbers, those whose only mark divides thousands put right.
 * @param read rows and what their numbers leave open
 * @param decimal mark they are read under
 */
export function valuesUnder(read: Pick<ReadRows, 'rows' | 'mark'>, decimal: DecimalSign | null): Float64Array[] {
  return read.rows.values.map((_, k) => {
    const { values, isAsRead, at } = meantValues(read, k, decimal, []);
    return isAsRead ? values : values.map((_value, row) => at(row));
  });
}

/**
 * A column in kW, kVA, V or A; energies as means of the interval.
 * @param column as read
 * @param intervalS length of an interval [s]
 */
export function inBase({ values, unit }: RawColumn, intervalS: number): Float64Array {
  const hour = unit.energy ? intervalsAnHour(intervalS) : { times: 1, over: 1 };
  const times = unit.times * hour.times;
  const over = unit.over * hour.over;
  return times === 1 && over === 1 ? values : values.map((value) => (value * times) / over);
}

/**
 * Whether columns give kW and kvar themselves, so that neither has to be worked out.
 * @param columns of one reading
 */
export function isWhole(columns: readonly Pick<RawColumn, 'quantity'>[]): boolean {
  const has = (wanted: RawColumn['quantity']) => columns.some(({ quantity }) => quantity === wanted);
  return has('active') && (has('reactive') || has('lagging'));
}
