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

/** Greatest block means of a selection in one month, period by period; filled again for each month and meter. */
export class DemandReading {
  /** greatest mean, ≥ 0 [kW] */
  readonly maxKw: Float64Array;
  /** greatest √(P² + (lagging − leading)²) of block means [kVA] */
  readonly maxKva: Float64Array;
  /** [kvar] */
  readonly maxKvar: Float64Array;
  /** lagging of the first block of greatest kW [kvar] */
  readonly laggingAtMaxKw: Float64Array;
  /** leading of the first block of greatest kW [kvar] */
  readonly leadingAtMaxKw: Float64Array;
  /** periods of the month read */
  periods = 0;
  readonly #shape: DemandShape;
  readonly #periodOfBlock: Int32Array[] | null;
  readonly #highestKw: Float64Array;
  readonly #blockKw: Float64Array;
  readonly #blockLagging: Float64Array;
  readonly #blockLeading: Float64Array;

  /** @param shape intervals, blocks, periods, basis */
  constructor(shape: DemandShape) {
    this.#shape = shape;
    const most = shape.periods?.most ?? 1;
    this.maxKw = new Float64Array(most);
    this.maxKva = new Float64Array(most);
    this.maxKvar = new Float64Array(most);
    this.laggingAtMaxKw = new Float64Array(most);
    this.leadingAtMaxKw = new Float64Array(most);
    this.#highestKw = new Float64Array(most);
    this.#periodOfBlock = shape.periods === null ? null : periodsOfBlocks(shape, shape.periods);
    this.#blockKw = new Float64Array(shape.blocks.most);
    this.#blockLagging = new Float64Array(shape.blocks.most);
    this.#blockLeading = new Float64Array(shape.blocks.most);
  }

  /**
   * Finds the greatest block means of one month.
   * @param m index of the month
   * @param columns the meter, length n
   */
  read(m: number, columns: MeterColumns): void {
    const { blocks, periods } = this.#shape;
    this.periods = periods === null ? 1 : periods.sizes[m]!.length;
    this.maxKw.fill(0, 0, this.periods);
    this.maxKva.fill(0, 0, this.periods);
    this.maxKvar.fill(0, 0, this.periods);
    this.laggingAtMaxKw.fill(0, 0, this.periods);
    this.leadingAtMaxKw.fill(0, 0, this.periods);
    this.#highestKw.fill(Number.NEGATIVE_INFINITY, 0, this.periods);
    if (periods === null && blocks.single[m]!) {
      this.#readSingle(m, columns);
      return;
    }
    this.#meanBlocks(m, columns);
    const sizes = blocks.sizes[m]!;
    const periodOfBlock = this.#periodOfBlock?.[m] ?? null;
    for (let b = 0; b < sizes.length; b++) this.#take(b, periodOfBlock === null ? 0 : periodOfBlock[b]!);
    for (let period = 0; period < this.periods; period++) this.maxKva[period] = Math.sqrt(this.maxKva[period]!);
  }

  // Whole months of blocks that are intervals: the same greatest values, kept in locals.
  #readSingle(m: number, { activeKw, laggingKvar, leadingKvar }: MeterColumns): void {
    const { selection, basis } = this.#shape;
    const { intervals, monthFrom } = selection;
    let highestKw = Number.NEGATIVE_INFINITY;
    let at = -1;
    let [square, kvar] = [0, 0];
    for (let k = monthFrom[m]!; k < monthFrom[m + 1]!; k++) {
      const i = intervals[k]!;
      const kw = activeKw[i]!;
      const lagging = laggingKvar[i]!;
      const leading = leadingKvar[i]!;
      if (kw > highestKw) {
        highestKw = kw;
        at = i;
      }
      const net = lagging - leading;
      const found = kw * kw + net * net;
      if (found > square) square = found;
      const reactive = reactiveOf(basis, lagging, leading);
      if (reactive > kvar) kvar = reactive;
    }
    if (at < 0) return;
    this.maxKw[0] = Math.max(highestKw, 0);
    this.laggingAtMaxKw[0] = laggingKvar[at]!;
    this.leadingAtMaxKw[0] = leadingKvar[at]!;
    this.maxKva[0] = Math.sqrt(square);
    this.maxKvar[0] = kvar;
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

  // maxKva holds squares until the month is read.
  #take(b: number, period: number): void {
    const kw = this.#blockKw[b]!;
    const lagging = this.#blockLagging[b]!;
    const leading = this.#blockLeading[b]!;
    if (kw > this.#highestKw[period]!) {
      this.#highestKw[period] = kw;
      this.maxKw[period] = Math.max(kw, 0);
      this.laggingAtMaxKw[period] = lagging;
      this.leadingAtMaxKw[period] = leading;
    }
    const net = lagging - leading;
    const square = kw * kw + net * net;
    if (square > this.maxKva[period]!) this.maxKva[period] = square;
    const kvar = reactiveOf(this.#shape.basis, lagging, leading);
    if (kvar > this.maxKvar[period]!) this.maxKvar[period] = kvar;
  }

  /**
   * kvar of the first block of greatest kW.
   * @param basis what counts of lagging and leading
   * @param period index of the period
   * @returns [kvar]
   */
  kvarAtMaxKw(basis: ReactiveBasis, period: number): number {
    return reactiveOf(basis, this.laggingAtMaxKw[period]!, this.leadingAtMaxKw[period]!);
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
