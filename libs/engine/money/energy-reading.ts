import type { EnergyShape } from './grouping.js';
import type { MeterColumns } from './meter-columns.js';
import type { ReactiveBasis } from './papers.js';
import { reactiveOf } from './reactive-basis.js';

/**
 * Energies of a selection's intervals in one month, period by period; filled again for each month and meter. A column is
 * added up when it is first asked for: most clauses look at one or two of them.
 */
export class EnergyReading {
  /** periods of the month read */
  periods = 0;
  readonly #shape: EnergyShape;
  readonly #activeKwh: Float64Array;
  readonly #laggingKvarh: Float64Array;
  readonly #leadingKvarh: Float64Array;
  /** E_p of whole months of the steady column, NaN where it is not known yet [kWh] */
  readonly #steadyKwh: Float64Array;
  #m = 0;
  #columns: MeterColumns | null = null;
  #hasActive = true;
  #hasLagging = true;
  #hasLeading = true;

  /** @param shape intervals, periods, hours */
  constructor(shape: EnergyShape) {
    this.#shape = shape;
    const most = shape.grouping?.most ?? 1;
    this.#activeKwh = new Float64Array(most);
    this.#laggingKvarh = new Float64Array(most);
    this.#leadingKvarh = new Float64Array(most);
    this.#steadyKwh = new Float64Array(shape.selection.monthFrom.length - 1).fill(Number.NaN);
  }

  /**
   * @param period index of the period
   * @returns Σ max(P, 0)·h [kWh]
   */
  activeKwh(period: number): number {
    if (!this.#hasActive) this.#formActive(this.#columns!.activeKw);
    this.#hasActive = true;
    return this.#activeKwh[period]!;
  }

  /**
   * @param period index of the period
   * @returns [kvarh]
   */
  laggingKvarh(period: number): number {
    if (!this.#hasLagging) this.#sumInto(this.#laggingKvarh, this.#columns!.laggingKvar);
    this.#hasLagging = true;
    return this.#laggingKvarh[period]!;
  }

  /**
   * @param period index of the period
   * @returns [kvarh]
   */
  leadingKvarh(period: number): number {
    if (!this.#hasLeading) this.#sumInto(this.#leadingKvarh, this.#columns!.leadingKvar);
    this.#hasLeading = true;
    return this.#leadingKvarh[period]!;
  }

  /**
   * Turns to one month.
   * @param m index of the month
   * @param columns the meter, length n; the month's intervals stay as they are until the next month is read
   */
  read(m: number, columns: MeterColumns): void {
    this.#m = m;
    this.#columns = columns;
    this.periods = this.#shape.grouping === null ? 1 : this.#shape.grouping.sizes[m]!.length;
    this.#hasActive = false;
    this.#hasLagging = false;
    this.#hasLeading = false;
  }

  /**
   * Takes one month's energies from somebody who has added them up already; for whole months alone.
   * @param m index of the month
   * @param activeKwh E_p [kWh]
   * @param laggingKvarh [kvarh]
   * @param leadingKvarh [kvarh]
   */
  take(m: number, activeKwh: number, laggingKvarh: number, leadingKvarh: number): void {
    this.#m = m;
    this.periods = 1;
    this.#activeKwh[0] = activeKwh;
    this.#laggingKvarh[0] = laggingKvarh;
    this.#leadingKvarh[0] = leadingKvarh;
    this.#hasActive = true;
    this.#hasLagging = true;
    this.#hasLeading = true;
  }

  #formActive(activeKw: Float64Array): void {
    const { grouping, steadyKw } = this.#shape;
    const isKept = grouping === null && activeKw === steadyKw;
    const kept = isKept ? this.#steadyKwh[this.#m]! : Number.NaN;
    if (Number.isNaN(kept)) this.#sumPositiveInto(this.#activeKwh, activeKw);
    else this.#activeKwh[0] = kept;
    if (isKept) this.#steadyKwh[this.#m] = this.#activeKwh[0]!;
  }

  #sumPositiveInto(sums: Float64Array, column: Float64Array): void {
    const { selection, grouping, hours } = this.#shape;
    const { intervals, monthFrom } = selection;
    const [from, end] = [monthFrom[this.#m]!, monthFrom[this.#m + 1]!];
    if (grouping === null) {
      let sum = 0;
      for (let k = from; k < end; k++) {
        const kw = column[intervals[k]!]!;
        if (kw > 0) sum += kw;
      }
      sums[0] = sum * hours;
      return;
    }
    const { groupOf } = grouping;
    sums.fill(0, 0, this.periods);
    for (let k = from; k < end; k++) {
      const kw = column[intervals[k]!]!;
      if (kw > 0) sums[groupOf[k]!]! += kw;
    }
    for (let period = 0; period < this.periods; period++) sums[period]! *= hours;
  }

  #sumInto(sums: Float64Array, column: Float64Array): void {
    const { selection, grouping, hours } = this.#shape;
    const { intervals, monthFrom } = selection;
    const [from, end] = [monthFrom[this.#m]!, monthFrom[this.#m + 1]!];
    if (grouping === null) {
      let sum = 0;
      for (let k = from; k < end; k++) sum += column[intervals[k]!]!;
      sums[0] = sum * hours;
      return;
    }
    const { groupOf } = grouping;
    sums.fill(0, 0, this.periods);
    for (let k = from; k < end; k++) sums[groupOf[k]!]! += column[intervals[k]!]!;
    for (let period = 0; period < this.periods; period++) sums[period]! *= hours;
  }

  /**
   * Reactive energy of a period.
   * @param basis what counts of lagging and leading
   * @param period index of the period
   * @returns E_q [kvarh]
   */
  reactiveKvarh(basis: ReactiveBasis, period: number): number {
    if (basis === 'lagging') return this.laggingKvarh(period);
    if (basis === 'leading') return this.leadingKvarh(period);
    return reactiveOf(basis, this.laggingKvarh(period), this.leadingKvarh(period));
  }
}
