import { InputProblem } from '#libs/engine/index.js';

/**
 * What a column of power factors has to be divided by: 1, or 100 where it is written in percent (95 for 0.95).
 * @param columns power factors, one a phase
 * @param rows that count, where each stands in the file, and the column for messages, counted from 1
 * @throws InputProblem where a value fits neither, naming the row
 */
export function scaleOf(
  columns: readonly Float64Array[],
  rows: { kept: Int32Array; rowNumber: Int32Array; factorColumn: number },
): 1 | 100 {
  const firstRow = (fits: (size: number) => boolean) =>
    rows.kept.find((row) => columns.some((values) => fits(Math.abs(values[row]!)))) ?? -1;
  const above = firstRow((size) => size > 1);
  if (above < 0) return 1;
  const far = firstRow((size) => size > 100);
  const below = firstRow((size) => size > 0 && size <= 1);
  // in percent nothing is as small as 1 %; else a row of one of the two kinds is wrong
  if (far < 0 && below < 0) return 100;
  const row = far >= 0 ? far : Math.max(above, below);
  const expected =
    far >= 0
      ? 'a power factor of at most 1, or 100 %'
      : 'power factors of at most 1 throughout, or in percent throughout';
  const found = columns.map((values) => values[row]).join(', ');
  throw new InputProblem([
    { code: 'out-of-range', row: rows.rowNumber[row]!, column: rows.factorColumn, expected, found },
  ]);
}

/**
 * Whether any of the numbers is below zero.
 * @param values a column
 */
export function hasNegative(values: Float64Array): boolean {
  for (const value of values) if (value < 0) return true;
  return false;
}
