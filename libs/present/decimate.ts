/**
 * Thins a row of points to the least and the greatest of each column of pixels, in their order, so that no peak is lost.
 * @param place place of each point, ascending, in columns, length n
 * @param y value of each point, NaN for a gap, length n
 * @returns indices to draw, ascending; first and last of every column and of every unbroken stretch kept
 */
export function decimateColumns(place: ArrayLike<number>, y: ArrayLike<number>): number[] {
  const kept: number[] = [];
  let from = 0;
  while (from < y.length) {
    const column = Math.floor(place[from]!);
    const gap = Number.isNaN(y[from]);
    let to = from;
    while (to < y.length && Math.floor(place[to]!) === column && Number.isNaN(y[to]) === gap) to++;
    kept.push(...(gap ? [from] : extremes(y, from, to)));
    from = to;
  }
  return kept;
}

/** First, least, greatest and last of a stretch, each once, ascending. */
function extremes(y: ArrayLike<number>, from: number, to: number): number[] {
  let least = from;
  let greatest = from;
  for (let i = from + 1; i < to; i++) {
    if (y[i]! < y[least]!) least = i;
    if (y[i]! > y[greatest]!) greatest = i;
  }
  return [...new Set([from, least, greatest, to - 1])].sort((a, b) => a - b);
}
