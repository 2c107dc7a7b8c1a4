import { type RangedTariff, billRange } from '../money/bill-range.js';
import type { MeterBox } from '../money/meter-box.js';
import { type MeterAfter, meterAfterInto } from '../operation/meter-after.js';
import type { ControlReach } from '../operation/control-reach.js';
import { energyPowerFactor } from '../quantity/power-factor.js';
import { primaryFromBus } from '../supply/transformer-passage.js';
import type { Study } from './study.js';

/** What is known of every bank of about one size under one set point, before any is simulated; one entry a month. */
export interface BoundCell {
  /** no bill is lower */
  leastBill: Float64Array;
  /** no fewer kvarh are connected [kvarh] */
  leastKvarh: Float64Array;
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
  reach: ControlReach;
}

/** Bounds the bills of banks that are known by their size alone. */
export class CellBounds {
  readonly #study: Study;
  readonly #ranged: RangedTariff;
  readonly #least: MeterAfter;
  readonly #most: MeterAfter;
  readonly #leastKw: Float64Array;
  readonly #mostKw: Float64Array;
  readonly #leastConnectedKvar: Float64Array;
  readonly #mostConnectedKvar: Float64Array;

  /**
   * @param study site and record
   * @param ranged the tariff, ready for bounds
   */
  constructor(study: Study, ranged: RangedTariff) {
    const n = study.record.beginS.length;
    const column = (): Float64Array => new Float64Array(n);
    this.#study = study;
    this.#ranged = ranged;
    this.#least = { activeKw: column(), laggingKvar: column(), leadingKvar: column() };
    this.#most = { activeKw: column(), laggingKvar: column(), leadingKvar: column() };
    this.#leastConnectedKvar = column();
    this.#mostConnectedKvar = column();
    const behind = study.load.metering.at === 'primary';
    this.#leastKw = behind ? column() : this.#most.activeKw;
    this.#mostKw = behind ? column() : this.#most.activeKw;
  }

  /**
   * The cell of a size.
   * @param size banks it is for
   * @returns bounds by month
   * @throws InputProblem where the transformers can't carry an interval
   * @source derived: with more connected the meter lags less and leads more, whatever the controller does
   */
  cell(size: CellSize): BoundCell {
    const { record, load, months } = this.#study;
    const n = record.beginS.length;
    this.#connectedInto(size);
    meterAfterInto(this.#least, { record, load, connectedKvar: this.#leastConnectedKvar }, 0, n);
    meterAfterInto(this.#most, { record, load, connectedKvar: this.#mostConnectedKvar }, 0, n);
    this.#activeInto();
    const box: MeterBox = {
      low: {
        activeKw: this.#leastKw,
        laggingKvar: this.#most.laggingKvar,
        leadingKvar: this.#least.leadingKvar,
      },
      high: {
        activeKw: this.#mostKw,
        laggingKvar: this.#least.laggingKvar,
        leadingKvar: this.#most.leadingKvar,
      },
    };
    const leastBill = Float64Array.from(billRange(this.#ranged, box), ({ lo }) => lo);
    return {
      leastBill,
      leastKvarh: this.#leastKvarh(months.names.length),
      mostLowestFactor: this.#mostLowestFactor(box),
    };
  }

  #connectedInto({ mostKvar, leastKvar, wantedKvar, reach }: CellSize): void {
    const { voltageScale } = this.#study;
    const [least, most] = [this.#leastConnectedKvar, this.#mostConnectedKvar];
    if (wantedKvar === null) {
      least.fill(0);
      most.fill(mostKvar);
      if (voltageScale !== null) for (let i = 0; i < most.length; i++) most[i]! *= voltageScale[i]!;
      return;
    }
    // `reach` is finite only where no voltage column scales the levels
    for (let i = 0; i < most.length; i++) {
      const wanted = wantedKvar[i]!;
      most[i] =
        Math.min(mostKvar, Math.max(0, wanted + reach.aboveKvar)) * (voltageScale === null ? 1 : voltageScale[i]!);
      least[i] = Math.max(0, Math.min(leastKvar, wanted - reach.belowKvar));
    }
  }

  // Behind transformers their loss is convex in the connected kvar: most at an end, and no less than what the active
  // power and the least net kvar draw at the highest voltage of the range.
  #activeInto(): void {
    const { load } = this.#study;
    if (load.metering.at === 'bus') return;
    const { passage } = load.metering;
    for (let i = 0; i < this.#mostKw.length; i++) {
      const p = load.activeKw[i]!;
      const q = load.reactiveKvar[i]!;
      this.#mostKw[i] = Math.max(this.#least.activeKw[i]!, this.#most.activeKw[i]!);
      const nearest = Math.max(q - this.#mostConnectedKvar[i]!, Math.min(q - this.#leastConnectedKvar[i]!, 0));
      const busVoltagePu = primaryFromBus(passage, p, q - this.#mostConnectedKvar[i]!)?.busVoltagePu ?? 1;
      const square = (p * p + nearest * nearest) / (passage.baseKva * busVoltagePu * busVoltagePu);
      const leastKw = p + passage.rPu * square + passage.noLoadKw;
      this.#leastKw[i] = Math.min(leastKw, this.#mostKw[i]!);
    }
  }

  #leastKvarh(months: number): Float64Array {
    const { ofInterval } = this.#study.months;
    const hours = this.#study.record.intervalS / 3600;
    const kvarh = new Float64Array(months);
    for (let i = 0; i < ofInterval.length; i++) kvarh[ofInterval[i]!]! += this.#leastConnectedKvar[i]! * hours;
    return kvarh;
  }

  // The least lagging beside the most active energy of each month.
  #mostLowestFactor({ low, high }: MeterBox): number {
    const { months } = this.#study;
    const active = new Float64Array(months.names.length);
    const lagging = new Float64Array(months.names.length);
    for (let i = 0; i < months.ofInterval.length; i++) {
      const month = months.ofInterval[i]!;
      active[month]! += Math.max(high.activeKw[i]!, 0);
      lagging[month]! += low.laggingKvar[i]!;
    }
    return active.reduce((least, kwh, m) => Math.min(least, energyPowerFactor(kwh, lagging[m]!) ?? 1), 1);
  }
}
