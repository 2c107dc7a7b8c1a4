import type { MeterColumn, MeterMap, MeterUnit } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { QUANTITIES, type Quantity } from '../record/build-columns.js';
import type { HeaderColumn } from './header-column.js';
import { type ReadUnit, readUnit } from './unit-text.js';

/** A column that gives a quantity, and how its numbers become kW, kvar or V: value × times ÷ over. */
export interface QuantityColumn {
  quantity: Quantity;
  /** counted from 0 */
  column: number;
  unit: ReadUnit;
}

/** One way of giving the columns their meaning. */
export interface ColumnChoice {
  /** what a map would say to choose it, beside what the map says already */
  map: MeterMap;
  columns: QuantityColumn[];
}

/** More than this are not worked out for a question. */
const MOST_CHOICES = 12;

const NO_UNIT: ReadUnit = { family: 'active', energy: false, times: 1, over: 1, smallMega: false };

/**
 * Every way in which the columns can be read; one where the header leaves nothing open.
 * @param header the columns
 * @param map what a person says
 * @param headerRow row of the header, for messages
 * @returns choices, at least one
 * @throws InputProblem where active or reactive power is missing, or the map names a column that is not there
 */
export function columnChoices(header: readonly HeaderColumn[], map: MeterMap, headerRow: number): ColumnChoice[] {
  const candidates = candidatesOf(header, map);
  refuseForeignUnits(candidates, header, headerRow);
  refuseMissing(candidates, header, headerRow);
  const sets = combined(candidates);
  const open = sets.flatMap((set) => withUnits(set, map, sets.length > 1));
  return open.slice(0, MOST_CHOICES);
}

type Candidates = Record<Quantity, HeaderColumn[]>;
type ColumnSet = Partial<Record<Quantity, HeaderColumn>>;

function candidatesOf(header: readonly HeaderColumn[], map: MeterMap): Candidates {
  const said = map.columns ?? {};
  const splitSaid = said.lagging !== undefined || said.leading !== undefined;
  const silenced = new Set<Quantity>([
    ...(said.reactive !== undefined ? (['lagging', 'leading'] as const) : []),
    ...(splitSaid ? (['reactive', 'lagging', 'leading'] as const) : []),
  ]);
  const taken = new Set(
    Object.entries(said).map(([quantity, column]) => columnNamed(header, column, `columns.${quantity}`)),
  );
  const candidates = {} as Candidates;
  for (const quantity of QUANTITIES) {
    const mapped = said[quantity as MeterColumn];
    if (mapped !== undefined) candidates[quantity] = [columnNamed(header, mapped, `columns.${quantity}`)];
    else if (silenced.has(quantity)) candidates[quantity] = [];
    else
      candidates[quantity] = best(header.filter((column) => isCandidate(column, quantity, map) && !taken.has(column)));
  }
  return candidates;
}

function isCandidate(column: HeaderColumn, quantity: Quantity, map: MeterMap): boolean {
  const readable = !column.foreignUnit || map.units?.[quantity as keyof MeterMap['units']] !== undefined;
  return column.role === quantity && readable;
}

/**
 * The column a map means.
 * @param header the columns
 * @param said number counted from 1, or name
 * @param path of the map's entry, for the message
 * @throws InputProblem where there is none
 */
export function columnNamed(header: readonly HeaderColumn[], said: number | string, path: string): HeaderColumn {
  const found =
    typeof said === 'number'
      ? header[said - 1]
      : (header.find(({ name }) => name === said.trim()) ??
        header.find(({ name }) => name.toLowerCase() === said.trim().toLowerCase()));
  if (found !== undefined) return found;
  const expected = `a column of the file: ${namesOf(header)}`;
  throw new InputProblem([{ code: 'out-of-range', path, expected, found: shown(said) }]);
}

/** Means before extremes, columns with a unit before those without, the whole before a phase. */
function best(columns: HeaderColumn[]): HeaderColumn[] {
  const rank = (column: HeaderColumn) =>
    (column.phase ? 4 : 0) + (column.extreme ? 2 : 0) + (column.unit === null ? 1 : 0);
  const least = Math.min(...columns.map(rank));
  return columns.filter((column) => rank(column) === least);
}

/** A column that is needed is not passed over because its unit can't be read. */
function refuseForeignUnits(candidates: Candidates, header: readonly HeaderColumn[], row: number): void {
  const given = (quantity: Quantity) =>
    candidates[quantity].length > 0 || (quantity === 'reactive' && candidates.lagging.length > 0);
  const problems = header
    .filter(
      ({ role, foreignUnit }) => foreignUnit && QUANTITIES.some((quantity) => quantity === role && !given(quantity)),
    )
    .map(({ index, name }) => ({
      code: 'wrong-unit' as const,
      ...(row > 0 ? { row } : {}),
      column: index + 1,
      expected: 'a unit of power or energy, such as kW, kWh, kvar or kvarh',
      found: shown(name),
    }));
  if (problems.length > 0) throw new InputProblem(problems);
}

function refuseMissing(candidates: Candidates, header: readonly HeaderColumn[], row: number): void {
  const place = { ...(row > 0 ? { row } : {}), found: namesOf(header) };
  const problems: Problem[] = [];
  if (candidates.active.length === 0) {
    problems.push({
      code: 'no-active-column',
      expected: 'a column of active power or energy, such as kW or kWh',
      ...place,
    });
  }
  if (candidates.reactive.length + candidates.lagging.length === 0) {
    const expected = 'a column of reactive power or energy, such as kvar or kvarh';
    problems.push({ code: 'no-reactive-column', expected, ...place });
  }
  const phases = [...candidates.active, ...candidates.reactive].filter(({ phase }) => phase);
  if (problems.length === 0 && phases.length > 1) {
    const expected = 'columns of all three phases together';
    problems.push({ code: 'not-supported-yet', expected, ...place, found: `a column a phase: ${namesOf(phases)}` });
  }
  if (problems.length > 0) throw new InputProblem(problems);
}

