/**
 * Adds a stretch of a column in index order; a loop of its own, so that it is compiled once for all who add.
 * @param column any unit, length n
 * @param from first entry
 * @param end the entry to stop before
 * @returns the sum, same unit
 */
export function plainSum(column: Float64Array, from: number, end: number): number {
  let sum = 0;
  for (let i = from; i < end; i++) sum += column[i]!;
  return sum;
}
