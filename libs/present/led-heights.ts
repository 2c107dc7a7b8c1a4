/** How words stand that lead back to points of a chart, in the renderer's unit. */
export interface LedRoom {
  /** from one line of words to the next */
  line: number;
  /** so far above its point a line stands at least */
  above: number;
  /** no line stands higher */
  top: number;
}

/**
 * Heights of words that lead back to their points: each at its point or above it, a line apart, so that a curve falling
 * away to the right of the points stays free of them. Where there is no room above, they go down.
 * @param points heights of the points, growing downwards, in any order
 * @param room line, distance and top, in the same unit
 * @returns heights of their words, in the order of the points
 */
export function ledHeights(points: readonly number[], { line, above, top }: LedRoom): number[] {
  const upwards = points.map((y, at) => ({ y, at })).sort((a, b) => b.y - a.y);
  const heights = new Array<number>(points.length).fill(0);
  let highest = Number.POSITIVE_INFINITY;
  for (const { y, at } of upwards) {
    highest = Math.min(y - above, highest - line);
    heights[at] = highest;
  }
  let lowest = top - line;
  for (const { at } of upwards.reverse()) {
    lowest = Math.max(heights[at]!, lowest + line);
    heights[at] = lowest;
  }
  return heights;
}
