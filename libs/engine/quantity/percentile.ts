/**
 * Percentile of an ascending column: position (n−1)·p, linear between neighbours.
 * @param ascending sorted values, any unit, length n ≥ 1
 * @param share 0 … 1
 * @returns the value at that position, same unit
 * @throws Error on an empty column (a fault of ours)
 * @source hyndman-fan-1996 (definition 7)
 */
export function percentile(ascending: ArrayLike<number>, share: number): number {
  const n = ascending.length;
  if (n === 0) throw new Error('percentile of an empty column');
  const position = (n - 1) * Math.min(1, Math.max(0, share));
  const below = Math.floor(position);
  const low = ascending[below]!;
  const high = ascending[Math.min(n - 1, below + 1)]!;
  return low + (position - below) * (high - low);
}
