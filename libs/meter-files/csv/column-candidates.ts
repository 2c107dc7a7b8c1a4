import type { ColumnName, MeterColumn, MeterMap } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { CSV_QUANTITIES, type CsvQuantity } from './csv-quantity.js';
import type { HeaderColumn } from './header-column.js';

/** One column, or several that are added: three phases, two quadrants. */
export type ColumnGroup = readonly HeaderColumn[];

/** The columns that can give each quantity. */
export type Candidates = Record<CsvQuantity, ColumnGroup[]>;

/**
 * The columns that can give each quantity: those the map names, else those whose names fit best.
 * @param header the columns
 * @param map what a person says
 * @param row row of the header, for messages
 * @throws InputProblem where the map names a column that is not there, a unit can't be read, or a phase is missing
 */
export function columnCandidates(header: readonly HeaderColumn[], map: MeterMap, row: number): Candidates {
  const said = map.columns ?? {};
  const silenced = silencedBy(said);
  const taken = new Set(
    Object.entries(said).flatMap(([quantity, columns]) => columnsNamed(header, columns, `columns.${quantity}`)),
  );
  const candidates = {} as Candidates;
  const broken: HeaderColumn[] = [];
  for (const quantity of CSV_QUANTITIES) {
    const mapped = said[quantity];
    const columns = best(header.filter((column) => isCandidate(column, quantity, map) && !taken.has(column)));
    if (mapped !== undefined) candidates[quantity] = [columnsNamed(header, mapped, `columns.${quantity}`)];
    else
      candidates[quantity] = silenced.has(quantity)
        ? []
        : (phaseGroups(columns, quantity) ?? brokenInto(broken, columns));
  }
  refuseForeignUnits(candidates, header, row);
  refuseBrokenPhases(broken, row);
  return candidates;
}

/** A map that says how reactive power is given leaves no room for other columns of it. */
function silencedBy(said: NonNullable<MeterMap['columns']>): Set<CsvQuantity> {
  const silenced = new Set<CsvQuantity>();
  const silence = (...quantities: CsvQuantity[]) => {
    for (const quantity of quantities) silenced.add(quantity);
  };
  if (said.reactive !== undefined) silence('lagging', 'leading');
  if (said.lagging !== undefined || said.leading !== undefined) silence('reactive', 'lagging', 'leading');
  const split = said.reactive ?? said.lagging ?? said.leading;
  const otherwise = said.apparent ?? said.powerFactor ?? said.current;
  if (otherwise !== undefined && split === undefined) silence('reactive', 'lagging', 'leading');
  return silenced;
}

function isCandidate(column: HeaderColumn, quantity: CsvQuantity, map: MeterMap): boolean {
  const readable = !column.foreignUnit || map.units?.[quantity as keyof MeterMap['units']] !== undefined;
  return column.role === quantity && readable;
}

/** Means before extremes, columns with a unit before those without, the whole before a phase, intervals before registers. */
function best(columns: HeaderColumn[]): HeaderColumn[] {
  const rank = (column: HeaderColumn) =>
    (column.register === 'said' ? 8 : 0) +
    (column.phase > 0 || column.quadrant > 0 ? 4 : 0) +
    (column.extreme ? 2 : 0) +
    (column.unit === null ? 1 : 0);
  const least = Math.min(...columns.map(rank));
  return columns.filter((column) => rank(column) === least);
}

/** Quantities of which a phase alone must not pass for the whole. */
const SUMMED: readonly CsvQuantity[] = [
  'active',
  'exported',
  'reactive',
  'lagging',
  'leading',
  'apparent',
  'connected',
];

/** Parts of a whole as one group, each other column as its own; null where a phase that is needed is missing. */
function phaseGroups(columns: HeaderColumn[], quantity: CsvQuantity): ColumnGroup[] | null {
  if (columns.length > 0 && columns.every(({ quadrant }) => quadrant > 0)) return [columns];
  const counted = columns.length === 3 && columns.every(({ countedPhase }) => countedPhase > 0);
  if (counted) return [columns, ...columns.map((column) => [column])];
  if (columns.every(({ phase }) => phase === 0)) return columns.map((column) => [column]);
  const three = columns.toSorted((a, b) => a.phase - b.phase);
  if (three.length === 3 && three.every(({ phase }, index) => phase === index + 1)) return [three];
  if (SUMMED.includes(quantity)) return null;
  return quantity === 'voltage' && columns.length === 1 ? [columns] : [];
}

function brokenInto(broken: HeaderColumn[], columns: HeaderColumn[]): ColumnGroup[] {
  broken.push(...columns);
  return [];
}

function refuseBrokenPhases(broken: HeaderColumn[], row: number): void {
  if (broken.length === 0) return;
  const expected = 'one column for each of the three phases, or one for all of them';
  const problem = { code: 'inconsistent' as const, column: broken[0]!.index + 1, expected, found: namesOf(broken) };
  throw new InputProblem([{ ...problem, ...(row > 0 ? { row } : {}) }]);
}

/** A column that is needed is not passed over because its unit can't be read. */
function refuseForeignUnits(candidates: Candidates, header: readonly HeaderColumn[], row: number): void {
  const given = (quantity: CsvQuantity) =>
    candidates[quantity].length > 0 || (quantity === 'reactive' && candidates.lagging.length > 0);
  const isNeeded = (role: MeterColumn | null) =>
    role !== 'apparent' &&
    role !== 'current' &&
    CSV_QUANTITIES.some((quantity) => quantity === role && !given(quantity));
  const problems: Problem[] = header
    .filter(({ role, foreignUnit }) => foreignUnit && isNeeded(role))
    .map(({ index, name }) => ({
      code: 'wrong-unit' as const,
      ...(row > 0 ? { row } : {}),
      column: index + 1,
      expected: 'a unit of power or energy, such as kW, kWh, kvar or kvarh',
      found: shown(name),
    }));
  if (problems.length > 0) throw new InputProblem(problems);
}

/**
 * The columns a map means.
 * @param header the columns
 * @param said numbers counted from 1, or names
 * @param path of the map's entry, for the message
 * @throws InputProblem where one is not there
 */
export function columnsNamed(
  header: readonly HeaderColumn[],
  said: ColumnName | readonly ColumnName[],
  path: string,
): ColumnGroup {
  return (typeof said === 'object' ? said : [said]).map((one) => columnNamed(header, one, path));
}

function columnNamed(header: readonly HeaderColumn[], said: ColumnName, path: string): HeaderColumn {
  const found =
    typeof said === 'number'
      ? header[said - 1]
      : (header.find(({ name }) => name === said.trim()) ??
        header.find(({ name }) => name.toLowerCase() === said.trim().toLowerCase()));
  if (found !== undefined) return found;
  const expected = `a column of the file: ${namesOf(header)}`;
  throw new InputProblem([{ code: 'out-of-range', path, expected, found: shown(said) }]);
}

/**
 * Names of columns as a message lists them.
 * @param header the columns
 */
export function namesOf(header: readonly HeaderColumn[]): string {
  const names = header.map(({ name, index }) => (name === '' ? `(column ${index + 1})` : name)).join(', ');
  return names.length > 300 ? `${names.slice(0, 300)}…` : names;
}
