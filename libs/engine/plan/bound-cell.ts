import { billRangeOf, type RangedTariff } from '../money/bill-range.js';
import type { MeterBox } from '../money/meter-box.js';
import type { ControlReach } from '../operation/control-reach.js';
import { type MeterAfter, meterAfterInto } from '../operation/meter-after.js';
import { plainSum } from '../quantity/plain-sum.js';
import { energyPowerFactor } from '../quantity/power-factor.js';
import { primaryFromBus, type TransformerPassage } from '../supply/transformer-passage.js';
import { ActiveSums } from './active-sums.js';
import { leastMoves } from './least-moves.js';
import type { Study } from './study.js';

/** What is known of every bank of about one size under one set point, before any is simulated; one entry a month. */
export interface BoundCell {
  /** no bill is lower */
  leastBill: Float64Array;
  /** no fewer kvarh are connected [kvarh] */
  leastKvarh: Float64Array;
  /** rises and falls of the connected kvar, none of them smaller [kvar] */
  leastMovesKvar: number[][];
  /** no bank's lowest monthly power factor is higher; 1 where no month has energy */
  mostLowestFactor: number;
}

/** Which banks a cell is for. */
export interface CellSize {
  /** none has a larger effective total [kvar] */
  mostKvar: number;
  /** none has a smaller one [kvar] */
  leastKvar: number;
  /** what the controller wants connected, length n [kvar]; null where nothing is known of it */
  wantedKvar: Float64Array | null;
  /** least wanted of each interval and of those before it in which a stage may be waiting still, length n [kvar] */
  leastWantedKvar: Float64Array | null;
  reach: Pick<ControlReach, 'aboveKvar' | 'belowKvar' | 'paceKvar'>;
}

/** Intervals that are worked on at a time. */
const STRETCH = 2048;

/** Bounds the bills of banks that are known by their size alone. */
export class CellBounds {
  readonly #study: Study;
  readonly #ranged: RangedTariff;
  readonly #box: MeterBox;
  readonly #leastConnectedKvar: Float64Array;
  readonly #mostConnectedKvar: Float64Array;
  /** meters at both ends of the connected kvar, behind transformers */
  readonly #least: MeterAfter;
  readonly #most: MeterAfter;
  readonly #active: ActiveSums;
  /** nothing is connected at the least, and the columns say so already */
  #noneIsLeast = false;
  /** least and most connected in the interval before the stretch that is formed */
  readonly #before = { leastKvar: new Float64Array(1), mostKvar: new Float64Array(1) };

