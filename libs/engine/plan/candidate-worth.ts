import type { Build } from '../layout/search-space.js';
import { type CostBasis, capitalTotal } from '../money/capital.js';
import { netColumn, presentValue, type SettledFinance } from '../money/cash-flow.js';
import type { SwitchPrice } from '../money/papers.js';
import type { PresentWeights } from '../money/present-weights.js';
import { type Life, lossWPerKvar, replacements, runningCosts, switchLife } from '../money/running-cost.js';
import { savingByMonth } from '../money/saving.js';
import type { TariffMonth } from '../money/tariff-calendar.js';
import type { CandidateRun } from './candidate-run.js';
import { LeastSwitchings } from './least-moves.js';
import { type LeastWear, leastWear } from './least-wear.js';
import { usageOf } from './price-bank.js';
import type { Study } from './study.js';

/** What every candidate is valued with. */
export interface WorthGround {
  study: Study;
  months: readonly TariffMonth[];
  /** totals of the bills as metered */
  beforeTotals: Float64Array;
  finance: SettledFinance;
  weights: PresentWeights;
  /** present value of replacing capacitors worth 1 at each end of their life */
  capacitorLives: number;
}

/**
 * Present value of replacing something worth 1 at each end of its life.
 * @param life how long it lasts; its amount counts
 * @param weights weights of the months
 * @returns present value
 * @source method-money
 */
export function lifeCost(life: Life, weights: PresentWeights): number {
  const { replacementIn } = weights;
  const found = replacements([life], replacementIn.length - 1);
  return found.reduce((sum, { month, amount }) => sum + amount * replacementIn[month]!, 0);
}

/** The most that is saved, the fewest kvarh connected and switchings, from each month to the end of the record. */
export interface BoundRest {
  /** present value; one more than there are months */
  mostSaving: Float64Array;
  /** [kvarh] */
  leastKvarh: Float64Array;
  leastSwitchings: Pick<LeastSwitchings, 'after'>;
}

/** Bounds of single months. */
export interface MonthBounds {
  /** no bill of a month is lower */
  leastBill: Float64Array;
  /** no fewer kvarh are connected in a month [kvarh] */
  leastKvarh: Float64Array;
  /** rises and falls of the connected kvar, none of them smaller [kvar] */
  leastMovesKvar: number[][];
}

/**
 * Bounds of all that is to come after each month.
 * @param ground what every candidate is valued with
 * @param bounds of single months
 * @returns sums from each month to the last
 * @source derived
 */
export function boundRest(ground: WorthGround, bounds: MonthBounds): BoundRest {
  const months = bounds.leastBill.length;
  const column = (): Float64Array => new Float64Array(months + 1);
  const leastSwitchings = new LeastSwitchings(bounds.leastMovesKvar);
  const rest = { mostSaving: column(), leastKvarh: column(), leastSwitchings };
  for (let m = months - 1; m >= 0; m--) {
    const saving = ground.weights.savingOfMonth[m]! * (ground.beforeTotals[m]! - bounds.leastBill[m]!);
    rest.mostSaving[m] = rest.mostSaving[m + 1]! + saving;
    rest.leastKvarh[m] = rest.leastKvarh[m + 1]! + bounds.leastKvarh[m]!;
  }
  return rest;
}

/** A build with one kind of switch: everything of its worth that does not depend on the record. */
export class BuildWorth {
  readonly capital: number;
  readonly #ground: WorthGround;
  readonly #cost: CostBasis;
  readonly #kind: SwitchPrice | undefined;
  /** present value of capital, maintenance and the capacitors' replacements */
  readonly #certainCost: number;
  /** present value of a kvarh connected over the record */
  readonly #lossPerKvarh: number;
  readonly #yearly: number;
  readonly #largestKvar: number;
  readonly #wear: LeastWear;

