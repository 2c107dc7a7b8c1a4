import type { BilledQuantity } from './papers.js';
import type { TariffMonth } from './tariff-calendar.js';
import { put } from './working.js';

/** Quantities this near to a whole number are that number. */
const WHOLE_WIDTH = 1e-9;

const WHOLE_UNITS: Record<
  NonNullable<BilledQuantity['wholeUnits']>,
  { words: string; of(quantity: number): number }
> = {
  up: { words: 'ceil', of: (quantity) => Math.ceil(quantity - WHOLE_WIDTH) },
  down: { words: 'floor', of: (quantity) => Math.floor(quantity + WHOLE_WIDTH) },
  nearest: { words: 'round', of: (quantity) => Math.floor(quantity + 0.5 + WHOLE_WIDTH) },
};

/** A month, and what the months before it have left. */
export interface CarriedRun {
  /** index of the month */
  m: number;
  month: TariffMonth;
  months: readonly TariffMonth[];
  /** own quantities, one row a carried part, one entry a month */
  carried: Float64Array;
}

/** How a formed quantity becomes the billed one: whole units, then the greatest of it, a minimum and a ratchet. */
export class QuantityRule {
  readonly #rule: BilledQuantity;
  /** row of the carried quantities, −1 where nothing is carried */
  readonly #row: number;

  /**
   * @param rule whole units, minimum, ratchet
   * @param row row of carried quantities it owns where it looks back
   */
  constructor(rule: BilledQuantity, row: number) {
    this.#rule = rule;
    this.#row = rule.ratchet === undefined ? -1 : row;
  }

  /**
   * The month's own quantity: whole units where the clause says so.
   * @param formed as formed
   * @returns the own quantity, same unit
   * @source method-money
   */
  own(formed: number): number {
    const { wholeUnits } = this.#rule;
    return wholeUnits === undefined ? formed : WHOLE_UNITS[wholeUnits].of(formed);
  }

  /**
   * Keeps a month's own quantity for the months after it.
   * @param run the month
   * @param own greatest own quantity of its periods
   */
  keep(run: CarriedRun, own: number): void {
    if (this.#row >= 0) run.carried[this.#row * run.months.length + run.m] = own;
  }

  /**
   * What earlier months ask for: pct/100 × their greatest own quantity, up to so many months back.
   * @param run the month
   * @returns same unit as the quantity; 0 without a ratchet
   * @source method-money
   */
  ratchet(run: CarriedRun): number {
    const { ratchet } = this.#rule;
    return ratchet === undefined ? 0 : (ratchet.pct / 100) * this.#greatestBefore(run);
  }

  #greatestBefore(run: CarriedRun): number {
    const { ratchet } = this.#rule;
    if (ratchet === undefined) return 0;
    const at = this.#row * run.months.length;
    let most = 0;
    for (let k = run.m - 1; k >= 0; k--) {
      const { month, monthsSinceYearZero } = run.months[k]!;
      if (run.month.monthsSinceYearZero - monthsSinceYearZero > ratchet.months) break;
      if (ratchet.of === undefined || ratchet.of.includes(month)) most = Math.max(most, run.carried[at + k]!);
    }
    return most;
  }

  /**
   * The billed quantity: the greatest of the own one, the minimum, and the ratchet's.
   * @param own own quantity
   * @param ratchet what earlier months ask for
   * @returns same unit
   * @source method-money
   */
  billed(own: number, ratchet: number): number {
    return Math.max(own, this.#rule.minimum ?? Number.NEGATIVE_INFINITY, ratchet);
  }

  /**
   * The billed quantity as a working.
   * @param formed working of the quantity as formed
   * @param run the month
   * @returns for example "max(ceil(565.2), 50, 80 / 100 · 700)"
   */
  working(formed: string, run: CarriedRun): string {
    const { wholeUnits, minimum, ratchet } = this.#rule;
    const own = wholeUnits === undefined ? formed : `${WHOLE_UNITS[wholeUnits].words}(${formed})`;
    const others = [
      ...(minimum === undefined ? [] : [put(minimum)]),
      ...(ratchet === undefined ? [] : [`${put(ratchet.pct)} / 100 · ${put(this.#greatestBefore(run))}`]),
    ];
    return others.length === 0 ? own : `max(${[own, ...others].join(', ')})`;
  }
}
