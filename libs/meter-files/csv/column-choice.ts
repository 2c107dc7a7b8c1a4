import type { ColumnName, MeterMap, MeterUnit, VoltageBetween } from '#libs/contract/meter-map.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { type Candidates, type ColumnGroup, columnCandidates, namesOf } from './column-candidates.js';
import { CSV_QUANTITIES, type CsvQuantity } from './csv-quantity.js';
import type { HeaderColumn } from './header-column.js';
import { type ReadUnit, readUnit } from './unit-text.js';

/** A column that gives a quantity, and how its numbers become kW, kvar, kVA, V or A: value × times ÷ over. */
export interface QuantityColumn {
  quantity: CsvQuantity;
  /** counted from 0 */
  column: number;
  unit: ReadUnit;
  /** what its name says of a register */
  register: HeaderColumn['register'];
}

/** One way of giving the columns their meaning. */
export interface ColumnChoice {
  /** what a map would say to choose it, beside what the map says already */
  map: MeterMap;
  /** three columns of one quantity are its phases */
  columns: QuantityColumn[];
  /** what voltages are measured between, as far as anything says it */
  between: VoltageBetween | null;
}

/** More than this are not worked out for a question. */
const MOST_CHOICES = 16;

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
  const candidates = columnCandidates(header, map, headerRow);
  const sets = combined(candidates);
  if (sets.length === 0) refuseMissing(candidates, header, headerRow);
  const open = sets.flatMap((set) => withUnits(set, map, sets.length > 1));
  return open.flatMap((choice) => withVoltages(choice, header, map)).slice(0, MOST_CHOICES);
}

type ColumnSet = Partial<Record<CsvQuantity, ColumnGroup>>;

function refuseMissing(candidates: Candidates, header: readonly HeaderColumn[], row: number): never {
  const place = { ...(row > 0 ? { row } : {}), found: namesOf(header) };
  const problems: Problem[] = [];
  if (candidates.active.length === 0) {
    const expected = 'a column of active power or energy, such as kW or kWh';
    problems.push({ code: 'no-active-column', expected, ...place });
  }
  if (candidates.reactive.length + candidates.lagging.length === 0) {
    const expected = 'a column of reactive power or energy, such as kvar or kvarh, or of kVA or power factor';
    problems.push({ code: 'no-reactive-column', expected, ...place });
  }
  throw new InputProblem(problems);
}

function combined(candidates: Candidates): ColumnSet[] {
  const measured = times(reactiveSets(candidates), 'active', candidates.active, true).flatMap((set) =>
    withCounterpart(set, candidates),
  );
  // recorded kvar are not passed over because the kW beside them are missing
  const isRecorded = candidates.reactive.length + candidates.lagging.length + candidates.leading.length > 0;
  let sets = measured.length > 0 || isRecorded ? measured : workedOut(candidates);
  for (const quantity of ['exported', 'connected'] as const) sets = times(sets, quantity, candidates[quantity]);
  // several voltages (phases) can't be told from one line-to-line voltage, and nothing depends on them
  for (const quantity of ['voltage', 'standby'] as const) {
    const [group, ...others] = candidates[quantity];
    if (group?.length === 1 && others.length === 0) sets = times(sets, quantity, [group]);
  }
  return sets;
}

/** Lagging and leading go together; a column of neither with only one of them may be its other half or the whole. */
function reactiveSets({ reactive, lagging, leading }: Candidates): ColumnSet[] {
  const pairs = lagging.flatMap((lag) => leading.map((lead) => ({ lagging: lag, leading: lead })));
  const halves = reactive.flatMap((whole) => leading.map((lead) => ({ lagging: whole, leading: lead })));
  const alone = lagging.length > 0 && leading.length === 0 ? lagging.map((lag) => ({ lagging: lag })) : [];
  const wholes = reactive.map((whole) => ({ reactive: whole }));
  if (pairs.length > 0) return pairs;
  // two columns whose names say no more may be the two directions
  const [first, second, ...others] = lagging.length + leading.length === 0 ? reactive : [];
  const directions =
    first !== undefined && second !== undefined && others.length === 0 && areAlike(first, second)
      ? [
          { lagging: first, leading: second },
          { lagging: second, leading: first },
        ]
      : [];
  return [...alone, ...halves, ...wholes, ...directions];
}

