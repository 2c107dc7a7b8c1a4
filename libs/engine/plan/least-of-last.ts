/**
 * The least of each entry and of those just before it.
 * @param column any values, length n
 * @param before how many entries are looked back
 * @param least receives them, length n; a new column where absent
 * @returns length n, in the column's unit
 */
export function leastOfLast(
  column: Float64Array,
  before: number,
  least: Float64Array = new Float64Array(column.length),
): Float64Array {
  let at = 0;
  for (let i = 0; i < column.length; i++) {
    if (column[i]! <= column[at]!) at = i;
    else if (at < i - before) {
      at = i - before;
      for (let k = at + 1; k <= i; k++) if (column[k]! <= column[at]!) at = k;
    }
    least[i] = column[at]!;
  }
  return least;
}
