import type { QuantitySource } from '../record/build-columns.js';
import type { IntervalGrid } from '../record/interval-grid.js';
import type { QuantityColumn } from './column-choice.js';
import type { CsvFile, CsvMeaning, ReadRows } from './csv-meaning.js';
import type { CsvQuantity } from './csv-quantity.js';
import { type DecimalSign, KEPT_COLUMNS, thousands } from './decimal-mark.js';
import { differencesOf, energyColumns, movesOf } from './energy-registers.js';
import { sumOf, type WorkedOutPowers, workedOutPowers } from './worked-out-powers.js';

/** A column of a file in the meaning it is read under. */
export interface RawColumn extends QuantityColumn {
  values: Float64Array;
}

/**
 * The columns of a file under one meaning, as read.
 * @param file what was read
 * @param meaning what it is taken to mean
 * @param missing rows whose quality says that they hold no value
 */
export function rawColumns(
  { reader }: CsvFile,
  { choice, decimal }: CsvMeaning,
  missing: ReadonlySet<number>,
): RawColumn[] {
  const values = valuesUnder(reader, decimal).map((column) => (missing.size === 0 ? column : without(column, missing)));
  return choice.columns.map((column) => ({ ...column, values: values[reader.columns.indexOf(column.column)]! }));
}

function without(column: Float64Array, missing: ReadonlySet<number>): Float64Array {
  const values = column.slice();
  for (const row of missing) values[row] = Number.NaN;
  return values;
}

/**
 * The columns, numbers whose only mark divides thousands put right.
 * @param read rows and what their numbers leave open
 * @param decimal mark they are read under
 */
export function valuesUnder(
  { rows, mark }: Pick<ReadRows, 'rows' | 'mark'>,
  decimal: DecimalSign | null,
): Float64Array[] {
  const divided = decimal === ',' ? mark.openDots : decimal === '.' ? mark.openCommas : [];
  const values = rows.values.map((column) => column.subarray(0, rows.count));
  const own = new Set<number>();
  for (const kept of divided) {
    const k = kept % KEPT_COLUMNS;
    if (!own.has(k)) values[k] = values[k]!.slice();
    own.add(k);
    const index = (kept - k) / KEPT_COLUMNS;
    values[k]![index] = thousands(values[k]![index]!);
  }
  return values;
}

/** Where the rows stand in time. */
export interface PlacedRows {
  grid: IntervalGrid;
  utcS: Float64Array;
  rowNumber: Int32Array;
  /** stamps mark the ends of intervals */
  ends: boolean;
  /** no other meaning is looked at, so that columns may be turned into the record's own in place */
  only: boolean;
}

/** The sources of a record, and what was done to get them. */
export interface CsvSources {
  sources: QuantitySource[];
  /** rows that can hold an interval: a register's outermost reading begins or ends one only */
  kept: Int32Array;
  /** columns of registers, counted from 0, and the intervals over which one falls */
  registers: number[];
  falls: number;
  /** columns of phases that were added up */
  phases: number[];
  /** powers that no column gives */
  workedOut: WorkedOutPowers | null;
}

/**
 * Turns the columns of a file into sources of a record's quantities: registers become energies of intervals, phases are
 * added, kW and kvar are worked out where no column gives them, a transformer ratio is multiplied in.
 * @param raw columns as read
 * @param meaning what they mean
 * @param placed where the rows stand in time
 * @throws InputProblem where the numbers contradict each other
 */
export function csvSources(raw: readonly RawColumn[], meaning: CsvMeaning, placed: PlacedRows): CsvSources {
  const registers = registersOf(raw, meaning);
  const rows = { ...placed, kept: placed.grid.kept, intervalS: placed.grid.intervalS };
  let falls = 0;
  const columns = raw.map((column) => {
    if (!registers.has(column.column)) return column;
    const differences = differencesOf(column.values, rows);
    falls += differences.falls;
    return { ...column, values: differences.values };
  });
  const { kept } = placed.grid;
  const inner = registers.size === 0 ? kept : placed.ends ? kept.subarray(1) : kept.subarray(0, -1);
  const groups = groupsOf(columns);
  const whole = isWhole(groups);
  const workedOut = whole ? null : workOut(groups, meaning, { ...placed, kept: inner });
  const given = workedOut === null ? [...groups.keys()] : GIVEN_BESIDE;
  const distinct = new Set(raw.map(({ column }) => column)).size === raw.length;
  const rest = { intervalS: rows.intervalS, spare: placed.only && distinct && workedOut === null };
  return {
    sources: [
      ...given.flatMap((quantity) => givenSource(groups.get(quantity), meaning, rest)),
      ...(workedOut === null ? [] : workedOutSources(workedOut, groups)),
    ].map((source) => multiplied(source, meaning.multiplier)),
    kept: inner,
    registers: [...registers],
    falls,
    phases: [...groups.values()].flatMap((group) => (group.length > 1 ? group.map(({ column }) => column) : [])),
    workedOut,
  };
}