  /**
   * @param ground what every candidate is valued with
   * @param build the build
   * @param cost prices, cabinets and the kind of its switches
   */
  constructor(ground: WorthGround, build: Build, cost: CostBasis) {
    const { prices } = cost;
    this.#ground = ground;
    this.#cost = cost;
    this.#kind = prices.switches?.find(({ kind }) => kind === cost.switchKind);
    this.capital = capitalTotal(build, cost);
    const { record } = ground.study;
    this.#yearly = 8760 / ((record.beginS.length * record.intervalS) / 3600);
    const maintenance = (prices.maintenancePerYear ?? 0) + (prices.maintenancePerStage ?? 0) * build.stages;
    const lossW = lossWPerKvar(prices, this.#kind, build.reactorPct);
    const capacitors = (prices.perKvar ?? 0) * build.ratedKvar * (prices.replacementFactor ?? 1);
    this.#certainCost =
      this.capital + maintenance * ground.weights.maintenancePerYear + capacitors * ground.capacitorLives;
    this.#largestKvar = build.largestKvar;
    this.#wear = leastWear(build, cost, ground.weights);
    this.#lossPerKvarh = ((this.#yearly * lossW) / 1000) * (prices.lossPricePerKwh ?? 0) * ground.weights.lossPerYear;
  }

  /**
   * No net present value of this build is greater.
   * @param rest bounds of banks of its size
   * @param run its simulation so far, or null
   * @param monthsDone months of it that count
   * @returns upper bound of the net present value
   * @source derived: each part of the net present value is bounded apart
   */
  upperBound(rest: BoundRest, run: CandidateRun | null, monthsDone: number): number {
    const { beforeTotals, weights } = this.#ground;
    let saving = rest.mostSaving[monthsDone]!;
    let kvarh = rest.leastKvarh[monthsDone]!;
    const toCome = rest.leastSwitchings.after(monthsDone, this.#largestKvar);
    if (run === null || monthsDone === 0) {
      return saving - this.#certainCost - this.#lossPerKvarh * kvarh - this.#wear.leastCost(toCome * this.#yearly);
    }
    for (let m = 0; m < monthsDone; m++) {
      saving += weights.savingOfMonth[m]! * (beforeTotals[m]! - run.afterTotals[m]!);
    }
    kvarh += run.connectedKvarh[monthsDone - 1]!;
    const done = run.switchings[monthsDone - 1]!.reduce((sum, count) => sum + count, 0);
    const inAll = this.#wear.leastCost((done + toCome) * this.#yearly);
    const switches = Math.max(inAll, this.#leastSwitchCost(run, monthsDone));
    return saving - this.#certainCost - this.#lossPerKvarh * kvarh - switches;
  }

  // A switch is replaced no later than its switchings so far say, at the least weight up to then.
  #leastSwitchCost(run: CandidateRun, monthsDone: number): number {
    if (this.#kind?.lifeSwitchings === undefined) return 0;
    const { leastReplacementBy } = this.#ground.weights;
    const switchings = run.switchings[monthsDone - 1]!;
    const factor = this.#cost.prices.replacementFactor ?? 1;
    const lives: Life[] = [];
    let stage = 0;
    for (const group of run.bank.groups) {
      for (let k = 0; k < group.count; k++, stage++) {
        lives.push(switchLife(this.#kind, group.ratedKvar, switchings[stage]! * this.#yearly, factor));
      }
    }
    const found = replacements(lives, leastReplacementBy.length - 1);
    return found.reduce((sum, { month, amount }) => sum + amount * leastReplacementBy[month]!, 0);
  }

  /**
   * The net present value of a run that is done, by the same arithmetic as a result's.
   * @param run its whole simulation
   * @returns net present value
   * @source method-money
   */
  netPresentValue(run: CandidateRun): number {
    const { study, months, beforeTotals, finance } = this.#ground;
    const switchings = run.switchings[months.length - 1]!;
    const use = usageOf(study, run.bank, { connectedIntervals: run.connectedIntervals(), switchings });
    const of = { switchKind: this.#cost.switchKind, horizonYears: finance.horizonYears };
    const running = runningCosts(run.bank, this.#cost.prices, use, of);
    const { byMonth } = savingByMonth(months, beforeTotals, run.afterTotals);
    const net = netColumn(byMonth, months[0]!.month, { capital: this.capital, running }, finance);
    return presentValue(net, finance.discountPct);
  }
}
