/** Sums of imported active power by month; those of the record's own column, which no bank at its bus moves, are kept. */
export class ActiveSums {
  readonly #steadyKw: Float64Array;
  /** NaN where a month is not added up yet */
  readonly #sums: Float64Array;

  /**
   * @param steadyKw active power as metered, length n [kW]
   * @param months of the record
   */
  constructor(steadyKw: Float64Array, months: number) {
    this.#steadyKw = steadyKw;
    this.#sums = new Float64Array(months).fill(Number.NaN);
  }

  /**
   * Σ max(P, 0) of a month's intervals.
   * @param m index of the month
   * @param activeKw the meter's active power, length n [kW]
   * @param from its first interval
   * @param end the interval to stop before
   * @returns kW times intervals
   */
  sum(m: number, activeKw: Float64Array, from: number, end: number): number {
    const isSteady = activeKw === this.#steadyKw;
    if (isSteady && !Number.isNaN(this.#sums[m]!)) return this.#sums[m]!;
    let sum = 0;
    for (let i = from; i < end; i++) if (activeKw[i]! > 0) sum += activeKw[i]!;
    if (isSteady) this.#sums[m] = sum;
    return sum;
  }
}