/** Two directions are measured in one unit. */
function areAlike([a]: ColumnGroup, [b]: ColumnGroup): boolean {
  return a!.register === b!.register && a!.unit?.energy === b!.unit?.energy && a!.unit?.times === b!.unit?.times;
}

/** A set, and where another column may hold what flows the other way, the set with it too. */
function withCounterpart(set: ColumnSet, { active, exported }: Candidates): ColumnSet[] {
  const other = active.length === 2 && exported.length === 0 ? active.find((group) => group !== set.active) : undefined;
  return other === undefined || !areAlike(set.active!, other) ? [set] : [set, { ...set, exported: other }];
}

/** Columns from which kW and kvar can be worked out where the file lacks one or both; the most exact that are there. */
const WAYS: readonly (readonly CsvQuantity[])[] = [
  ['active', 'apparent', 'powerFactor'],
  ['active', 'apparent'],
  ['active', 'powerFactor'],
  ['active', 'voltage', 'current'],
  ['apparent', 'powerFactor'],
  ['voltage', 'current', 'powerFactor'],
];

function workedOut(candidates: Candidates): ColumnSet[] {
  // a greatest value is none of the interval
  const usable = (quantity: CsvQuantity) =>
    candidates[quantity].filter((group) => group.every(({ extreme }) => !extreme));
  const way = WAYS.find((quantities) => quantities.every((quantity) => usable(quantity).length > 0));
  if (way === undefined) return [];
  const sets = way.reduce<ColumnSet[]>((known, quantity) => times(known, quantity, usable(quantity)), [{}]);
  return sets.filter(hasWholeFactor);
}

/** A power factor a phase belongs to powers or currents a phase. */
function hasWholeFactor({ powerFactor, active, apparent, current }: ColumnSet): boolean {
  return powerFactor?.length !== 3 || [active, apparent, current].every((group) => (group?.length ?? 3) === 3);
}

function times(sets: ColumnSet[], quantity: CsvQuantity, groups: ColumnGroup[], needed = false): ColumnSet[] {
  if (groups.length === 0) return needed ? [] : sets;
  return sets.flatMap((set) => groups.map((group) => ({ ...set, [quantity]: set[quantity] ?? group })));
}

/** A set with the unit of every column; one choice a possible meaning where columns have none. */
function withUnits(set: ColumnSet, map: MeterMap, severalSets: boolean): ColumnChoice[] {
  const entries = (Object.entries(set) as [CsvQuantity, ColumnGroup][]).flatMap(([quantity, group]) =>
    group.map((column) => ({ quantity, column })),
  );
  const columnsMap: MeterMap = severalSets ? { columns: mapOf(set) } : {};
  const isBare = ({ quantity, column }: (typeof entries)[number]) => unitOf(quantity, column, map) === null;
  const bare = [...new Set(entries.filter(isBare).map(({ quantity }) => quantity))];
  const meanings: MeterMap[] = bare.length === 0 ? [{}] : meaningsOf(bare, set);
  return meanings.map((meaning) => ({
    map: { ...columnsMap, ...meaning },
    between: map.voltageBetween ?? null,
    columns: entries.map(({ quantity, column }) => ({
      quantity,
      column: column.index,
      register: column.register,
      unit: unitOf(quantity, column, { ...map, ...meaning, units: { ...map.units, ...meaning.units } }) ?? NO_UNIT,
    })),
  }));
}

function mapOf(set: ColumnSet): MeterMap['columns'] {
  const said = (group: ColumnGroup): ColumnName | ColumnName[] => {
    const [first, ...others] = group.map(({ index }) => index + 1);
    return others.length === 0 ? first! : [first!, ...others];
  };
  return Object.fromEntries(Object.entries(set).map(([quantity, group]) => [quantity, said(group)]));
}

