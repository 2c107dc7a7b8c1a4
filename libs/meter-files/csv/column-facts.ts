import type { CsvMeaning } from './csv-meaning.js';
import { decimalPower, energyColumns, movesOf } from './energy-registers.js';
import { hasNegative, scaleOf } from './power-factor.js';
import { inBase, isWhole, type MeantColumn, wholeColumn } from './raw-columns.js';
import type { FactorFacts } from './worked-out-powers.js';

/** What columns show as a whole; a part of their rows is read by it as well. */
export interface ColumnFacts {
  /** columns of registers, counted from 0, each with the power of ten of its decimals */
  registers: ReadonlyMap<number, number>;
  factor: FactorFacts | null;
  /** see PowerRules; null where it has not been found yet */
  slackKva: readonly number[] | null;
}

/** Where rows that count stand, for a refusal. */
export interface CountedRows {
  readonly kept: Int32Array;
  rowNumber: Int32Array;
  intervalS: number;
}

/**
 * Looks at columns as a whole.
 * @param columns under the meaning
 * @param meaning what the file is taken to mean
 * @param rows in time order
 * @param room takes one column at a time
 * @throws InputProblem where a register falls like none, or a power factor is beyond 1, naming the row
 */
export function columnFacts(
  columns: readonly MeantColumn[],
  meaning: CsvMeaning,
  rows: CountedRows,
  room?: Float64Array,
): ColumnFacts {
  const whole = (wanted: number) => wholeColumn(columns.find(({ column }) => column === wanted)!, room);
  const registers = new Map<number, number>();
  for (const column of registersAmong(columns, meaning, whole)) registers.set(column, decimalPower(whole(column)));
  return { registers, factor: factorFacts(columns, rows), slackKva: null };
}

function registersAmong(
  columns: readonly MeantColumn[],
  { energy }: CsvMeaning,
  whole: (column: number) => Float64Array,
): Iterable<number> {
  const energies = columns.filter(({ unit }) => unit.energy);
  if (energy === 'interval' || energies.length === 0) return [];
  const found = energyColumns(energies, (column) => movesOf(whole(column)));
  return energy === 'register' ? energies.map(({ column }) => column) : found.registers;
}

function factorFacts(columns: readonly MeantColumn[], rows: CountedRows): FactorFacts | null {
  const factors = columns.filter(({ quantity }) => quantity === 'powerFactor');
  const [first] = factors;
  // a power factor counts only where no column gives kvar
  if (first === undefined || isWhole(columns)) return null;
  const values = factors.map((column) => inBase({ ...column, values: wholeColumn(column) }, rows.intervalS));
  const signed = values.map((column, i) => factors[i]!.isSided || hasNegative(column));
  return {
    scale: scaleOf(values, { ...rows, factorColumn: first.column + 1 }),
    signed,
  };
}
