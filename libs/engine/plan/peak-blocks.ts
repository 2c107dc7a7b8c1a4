import type { DemandShape } from '../money/demand-reading.js';
import type { Range } from '../money/range.js';
import type { LoadRecord } from '../record/load-record.js';

/** Blocks that are left out together. */
const RUN = 64;
/** Squares carry this share for their last bits. */
const SQUARE_SHARE = 1e-9;

/** The demand blocks of a month, and what is known of runs of them. */
interface PeakMonth {
  /** greatest mean, ≥ 0 [kW] */
  maxKw: number;
  /** intervals of the record, block after block */
  intervals: Int32Array;
  /** place in `intervals` at which each block begins, and their end; null where each block is one interval */
  blockFrom: Int32Array | null;
  blocks: number;
  /** runs of blocks, those that lie highest as metered first */
  order: Uint32Array;
  /** greatest of each run [kW²] */
  kwSquare: Float64Array;
  /** lagging less leading as metered, greatest and least of each run [kvar] */
  mostNetKvar: Float64Array;
  leastNetKvar: Float64Array;
}

/**
 * The greatest kVA of a demand over whole months, between two ends of the connected kvar. Active power stays as metered, so a
 * run of blocks that comes to neither end of the greatest so far, with nothing connected nor with all, is passed over.
 */
export class PeakBlocks {
  readonly #record: LoadRecord;
  readonly #months: PeakMonth[];

  /**
   * @param record as metered at the bus
   * @param shape intervals and blocks, no periods but months
   */
  constructor(record: LoadRecord, shape: DemandShape) {
    this.#record = record;
    this.#months = shape.blocks.sizes.map((_, m) => peakMonth(record, shape, m));
  }

  /**
   * @param m index of the month
   * @returns greatest mean of its blocks, ≥ 0 [kW]
   */
  maxKw(m: number): number {
    return this.#months[m]!.maxKw;
  }

  /**
   * The greatest kVA of a month.
   * @param m index of the month
   * @param mostKvar no more is connected in any interval [kvar]
   * @param columns connected at the least and at the most, length n; null where it is anything up to `mostKvar` [kvar]
   * @returns where it lies [kVA]
   * @source derived: the net kvar of a block lie between those with the least connected and those with the most
   */
  maxKva(m: number, mostKvar: number, columns: ConnectedEnds | null): Range {
    const month = this.#months[m]!;
    const { order, kwSquare, mostNetKvar, leastNetKvar } = month;
    const squares = new Float64Array(2);
    for (let place = 0; place < order.length; place++) {
      const run = order[place]!;
      const [mostNet, leastNet] = [mostNetKvar[run]!, leastNetKvar[run]!];
      const nearKvar = columns === null ? Math.max(mostNet - mostKvar, -leastNet, 0) : Math.max(mostNet, -leastNet);
      const farKvar = Math.max(mostNet, mostKvar - leastNet);
      const near = (kwSquare[run]! + nearKvar * nearKvar) * (1 + SQUARE_SHARE);
      const far = (kwSquare[run]! + farKvar * farKvar) * (1 + SQUARE_SHARE);
      if (near <= squares[0]! && far <= squares[1]!) continue;
      if (columns === null) this.#constantInto(squares, month, run, mostKvar);
      else if (month.blockFrom === null) this.#singlesInto(squares, month, run, columns);
      else this.#betweenInto(squares, month, run, columns);
    }
    return { lo: Math.sqrt(squares[0]!), hi: Math.sqrt(squares[1]!) };
  }

  #constantInto(squares: Float64Array, month: PeakMonth, run: number, mostKvar: number): void {
    const { activeKw, laggingKvar, leadingKvar } = this.#record;
    const { intervals, blockFrom, blocks } = month;
    let low = squares[0]!;
    let high = squares[1]!;
    for (let b = run * RUN; b < Math.min((run + 1) * RUN, blocks); b++) {
      const from = blockFrom === null ? b : blockFrom[b]!;
      const end = blockFrom === null ? b + 1 : blockFrom[b + 1]!;
      let [kw, net] = [0, 0];
      for (let k = from; k < end; k++) {
        const i = intervals[k]!;
        kw += activeKw[i]!;
        net += laggingKvar[i]! - leadingKvar[i]!;
      }
      kw /= end - from;
      const square = kw * kw;
      net /= end - from;
      low = Math.max(low, square + nearestSquare(net - mostKvar, net));
      high = Math.max(high, square + farthestSquare(net - mostKvar, net));
    }
    squares[0] = low;
    squares[1] = high;
  }

  // Blocks of single intervals, by comparisons that seldom hold: a search passes here most.
  #singlesInto(squares: Float64Array, month: PeakMonth, run: number, { leastKvar, mostKvar }: ConnectedEnds): void {
    const { activeKw, laggingKvar, leadingKvar } = this.#record;
    const { intervals } = month;
    const end = Math.min((run + 1) * RUN, month.blocks);
    let low = squares[0]!;
    let high = squares[1]!;
    for (let b = run * RUN; b < end; b++) {
      const i = intervals[b]!;
      const kw = activeKw[i]!;
      const net = laggingKvar[i]! - leadingKvar[i]!;
      const netLo = net - mostKvar[i]!;
      const netHi = net - leastKvar[i]!;
      const square = kw * kw;
      const atMost = square + netLo * netLo;
      const atLeast = square + netHi * netHi;
      if (atMost > high) high = atMost;
      if (atLeast > high) high = atLeast;
      // the nearest is no farther than either end
      if (atMost > low && atLeast > low) low = Math.max(low, square + nearestSquare(netLo, netHi));
    }
    squares[0] = low;
    squares[1] = high;
  }

  #betweenInto(squares: Float64Array, month: PeakMonth, run: number, { leastKvar, mostKvar }: ConnectedEnds): void {
    const { activeKw, laggingKvar, leadingKvar } = this.#record;
    const { intervals, blockFrom, blocks } = month;
    let low = squares[0]!;
    let high = squares[1]!;
    for (let b = run * RUN; b < Math.min((run + 1) * RUN, blocks); b++) {
      const from = blockFrom === null ? b : blockFrom[b]!;
      const end = blockFrom === null ? b + 1 : blockFrom[b + 1]!;
      let [kw, netLo, netHi] = [0, 0, 0];
      for (let k = from; k < end; k++) {
        const i = intervals[k]!;
        const net = laggingKvar[i]! - leadingKvar[i]!;
        kw += activeKw[i]!;
        netLo += net - mostKvar[i]!;
        netHi += net - leastKvar[i]!;
      }
      kw /= end - from;
      const square = kw * kw;
      netLo /= end - from;
      netHi /= end - from;
      low = Math.max(low, square + nearestSquare(netLo, netHi));
      high = Math.max(high, square + farthestSquare(netLo, netHi));
    }
    squares[0] = low;
    squares[1] = high;
  }
}

