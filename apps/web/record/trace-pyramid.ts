/** Values a cell of the next storey stands for. */
const WIDE = 16;

/** Least and greatest of a column over stretches of growing length, so that any stretch is answered in a few steps. */
export class TracePyramid {
  readonly #storeys: { least: Float32Array; most: Float32Array }[];

  /** @param column values; NaN where there is none */
  constructor(column: Float32Array) {
    this.#storeys = [{ least: column, most: column }];
    for (let below = this.#storeys[0]!; below.least.length > WIDE; below = this.#storeys.at(-1)!) {
      this.#storeys.push(storeyOver(below));
    }
  }

  /**
   * Least and greatest between two indices, widened to whole cells where that is within a pixel; without any value
   * +∞ and −∞.
   * @param from first index
   * @param to one after the last
   */
  extent(from: number, to: number): { least: number; most: number } {
    let storey = 0;
    let wide = 1;
    while (storey + 1 < this.#storeys.length && to - from >= 8 * wide * WIDE) {
      storey++;
      wide *= WIDE;
    }
    const { least, most } = this.#storeys[storey]!;
    const first = Math.floor(from / wide);
    const last = Math.min(least.length, Math.max(first + 1, Math.ceil(to / wide)));
    let low = Number.POSITIVE_INFINITY;
    let high = Number.NEGATIVE_INFINITY;
    for (let i = first; i < last; i++) {
      if (least[i]! < low) low = least[i]!;
      if (most[i]! > high) high = most[i]!;
    }
    return { least: low, most: high };
  }
}

function storeyOver({ least, most }: { least: Float32Array; most: Float32Array }) {
  const count = Math.ceil(least.length / WIDE);
  const over = { least: new Float32Array(count), most: new Float32Array(count) };
  for (let cell = 0; cell < count; cell++) {
    const end = Math.min(least.length, (cell + 1) * WIDE);
    let low = Number.POSITIVE_INFINITY;
    let high = Number.NEGATIVE_INFINITY;
    for (let i = cell * WIDE; i < end; i++) {
      if (least[i]! < low) low = least[i]!;
      if (most[i]! > high) high = most[i]!;
    }
    over.least[cell] = low;
    over.most[cell] = high;
  }
  return over;
}
