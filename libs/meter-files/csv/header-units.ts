import { unitInCells } from './cell-tails.js';
import type { HeaderColumn } from './header-column.js';
import { headerColumns } from './header-sets.js';
import { readUnit } from './unit-text.js';

/**
 * Whether words under the names are their units: no more of them than names, and one of them a unit.
 * @param under cells of the row
 * @param names cells of the header row
 */
export function isUnitRow(under: readonly string[], names: readonly string[]): boolean {
  return under.length <= names.length + 1 && under.some((cell) => readUnit(bare(cell)) !== null);
}

/**
 * A name with the unit that stands below it.
 * @param name a cell of the header row
 * @param unit the cell below it
 */
export function withUnit(name: string, unit: string | undefined): string {
  return unit === undefined || readUnit(bare(unit)) === null ? name : `${name} [${bare(unit)}]`;
}

/**
 * The columns, those without a unit with the one that stands behind each number below them.
 * @param header the columns
 * @param data first rows of data, as texts
 */
export function withCellUnits(header: HeaderColumn[], data: readonly string[][]): HeaderColumn[] {
  const named = header.map(({ name, index, unit, role }) => {
    const said = unit === null && role !== 'time' ? unitInCells(data.map((cells) => cells[index] ?? '')) : null;
    return said === null ? name : `${name} [${said}]`;
  });
  return named.every((name, index) => name === header[index]!.name) ? header : headerColumns(named);
}

function bare(unit: string): string {
  return unit.replace(/^[([{<]|[)\]}>]$/g, '').trim();
}
