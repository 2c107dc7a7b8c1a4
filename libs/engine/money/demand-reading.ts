import type { Grouping } from './grouping.js';
import type { MeterColumns } from './meter-columns.js';
import type { ReactiveBasis } from './papers.js';
import { reactiveOf } from './reactive-basis.js';
import type { Selection } from './selection.js';

/** How a selection's demand is formed. */
export interface DemandShape {
  selection: Selection;
  /** demand blocks */
  blocks: Grouping;
  /** periods of the clause, null for whole months */
  periods: Grouping | null;
  /** which kvar are held against each other */
  basis: ReactiveBasis;
}

/**
 * Greatest block means of a selection in one month, period by period; filled again for each month and meter. What blocks of
 * single intervals are looked through for is found when it is first asked for: most clauses ask for one thing.
 */
export class DemandReading {
  /** periods of the month read */
  periods = 0;
  readonly #maxKw: Float64Array;
  readonly #maxKva: Float64Array;
  readonly #maxKvar: Float64Array;
  readonly #laggingAtMaxKw: Float64Array;
  readonly #leadingAtMaxKw: Float64Array;
  readonly #shape: DemandShape;
  readonly #periodOfBlock: Int32Array[] | null;
  readonly #highestKw: Float64Array;
  readonly #blockKw: Float64Array;
  readonly #blockLagging: Float64Array;
  readonly #blockLeading: Float64Array;
  #m = 0;
  #columns: MeterColumns | null = null;
  #hasKw = true;
  #hasKva = true;
  #hasKvar = true;

  /** @param shape intervals, blocks, periods, basis */
  constructor(shape: DemandShape) {
    this.#shape = shape;
    const most = shape.periods?.most ?? 1;
    this.#maxKw = new Float64Array(most);
    this.#maxKva = new Float64Array(most);
    this.#maxKvar = new Float64Array(most);
    this.#laggingAtMaxKw = new Float64Array(most);
    this.#leadingAtMaxKw = new Float64Array(most);
    this.#highestKw = new Float64Array(most);
    this.#periodOfBlock = shape.periods === null ? null : periodsOfBlocks(shape, shape.periods);
    this.#blockKw = new Float64Array(shape.blocks.most);
    this.#blockLagging = new Float64Array(shape.blocks.most);
    this.#blockLeading = new Float64Array(shape.blocks.most);
  }

