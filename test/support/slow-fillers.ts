// Numbers that stand for missing ones, by the rule as DEVELOPERS.md states it: such a number is a gap where it is below zero
// and nothing else of its column is, and more than three times anything else; it is a value within a fifth of a neighbour,
// or where its column goes on through several of them. Any other is asked about.

/** Cells that stand for nothing, and cells of which the file does not say what they are, by row. */
export interface SlowFillers {
  gaps: Set<number>;
  open: Set<number>;
}

/** Nines without end, and the ends of whole numbers of 16 and 32 bits with and without a sign. */
export function mayStandForNone(value: number): boolean {
  const size = Math.abs(value);
  if (/^9{3,10}$|^9{3,5}\.99?$/.test(String(size))) return true;
  return [2 ** 15, 2 ** 31].some((half) => size === half || size === half - 1 || size === 2 * half - 1);
}

/**
 * Looks a column through.
 * @param cells in the order of the file, null where one is missing
 */
export function slowFillers(cells: readonly (number | null)[]): SlowFillers {
  const found: SlowFillers = { gaps: new Set(), open: new Set() };
  const others = cells.filter((cell): cell is number => cell !== null && !mayStandForNone(cell));
  const size = others.reduce((most, other) => Math.max(most, Math.abs(other)), 0);
  const anyNegative = others.some((other) => other < 0);
  cells.forEach((cell, row) => {
    if (cell === null || !mayStandForNone(cell)) return;
    if (cell < 0 && !anyNegative && -cell > 3 * size) found.gaps.add(row);
    else if (!isValue(cells, row)) found.open.add(row);
  });
  return found;
}

function isValue(cells: readonly (number | null)[], row: number): boolean {
  const value = cells[row]!;
  const isNear = (other: number | null | undefined) =>
    other != null && !mayStandForNone(other) && Math.abs(other - value) <= Math.abs(value) * 0.2;
  if (isNear(cells[row - 1]) || isNear(cells[row + 1])) return true;
  const isOther = (cell: number | null) => cell === null || !mayStandForNone(cell);
  const before = cells.slice(0, row).findLast(isOther);
  const behind = cells.slice(row + 1).find(isOther);
  if (!isNear(before) || !isNear(behind)) return false;
  return Math.min(before!, behind!) <= value && value <= Math.max(before!, behind!);
}
