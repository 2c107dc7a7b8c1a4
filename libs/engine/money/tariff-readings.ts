import { DemandReading } from './demand-reading.js';
import { EnergyReading } from './energy-reading.js';
import type { Groupings, Period } from './grouping.js';
import type { MeterColumns } from './meter-columns.js';
import type { ReactiveBasis } from './papers.js';
import type { Selection } from './selection.js';

/** The readings a tariff's clauses ask for, each formed once a month however many clauses use it, and only what is asked for. */
export class TariffReadings {
  readonly #groupings: Groupings;
  readonly #energies = new Map<string, EnergyReading>();
  readonly #demands = new Map<string, DemandReading>();

  /** @param groupings blocks and periods of the tariff on its record */
  constructor(groupings: Groupings) {
    this.#groupings = groupings;
  }

  /**
   * Energies of a selection.
   * @param selection the intervals
   * @param per length of a period
   * @returns the reading, shared by all who ask for the same
   */
  energy(selection: Selection, per: Period): EnergyReading {
    const key = `${per} ${selection.key}`;
    const known = this.#energies.get(key);
    if (known !== undefined) return known;
    const made = new EnergyReading(this.#groupings.energyShape(selection, per));
    this.#energies.set(key, made);
    return made;
  }

  /**
   * Demand of a selection.
   * @param selection the intervals
   * @param per length of a period
   * @param basis which kvar are held against each other
   * @returns the reading, shared by all who ask for the same
   */
  demand(selection: Selection, per: Period, basis: ReactiveBasis): DemandReading {
    const key = `${per} ${basis} ${selection.key}`;
    const known = this.#demands.get(key);
    if (known !== undefined) return known;
    const periods = this.#groupings.periods(selection, per);
    const blocks = this.#groupings.blocks(selection, per);
    const made = new DemandReading({ selection, blocks, periods, basis });
    this.#demands.set(key, made);
    return made;
  }

  /**
   * Turns every reading to one month.
   * @param m index of the month
   * @param columns the meter, length n; the month's intervals stay as they are until the next month is read
   */
  read(m: number, columns: MeterColumns): void {
    for (const reading of this.#energies.values()) reading.read(m, columns);
    for (const reading of this.#demands.values()) reading.read(m, columns);
  }
}
