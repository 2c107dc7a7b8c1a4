import { DemandReading } from './demand-reading.js';
import { EnergyReading } from './energy-reading.js';
import { demandBlocks, type Grouping, type Period, periods } from './grouping.js';
import type { MeterColumns } from './meter-columns.js';
import type { ReactiveBasis } from './papers.js';
import type { Selection } from './selection.js';
import type { TariffCalendar } from './tariff-calendar.js';

/** The readings a tariff's clauses ask for, each formed once a month however many clauses use it. */
export class TariffReadings {
  readonly #calendar: TariffCalendar;
  readonly #demandS: number;
  readonly #energies = new Map<string, EnergyReading>();
  readonly #demands = new Map<string, DemandReading>();

  /**
   * @param calendar the record by the site's clock
   * @param demandS length of a demand block [s]
   */
  constructor(calendar: TariffCalendar, demandS: number) {
    this.#calendar = calendar;
    this.#demandS = demandS;
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
    const made = new EnergyReading(selection, this.#periods(selection, per), this.#calendar.intervalS / 3600);
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
    const within = this.#periods(selection, per);
    const blocks = demandBlocks(this.#calendar, selection, this.#demandS, within);
    const made = new DemandReading({ selection, blocks, periods: within, basis });
    this.#demands.set(key, made);
    return made;
  }

  #periods(selection: Selection, per: Period): Grouping | null {
    return per === 'month' ? null : periods(this.#calendar, selection, per);
  }

  /**
   * Forms every reading for one month.
   * @param m index of the month
   * @param columns the meter, length n
   */
  read(m: number, columns: MeterColumns): void {
    for (const reading of this.#energies.values()) reading.read(m, columns);
    for (const reading of this.#demands.values()) reading.read(m, columns);
  }
}