/** Where current counts, a factor of √3 lies between the two ways of measuring a voltage. */
function withVoltages(choice: ColumnChoice, header: readonly HeaderColumn[], map: MeterMap): ColumnChoice[] {
  const voltages = choice.columns.filter(({ quantity }) => quantity === 'voltage');
  const named = new Set(voltages.map(({ column }) => header[column]?.between ?? null));
  const [said = null] = named.size === 1 ? [...named] : [];
  const between = map.voltageBetween ?? said;
  const matters = choice.columns.some(({ quantity }) => quantity === 'current');
  if (between !== null || !matters) return [{ ...choice, between }];
  return (['lineToLine', 'lineToNeutral'] as const).map((voltageBetween) => ({
    ...choice,
    map: { ...choice.map, voltageBetween },
    between: voltageBetween,
  }));
}

/** Powers and energies, in kilo and in plain units. */
function meaningsOf(bare: CsvQuantity[], set: ColumnSet): MeterMap[] {
  const words = bare.flatMap((quantity) => set[quantity]?.map(({ name }) => name) ?? []).join(' ');
  const power = /power|demand|leistung|puissance|potencia/i.test(words);
  const energy = /energy|arbeit|energie|energi|consum|usage|verbrauch/i.test(words);
  const plain = (...units: [active: MeterUnit, apparent: MeterUnit, reactive: MeterUnit]): MeterMap => ({
    units: Object.fromEntries(bare.map((quantity) => [quantity, units[FAMILY_ORDER.indexOf(familyOf(quantity))]])),
  });
  return [
    ...(power || !energy ? [{ quantity: 'power' as const }, plain('W', 'VA', 'var')] : []),
    ...(energy || !power ? [{ quantity: 'energy' as const }, plain('Wh', 'VAh', 'varh')] : []),
  ];
}

const FAMILY_ORDER = ['active', 'apparent', 'reactive'] as const;

function familyOf(quantity: CsvQuantity): (typeof FAMILY_ORDER)[number] {
  if (quantity === 'active' || quantity === 'exported') return 'active';
  return quantity === 'apparent' ? 'apparent' : 'reactive';
}

const KILO_UNITS = { active: 'kW', apparent: 'kVA', reactive: 'kvar' } as const;

/** The unit of a column: the map's, the header's, or what the map says of columns without one. */
function unitOf(quantity: CsvQuantity, column: HeaderColumn, map: MeterMap): ReadUnit | null {
  if (quantity === 'standby' || quantity === 'powerFactor') return NO_UNIT;
  const said = map.units?.[quantity];
  const unit = said === undefined ? column.unit : readUnit(said);
  if (unit !== null) return checkedUnit(quantity, column, unit);
  if (quantity === 'voltage') return readUnit('V');
  if (quantity === 'current') return readUnit('A');
  if (map.quantity === undefined) return null;
  return readUnit(`${KILO_UNITS[familyOf(quantity)]}${map.quantity === 'power' ? '' : 'h'}`);
}

type UnitQuantity = Exclude<CsvQuantity, 'standby' | 'powerFactor'>;

const FAMILIES: Record<UnitQuantity, readonly string[]> = {
  active: ['active'],
  exported: ['active'],
  // reactive power is often written in kW or kVA by mistake
  reactive: ['reactive', 'active', 'apparent'],
  lagging: ['reactive', 'active', 'apparent'],
  leading: ['reactive', 'active', 'apparent'],
  connected: ['reactive'],
  voltage: ['voltage'],
  apparent: ['apparent'],
  current: ['current'],
};

function checkedUnit(quantity: UnitQuantity, column: HeaderColumn, unit: ReadUnit): ReadUnit {
  if (FAMILIES[quantity].includes(unit.family)) return unit;
  const [family] = FAMILIES[quantity];
  const plain = family === 'voltage' || family === 'current';
  throw new InputProblem([
    {
      code: 'wrong-unit',
      column: column.index + 1,
      expected: `a unit of ${family}${plain ? '' : ' power or energy'}`,
      found: column.name,
    },
  ]);
}

/** Quantities in the order in which a reading names its columns. */
export function inOrder(columns: readonly QuantityColumn[]): QuantityColumn[] {
  return columns.toSorted((a, b) => CSV_QUANTITIES.indexOf(a.quantity) - CSV_QUANTITIES.indexOf(b.quantity));
}
