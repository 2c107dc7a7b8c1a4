import { billRange, type RangedTariff } from '../money/bill-range.js';
import type { MeterBox } from '../money/meter-box.js';
import type { ControlReach } from '../operation/control-reach.js';
import { type MeterAfter, meterAfterInto } from '../operation/meter-after.js';
import { energyPowerFactor } from '../quantity/power-factor.js';
import { primaryFromBus, type TransformerPassage } from '../supply/transformer-passage.js';
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

  /**
   * @param study site and record
   * @param ranged the tariff, ready for bounds
   */
  constructor(study: Study, ranged: RangedTariff) {
    const n = study.record.beginS.length;
    const column = (): Float64Array => new Float64Array(n);
    this.#study = study;
    this.#ranged = ranged;
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
   * The cell of a size.
   * @param size banks it is for
   * @returns bounds by month
   * @throws InputProblem where the transformers can't carry an interval
   * @source derived: with more connected the meter lags less and leads more, whatever the controller does
   */
  cell(size: CellSize): BoundCell {
    const { record, load } = this.#study;
    const n = record.beginS.length;
    this.#connectedInto(size);
    if (load.metering.at === 'bus') {
      this.#atBusInto(this.#least, this.#leastConnectedKvar);
      this.#atBusInto(this.#most, this.#mostConnectedKvar);
    } else {
      meterAfterInto(this.#least, { record, load, connectedKvar: this.#leastConnectedKvar }, 0, n);
      meterAfterInto(this.#most, { record, load, connectedKvar: this.#mostConnectedKvar }, 0, n);
      this.#activeInto(load.metering.passage);
    }
    const leastBill = Float64Array.from(billRange(this.#ranged, this.#box), ({ lo }) => lo);
    return { leastBill, ...this.#monthSums(size) };
  }

  #connectedInto(size: CellSize): void {
    const { voltageScale } = this.#study;
    const [least, most] = [this.#leastConnectedKvar, this.#mostConnectedKvar];
    const { mostKvar, leastKvar, wantedKvar, leastWantedKvar, reach } = size;
    if (wantedKvar === null || leastWantedKvar === null) {
      least.fill(0);
      most.fill(mostKvar);
    } else {
      const { aboveKvar, belowKvar, paceKvar } = reach;
      let [low, high] = [0, 0];
      for (let i = 0; i < most.length; i++) {
        high = Math.max(0, Math.min(mostKvar, Math.max(wantedKvar[i]! + aboveKvar, high - paceKvar)));
        low = Math.max(0, Math.min(leastKvar, leastWantedKvar[i]! - belowKvar, low + paceKvar));
        most[i] = high;
        least[i] = low;
      }
    }
    // a reach is finite only where no voltage scales the levels
    if (voltageScale !== null) for (let i = 0; i < most.length; i++) most[i]! *= voltageScale[i]!;
  }

  // `meterAfterInto` at the bus, where the active power stays: this runs a hundred times before anything is simulated.
  #atBusInto(after: MeterAfter, connectedKvar: Float64Array): void {
    const { laggingKvar, leadingKvar } = this.#study.record;
    const { reactiveKvar } = this.#study.load;
    const [afterLagging, afterLeading] = [after.laggingKvar, after.leadingKvar];
    for (let i = 0; i < connectedKvar.length; i++) {
      const lagging = laggingKvar[i]!;
      const leading = leadingKvar[i]!;
      const fall = lagging - leading - (reactiveKvar[i]! - connectedKvar[i]!);
      const left = fall >= 0 ? lagging - fall : leading + fall;
      const kept = Math.max(left, 0);
      const over = kept - left;
      afterLagging[i] = fall >= 0 ? kept : lagging + over;
      afterLeading[i] = fall >= 0 ? leading + over : kept;
    }
  }

  // Behind transformers their loss is convex in the connected kvar: most at an end, and no less than what the active
  // power and the least net kvar draw at the highest voltage of the range.
  #activeInto(passage: TransformerPassage): void {
    const { load } = this.#study;
    const [lowKw, highKw] = [this.#box.low.activeKw, this.#box.high.activeKw];
    for (let i = 0; i < highKw.length; i++) {
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
  #monthSums(size: CellSize): Omit<BoundCell, 'leastBill'> {
    const { months } = this.#ranged.prepared.calendar;
    const { activeKw } = this.#box.high;
    const { laggingKvar } = this.#box.low;
    const hours = this.#study.record.intervalS / 3600;
    const leastKvarh = new Float64Array(months.length);
    const leastMovesKvar: number[][] = [];
    const isHeld = size.wantedKvar !== null && Number.isFinite(size.reach.belowKvar);
    let mostLowestFactor = 1;
    for (const [m, { from, end }] of months.entries()) {
      let kvar = 0;
      let active = 0;
      let lagging = 0;
      for (let i = from; i < end; i++) {
        kvar += this.#leastConnectedKvar[i]!;
        active += Math.max(activeKw[i]!, 0);
        lagging += laggingKvar[i]!;
      }
      leastKvarh[m] = kvar * hours;
      leastMovesKvar[m] = isHeld ? leastMoves(this.#leastConnectedKvar, this.#mostConnectedKvar, from, end) : [];
      mostLowestFactor = Math.min(mostLowestFactor, energyPowerFactor(active, lagging) ?? 1);
    }
    return { leastKvarh, leastMovesKvar, mostLowestFactor };
  }
}
