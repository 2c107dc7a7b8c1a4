import { InputProblem } from '#libs/engine/index.js';
import type { QuantityColumn } from './column-choice.js';

/** Rows from which on a column that never falls is looked at as a register's reading. */
const REGISTER_ROWS = 200;
/** Falls a register may have: resets, exchanges, rows out of place. */
const FALLING_SHARE = 0.01;
const MOST_FALLING_SHARE = 0.05;

/** How a column moves from row to row. */
export interface ColumnMoves {
  count: number;
  /** steps against the column's own direction, and steps along it */
  falls: number;
  rises: number;
  /** the earliest value over the mean of the steps along the direction; NaN where all are 0 */
  size: number;
}

/**
 * How a column moves in the order of the file; a file with the newest row first is read backwards.
 * @param values one number a row
 */
export function movesOf(values: Float64Array): ColumnMoves {
  let up = 0;
  let down = 0;
  let upSum = 0;
  let downSum = 0;
  let first = Number.NaN;
  let count = 0;
  let before = Number.NaN;
  const most = MOST_FALLING_SHARE * values.length;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    if (value > before) {
      up++;
      upSum += value - before;
    } else if (value < before) {
      down++;
      downSum += before - value;
    }
    if (count === 0) first = value;
    count++;
    before = value;
    // no register, whatever follows
    if (up > most && down > most) break;
  }
  const rises = Math.max(up, down);
  const step = (up >= down ? upSum : downSum) / Math.max(1, rises);
  return { count, falls: Math.min(up, down), rises, size: (up >= down ? first : before) / step };
}

/** Columns of energy by what they hold. */
export interface EnergyColumns {
  /** surely the reading of a register: the name says it, or the column rises in steps far smaller than itself */
  registers: Set<number>;
  /** the energy of each interval or the reading of a register */
  open: Set<number>;
}

/**
 * Tells readings of registers from energies of intervals: these rise and fall, a register only rises.
 * @param columns of one reading of the file
 * @param moves how each column moves, by its number
 * @throws InputProblem where a column said to be a register falls like none
 */
export function energyColumns(
  columns: readonly QuantityColumn[],
  moves: (column: number) => ColumnMoves,
): EnergyColumns {
  const found: EnergyColumns = { registers: new Set(), open: new Set() };
  const energies = columns.filter(({ unit }) => unit.energy);
  for (const column of energies) {
    const held = heldBy(column, moves(column.column));
    if (held !== 'intervals') found[held === 'register' ? 'registers' : 'open'].add(column.column);
  }
  // beside a register another column that never falls is likely one too
  const beside = found.registers.size === 0 ? [] : energies.filter(({ column }) => !found.registers.has(column));
  for (const { column } of beside) if (isSteady(moves(column))) found.open.add(column);
  return found;
}

function isSteady({ falls, count }: ColumnMoves): boolean {
  return falls <= FALLING_SHARE * count;
}

function heldBy({ column, register }: QuantityColumn, moves: ColumnMoves): 'register' | 'intervals' | 'either' {
  const { count, falls, rises, size } = moves;
  if (register === 'said') {
    if (falls > Math.max(1, MOST_FALLING_SHARE * count)) refuseFalling(column, falls);
    return 'register';
  }
  if (!isSteady(moves)) return 'intervals';
  // a column of zeros is no reading, one that stands still at a number is
  if (register === 'maybe' && !Number.isNaN(size)) return 'register';
  if (count < REGISTER_ROWS || rises === 0) return 'intervals';
  return size >= 10 ? 'register' : 'either';
}

function refuseFalling(column: number, falls: number): never {
  const expected = 'the reading of a register, which rises';
  throw new InputProblem([
    { code: 'inconsistent', column: column + 1, expected, found: `a column that falls ${falls} times` },
  ]);
}

/** A register's readings as energies of intervals. */
export interface Differences {
  /** of each row in time order; what other rows hold says nothing */
  values: Float64Array;
  /** intervals over which the reading falls: a reset, an exchange or the register's end; they are left without a value */
  falls: number;
}

/**
 * The energy of each interval from readings at its two ends; a reading belongs to the moment of its stamp.
 * @param readings one a row
 * @param rows in time order, their moments [s], the interval [s], and whether a row stands at its interval's end
 * @param power of ten of the readings' decimals, see decimalPower
 * @param room takes the energies; the readings themselves where nobody needs them any more
 */
export function differencesOf(
  readings: Float64Array,
  rows: { kept: Int32Array; utcS: Float64Array; intervalS: number; ends: boolean },
  { power, room }: { power: number; room: Float64Array },
): Differences {
  const { kept, utcS, intervalS, ends } = rows;
  let falls = 0;
  let before = readings[kept[0]!]!;
  for (let i = 1; i < kept.length; i++) {
    const from = kept[i - 1]!;
    const to = kept[i]!;
    const reading = readings[to]!;
    const energy = utcS[to]! - utcS[from]! === intervalS ? reading - before : Number.NaN;
    if (energy < 0) falls++;
    // a difference of two readings has no more decimals than they have
    room[ends ? to : from] = energy < 0 ? Number.NaN : Math.round(energy * power) / power;
    before = reading;
  }
  // the outermost reading has an interval on one side only
  if (kept.length > 0) room[kept[ends ? 0 : kept.length - 1]!] = Number.NaN;
  return { values: room, falls };
}

/**
 * Power of ten of the decimals that a double of the largest reading's size still holds truly: fifteen digits in all, at
 * most nine behind the mark.
 * @param readings of a register
 */
export function decimalPower(readings: Float64Array): number {
  let largest = 1;
  for (const reading of readings) if (Math.abs(reading) > largest) largest = Math.abs(reading);
  return 10 ** Math.max(0, Math.min(9, 14 - Math.floor(Math.log10(largest))));
}
