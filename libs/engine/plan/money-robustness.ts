import { firmVerdict } from '../duty/quick-judge.js';
import { graver, type Verdict } from '../duty/rules.js';
import type { BreakEven, MoneyQuantity, MovedWorth, PickChange, Recommended } from '../money/money-result.js';
import type { MoneyRobustness, WayRobustness } from '../money/money-result.js';
import { InputProblem } from '../problem.js';
import { changeTowards } from './change-towards.js';
import { grownStudy } from './grown-study.js';
import { basisOf, type Judged, overallVerdict } from './judge-basis.js';
import { judgeMoved, withCapacitance, withoutStage } from './robustness.js';
import { savingRange, worstStageOut } from './saving-range.js';
import { NEAR_VALUE } from './search.js';
import { operate } from './study.js';
import { type Scale, scaleOf, weighAgain, type WorthAgain } from './weigh-again.js';
import type { WeighedBank } from './weighed-bank.js';

/** Load in the years to come, relative to the record's; practice. */
export const LOAD_MOVES = [0.8, 1.2] as const;
/** Capacitance of a new bank at the end of its life. */
const AGED_CAPACITANCE = 0.9;
/** Costs and tariffs as offers and years move them; practice. */
const MONEY_MOVES = [0.8, 1.2] as const;

/** Least and greatest factor that is tried. */
const TRIED = {
  load: { least: 0.25, most: 4 },
  capacitance: { least: 0.6, most: 1.2 },
  costs: { least: 0.1, most: 10 },
  tariff: { least: 0.1, most: 10 },
} satisfies Partial<Record<MoneyQuantity, { least: number; most: number }>>;

type TriedQuantity = keyof typeof TRIED;

/** Every factor of load and capacitance is a simulation, those of money are arithmetic. */
const SEARCHES = {
  load: { steps: 2, closedIn: 1e-2 },
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
  readonly #grown = new Map<number, Scale | null>();

  /** @param weighed ways and record */
  constructor(weighed: WeighedWays) {
    this.#weighed = weighed;
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
    if (way.bank.groups.length === 0) return NOTHING;
    if (quantity === 'costs' || quantity === 'tariff') return this.#priced(way, quantity, factor);
    const key = `${way.name} ${quantity} ${factor}`;
    const known = this.#known.get(key);
    if (known !== undefined) return known;
    const found = quantity === 'load' ? this.#loaded(way, factor) : this.#aged(way, factor);
    this.#known.set(key, found);
    return found;
  }

  // Savings less losses go with the tariff, all else with the costs: a net present value is linear in both.
  #priced(way: WeighedBank, quantity: 'costs' | 'tariff', factor: number): WorthAgain | null {
    const present = this.at(way, 'load', 1);
    if (present === null) return null;
    const onGain = quantity === 'tariff' ? factor : 1;
    const savingPerYear = present.savingPerYear * onGain;
    if (present.gain === null || present.cost === null) return { ...present, savingPerYear };
    const gain = present.gain * onGain;
    const cost = present.cost * (quantity === 'costs' ? factor : 1);
    return { ...present, savingPerYear, gain, cost, npv: gain - cost };
  }

  #loaded(way: WeighedBank, factor: number): WorthAgain | null {
    const { bank, control } = way;
    try {
      const scale = this.#scaleAt(factor);
      return scale && weighAgain(scale, way, { operated: operate(scale.study, bank, control), bank, kept: bank });
    } catch (problem) {
      return nullWhereTooLarge(problem);
    }
  }

  #scaleAt(factor: number): Scale | null {
    const { scale } = this.#weighed;
    if (factor === 1) return scale;
    const known = this.#grown.get(factor);
    if (known !== undefined) return known;
    const made = grownScale(scale, factor);
    this.#grown.set(factor, made);
    return made;
  }

  #aged(way: WeighedBank, factor: number): WorthAgain | null {
    if (factor === 1) return this.at(way, 'load', 1);
    const { scale } = this.#weighed;
    const aged = withCapacitance(way.bank, factor);
    const operated = operate(scale.study, aged, way.control);
    return weighAgain(scale, way, { operated, bank: aged, kept: way.bank });
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

