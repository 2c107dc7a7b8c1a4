import type { BreakEven, MoneyQuantity, PickChange, Recommended } from '../money/money-result.js';
import { changeTowards } from './change-towards.js';
import { COMMON_LOADS, LOAD_SEARCH, LOADS_TRIED } from './load-moves.js';
import { MovedLoads } from './moved-loads.js';
import { withCapacitance } from './robustness.js';
import { NEAR_VALUE } from './search.js';
import { type Scale, type Working, type WorthAgain, weighAgain, workOn } from './weigh-again.js';
import type { WeighedBank } from './weighed-bank.js';

/** Least and greatest factor that is tried. */
const TRIED = {
  load: LOADS_TRIED,
  // capacitance is lost, not gained
  capacitance: { least: 0.6, most: 1 },
  costs: { least: 0.1, most: 10 },
  tariff: { least: 0.1, most: 10 },
} satisfies Partial<Record<MoneyQuantity, { least: number; most: number }>>;

/** A quantity that a factor is tried on. */
export type TriedQuantity = keyof typeof TRIED;

/** Every factor of load and capacitance is a simulation, those of money are arithmetic. */
const SEARCHES = {
  load: LOAD_SEARCH,
  capacitance: { steps: 1, closedIn: 1e-2 },
  costs: { steps: 20, closedIn: 1e-6 },
  tariff: { steps: 20, closedIn: 1e-6 },
} satisfies Record<TriedQuantity, { steps: number; closedIn: number }>;

/** Ways and the record they are weighed on. */
export interface WeighedWays {
  /** the record as metered */
  scale: Scale;
  ways: readonly WeighedBank[];
  chosen: Recommended;
}

/** Weighs ways with their inputs moved; each factor of a quantity is simulated once. */
export class MoneyMover {
  readonly #weighed: WeighedWays;
  readonly #known = new Map<string, WorthAgain | null>();
  readonly #working = new Map<Recommended, Working>();
  readonly #present = new Map<Recommended, WorthAgain>();
  readonly #loads: MovedLoads;

  /** @param weighed ways and record */
  constructor(weighed: WeighedWays) {
    this.#weighed = weighed;
    this.#loads = new MovedLoads(weighed.scale);
  }

  /**
   * A way's bank over the record as it is.
   * @param way a way with a bank
   * @returns how it works
   */
  working(way: WeighedBank): Working {
    const known = this.#working.get(way.name);
    if (known !== undefined) return known;
    const made = workOn(this.#weighed.scale, way.bank, way.control);
    this.#working.set(way.name, made);
    return made;
  }

  /**
   * A way on the record as it is.
   * @param way the way
   * @returns its worth
   * @source method-money
   */
  present(way: WeighedBank): WorthAgain {
    const { bank } = way;
    if (bank.groups.length === 0) return NOTHING;
    const known = this.#present.get(way.name);
    if (known !== undefined) return known;
    const made = weighAgain(this.#weighed.scale, way, this.working(way));
    this.#present.set(way.name, made);
    return made;
  }

  /**
   * A way with one quantity taken by a factor; nothing is moved at 1.
   * @param way the way
   * @param quantity which
   * @param factor on it
   * @returns its worth, or null where the transformers can't carry the load
   * @source method-robustness
   */
  at(way: WeighedBank, quantity: TriedQuantity, factor: number): WorthAgain | null {
    if (way.bank.groups.length === 0 || factor === 1) return this.present(way);
    if (quantity === 'costs' || quantity === 'tariff') return this.#priced(way, quantity, factor);
    const known = this.#known.get(keyOf(way, quantity, factor));
    if (known !== undefined) return known;
    if (quantity === 'load') return this.#loaded(way, factor);
    const found = this.#aged(way, factor);
    this.#known.set(keyOf(way, quantity, factor), found);
    return found;
  }

  // Savings less losses go with the tariff, all else with the costs: a net present value is linear in both.
  #priced(way: WeighedBank, quantity: 'costs' | 'tariff', factor: number): WorthAgain {
    const present = this.present(way);
    const onGain = quantity === 'tariff' ? factor : 1;
    const savingPerYear = present.savingPerYear * onGain;
    if (present.gain === null || present.cost === null) return { ...present, savingPerYear };
    const gain = present.gain * onGain;
    const cost = present.cost * (quantity === 'costs' ? factor : 1);
    return { ...present, savingPerYear, gain, cost, npv: gain - cost };
  }

  #loaded(way: WeighedBank, factor: number): WorthAgain | null {
    const { ways } = this.#weighed;
    const asked = COMMON_LOADS.includes(factor) ? ways.filter(({ bank }) => bank.groups.length > 0) : [way];
    const found = this.#loads.under(asked, factor);
    for (const [k, one] of asked.entries()) this.#known.set(keyOf(one, 'load', factor), found[k]!);
    return found[asked.indexOf(way)]!;
  }

