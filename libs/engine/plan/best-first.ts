/** Numbered things by their keys, the greatest key first. */
export class BestFirst {
  #keys: Float64Array;
  #ids: Int32Array;
  #size = 0;

  /** @param capacity most things at a time */
  constructor(capacity: number) {
    this.#keys = new Float64Array(capacity);
    this.#ids = new Int32Array(capacity);
  }

  /** @returns things in it */
  get size(): number {
    return this.#size;
  }

  /** @returns the greatest key; −∞ where there is nothing */
  get greatestKey(): number {
    return this.#size === 0 ? Number.NEGATIVE_INFINITY : this.#keys[0]!;
  }

  /**
   * @param id number of the thing
   * @param key its key
   */
  push(id: number, key: number): void {
    let at = this.#size++;
    while (at > 0) {
      const parent = (at - 1) >> 1;
      if (this.#keys[parent]! >= key) break;
      this.#move(parent, at);
      at = parent;
    }
    this.#keys[at] = key;
    this.#ids[at] = id;
  }

  /** @returns the thing of the greatest key, taken out; at least one is in */
  pop(): number {
    const top = this.#ids[0]!;
    this.#size--;
    if (this.#size > 0) this.#sink(this.#ids[this.#size]!, this.#keys[this.#size]!);
    return top;
  }

  #sink(id: number, key: number): void {
    let at = 0;
    for (;;) {
      let child = 2 * at + 1;
      if (child >= this.#size) break;
      if (child + 1 < this.#size && this.#keys[child + 1]! > this.#keys[child]!) child++;
      if (this.#keys[child]! <= key) break;
      this.#move(child, at);
      at = child;
    }
    this.#keys[at] = key;
    this.#ids[at] = id;
  }

  #move(from: number, to: number): void {
    this.#keys[to] = this.#keys[from]!;
    this.#ids[to] = this.#ids[from]!;
  }

  /** @returns what is left, in no order */
  rest(): Int32Array {
    return this.#ids.slice(0, this.#size);
  }
}
