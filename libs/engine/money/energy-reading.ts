import type { Grouping } from './grouping.js';
import type { MeterColumns } from './meter-columns.js';
import type { ReactiveBasis } from './papers.js';
import { reactiveOf } from './reactive-basis.js';
import type { Selection } from './selection.js';

/** Energies of a selection's intervals in one month, period by period; filled again for each month and meter. */
export class EnergyReading {
  /** Σ max(P, 0)·h of each period [kWh] */
  readonly activeKwh: Float64Array;
  /** [kvarh] */
  readonly laggingKvarh: Float64Array;
  /** [kvarh] */
  readonly leadingKvarh: Float64Array;
  /** periods of the month read */
  periods = 0;
  /** intervals of the month read */
  intervals = 0;
  readonly #selection: Selection;
  readonly #grouping: Grouping | null;
  readonly #hours: number;

  /**
   * @param selection the intervals
   * @param grouping their periods, null for whole months
   * @param hours length of an interval [h]
   */
  constructor(selection: Selection, grouping: Grouping | null, hours: number) {
    this.#selection = selection;
    this.#grouping = grouping;
    this.#hours = hours;
    const most = grouping?.most ?? 1;
    this.activeKwh = new Float64Array(most);
    this.laggingKvarh = new Float64Array(most);
    this.leadingKvarh = new Float64Array(most);
  }

  /**
   * Adds up one month.
   * @param m index of the month
   * @param columns the meter, length n
   */
  read(m: number, columns: MeterColumns): void {
    const from = this.#selection.monthFrom[m]!;
    const end = this.#selection.monthFrom[m + 1]!;
    this.intervals = end - from;
    if (this.#grouping === null) {
      this.periods = 1;
      this.#readMonth(from, end, columns);
    } else {
      this.periods = this.#grouping.sizes[m]!.length;
      this.#readPeriods(from, end, columns, this.#grouping.groupOf);
    }
  }

  /**
   * Takes one month's energies from somebody who has added them up already; for whole months alone.
   * @param m index of the month
   * @param activeKwh E_p [kWh]
   * @param laggingKvarh [kvarh]
   * @param leadingKvarh [kvarh]
   */
  take(m: number, activeKwh: number, laggingKvarh: number, leadingKvarh: number): void {
    this.intervals = this.#selection.monthFrom[m + 1]! - this.#selection.monthFrom[m]!;
    this.periods = 1;
    this.activeKwh[0] = activeKwh;
    this.laggingKvarh[0] = laggingKvarh;
    this.leadingKvarh[0] = leadingKvarh;
  }

  #readMonth(from: number, end: number, { activeKw, laggingKvar, leadingKvar }: MeterColumns): void {
    const { intervals } = this.#selection;
    let active = 0;
    let lagging = 0;
    let leading = 0;
    for (let k = from; k < end; k++) {
      const i = intervals[k]!;
      const kw = activeKw[i]!;
      if (kw > 0) active += kw;
      lagging += laggingKvar[i]!;
      leading += leadingKvar[i]!;
    }
    this.activeKwh[0] = active * this.#hours;
    this.laggingKvarh[0] = lagging * this.#hours;
    this.leadingKvarh[0] = leading * this.#hours;
  }

  #readPeriods(from: number, end: number, columns: MeterColumns, groupOf: Int32Array): void {
    const { intervals } = this.#selection;
    const { activeKwh, laggingKvarh, leadingKvarh } = this;
    activeKwh.fill(0, 0, this.periods);
    laggingKvarh.fill(0, 0, this.periods);
    leadingKvarh.fill(0, 0, this.periods);
    for (let k = from; k < end; k++) {
      const i = intervals[k]!;
      const period = groupOf[k]!;
      const kw = columns.activeKw[i]!;
      if (kw > 0) activeKwh[period]! += kw;
      laggingKvarh[period]! += columns.laggingKvar[i]!;
      leadingKvarh[period]! += columns.leadingKvar[i]!;
    }
    for (let period = 0; period < this.periods; period++) {
      activeKwh[period]! *= this.#hours;
      laggingKvarh[period]! *= this.#hours;
      leadingKvarh[period]! *= this.#hours;
    }
  }

  /**
   * Reactive energy of a period.
   * @param basis what counts of lagging and leading
   * @param period index of the period
   * @returns E_q [kvarh]
   */
  reactiveKvarh(basis: ReactiveBasis, period: number): number {
    return reactiveOf(basis, this.laggingKvarh[period]!, this.leadingKvarh[period]!);
  }
}