function namesOf(header: readonly HeaderColumn[]): string {
  const names = header.map(({ name, index }) => (name === '' ? `(column ${index + 1})` : name)).join(', ');
  return names.length > 300 ? `${names.slice(0, 300)}…` : names;
}

/** Lagging and leading go together; a column of neither with only one of them may be its other half or the whole. */
function combined(candidates: Candidates): ColumnSet[] {
  const { reactive, lagging, leading } = candidates;
  const pairs = lagging.flatMap((lag) => leading.map((lead) => ({ lagging: lag, leading: lead })));
  const halves = reactive.flatMap((whole) => leading.map((lead) => ({ lagging: whole, leading: lead })));
  const alone = lagging.length > 0 && leading.length === 0 ? lagging.map((lag) => ({ lagging: lag })) : [];
  const wholes = reactive.map((whole) => ({ reactive: whole }));
  const flows: ColumnSet[] = pairs.length > 0 ? pairs : [...alone, ...halves, ...wholes];
  let sets = flows;
  for (const quantity of ['active', 'exported', 'connected'] as const)
    sets = times(sets, quantity, candidates[quantity]);
  // several voltages (phases) can't be told from one line-to-line voltage, and nothing depends on them
  for (const quantity of ['voltage', 'standby'] as const) {
    if (candidates[quantity].length === 1) sets = times(sets, quantity, candidates[quantity]);
  }
  return sets;
}

function times(sets: ColumnSet[], quantity: Quantity, columns: HeaderColumn[]): ColumnSet[] {
  return columns.length === 0 ? sets : sets.flatMap((set) => columns.map((column) => ({ ...set, [quantity]: column })));
}

/** A set with the unit of every column; one choice a possible meaning where columns have none. */
function withUnits(set: ColumnSet, map: MeterMap, severalSets: boolean): ColumnChoice[] {
  const entries = Object.entries(set) as [Quantity, HeaderColumn][];
  const columnsMap: MeterMap = severalSets
    ? { columns: Object.fromEntries(entries.map(([quantity, { index }]) => [quantity, index + 1])) }
    : {};
  const bare = entries
    .filter(([quantity, column]) => unitOf(quantity, column, map) === null)
    .map(([quantity]) => quantity);
  const meanings: MeterMap[] = bare.length === 0 ? [{}] : meaningsOf(bare, set);
  return meanings.map((meaning) => ({
    map: { ...columnsMap, ...meaning },
    columns: entries.map(([quantity, column]) => ({
      quantity,
      column: column.index,
      unit: unitOf(quantity, column, { ...map, ...meaning, units: { ...map.units, ...meaning.units } }) ?? NO_UNIT,
    })),
  }));
}

/** Powers and energies, in kilo and in plain units. */
function meaningsOf(bare: Quantity[], set: ColumnSet): MeterMap[] {
  const words = bare.map((quantity) => set[quantity]?.name ?? '').join(' ');
  const power = /power|demand|leistung|puissance|potencia/i.test(words);
  const energy = /energy|arbeit|energie|energi|consum|usage|verbrauch/i.test(words);
  const plain = (w: MeterUnit, q: MeterUnit): MeterMap => ({
    units: Object.fromEntries(
      bare.map((quantity) => [quantity, quantity === 'active' || quantity === 'exported' ? w : q]),
    ),
  });
  return [
    ...(power || !energy ? [{ quantity: 'power' as const }, plain('W', 'var')] : []),
    ...(energy || !power ? [{ quantity: 'energy' as const }, plain('Wh', 'varh')] : []),
  ];
}

/** The unit of a column: the map's, the header's, or what the map says of columns without one. */
function unitOf(quantity: Quantity, column: HeaderColumn, map: MeterMap): ReadUnit | null {
  if (quantity === 'standby') return NO_UNIT;
  const said = map.units?.[quantity];
  const unit = said === undefined ? column.unit : readUnit(said);
  if (unit !== null) return checkedUnit(quantity, column, unit);
  if (quantity === 'voltage') return readUnit('V');
  if (map.quantity === undefined) return null;
  const active = quantity === 'active' || quantity === 'exported';
  return readUnit(`${active ? 'kW' : 'kvar'}${map.quantity === 'power' ? '' : 'h'}`);
}

const FAMILIES: Record<Exclude<Quantity, 'standby'>, readonly string[]> = {
  active: ['active'],
  exported: ['active'],
  // reactive power is often written in kW or kVA by mistake
  reactive: ['reactive', 'active', 'apparent'],
  lagging: ['reactive', 'active', 'apparent'],
  leading: ['reactive', 'active', 'apparent'],
  connected: ['reactive'],
  voltage: ['voltage'],
};

function checkedUnit(quantity: Exclude<Quantity, 'standby'>, column: HeaderColumn, unit: ReadUnit): ReadUnit {
  if (FAMILIES[quantity].includes(unit.family)) return unit;
  throw new InputProblem([
    {
      code: 'wrong-unit',
      column: column.index + 1,
      expected: `a unit of ${FAMILIES[quantity][0]} power or energy`.replace('voltage power or energy', 'voltage'),
      found: column.name,
    },
  ]);
}
