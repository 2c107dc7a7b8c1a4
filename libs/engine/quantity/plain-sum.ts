/**
 * Adds a stretch of a column in index order; a loop of its own, so that it is compiled once for all who add.
 * @param column any unit, length n
 * @param from first entry
 * @param end the entry to stop before
 * @param before sum of the entries before, same unit
 * @returns the sum, same unit
 */
export function plainSum(column: Float64Array, from: number, end: number, before = 0): number {
  let sum = before;
  for (let i = from; i < end; i++) sum += column[i]!;
  return sum;
}