function grownScale({ study, money }: Scale, factor: number): Scale | null {
  try {
    return scaleOf(grownStudy(study, factor), money);
  } catch (problem) {
    return nullWhereTooLarge(problem);
  }
}

function nullWhereTooLarge(problem: unknown): null {
  if (problem instanceof InputProblem && problem.code === 'load-too-large') return null;
  throw problem;
}

/**
 * Every way with a bank under load growth and loss, aged capacitance, one stage out, both ends of the fault level, and
 * other costs and tariffs; its break-evens; and where another way would be the pick.
 * @param weighed ways and the record they are weighed on
 * @param mover weighs them
 * @returns the table
 * @source method-robustness
 */
export function moneyRobustness(weighed: WeighedWays, mover: MoneyMover): MoneyRobustness {
  const { ways, scale } = weighed;
  const isPriced = scale.money.prices !== null;
  const quantities = isPriced ? (['load', 'capacitance', 'costs', 'tariff'] as const) : [];
  return {
    ways: ways
      .filter(({ bank }) => bank.groups.length > 0)
      .map((way): WayRobustness => {
        const present = mover.at(way, 'load', 1);
        return {
          name: way.name,
          npv: present?.npv ?? null,
          saving: savingRange(scale, way),
          moved: movedWorths(scale, way, mover),
          breakEvens: quantities.map((quantity) => mover.breakEven(way, quantity)),
        };
      }),
    pickChanges:
      isPriced && ways.length > 1
        ? (['load', 'costs', 'tariff'] as const).map((quantity) => mover.pickChange(quantity))
        : [],
  };
}

function movedWorths(scale: Scale, way: WeighedBank, mover: MoneyMover): MovedWorth[] {
  const judged: Judged = scale.study;
  const { bank, control } = way;
  const verdictAt = (quantity: 'load' | 'capacitance' | 'fault level', factor: number): Verdict =>
    overallVerdict(judged, judgeMoved(judged, bank, control, { quantity, factor }));
  const present = verdictAt('load', 1);
  const row = (quantity: TriedQuantity, value: number, verdict: Verdict): MovedWorth[] => {
    const worth = mover.at(way, quantity, value);
    return worth === null ? [] : [{ quantity, value, unit: null, ...shown(worth), verdict }];
  };
  const { max, min } = judged.site.supply.faultLevelMva;
  const now = mover.at(way, 'load', 1);
  return [
    ...LOAD_MOVES.flatMap((factor) => row('load', factor, verdictAt('load', factor))),
    ...row('capacitance', AGED_CAPACITANCE, verdictAt('capacitance', AGED_CAPACITANCE)),
    {
      quantity: 'stages',
      value: 1,
      unit: null,
      ...shown(worstStageOut(scale, way)),
      verdict: stageOutVerdict(judged, way),
    },
    ...(now === null
      ? []
      : [min, max].map((level): MovedWorth => {
          const verdict = faultVerdict(judged, way, level);
          return { quantity: 'fault level', value: level, unit: 'MVA', ...shown(now), verdict };
        })),
    ...MONEY_MOVES.flatMap((factor) => row('costs', factor, present)),
    ...MONEY_MOVES.flatMap((factor) => row('tariff', factor, present)),
  ];
}

function shown({ savingPerYear, npv, targetMet }: WorthAgain): Pick<MovedWorth, 'savingPerYear' | 'npv' | 'targetMet'> {
  return { savingPerYear, npv, targetMet };
}

// Both ends of the fault level at one value: what the bank is on a supply that is always as strong, or as weak.
function faultVerdict(judged: Judged, { bank, control }: WeighedBank, level: number): Verdict {
  const { supply } = judged.site;
  const site = { ...judged.site, supply: { ...supply, faultLevelMva: { max: level, min: level } } };
  const at = { site, model: judged.model };
  return overallVerdict(at, judgeMoved(at, bank, control, { quantity: 'load', factor: 1 }));
}

function stageOutVerdict(judged: Judged, { bank, control }: WeighedBank): Verdict {
  return bank.groups
    .map((_, g) => firmVerdict(judged.model, withoutStage(bank, g), basisOf(judged, control)))
    .reduce<Verdict>((worst, one) => graver(worst, overallVerdict(judged, one)), 'clear');
}
