import { billRangeOf, type RangedTariff } from '../money/bill-range.js';
import type { EnergyBox, WholeMonths } from '../money/box-readings.js';
import type { DemandBox } from '../money/demand-box.js';
import { energyPowerFactor } from '../quantity/power-factor.js';
import type { BoundCell, CellSize } from './bound-cell.js';
import { leastMoves } from './least-moves.js';
import { PeakBlocks } from './peak-blocks.js';
import type { Study } from './study.js';

/** Sums between the ends of what may be connected, by month; kvar times intervals. */
interface MonthSums {
  /** Σ max(lagging − most, 0) */
  leastLagging: Float64Array;
  /** Σ max(lagging − least, 0) */
  mostLagging: Float64Array;
  most: Float64Array;
  least: Float64Array;
}

/** The meter's own sums over a selection, by month. */
interface MeteredSums {
  box: EnergyBox | null;
  /** indices into the record */
  intervals: Int32Array;
  monthFrom: Int32Array;
  activeKw: Float64Array;
  laggingKvar: Float64Array;
  leadingKvar: Float64Array;
}

/** Intervals that are added up at a time. */
const STRETCH = 2048;

/**
 * The bounds of `CellBounds` where the meter stands at the bus and a tariff looks at nothing but energies of whole months and
 * their greatest kW and kVA: lagging' = max(lagging − B, 0) and leading' = leading + max(B − lagging, 0) are added up as
 * they are formed, and no column of the meter is written. A search forms a hundred of them before it simulates anything.
 */
export class MonthCells {
  readonly #study: Study;
  readonly #ranged: RangedTariff;
  readonly #whole: MeteredSums;
  readonly #parts: MeteredSums[];
  readonly #demands: { box: DemandBox; peaks: PeakBlocks }[];
  readonly #leastKvar: Float64Array;
  readonly #mostKvar: Float64Array;
  readonly #wholeSums: MonthSums;
  readonly #partSums: MonthSums;
  // In columns, so that the kernel is compiled once for sizes of any make.
  /** most and least of a size, its reach above and below, its pace [kvar] */
  readonly #limitsKvar = new Float64Array(5);
  /** most and least connected in the interval before the stretch that is formed [kvar] */
  readonly #beforeKvar = new Float64Array(2);

  /**
   * @param study site and record
   * @param ranged the tariff, ready for bounds
   * @param boxes its boxes
   */
  constructor(study: Study, ranged: RangedTariff, { energies, demands }: WholeMonths) {
    const { record } = study;
    const n = record.beginS.length;
    this.#study = study;
    this.#ranged = ranged;
    this.#leastKvar = new Float64Array(n);
    this.#mostKvar = new Float64Array(n);
    const all = new Int32Array(n);
    for (let i = 0; i < n; i++) all[i] = i;
    this.#whole = this.#metered(null, all, this.#monthFrom());
    this.#wholeSums = monthSums(ranged.prepared.calendar.months.length);
    this.#partSums = monthSums(ranged.prepared.calendar.months.length);
    this.#parts = energies.map((box) => this.#metered(box, box.selection.intervals, box.selection.monthFrom));
    this.#demands = demands.map((box) => ({ box, peaks: new PeakBlocks(record, box.shape) }));
  }

  /**
   * The bounds, where they can be formed this way.
   * @param study site and record
   * @param ranged the tariff, ready for bounds
   * @returns null where transformers, an old bank, a voltage column or another tariff ask for more
   */
  static of(study: Study, ranged: RangedTariff): MonthCells | null {
    const { site, load, voltageScale } = study;
    const added = site.recordedBank.state === 'fixed' || site.recordedBank.state === 'logged';
    const boxes = ranged.boxes.wholeMonths;
    if (boxes === null || added || voltageScale !== null || load.metering.at !== 'bus') return null;
    return new MonthCells(study, ranged, boxes);
  }