/** Columns of what is connected at the least and at the most, length n each. */
export interface ConnectedEnds {
  /** [kvar] */
  leastKvar: Float64Array;
  /** [kvar] */
  mostKvar: Float64Array;
}

function nearestSquare(lo: number, hi: number): number {
  const near = lo > 0 ? lo : Math.min(hi, 0);
  return near * near;
}

function farthestSquare(lo: number, hi: number): number {
  const far = -lo > hi ? lo : hi;
  return far * far;
}

function peakMonth(record: LoadRecord, shape: DemandShape, m: number): PeakMonth {
  const { monthFrom, intervals } = shape.selection;
  const blocks = shape.blocks.sizes[m]!.length;
  const grouped = shape.blocks.single[m]!
    ? { intervals: intervals.subarray(monthFrom[m]!, monthFrom[m + 1]!), blockFrom: null }
    : broughtTogether(shape, m);
  const runs = Math.ceil(blocks / RUN);
  const kwSquare = new Float64Array(runs);
  const mostNetKvar = new Float64Array(runs).fill(Number.NEGATIVE_INFINITY);
  const leastNetKvar = new Float64Array(runs).fill(Number.POSITIVE_INFINITY);
  let maxKw = 0;
  for (let b = 0; b < blocks; b++) {
    const { kw, netKvar } = meansOf(record, grouped, b);
    const run = Math.floor(b / RUN);
    maxKw = Math.max(maxKw, kw);
    kwSquare[run] = Math.max(kwSquare[run]!, kw * kw);
    mostNetKvar[run] = Math.max(mostNetKvar[run]!, netKvar);
    leastNetKvar[run] = Math.min(leastNetKvar[run]!, netKvar);
  }
  const height = kwSquare.map((square, run) => square + mostNetKvar[run]! ** 2);
  const order = Uint32Array.from(kwSquare.keys()).sort((a, b) => height[b]! - height[a]!);
  return { maxKw, ...grouped, blocks, order, kwSquare, mostNetKvar, leastNetKvar };
}

function meansOf(
  { activeKw, laggingKvar, leadingKvar }: LoadRecord,
  { intervals, blockFrom }: Pick<PeakMonth, 'intervals' | 'blockFrom'>,
  b: number,
): { kw: number; netKvar: number } {
  const from = blockFrom === null ? b : blockFrom[b]!;
  const end = blockFrom === null ? b + 1 : blockFrom[b + 1]!;
  let [kw, net] = [0, 0];
  for (let k = from; k < end; k++) {
    kw += activeKw[intervals[k]!]!;
    net += laggingKvar[intervals[k]!]! - leadingKvar[intervals[k]!]!;
  }
  return { kw: kw / (end - from), netKvar: net / (end - from) };
}

// The intervals of a month block after block: an hour that is there twice shares its blocks.
function broughtTogether({ selection, blocks }: DemandShape, m: number): Pick<PeakMonth, 'intervals' | 'blockFrom'> {
  const { intervals, monthFrom } = selection;
  const sizes = blocks.sizes[m]!;
  const blockFrom = new Int32Array(sizes.length + 1);
  for (let b = 0; b < sizes.length; b++) blockFrom[b + 1] = blockFrom[b]! + sizes[b]!;
  const next = blockFrom.slice(0, sizes.length);
  const found = new Int32Array(blockFrom[sizes.length]!);
  for (let k = monthFrom[m]!; k < monthFrom[m + 1]!; k++) found[next[blocks.groupOf[k]!]!++] = intervals[k]!;
  return { intervals: found, blockFrom };
}
