import { type DemandShape, periodsOfBlocks } from './demand-reading.js';
import type { MeterBox } from './meter-box.js';
import type { ReactiveBasis } from './papers.js';
import type { Range } from './range.js';
import { reactiveOf } from './reactive-basis.js';

/** Lower or upper ends of a period's greatest block means. */
interface Ends {
  kw: Float64Array;
  kva: Float64Array;
  kvar: Float64Array;
  /** of the blocks that may be the one of greatest kW */
  laggingAtMaxKw: Float64Array;
  leadingAtMaxKw: Float64Array;
}

/** What is asked for of a period. */
const QUANTITIES = ['kw', 'kva', 'kvar', 'atMaxKw'] as const;

type Quantity = (typeof QUANTITIES)[number];

/** Greatest block means of a selection between the ends of a box, period by period. */
export class DemandBox {
  /** periods of the month read */
  periods = 0;
  /** somebody looks at more of it than kW and kVA */
  wantsKvar = false;
  readonly shape: DemandShape;
  readonly #periodOfBlock: Int32Array[] | null;
  readonly #low: Ends;
  readonly #high: Ends;
  /** block means: kW, lagging, leading, lower ends, then upper ones */
  readonly #means: Float64Array[];
  readonly #formed = new Set<Quantity>();
  #m = 0;
  #box: MeterBox | null = null;

  /** @param shape intervals, blocks, periods, basis */
  constructor(shape: DemandShape) {
    this.shape = shape;
    const most = shape.periods?.most ?? 1;
    this.#periodOfBlock = shape.periods === null ? null : periodsOfBlocks(shape, shape.periods);
    this.#low = endsOf(most);
    this.#high = endsOf(most);
    this.#means = Array.from({ length: 6 }, () => new Float64Array(shape.blocks.most));
  }

  /**
   * Turns to one month.
   * @param m index of the month
   * @param box the meter's ends; the month's intervals stay as they are until the next month is read
   */
  read(m: number, box: MeterBox): void {
    const { periods } = this.shape;
    this.#m = m;
    this.#box = box;
    this.periods = periods === null ? 1 : periods.sizes[m]!.length;
    this.#formed.clear();
  }

  /** @returns its only period is the month */
  get byMonth(): boolean {
    return this.shape.periods === null;
  }

  /**
   * Takes one month's greatest means from somebody who has found them already; for whole months alone.
   * @param maxKw greatest mean, ≥ 0, the same at both ends [kW]
   * @param maxKva between what and what the greatest lies [kVA]
   */
  take(maxKw: number, maxKva: Range): void {
    this.periods = 1;
    this.#low.kw[0] = maxKw;
    this.#high.kw[0] = maxKw;
    this.#low.kva[0] = maxKva.lo;
    this.#high.kva[0] = maxKva.hi;
    this.#formed.clear();
    this.#formed.add('kw');
    this.#formed.add('kva');
  }

  // A quantity is formed when it is first asked for; where blocks are means, all of them at once.
  #form(quantity: Quantity): void {
    if (this.#formed.has(quantity)) return;
    const { blocks, periods } = this.shape;
    if (periods !== null || !blocks.single[this.#m]!) {
      this.#formAll(this.#m, this.#box!);
      for (const one of QUANTITIES) this.#formed.add(one);
      return;
    }
    this.#formed.add(quantity);
    if (quantity === 'kw') this.#singleKw(this.#m, this.#box!);
    else if (quantity === 'kva') this.#singleKva(this.#m, this.#box!);
    else if (quantity === 'kvar') this.#singleKvar(this.#m, this.#box!);
    else this.#singleAtMaxKw(this.#m, this.#box!);
  }

  #formAll(m: number, box: MeterBox): void {
    const { blocks } = this.shape;
    for (const ends of [this.#low, this.#high]) {
      for (const column of Object.values(ends) as Float64Array[]) column.fill(0, 0, this.periods);
    }
    this.#meanBlocks(m, box);
    const periodOfBlock = this.#periodOfBlock?.[m] ?? null;
    const count = blocks.sizes[m]!.length;
    for (let b = 0; b < count; b++) this.#take(b, periodOfBlock === null ? 0 : periodOfBlock[b]!);
    this.#low.laggingAtMaxKw.fill(Number.POSITIVE_INFINITY, 0, this.periods);
    this.#low.leadingAtMaxKw.fill(Number.POSITIVE_INFINITY, 0, this.periods);
    for (let b = 0; b < count; b++) this.#takeAtMaxKw(b, periodOfBlock === null ? 0 : periodOfBlock[b]!);
  }

  #singleKw(m: number, { low, high }: MeterBox): void {
    const { intervals, monthFrom } = this.shape.selection;
    const { activeKw: lowActiveKw } = low;
    const { activeKw: highActiveKw } = high;
    const end = monthFrom[m + 1]!;
    let [lowKw, highKw] = [0, 0];
    for (let k = monthFrom[m]!; k < end; k++) {
      const i = intervals[k]!;
      if (lowActiveKw[i]! > lowKw) lowKw = lowActiveKw[i]!;
      if (highActiveKw[i]! > highKw) highKw = highActiveKw[i]!;
    }
    this.#low.kw[0] = lowKw;
    this.#high.kw[0] = highKw;
  }