  /**
   * The cell of a size.
   * @param size banks it is for
   * @returns bounds by month
   * @source derived: with more connected the meter lags less and leads more, whatever the controller does
   */
  cell(size: CellSize): BoundCell {
    const { months } = this.#ranged.prepared.calendar;
    const cell = {
      leastKvarh: new Float64Array(months.length),
      leastMovesKvar: months.map((): number[] => []),
      mostLowestFactor: 1,
    };
    const { aboveKvar, belowKvar, paceKvar } = size.reach;
    this.#limitsKvar.set([size.mostKvar, size.leastKvar, aboveKvar, belowKvar, paceKvar]);
    this.#beforeKvar.fill(0);
    const bills = billRangeOf(this.#ranged, (m) => {
      this.#monthInto(size, m);
      this.#sumInto(cell, size, m);
      this.#read(m, size);
    });
    return { ...cell, leastBill: Float64Array.from(bills, ({ lo }) => lo) };
  }

  #sumInto(cell: Omit<BoundCell, 'leastBill'>, size: CellSize, m: number): void {
    const { from, end } = this.#ranged.prepared.calendar.months[m]!;
    const { least, leastLagging } = this.#wholeSums;
    const isHeld = size.wantedKvar !== null && Number.isFinite(size.reach.belowKvar);
    cell.leastKvarh[m] = least[m]! * (this.#study.record.intervalS / 3600);
    if (isHeld) cell.leastMovesKvar[m] = leastMoves(this.#leastKvar, this.#mostKvar, from, end);
    const factor = energyPowerFactor(this.#whole.activeKw[m]!, leastLagging[m]!);
    cell.mostLowestFactor = Math.min(cell.mostLowestFactor, factor ?? 1);
  }

  // Σ max(B − lagging, 0) = ΣB − Σ lagging + Σ max(lagging − B, 0)
  #read(m: number, size: CellSize): void {
    const hours = this.#study.record.intervalS / 3600;
    for (const part of this.#parts) {
      const active = part.activeKw[m]! * hours;
      if (part.box?.wantsReactive !== true) {
        part.box?.low.take(m, active, Number.NaN, Number.NaN);
        part.box?.high.take(m, active, Number.NaN, Number.NaN);
        continue;
      }
      const sums = this.#sumsOf(part, m, size);
      const lagging = part.laggingKvar[m]!;
      const leading = part.leadingKvar[m]!;
      const [leastLagging, mostLagging] = [sums.leastLagging[m]!, sums.mostLagging[m]!];
      const leastLeading = leading + Math.max(sums.least[m]! - lagging + mostLagging, 0);
      const mostLeading = leading + Math.max(sums.most[m]! - lagging + leastLagging, 0);
      part.box.low.take(m, active, leastLagging * hours, leastLeading * hours);
      part.box.high.take(m, active, mostLagging * hours, mostLeading * hours);
    }
    const isControlled = size.wantedKvar !== null && size.leastWantedKvar !== null;
    const ends = isControlled ? { leastKvar: this.#leastKvar, mostKvar: this.#mostKvar } : null;
    for (const { box, peaks } of this.#demands) box.take(peaks.maxKw(m), peaks.maxKva(m, size.mostKvar, ends));
  }

  #sumsOf(part: MeteredSums, m: number, size: CellSize): MonthSums {
    if (part.intervals.length === this.#leastKvar.length) return this.#wholeSums;
    this.#partInto(part, m, size);
    return this.#partSums;
  }

  #monthInto(size: CellSize, m: number): void {
    const { from, end } = this.#ranged.prepared.calendar.months[m]!;
    const { wantedKvar, leastWantedKvar, mostKvar } = size;
    const sums = this.#wholeSums;
    sums.most[m] = 0;
    sums.least[m] = 0;
    sums.leastLagging[m] = 0;
    sums.mostLagging[m] = 0;
    if (wantedKvar === null || leastWantedKvar === null) {
      // The same kvar throughout: all of them may be out, or in.
      sums.leastLagging[m] = sumBeyond(this.#study.record.laggingKvar, mostKvar, from, end);
      sums.mostLagging[m] = this.#whole.laggingKvar[m]!;
      sums.most[m] = mostKvar * (end - from);
      return;
    }
    for (let at = from; at < end; at += STRETCH) this.#controlledInto(wantedKvar, leastWantedKvar, m, at);
  }

  // biome-ignore lint/complexity/noExcessiveCognitiveComplexity: a kernel; its sums stay in locals
  #controlledInto(wantedKvar: Float64Array, leastWantedKvar: Float64Array, m: number, from: number): void {
    const end = Math.min(from + STRETCH, this.#ranged.prepared.calendar.months[m]!.end);
    const { laggingKvar } = this.#study.record;
    const limits = this.#limitsKvar;
    const [mostKvar, leastKvar] = [limits[0]!, limits[1]!];
    const [aboveKvar, belowKvar, paceKvar] = [limits[2]!, limits[3]!, limits[4]!];
    const [leastColumn, mostColumn] = [this.#leastKvar, this.#mostKvar];
    const sums = this.#wholeSums;
    const before = this.#beforeKvar;
    let [most, least] = [before[0]!, before[1]!];
    let [leastLagging, mostLagging] = [sums.leastLagging[m]!, sums.mostLagging[m]!];
    let [mostSum, leastSum] = [sums.most[m]!, sums.least[m]!];
    for (let i = from; i < end; i++) {
      const slowest = most - paceKvar;
      most = wantedKvar[i]! + aboveKvar;
      if (most < slowest) most = slowest;
      if (most > mostKvar) most = mostKvar;
      if (most < 0) most = 0;
      const quickest = least + paceKvar;
      least = leastWantedKvar[i]! - belowKvar;
      if (least > quickest) least = quickest;
      if (least > leastKvar) least = leastKvar;
      if (least < 0) least = 0;
      mostColumn[i] = most;
      leastColumn[i] = least;
      mostSum += most;
      leastSum += least;
      const beyondMost = laggingKvar[i]! - most;
      const beyondLeast = laggingKvar[i]! - least;
      if (beyondMost > 0) leastLagging += beyondMost;
      if (beyondLeast > 0) mostLagging += beyondLeast;
    }
    sums.leastLagging[m] = leastLagging;
    sums.mostLagging[m] = mostLagging;
    sums.most[m] = mostSum;
    sums.least[m] = leastSum;
    before[0] = most;
    before[1] = least;
  }

  // Some of a month's intervals, from the columns that the whole was added up from.
  #partInto({ intervals, monthFrom, laggingKvar }: MeteredSums, m: number, size: CellSize): void {
    const lagging = this.#study.record.laggingKvar;
    const [leastColumn, mostColumn] = [this.#leastKvar, this.#mostKvar];
    const isControlled = size.wantedKvar !== null;
    const sums = this.#partSums;
    sums.leastLagging[m] = 0;
    sums.mostLagging[m] = isControlled ? 0 : laggingKvar[m]!;
    sums.most[m] = 0;
    sums.least[m] = 0;
    for (let k = monthFrom[m]!; k < monthFrom[m + 1]!; k++) {
      const i = intervals[k]!;
      const most = isControlled ? mostColumn[i]! : size.mostKvar;
      sums.most[m]! += most;
      sums.leastLagging[m]! += Math.max(lagging[i]! - most, 0);
      if (!isControlled) continue;
      sums.least[m]! += leastColumn[i]!;
      sums.mostLagging[m]! += Math.max(lagging[i]! - leastColumn[i]!, 0);
    }
  }

  #monthFrom(): Int32Array {
    const { months } = this.#ranged.prepared.calendar;
    return Int32Array.from([...months.map(({ from }) => from), this.#study.record.beginS.length]);
  }

  #metered(box: EnergyBox | null, intervals: Int32Array, monthFrom: Int32Array): MeteredSums {
    const { activeKw, laggingKvar, leadingKvar } = this.#study.record;
    const months = monthFrom.length - 1;
    const found = {
      box,
      intervals,
      monthFrom,
      activeKw: new Float64Array(months),
      laggingKvar: new Float64Array(months),
      leadingKvar: new Float64Array(months),
    };
    for (let m = 0; m < months; m++) {
      for (let k = monthFrom[m]!; k < monthFrom[m + 1]!; k++) {
        const i = intervals[k]!;
        found.activeKw[m]! += Math.max(activeKw[i]!, 0);
        found.laggingKvar[m]! += laggingKvar[i]!;
        found.leadingKvar[m]! += leadingKvar[i]!;
      }
    }
    return found;
  }
}

function monthSums(months: number): MonthSums {
  const column = (): Float64Array => new Float64Array(months);
  return { leastLagging: column(), mostLagging: column(), most: column(), least: column() };
}

// What of a column lies beyond a value, added up.
function sumBeyond(column: Float64Array, value: number, from: number, end: number): number {
  let sum = 0;
  for (let i = from; i < end; i++) {
    const beyond = column[i]! - value;
    if (beyond > 0) sum += beyond;
  }
  return sum;
}
