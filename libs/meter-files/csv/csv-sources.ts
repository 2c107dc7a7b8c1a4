import type { QuantitySource } from '../record/build-columns.js';
import type { IntervalGrid } from '../record/interval-grid.js';
import type { ColumnFacts } from './column-facts.js';
import type { CsvMeaning } from './csv-meaning.js';
import type { CsvQuantity } from './csv-quantity.js';
import { differencesOf } from './energy-registers.js';
import { inBase, isWhole, type RawColumn } from './raw-columns.js';
import { sumOf, type WorkedOutPowers, workedOutPowers } from './worked-out-powers.js';

/** Where the rows stand in time. */
export interface PlacedRows {
  grid: Pick<IntervalGrid, 'kept' | 'intervalS'>;
  utcS: Float64Array;
  rowNumber: Int32Array;
  /** stamps mark the ends of intervals */
  ends: boolean;
  /** no other meaning is looked at, so that columns may be turned into the record's own in place */
  only: boolean;
  /** where columns that are worked out come from, all 0 */
  fresh?: (length: number) => Float64Array;
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
 * @param facts what the columns show as a whole, of which these rows may be a part
 * @throws InputProblem where the numbers contradict each other
 */
export function csvSources(
  raw: readonly RawColumn[],
  meaning: CsvMeaning,
  placed: PlacedRows,
  facts: ColumnFacts,
): CsvSources {
  const { registers } = facts;
  const { only, fresh = (length: number) => new Float64Array(length) } = placed;
  const rows = { ...placed, kept: placed.grid.kept, intervalS: placed.grid.intervalS };
  // columns that nobody else needs are turned into what they mean where they stand
  const spare = only && new Set(raw.map(({ column }) => column)).size === raw.length;
  let falls = 0;
  const columns = raw.map((column) => {
    const power = registers.get(column.column);
    if (power === undefined) return column;
    const room = spare ? column.values : fresh(column.values.length);
    const differences = differencesOf(column.values, rows, { power, room });
    falls += differences.falls;
    return { ...column, values: differences.values };
  });
  const { kept } = placed.grid;
  const inner = registers.size === 0 ? kept : placed.ends ? kept.subarray(1) : kept.subarray(0, -1);
  const groups = groupsOf(columns);
  const whole = isWhole(columns);
  const workedOut = whole ? null : workOut(groups, meaning, { ...placed, kept: inner, spare }, facts);
  const given = workedOut === null ? [...groups.keys()] : GIVEN_BESIDE;
  const rest = { intervalS: rows.intervalS, spare };
  return {
    sources: [
      ...given.flatMap((quantity) => givenSource(groups.get(quantity), meaning, rest)),
      ...(workedOut === null ? [] : workedOutSources(workedOut, groups)),
    ].map((source) => multiplied(source, meaning.multiplier)),
    kept: inner,
    registers: [...registers.keys()],
    falls,
    phases: [...groups.values()].flatMap((group) => (group.length === 3 ? group.map(({ column }) => column) : [])),
    workedOut,
  };
}

type Groups = Map<CsvQuantity, RawColumn[]>;

function groupsOf(columns: readonly RawColumn[]): Groups {
  const groups: Groups = new Map();
  for (const column of columns) groups.set(column.quantity, [...(groups.get(column.quantity) ?? []), column]);
  return groups;
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
    return [{ ...source, spare: true, values: sumOf(group.map(({ values }) => values)), times: first.unit.times }];
  }
  // phases in different units
  return [
    {
      ...source,
      values: sumOf(group.map((one) => inBase(one, intervalS))),
      energy: false,
      times: 1,
      over: 1,
      spare: true,
    },
  ];
}

function sameUnit(a: RawColumn['unit'], b: RawColumn['unit']): boolean {
  return a.energy === b.energy && a.times === b.times && a.over === b.over;
}

function workOut(
  groups: Groups,
  { choice, powerFactorSign }: CsvMeaning,
  placed: PlacedRows & { kept: Int32Array; spare: boolean },
  { factor, slackKva }: ColumnFacts,
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
      factor,
      slackKva,
      kept: placed.kept,
      spare: placed.spare,
      rowNumber: placed.rowNumber.subarray(0, placed.utcS.length),
      apparentColumn: numberOf('apparent'),
    },
  );
}

function workedOutSources(powers: WorkedOutPowers, groups: Groups): QuantitySource[] {
  const plain = { energy: false, times: 1, over: 1, spare: true };
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
