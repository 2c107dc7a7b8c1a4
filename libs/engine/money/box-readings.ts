import { DemandBox } from './demand-box.js';
import { EnergyReading } from './energy-reading.js';
import type { EnergyShape, Groupings, Period } from './grouping.js';
import type { MeterBox } from './meter-box.js';
import type { ReactiveBasis } from './papers.js';
import type { Range } from './range.js';
import type { Selection } from './selection.js';

/** Energies of a selection between the ends of a box, period by period. */
export class EnergyBox {
  readonly selection: Selection;
  /** its only period is the month */
  readonly byMonth: boolean;
  /** somebody looks at more of it than E_p */
  wantsReactive = false;
  readonly low: EnergyReading;
  readonly high: EnergyReading;

  /** @param shape intervals, periods, hours */
  constructor(shape: EnergyShape) {
    this.selection = shape.selection;
    this.byMonth = shape.grouping === null;
    this.low = new EnergyReading(shape);
    this.high = new EnergyReading(shape);
  }

  /**
   * Turns to one month.
   * @param m index of the month
   * @param box the meter's ends
   */
  read(m: number, box: MeterBox): void {
    this.low.read(m, box.low);
    this.high.read(m, box.high);
  }

  /** @returns periods of the month read */
  get periods(): number {
    return this.low.periods;
  }

  /**
   * @param period index of the period
   * @returns E_p [kWh]
   */
  activeKwh(period: number): Range {
    return { lo: this.low.activeKwh(period), hi: this.high.activeKwh(period) };
  }

  /**
   * @param basis what counts of lagging and leading
   * @param period index of the period
   * @returns E_q [kvarh]
   */
  reactiveKvarh(basis: ReactiveBasis, period: number): Range {
    const { low, high } = this;
    if (basis === 'net') {
      return {
        lo: Math.max(low.laggingKvarh(period) - high.leadingKvarh(period), 0),
        hi: Math.max(high.laggingKvarh(period) - low.leadingKvarh(period), 0),
      };
    }
    return { lo: low.reactiveKvarh(basis, period), hi: high.reactiveKvarh(basis, period) };
  }
}

/** The boxes of a tariff that looks at whole months. */
export interface WholeMonths {
  energies: EnergyBox[];
  /** of which nobody wants the kvar */
  demands: DemandBox[];
}

/** The boxes a tariff's bounds ask for, each formed once a month. */
export class BoxReadings {
  readonly #groupings: Groupings;
  readonly #energies = new Map<string, EnergyBox>();
  readonly #demands = new Map<string, DemandBox>();

  /** @param groupings blocks and periods of the tariff on its record */
  constructor(groupings: Groupings) {
    this.#groupings = groupings;
  }

  /**
   * Energies of a selection.
   * @param selection the intervals
   * @param per length of a period
   * @param wants what is looked at of it
   * @returns the box, shared by all who ask for the same
   */
  energy(selection: Selection, per: Period, wants: 'active' | 'reactive' = 'reactive'): EnergyBox {
    const key = `${per} ${selection.key}`;
    const box = this.#energies.get(key) ?? new EnergyBox(this.#groupings.energyShape(selection, per));
    this.#energies.set(key, box);
    if (wants === 'reactive') box.wantsReactive = true;
    return box;
  }

  /**
   * Demand of a selection.
   * @param selection the intervals
   * @param per length of a period
   * @param basis which kvar are held against each other
   * @param wants what is looked at of it: kW and kVA, or the kvar too
   * @returns the box, shared by all who ask for the same
   */
  demand(selection: Selection, per: Period, basis: ReactiveBasis, wants: 'kva' | 'kvar' = 'kvar'): DemandBox {
    const key = `${per} ${basis} ${selection.key}`;
    const box = this.#demands.get(key) ?? this.#demandBox(selection, per, basis);
    this.#demands.set(key, box);
    if (wants === 'kvar') box.wantsKvar = true;
    return box;
  }

  #demandBox(selection: Selection, per: Period, basis: ReactiveBasis): DemandBox {
    const periods = this.#groupings.periods(selection, per);
    const blocks = this.#groupings.blocks(selection, per);
    return new DemandBox({ selection, blocks, periods, basis });
  }

  /** @returns the boxes where each is an energy, or a demand in kW or kVA, of whole months; null where a tariff asks for more */
  get wholeMonths(): WholeMonths | null {
    const energies = [...this.#energies.values()];
    const demands = [...this.#demands.values()];
    const areWhole = energies.every(({ byMonth }) => byMonth) && demands.every(({ byMonth }) => byMonth);
    return areWhole && !demands.some(({ wantsKvar }) => wantsKvar) ? { energies, demands } : null;
  }

  /**
   * Turns every box to one month.
   * @param m index of the month
   * @param box the meter's ends
   */
  read(m: number, box: MeterBox): void {
    for (const reading of this.#energies.values()) reading.read(m, box);
    for (const reading of this.#demands.values()) reading.read(m, box);
  }
}