  /**
   * @param period index of the period
   * @returns greatest mean, ≥ 0 [kW]
   */
  maxKw(period: number): number {
    if (!this.#hasKw) this.#formKw();
    return this.#maxKw[period]!;
  }

  /**
   * @param period index of the period
   * @returns greatest √(P² + (lagging − leading)²) of block means [kVA]
   */
  maxKva(period: number): number {
    if (!this.#hasKva) this.#formKva();
    return this.#maxKva[period]!;
  }

  /**
   * @param period index of the period
   * @returns [kvar]
   */
  maxKvar(period: number): number {
    if (!this.#hasKvar) this.#formKvar();
    return this.#maxKvar[period]!;
  }

  /**
   * Turns to one month.
   * @param m index of the month
   * @param columns the meter, length n; the month's intervals stay as they are until the next month is read
   */
  read(m: number, columns: MeterColumns): void {
    const { periods } = this.#shape;
    this.#m = m;
    this.#columns = columns;
    this.periods = periods === null ? 1 : periods.sizes[m]!.length;
    this.#hasKw = false;
    this.#hasKva = false;
    this.#hasKvar = false;
  }

  // Whole months of blocks that are intervals: no means are formed, and greatest values are kept in locals.
  get #isSingle(): boolean {
    return this.#shape.periods === null && this.#shape.blocks.single[this.#m]!;
  }

  #formKw(): void {
    if (!this.#isSingle) {
      this.#formAll();
      return;
    }
    this.#hasKw = true;
    const { activeKw, laggingKvar, leadingKvar } = this.#columns!;
    const { intervals, monthFrom } = this.#shape.selection;
    const end = monthFrom[this.#m + 1]!;
    let highestKw = Number.NEGATIVE_INFINITY;
    let at = -1;
    for (let k = monthFrom[this.#m]!; k < end; k++) {
      const kw = activeKw[intervals[k]!]!;
      if (kw > highestKw) {
        highestKw = kw;
        at = intervals[k]!;
      }
    }
    this.#maxKw[0] = Math.max(highestKw, 0);
    this.#laggingAtMaxKw[0] = at < 0 ? 0 : laggingKvar[at]!;
    this.#leadingAtMaxKw[0] = at < 0 ? 0 : leadingKvar[at]!;
  }

  #formKva(): void {
    if (!this.#isSingle) {
      this.#formAll();
      return;
    }
    this.#hasKva = true;
    const { activeKw, laggingKvar, leadingKvar } = this.#columns!;
    const { intervals, monthFrom } = this.#shape.selection;
    const end = monthFrom[this.#m + 1]!;
    let square = 0;
    for (let k = monthFrom[this.#m]!; k < end; k++) {
      const i = intervals[k]!;
      const kw = activeKw[i]!;
      const net = laggingKvar[i]! - leadingKvar[i]!;
      const found = kw * kw + net * net;
      if (found > square) square = found;
    }
    this.#maxKva[0] = Math.sqrt(square);
  }

  #formKvar(): void {
    if (!this.#isSingle) {
      this.#formAll();
      return;
    }
    this.#hasKvar = true;
    const { laggingKvar, leadingKvar } = this.#columns!;
    const { basis, selection } = this.#shape;
    const { intervals, monthFrom } = selection;
    const end = monthFrom[this.#m + 1]!;
    let most = 0;
    for (let k = monthFrom[this.#m]!; k < end; k++) {
      const i = intervals[k]!;
      const kvar = reactiveOf(basis, laggingKvar[i]!, leadingKvar[i]!);
      if (kvar > most) most = kvar;
    }
    this.#maxKvar[0] = most;
  }

  #formAll(): void {
    this.#hasKw = true;
    this.#hasKva = true;
    this.#hasKvar = true;
    this.#maxKw.fill(0, 0, this.periods);
    this.#maxKva.fill(0, 0, this.periods);
    this.#maxKvar.fill(0, 0, this.periods);
    this.#laggingAtMaxKw.fill(0, 0, this.periods);
    this.#leadingAtMaxKw.fill(0, 0, this.periods);
    this.#highestKw.fill(Number.NEGATIVE_INFINITY, 0, this.periods);
    this.#meanBlocks(this.#m, this.#columns!);
    const sizes = this.#shape.blocks.sizes[this.#m]!;
    const periodOfBlock = this.#periodOfBlock?.[this.#m] ?? null;
    for (let b = 0; b < sizes.length; b++) this.#take(b, periodOfBlock === null ? 0 : periodOfBlock[b]!);
    for (let period = 0; period < this.periods; period++) this.#maxKva[period] = Math.sqrt(this.#maxKva[period]!);
  }

  #meanBlocks(m: number, columns: MeterColumns): void {
    const { selection, blocks } = this.#shape;
    const sizes = blocks.sizes[m]!;
    const kw = this.#blockKw.fill(0, 0, sizes.length);
    const lagging = this.#blockLagging.fill(0, 0, sizes.length);
    const leading = this.#blockLeading.fill(0, 0, sizes.length);
    for (let k = selection.monthFrom[m]!; k < selection.monthFrom[m + 1]!; k++) {
      const i = selection.intervals[k]!;
      const block = blocks.groupOf[k]!;
      kw[block]! += columns.activeKw[i]!;
      lagging[block]! += columns.laggingKvar[i]!;
      leading[block]! += columns.leadingKvar[i]!;
    }
    if (blocks.single[m]!) return;
    for (let b = 0; b < sizes.length; b++) {
      kw[b]! /= sizes[b]!;
      lagging[b]! /= sizes[b]!;
      leading[b]! /= sizes[b]!;
    }
  }

  // #maxKva holds squares until all blocks are taken.
  #take(b: number, period: number): void {
    const kw = this.#blockKw[b]!;
    const lagging = this.#blockLagging[b]!;
    const leading = this.#blockLeading[b]!;
    if (kw > this.#highestKw[period]!) {
      this.#highestKw[period] = kw;
      this.#maxKw[period] = Math.max(kw, 0);
      this.#laggingAtMaxKw[period] = lagging;
      this.#leadingAtMaxKw[period] = leading;
    }
    const net = lagging - leading;
    const square = kw * kw + net * net;
    if (square > this.#maxKva[period]!) this.#maxKva[period] = square;
    const kvar = reactiveOf(this.#shape.basis, lagging, leading);
    if (kvar > this.#maxKvar[period]!) this.#maxKvar[period] = kvar;
  }

  /**
   * kvar of the first block of greatest kW.
   * @param basis what counts of lagging and leading
   * @param period index of the period
   * @returns [kvar]
   */
  kvarAtMaxKw(basis: ReactiveBasis, period: number): number {
    if (!this.#hasKw) this.#formKw();
    return reactiveOf(basis, this.#laggingAtMaxKw[period]!, this.#leadingAtMaxKw[period]!);
  }
}

/**
 * The period of each demand block, month by month: no block reaches over the end of a period, so the period of any of
 * its intervals is its own.
 * @param shape intervals and blocks
 * @param periods periods of the same intervals
 * @returns one list a month
 */
export function periodsOfBlocks(shape: DemandShape, periods: Grouping): Int32Array[] {
  const { selection, blocks } = shape;
  return blocks.sizes.map((sizes, m) => {
    const periodOfBlock = new Int32Array(sizes.length).fill(-1);
    for (let k = selection.monthFrom[m]!; k < selection.monthFrom[m + 1]!; k++) {
      const block = blocks.groupOf[k]!;
      if (periodOfBlock[block] === -1) periodOfBlock[block] = periods.groupOf[k]!;
    }
    return periodOfBlock;
  });
}
