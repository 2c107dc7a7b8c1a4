import { type ControllerPace, controlReach, type ReachedBank } from '../operation/control-reach.js';
import type { ControllerView } from '../operation/controller-view.js';
import { leastOfLast } from './least-of-last.js';

/** What is wanted is counted in so many steps. */
const STEPS = 2048;
/** Sums carry this share for their last bits. */
const SUM_SHARE = 1e-9;

/** The fewest kvarh that banks have connected over a record, each by its own total and its own reach. */
export class KeptKvarh {
  /** by what is wanted, then by the intervals looked back */
  readonly #counts = new Map<Float64Array, Map<number, WantedCounts>>();
  /** written over by each count [kvar] */
  #least: Float64Array | null = null;

  /**
   * The fewest kvarh of a bank.
   * @param bank its stages, none of them fixed; totalKvar effective [kvar]
   * @param control settings of its controller
   * @param view what the controller sees, length n
   * @returns 0 where the controller may be held back [kvarh]
   * @source derived: what the pace of switching holds back is made good within as many intervals as the bank takes to come in
   */
  least(bank: ReachedBank & { totalKvar: number }, control: ControllerPace, view: ControllerView): number {
    const { belowKvar, paceKvar, waitIntervals } = controlReach(bank, control, view);
    if (!Number.isFinite(belowKvar)) return 0;
    const comesIn = Math.ceil(bank.totalKvar / paceKvar + 1e-9) - 1;
    const totalKvar = bank.totalKvar * (1 - 1e-9);
    const sum = this.#countsOf(view.wantedKvar, waitIntervals + comesIn).leastSum(totalKvar, belowKvar);
    // before the first interval nothing is in
    return (Math.max(sum - comesIn * totalKvar, 0) * view.intervalS) / 3600;
  }

  #countsOf(wantedKvar: Float64Array, before: number): WantedCounts {
    const known = this.#counts.get(wantedKvar) ?? new Map<number, WantedCounts>();
    this.#counts.set(wantedKvar, known);
    const counted = known.get(before);
    if (counted !== undefined) return counted;
    this.#least ??= new Float64Array(wantedKvar.length);
    const made = new WantedCounts(before === 0 ? wantedKvar : leastOfLast(wantedKvar, before, this.#least));
    known.set(before, made);
    return made;
  }
}

/** How often so much is wanted, so that Σ max(0, min(total, least wanted − distance)) costs no pass over the record. */
class WantedCounts {
  readonly #stepKvar: number;
  /** intervals in which a step or more is wanted */
  readonly #countFrom = new Float64Array(STEPS + 1);
  /** lower ends of their steps, added up [kvar] */
  readonly #sumFrom = new Float64Array(STEPS + 1);

  /** @param least wanted of each interval and of those before it [kvar] */
  constructor(least: Float64Array) {
    let greatest = 0;
    for (let i = 0; i < least.length; i++) if (least[i]! > greatest) greatest = least[i]!;
    this.#stepKvar = greatest / STEPS;
    const counts = this.#countFrom;
    const perKvar = greatest > 0 ? STEPS / greatest : 0;
    for (let i = 0; i < least.length; i++) {
      const kvar = least[i]!;
      if (kvar > 0) counts[Math.floor(kvar * perKvar * (1 - SUM_SHARE))]!++;
    }
    for (let step = STEPS - 1; step >= 0; step--) {
      this.#sumFrom[step] = this.#sumFrom[step + 1]! + counts[step]! * step * this.#stepKvar;
      counts[step]! += counts[step + 1]!;
    }
  }

  // kvar times intervals
  leastSum(totalKvar: number, belowKvar: number): number {
    const some = this.#stepFrom(belowKvar);
    const all = this.#stepFrom(belowKvar + totalKvar);
    const between = this.#countFrom[some]! - this.#countFrom[all]!;
    const kvar = this.#sumFrom[some]! - this.#sumFrom[all]! - belowKvar * between + totalKvar * this.#countFrom[all]!;
    return Math.max(kvar * (1 - SUM_SHARE), 0);
  }

  // The first step whose lower end is no less.
  #stepFrom(kvar: number): number {
    return this.#stepKvar === 0 ? STEPS : Math.min(Math.ceil(kvar / this.#stepKvar), STEPS);
  }
}