type Groups = Map<CsvQuantity, RawColumn[]>;

function groupsOf(columns: readonly RawColumn[]): Groups {
  const groups: Groups = new Map();
  for (const column of columns) groups.set(column.quantity, [...(groups.get(column.quantity) ?? []), column]);
  return groups;
}

function registersOf(raw: readonly RawColumn[], { energy }: CsvMeaning): Set<number> {
  if (energy === 'interval') return new Set();
  const energies = raw.filter(({ unit }) => unit.energy);
  if (energies.length === 0) return new Set();
  const found = energyColumns(energies, movesIn(raw));
  return energy === 'register' ? new Set(energies.map(({ column }) => column)) : found.registers;
}

/** How each column moves, by its number. */
export function movesIn(raw: readonly RawColumn[]) {
  return (column: number) => movesOf(raw.find((other) => other.column === column)!.values);
}

function isWhole(groups: Groups): boolean {
  return groups.has('active') && (groups.has('reactive') || groups.has('lagging'));
}

/** Quantities that are taken as they are even where others are worked out. */
const GIVEN_BESIDE: readonly CsvQuantity[] = ['voltage', 'connected', 'standby'];

function givenSource(
  group: RawColumn[] | undefined,
  { choice }: CsvMeaning,
  { intervalS, spare }: { intervalS: number; spare: boolean },
): QuantitySource[] {
  const [first] = group ?? [];
  if (group === undefined || first === undefined) return [];
  const { quantity, column } = first;
  if (quantity === 'apparent' || quantity === 'powerFactor' || quantity === 'current') return [];
  if (quantity === 'voltage' && group.length > 1) return [];
  const line = quantity === 'voltage' && choice.between === 'lineToNeutral' ? Math.sqrt(3) : 1;
  const source = { quantity, column: column + 1, energy: first.unit.energy, over: first.unit.over, spare };
  if (group.length === 1) return [{ ...source, values: first.values, times: first.unit.times * line }];
  if (group.every(({ unit }) => sameUnit(unit, first.unit))) {
    return [{ ...source, values: sumOf(group.map(({ values }) => values)), times: first.unit.times }];
  }
  // phases in different units
  return [{ ...source, values: sumOf(group.map((one) => inBase(one, intervalS))), energy: false, times: 1, over: 1 }];
}

function sameUnit(a: RawColumn['unit'], b: RawColumn['unit']): boolean {
  return a.energy === b.energy && a.times === b.times && a.over === b.over;
}

function workOut(
  groups: Groups,
  { choice, powerFactorSign }: CsvMeaning,
  placed: PlacedRows & { kept: Int32Array },
): WorkedOutPowers {
  const { intervalS } = placed.grid;
  const of = (quantity: CsvQuantity) => groups.get(quantity)?.map((column) => inBase(column, intervalS)) ?? null;
  const exported = of('exported');
  const active = of('active');
  const net =
    active === null || exported === null ? active : [sumOf(active).map((kw, row) => kw - sumOf(exported)[row]!)];
  const numberOf = (quantity: CsvQuantity) => (groups.get(quantity)?.[0]?.column ?? -1) + 1;
  return workedOutPowers(
    {
      activeKw: net,
      apparentKva: of('apparent'),
      powerFactor: of('powerFactor'),
      voltageV: of('voltage'),
      currentA: of('current'),
    },
    {
      sign: powerFactorSign,
      between: choice.between,
      kept: placed.kept,
      rowNumber: placed.rowNumber.subarray(0, placed.utcS.length),
      apparentColumn: numberOf('apparent'),
      factorColumn: numberOf('powerFactor'),
    },
  );
}

/** A column in kW, kVA, V or A; energies as means of the interval. */
function inBase({ values, unit }: RawColumn, intervalS: number): Float64Array {
  const times = unit.times * (unit.energy ? 3600 : 1);
  const over = unit.over * (unit.energy ? intervalS : 1);
  return times === 1 && over === 1 ? values : values.map((value) => (value * times) / over);
}

function workedOutSources(powers: WorkedOutPowers, groups: Groups): QuantitySource[] {
  const plain = { energy: false, times: 1, over: 1 };
  const column =
    ((groups.get('apparent') ?? groups.get('powerFactor') ?? groups.get('current'))?.[0]?.column ?? -1) + 1;
  return [
    { ...plain, quantity: 'active', values: powers.activeKw, column: (groups.get('active')?.[0]?.column ?? -1) + 1 },
    { ...plain, quantity: powers.unsigned ? 'lagging' : 'reactive', values: powers.reactiveKvar, column },
  ];
}

const MULTIPLIED: readonly CsvQuantity[] = ['active', 'exported', 'reactive', 'lagging', 'leading'];

function multiplied(source: QuantitySource, multiplier: number): QuantitySource {
  return multiplier === 1 || !MULTIPLIED.includes(source.quantity)
    ? source
    : { ...source, times: source.times * multiplier };
}
