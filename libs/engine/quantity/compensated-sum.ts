/**
 * Adds a column with Neumaier's compensation, in index order, so that a year's sum is exact to the last digits.
 * @param values column, any unit
 * @param from first entry
 * @param end the entry to stop before
 * @param least what is less counts as this much, same unit
 * @returns the sum, same unit
 * @source neumaier-1974
 */
export function compensatedSum(
  values: ArrayLike<number>,
  from = 0,
  end = values.length,
  least = Number.NEGATIVE_INFINITY,
): number {
  let sum = 0;
  let lost = 0;
  for (let i = from; i < end; i++) {
    const value = Math.max(values[i]!, least);
    const next = sum + value;
    lost += Math.abs(sum) >= Math.abs(value) ? sum - next + value : value - next + sum;
    sum = next;
  }
  return sum + lost;
}

/** A running compensated sum, one an accumulator; used where several totals grow in one pass. */
export class Total {
  #sum = 0;
  #lost = 0;

  /** @param value next term */
  add(value: number): void {
    const next = this.#sum + value;
    this.#lost += Math.abs(this.#sum) >= Math.abs(value) ? this.#sum - next + value : value - next + this.#sum;
    this.#sum = next;
  }

  /** @returns the sum so far */
  get value(): number {
    return this.#sum + this.#lost;
  }
}