  #aged(way: WeighedBank, factor: number): WorthAgain | null {
    const { scale } = this.#weighed;
    const aged = withCapacitance(way.bank, factor);
    return weighAgain(scale, way, workOn(scale, aged, way.control, { kept: way.bank }));
  }

  /**
   * Factors on a quantity at which a way's net present value crosses 0.
   * @param way a priced way
   * @param quantity which
   * @returns the crossings nearest to 1 on either side
   * @source method-robustness
   */
  breakEven(way: WeighedBank, quantity: TriedQuantity): BreakEven {
    const { least, most } = TRIED[quantity];
    const isWorth = (factor: number): boolean | null => {
      const npv = this.at(way, quantity, factor)?.npv ?? null;
      return npv === null ? null : npv >= 0;
    };
    const crossing = (end: number): number | null => {
      if (end === 1) return null;
      const change = changeTowards(isWorth, isWorth(1), { end, ...SEARCHES[quantity] });
      return change === null || change.value === null ? null : change.factor;
    };
    return { quantity, lowFactor: crossing(least), highFactor: crossing(most), leastTried: least, mostTried: most };
  }

  /**
   * Factors on a quantity at which another of the ways is worth more than the chosen one.
   * @param quantity which
   * @returns the changes nearest to 1 on either side
   * @source method-robustness
   */
  pickChange(quantity: TriedQuantity): PickChange {
    const { chosen } = this.#weighed;
    const { least, most } = TRIED[quantity];
    const pickAt = (factor: number): Recommended | null => this.#pick(quantity, factor);
    const change = (end: number): { factor: number; value: Recommended | null } | null => {
      const found = changeTowards(pickAt, chosen, { end, ...SEARCHES[quantity] });
      return found?.value == null ? null : found;
    };
    const [down, up] = [change(least), change(most)];
    return {
      quantity,
      lowFactor: down?.factor ?? null,
      highFactor: up?.factor ?? null,
      leastTried: least,
      mostTried: most,
      nameBelow: down?.value ?? null,
      nameAbove: up?.value ?? null,
    };
  }

  // As the recommendation is made: in order, a later way only where it is worth more; null where a load can't be carried.
  #pick(quantity: TriedQuantity, factor: number): Recommended | null {
    let best: { name: Recommended; npv: number } | null = null;
    for (const way of this.#weighed.ways) {
      if (!way.eligible) continue;
      const npv = this.at(way, quantity, factor)?.npv ?? null;
      if (npv === null) return null;
      if (best === null || npv > best.npv + NEAR_VALUE) best = { name: way.name, npv };
    }
    return best?.name ?? 'do nothing';
  }
}

const NOTHING: WorthAgain = { savingPerYear: 0, targetMet: false, gain: 0, cost: 0, npv: 0 };

function keyOf(way: WeighedBank, quantity: TriedQuantity, factor: number): string {
  return `${way.name} ${quantity} ${factor}`;
}