  /**
   * @param study site and record
   * @param ranged the tariff, ready for bounds
   */
  constructor(study: Study, ranged: RangedTariff) {
    const n = study.record.beginS.length;
    const column = (): Float64Array => new Float64Array(n);
    this.#study = study;
    this.#ranged = ranged;
    this.#active = new ActiveSums(study.record.activeKw, ranged.prepared.calendar.months.length);
    this.#leastConnectedKvar = column();
    this.#mostConnectedKvar = column();
    const behind = study.load.metering.at === 'primary';
    const meter = (): MeterAfter => ({
      activeKw: behind ? column() : study.record.activeKw,
      laggingKvar: column(),
      leadingKvar: column(),
    });
    this.#least = meter();
    this.#most = meter();
    // With more connected the meter lags less and leads more.
    this.#box = {
      low: {
        activeKw: behind ? column() : study.record.activeKw,
        laggingKvar: this.#most.laggingKvar,
        leadingKvar: this.#least.leadingKvar,
      },
      high: {
        activeKw: behind ? column() : study.record.activeKw,
        laggingKvar: this.#least.laggingKvar,
        leadingKvar: this.#most.leadingKvar,
      },
    };
  }

  /**
   * The cell of a size. It is formed month by month, so that what is written and read again stays near the processor.
   * @param size banks it is for
   * @returns bounds by month
   * @throws InputProblem where the transformers can't carry an interval
   * @source derived: with more connected the meter lags less and leads more, whatever the controller does
   */
  cell(size: CellSize): BoundCell {
    const { months } = this.#ranged.prepared.calendar;
    const cell: BoundCell = {
      leastBill: new Float64Array(0),
      leastKvarh: new Float64Array(months.length),
      leastMovesKvar: months.map(() => []),
      mostLowestFactor: 1,
    };
    this.#before.leastKvar[0] = 0;
    this.#before.mostKvar[0] = 0;
    this.#noneIsLeast &&= size.wantedKvar === null;
    const bills = billRangeOf(this.#ranged, (m) => {
      this.#monthInto(size, m);
      this.#ranged.boxes.read(m, this.#box);
      this.#sumInto(cell, size, m);
    });
    this.#noneIsLeast = size.wantedKvar === null;
    return { ...cell, leastBill: Float64Array.from(bills, ({ lo }) => lo) };
  }

  #monthInto(size: CellSize, m: number): void {
    const { record, load } = this.#study;
    const { from, end } = this.#ranged.prepared.calendar.months[m]!;
    // what a step leaves is read by the next while it is near
    for (let at = from; at < end; at += STRETCH) {
      const stop = Math.min(at + STRETCH, end);
      this.#connectedInto(size, at, stop);
      if (!this.#noneIsLeast) {
        meterAfterInto(this.#least, { record, load, connectedKvar: this.#leastConnectedKvar }, at, stop);
      }
      meterAfterInto(this.#most, { record, load, connectedKvar: this.#mostConnectedKvar }, at, stop);
      if (load.metering.at === 'primary') this.#activeInto(load.metering.passage, at, stop);
    }
  }

  #connectedInto(size: CellSize, from: number, end: number): void {
    const { voltageScale } = this.#study;
    const { mostKvar, wantedKvar, leastWantedKvar } = size;
    if (wantedKvar === null || leastWantedKvar === null) {
      if (!this.#noneIsLeast) this.#leastConnectedKvar.fill(0, from, end);
      this.#mostConnectedKvar.fill(mostKvar, from, end);
    } else this.#controlledInto(size, wantedKvar, leastWantedKvar, { from, end });
    // a reach is finite only where no voltage scales the levels
    const most = this.#mostConnectedKvar;
    if (voltageScale !== null) for (let i = from; i < end; i++) most[i]! *= voltageScale[i]!;
  }

  // Comparisons for Math.min and Math.max, which look at signs of zero and at what is no number: a search passes here most.
  #controlledInto(
    { mostKvar, leastKvar, reach }: CellSize,
    wantedKvar: Float64Array,
    leastWantedKvar: Float64Array,
    { from, end }: { from: number; end: number },
  ): void {
    const { aboveKvar, belowKvar, paceKvar } = reach;
    const [leastColumn, mostColumn] = [this.#leastConnectedKvar, this.#mostConnectedKvar];
    const before = this.#before;
    let [least, most] = [before.leastKvar[0]!, before.mostKvar[0]!];
    for (let i = from; i < end; i++) {
      const slowest = most - paceKvar;
      most = wantedKvar[i]! + aboveKvar;
      if (most < slowest) most = slowest;
      if (most > mostKvar) most = mostKvar;
      if (most < 0) most = 0;
      mostColumn[i] = most;
      const quickest = least + paceKvar;
      least = leastWantedKvar[i]! - belowKvar;
      if (least > quickest) least = quickest;
      if (least > leastKvar) least = leastKvar;
      if (least < 0) least = 0;
      leastColumn[i] = least;
    }
    before.leastKvar[0] = least;
    before.mostKvar[0] = most;
  }

  // Behind transformers their loss is convex in the connected kvar: most at an end, and no less than what the active
  // power and the least net kvar draw at the highest voltage of the range.
  #activeInto(passage: TransformerPassage, from: number, end: number): void {
    const { load } = this.#study;
    const [lowKw, highKw] = [this.#box.low.activeKw, this.#box.high.activeKw];
    for (let i = from; i < end; i++) {
      const p = load.activeKw[i]!;
      const q = load.reactiveKvar[i]!;
      highKw[i] = Math.max(this.#least.activeKw[i]!, this.#most.activeKw[i]!);
      const nearest = Math.max(q - this.#mostConnectedKvar[i]!, Math.min(q - this.#leastConnectedKvar[i]!, 0));
      const busVoltagePu = primaryFromBus(passage, p, q - this.#mostConnectedKvar[i]!)?.busVoltagePu ?? 1;
      const square = (p * p + nearest * nearest) / (passage.baseKva * busVoltagePu * busVoltagePu);
      lowKw[i] = Math.min(p + passage.rPu * square + passage.noLoadKw, highKw[i]!);
    }
  }

  // kvarh that are connected at the least; the least lagging beside the most active energy.
  #sumInto(cell: BoundCell, size: CellSize, m: number): void {
    const { from, end } = this.#ranged.prepared.calendar.months[m]!;
    const [least, most] = [this.#leastConnectedKvar, this.#mostConnectedKvar];
    const { activeKw } = this.#box.high;
    const { laggingKvar } = this.#box.low;
    const kvar = this.#noneIsLeast ? 0 : plainSum(least, from, end);
    const lagging = plainSum(laggingKvar, from, end);
    const active = this.#active.sum(m, activeKw, from, end);
    const isHeld = size.wantedKvar !== null && Number.isFinite(size.reach.belowKvar);
    cell.leastKvarh[m] = kvar * (this.#study.record.intervalS / 3600);
    cell.leastMovesKvar[m] = isHeld ? leastMoves(least, most, from, end) : [];
    cell.mostLowestFactor = Math.min(cell.mostLowestFactor, energyPowerFactor(active, lagging) ?? 1);
  }
}
