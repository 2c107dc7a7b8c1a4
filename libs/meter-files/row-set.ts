const FIRST_BYTES = 512;

/** A set of rows, one bit a row: in a large file a list of them would take up as much memory as its numbers. */
export class RowSet {
  #bits = new Uint8Array(FIRST_BYTES);
  #size = 0;

  get size(): number {
    return this.#size;
  }

  /** @param row index, counted from 0 */
  has(row: number): boolean {
    return ((this.#bits[row >> 3] ?? 0) & (1 << (row & 7))) !== 0;
  }

  /** @param row index, counted from 0 */
  add(row: number): void {
    if (this.has(row)) return;
    const at = row >> 3;
    if (at >= this.#bits.length) {
      const larger = new Uint8Array(Math.max(2 * this.#bits.length, at + 1));
      larger.set(this.#bits);
      this.#bits = larger;
    }
    this.#bits[at]! |= 1 << (row & 7);
    this.#size++;
  }

  /** @param row index, counted from 0 */
  delete(row: number): void {
    if (!this.has(row)) return;
    this.#bits[row >> 3]! &= ~(1 << (row & 7));
    this.#size--;
  }

  /** The rows, ascending. */
  *[Symbol.iterator](): Generator<number> {
    for (let at = 0; at < this.#bits.length; at++) {
      for (let bits = this.#bits[at]!, row = 8 * at; bits !== 0; bits >>= 1, row++) if ((bits & 1) !== 0) yield row;
    }
  }
}
