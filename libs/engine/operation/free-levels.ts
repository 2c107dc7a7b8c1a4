import type { Decision } from './decide.js';
import type { SwitchedBank } from './switched-bank.js';

/** Banks with more count vectors than this are walked instead. */
const MOST_VECTORS = 1024;

/** What a decision starts from and may do. */
type Reach = Pick<Decision, 'connected' | 'free' | 'mostSwitchings'>;

/**
 * Every count vector of a bank by its level, ascending: the nearest level that can be reached is looked up instead of
 * walked to. The choice is that of `nearestLevel`: least |d|, then fewest switchings, then the lower level, then the
 * lexicographically smallest, largest class first.
 * @source method-controller
 */
export class FreeLevels {
  readonly #classes: number;
  /** switchable kvar of each vector, ascending [kvar] */
  readonly #levelKvar: Float64Array;
  /** counts of each vector, largest class first */
  readonly #counts: Uint8Array;
  readonly #tolerance: number;

  private constructor(classes: SwitchedBank['classes'], vectors: number, tolerance: number) {
    this.#classes = classes.length;
    this.#tolerance = tolerance;
    const levelKvar = new Float64Array(vectors);
    const counts = new Uint8Array(vectors * classes.length);
    // lexicographic, largest class first: the last class counts fastest
    let repeat = vectors;
    for (const [c, { kvar, stages }] of classes.entries()) {
      repeat /= stages.length + 1;
      for (let v = 0; v < vectors; v++) {
        const count = Math.floor(v / repeat) % (stages.length + 1);
        counts[v * classes.length + c] = count;
        levelKvar[v]! += count * kvar;
      }
    }
    const order = new Uint16Array(vectors);
    for (let v = 0; v < vectors; v++) order[v] = v;
    order.sort((a, b) => levelKvar[a]! - levelKvar[b]! || a - b);
    this.#levelKvar = Float64Array.from(order, (v) => levelKvar[v]!);
    this.#counts = new Uint8Array(counts.length);
    for (let v = 0; v < vectors; v++) {
      for (let c = 0; c < classes.length; c++) {
        this.#counts[v * classes.length + c] = counts[order[v]! * classes.length + c]!;
      }
    }
  }

  /**
   * The levels of a bank.
   * @param bank the controller's view of the bank
   * @param tolerance levels no further apart are as near [kvar]
   * @returns null where there are too many, or none
   */
  static of({ classes }: Pick<SwitchedBank, 'classes'>, tolerance: number): FreeLevels | null {
    const count = classes.reduce((product, { stages }) => product * (stages.length + 1), 1);
    if (classes.length === 0 || count > MOST_VECTORS || classes.some(({ stages }) => stages.length > 255)) return null;
    return new FreeLevels(classes, count, tolerance);
  }

  /**
   * Chooses among the vectors that can be reached: no class takes in more than is free, and all switch no more than they
   * may. The present vector is always one of them.
   * @param wantedKvar what the switchable stages should come to [kvar]
   * @param decision counts at present, free stages, most switchings; receives the counts
   */
  chooseReachableInto(
    wantedKvar: number,
    { connected, free, mostSwitchings, chosen }: Reach & Pick<Decision, 'chosen'>,
  ): void {
    const levels = this.#levelKvar;
    const reach = { connected, free, mostSwitchings };
    const above = this.#firstFrom(wantedKvar);
    const most = this.#leastOff(wantedKvar, above, reach) + this.#tolerance;
    let from = above;
    while (from > 0 && wantedKvar - levels[from - 1]! <= most) from--;
    let best = -1;
    let fewest = 0;
    for (let v = from; v < levels.length && levels[v]! - wantedKvar <= most; v++) {
      const moves = this.#movesWithin(v, reach);
      if (moves > mostSwitchings) continue;
      if (best >= 0 && (moves > fewest || (moves === fewest && !this.#before(v, best)))) continue;
      best = v;
      fewest = moves;
    }
    for (let c = 0; c < this.#classes; c++) chosen[c] = this.#counts[best * this.#classes + c]!;
  }

  // Outwards from what is wanted until a level is within reach.
  #leastOff(wantedKvar: number, firstAbove: number, reach: Reach): number {
    const levels = this.#levelKvar;
    let above = firstAbove;
    let below = firstAbove - 1;
    while (above < levels.length || below >= 0) {
      const offAbove = above < levels.length ? levels[above]! - wantedKvar : Number.POSITIVE_INFINITY;
      const offBelow = below >= 0 ? wantedKvar - levels[below]! : Number.POSITIVE_INFINITY;
      const nearest = offBelow <= offAbove ? below-- : above++;
      if (this.#movesWithin(nearest, reach) <= reach.mostSwitchings) return Math.min(offAbove, offBelow);
    }
    throw new Error('the present level is within reach');
  }

  // Infinite where more of a class would be taken in than is free.
  #movesWithin(v: number, { connected, free }: Reach): number {
    let moves = 0;
    const first = v * this.#classes;
    for (let c = 0; c < this.#classes; c++) {
      const apart = this.#counts[first + c]! - connected[c]!;
      if (apart > free[c]!) return Number.POSITIVE_INFINITY;
      moves += apart < 0 ? -apart : apart;
    }
    return moves;
  }

  /**
   * Chooses where every stage is free.
   * @param chosen receives the counts, largest class first
   * @param wantedKvar what the switchable stages should come to [kvar]
   * @param connected counts at present
   */
  chooseInto(chosen: Int32Array, wantedKvar: number, connected: Int32Array): void {
    const levels = this.#levelKvar;
    const above = this.#firstFrom(wantedKvar);
    const offAbove = above < levels.length ? levels[above]! - wantedKvar : Number.POSITIVE_INFINITY;
    const offBelow = above > 0 ? wantedKvar - levels[above - 1]! : Number.POSITIVE_INFINITY;
    const most = Math.min(offAbove, offBelow) + this.#tolerance;
    let from = above;
    while (from > 0 && wantedKvar - levels[from - 1]! <= most) from--;
    let best = -1;
    let fewest = 0;
    for (let v = from; v < levels.length && levels[v]! - wantedKvar <= most; v++) {
      const moves = this.#moves(v, connected);
      if (best >= 0 && (moves > fewest || (moves === fewest && !this.#before(v, best)))) continue;
      best = v;
      fewest = moves;
    }
    for (let c = 0; c < this.#classes; c++) chosen[c] = this.#counts[best * this.#classes + c]!;
  }

  #firstFrom(kvar: number): number {
    const levels = this.#levelKvar;
    let low = 0;
    let high = levels.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (levels[middle]! < kvar) low = middle + 1;
      else high = middle;
    }
    return low;
  }

  #moves(v: number, connected: Int32Array): number {
    let moves = 0;
    const first = v * this.#classes;
    for (let c = 0; c < this.#classes; c++) {
      const apart = this.#counts[first + c]! - connected[c]!;
      moves += apart < 0 ? -apart : apart;
    }
    return moves;
  }

  // They come ascending: a later one of the same level is before an earlier one only lexicographically.
  #before(v: number, best: number): boolean {
    if (this.#levelKvar[v]! > this.#levelKvar[best]! + this.#tolerance) return false;
    for (let c = 0; c < this.#classes; c++) {
      const apart = this.#counts[v * this.#classes + c]! - this.#counts[best * this.#classes + c]!;
      if (apart !== 0) return apart < 0;
    }
    return false;
  }
}
