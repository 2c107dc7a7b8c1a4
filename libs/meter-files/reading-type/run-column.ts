const FIRST_RUNS = 8;

/**
 * Numbers of a file that mostly rise in equal steps, such as stamps and rows: each stretch of equal steps is kept as its
 * beginning and its step. Every number comes back as it was added, NaN too; a negative zero as zero.
 */
export class RunColumn {
  count = 0;
  /** index at which each run begins, its first number and its step */
  #from = new Int32Array(FIRST_RUNS);
  #first = new Float64Array(FIRST_RUNS);
  #step = new Float64Array(FIRST_RUNS);
  #runs = 0;
  // the run looked at last
  #seen = 0;

  /** stretches kept; one takes 20 bytes, however many numbers it holds */
  get runs(): number {
    return this.#runs;
  }

  /** Adds a number behind those there are. */
  add(value: number): void {
    const run = this.#runs - 1;
    const length = this.count - (run < 0 ? 0 : this.#from[run]!);
    if (run >= 0 && length === 1 && this.#startsStep(run, value)) this.count++;
    else if (run >= 0 && length > 1 && Object.is(this.#first[run]! + this.#step[run]! * length, value)) this.count++;
    else this.#begin(value);
  }

  /**
   * The number at an index; quickest in order.
   * @param index below `count`
   */
  at(index: number): number {
    const from = this.#from;
    if (index < from[this.#seen]!) this.#seen = 0;
    if (this.#seen + 1 < this.#runs && index >= from[this.#seen + 1]!) this.#seen = this.#runOf(index);
    const run = this.#seen;
    return this.#first[run]! + this.#step[run]! * (index - from[run]!);
  }

  /** Whether one of the numbers passes a test. */
  some(test: (value: number) => boolean): boolean {
    for (let i = 0; i < this.count; i++) if (test(this.at(i))) return true;
    return false;
  }

  /** All numbers as they stand. */
  toNumbers(): Float64Array {
    const numbers = new Float64Array(this.count);
    for (let i = 0; i < numbers.length; i++) numbers[i] = this.at(i);
    return numbers;
  }

  /** Two numbers make a step where the second comes back from it. */
  #startsStep(run: number, value: number): boolean {
    const first = this.#first[run]!;
    const step = Number.isNaN(first) && Number.isNaN(value) ? 0 : value - first;
    if (!Number.isFinite(step) || !Object.is(first + step, value)) return false;
    this.#step[run] = step;
    return true;
  }

  #begin(value: number): void {
    const run = this.#runs;
    if (run === this.#from.length) {
      this.#from = larger(this.#from, new Int32Array(2 * run));
      this.#first = larger(this.#first, new Float64Array(2 * run));
      this.#step = larger(this.#step, new Float64Array(2 * run));
    }
    this.#from[run] = this.count;
    this.#first[run] = value;
    this.#step[run] = 0;
    this.#runs++;
    this.count++;
  }

  #runOf(index: number): number {
    const from = this.#from;
    const next = this.#seen + 1;
    if (next + 1 >= this.#runs || index < from[next + 1]!) return next;
    let [low, high] = [next + 1, this.#runs - 1];
    while (low < high) {
      const middle = (low + high + 1) >> 1;
      if (from[middle]! <= index) low = middle;
      else high = middle - 1;
    }
    return low;
  }
}

function larger<T extends Int32Array | Float64Array>(from: T, to: T): T {
  to.set(from);
  return to;
}