  // Greatest values stay in locals: a search forms hundreds of them.
  #singleKva(m: number, { low, high }: MeterBox): void {
    const { intervals, monthFrom } = this.shape.selection;
    const { activeKw: lowActiveKw, laggingKvar: lowLaggingKvar, leadingKvar: lowLeadingKvar } = low;
    const { activeKw: highActiveKw, laggingKvar: highLaggingKvar, leadingKvar: highLeadingKvar } = high;
    const end = monthFrom[m + 1]!;
    let [lowSquare, highSquare] = [0, 0];
    for (let k = monthFrom[m]!; k < end; k++) {
      const i = intervals[k]!;
      const kwLo = lowActiveKw[i]!;
      const kwHi = highActiveKw[i]!;
      const netLo = lowLaggingKvar[i]! - highLeadingKvar[i]!;
      const netHi = highLaggingKvar[i]! - lowLeadingKvar[i]!;
      const nearKw = kwLo > 0 ? kwLo : Math.min(kwHi, 0);
      const nearNet = netLo > 0 ? netLo : Math.min(netHi, 0);
      const near = nearKw * nearKw + nearNet * nearNet;
      if (near > lowSquare) lowSquare = near;
      const farKw = -kwLo > kwHi ? kwLo : kwHi;
      const farNet = -netLo > netHi ? netLo : netHi;
      const far = farKw * farKw + farNet * farNet;
      if (far > highSquare) highSquare = far;
    }
    this.#low.kva[0] = Math.sqrt(lowSquare);
    this.#high.kva[0] = Math.sqrt(highSquare);
  }

  #singleKvar(m: number, { low, high }: MeterBox): void {
    const { selection, basis } = this.shape;
    const { intervals, monthFrom } = selection;
    let [lowKvar, highKvar] = [0, 0];
    for (let k = monthFrom[m]!; k < monthFrom[m + 1]!; k++) {
      const i = intervals[k]!;
      const [laggingLo, laggingHi] = [low.laggingKvar[i]!, high.laggingKvar[i]!];
      const [leadingLo, leadingHi] = [low.leadingKvar[i]!, high.leadingKvar[i]!];
      const kvarLo = basis === 'net' ? laggingLo - leadingHi : reactiveOf(basis, laggingLo, leadingLo);
      const kvarHi = basis === 'net' ? laggingHi - leadingLo : reactiveOf(basis, laggingHi, leadingHi);
      if (kvarLo > lowKvar) lowKvar = kvarLo;
      if (kvarHi > highKvar) highKvar = kvarHi;
    }
    this.#low.kvar[0] = lowKvar;
    this.#high.kvar[0] = highKvar;
  }

  // The interval of greatest kW is one of those whose upper end reaches the greatest lower end.
  #singleAtMaxKw(m: number, { low, high }: MeterBox): void {
    this.#form('kw');
    const { intervals, monthFrom } = this.shape.selection;
    const reached = this.#low.kw[0]!;
    const infinite = Number.POSITIVE_INFINITY;
    let [laggingLo, leadingLo, laggingHi, leadingHi] = [infinite, infinite, 0, 0];
    for (let k = monthFrom[m]!; k < monthFrom[m + 1]!; k++) {
      const i = intervals[k]!;
      if (high.activeKw[i]! < reached && reached > 0) continue;
      laggingLo = Math.min(laggingLo, low.laggingKvar[i]!);
      leadingLo = Math.min(leadingLo, low.leadingKvar[i]!);
      laggingHi = Math.max(laggingHi, high.laggingKvar[i]!);
      leadingHi = Math.max(leadingHi, high.leadingKvar[i]!);
    }
    this.#low.laggingAtMaxKw[0] = laggingLo;
    this.#low.leadingAtMaxKw[0] = leadingLo;
    this.#high.laggingAtMaxKw[0] = laggingHi;
    this.#high.leadingAtMaxKw[0] = leadingHi;
  }

  #meanBlocks(m: number, { low, high }: MeterBox): void {
    const { selection, blocks } = this.shape;
    const sizes = blocks.sizes[m]!;
    const columns = [low.activeKw, low.laggingKvar, low.leadingKvar, high.activeKw, high.laggingKvar, high.leadingKvar];
    for (const [c, column] of columns.entries()) {
      const mean = this.#means[c]!.fill(0, 0, sizes.length);
      for (let k = selection.monthFrom[m]!; k < selection.monthFrom[m + 1]!; k++) {
        mean[blocks.groupOf[k]!]! += column[selection.intervals[k]!]!;
      }
      if (!blocks.single[m]!) for (let b = 0; b < sizes.length; b++) mean[b]! /= sizes[b]!;
    }
  }

  #take(b: number, period: number): void {
    const [kwLo, kwHi] = [this.#means[0]![b]!, this.#means[3]![b]!];
    const [laggingLo, laggingHi] = [this.#means[1]![b]!, this.#means[4]![b]!];
    const [leadingLo, leadingHi] = [this.#means[2]![b]!, this.#means[5]![b]!];
    const netLo = laggingLo - leadingHi;
    const netHi = laggingHi - leadingLo;
    raise(this.#low.kw, period, kwLo);
    raise(this.#high.kw, period, kwHi);
    raise(this.#low.kva, period, length(nearestToZero(kwLo, kwHi), nearestToZero(netLo, netHi)));
    raise(this.#high.kva, period, length(farthestFromZero(kwLo, kwHi), farthestFromZero(netLo, netHi)));
    const { basis } = this.shape;
    raise(this.#low.kvar, period, basis === 'net' ? netLo : reactiveOf(basis, laggingLo, leadingLo));
    raise(this.#high.kvar, period, basis === 'net' ? netHi : reactiveOf(basis, laggingHi, leadingHi));
  }

  // The block of greatest kW is one of those whose upper end reaches the greatest lower end.
  #takeAtMaxKw(b: number, period: number): void {
    const reached = this.#low.kw[period]!;
    if (this.#means[3]![b]! < reached && reached > 0) return;
    lower(this.#low.laggingAtMaxKw, period, this.#means[1]![b]!);
    lower(this.#low.leadingAtMaxKw, period, this.#means[2]![b]!);
    raise(this.#high.laggingAtMaxKw, period, this.#means[4]![b]!);
    raise(this.#high.leadingAtMaxKw, period, this.#means[5]![b]!);
  }

  /**
   * @param period index of the period
   * @returns greatest mean, ≥ 0 [kW]
   */
  maxKw(period: number): Range {
    this.#form('kw');
    return { lo: this.#low.kw[period]!, hi: this.#high.kw[period]! };
  }

  /**
   * @param period index of the period
   * @returns [kVA]
   */
  maxKva(period: number): Range {
    this.#form('kva');
    return { lo: this.#low.kva[period]!, hi: this.#high.kva[period]! };
  }

  /**
   * @param period index of the period
   * @returns [kvar]
   */
  maxKvar(period: number): Range {
    this.#form('kvar');
    return { lo: this.#low.kvar[period]!, hi: this.#high.kvar[period]! };
  }

  /**
   * @param basis what counts of lagging and leading
   * @param period index of the period
   * @returns kvar of the block of greatest kW [kvar]
   */
  kvarAtMaxKw(basis: ReactiveBasis, period: number): Range {
    this.#form('atMaxKw');
    const at = (ends: Ends, column: 'laggingAtMaxKw' | 'leadingAtMaxKw'): number => {
      const value = ends[column][period]!;
      return Number.isFinite(value) ? value : 0;
    };
    const [laggingLo, laggingHi] = [at(this.#low, 'laggingAtMaxKw'), at(this.#high, 'laggingAtMaxKw')];
    const [leadingLo, leadingHi] = [at(this.#low, 'leadingAtMaxKw'), at(this.#high, 'leadingAtMaxKw')];
    if (basis === 'net') {
      return { lo: Math.max(laggingLo - leadingHi, 0), hi: Math.max(laggingHi - leadingLo, 0) };
    }
    return { lo: reactiveOf(basis, laggingLo, leadingLo), hi: reactiveOf(basis, laggingHi, leadingHi) };
  }
}

function endsOf(periods: number): Ends {
  const column = (): Float64Array => new Float64Array(periods);
  return { kw: column(), kva: column(), kvar: column(), laggingAtMaxKw: column(), leadingAtMaxKw: column() };
}

function raise(column: Float64Array, at: number, value: number): void {
  if (value > column[at]!) column[at] = value;
}

function lower(column: Float64Array, at: number, value: number): void {
  if (value < column[at]!) column[at] = value;
}

function length(a: number, b: number): number {
  return Math.sqrt(a * a + b * b);
}

function nearestToZero(lo: number, hi: number): number {
  return Math.max(lo, Math.min(hi, 0));
}

function farthestFromZero(lo: number, hi: number): number {
  return Math.max(Math.abs(lo), Math.abs(hi));
}
