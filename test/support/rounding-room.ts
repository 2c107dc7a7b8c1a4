/** Half the distance from 1 to the next double. */
const HALF_PLACE = 2 ** -53;

/**
 * What rounding alone may move an inverse by: with each entry of Y off by half its last place, Z = Y⁻¹ is off by no more
 * than |Z|·|Y|·|Z| of that, to first order. Near a resonance it is much, and no method with doubles does better.
 * @param y sizes of the entries of a matrix, row after row
 * @param z sizes of the entries of its inverse
 * @param n rows
 * @returns the greatest of it over all entries, against the two diagonal entries of Z an entry lies between
 */
export function roundingRoom(y: Float64Array, z: Float64Array, n: number): number {
  const zy = product(z, y, n);
  const moved = product(zy, z, n);
  let most = 0;
  for (let r = 0; r < n; r++) {
    for (let c = 0; c < n; c++) {
      most = Math.max(most, moved[r * n + c]! / Math.sqrt(z[r * n + r]! * z[c * n + c]!));
    }
  }
  return HALF_PLACE * most;
}

function product(a: Float64Array, b: Float64Array, n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let r = 0; r < n; r++) {
    for (let c = 0; c < n; c++) {
      for (let k = 0; k < n; k++) out[r * n + c]! += a[r * n + k]! * b[k * n + c]!;
    }
  }
  return out;
}
