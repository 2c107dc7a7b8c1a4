import type { Decision } from './decide.js';
import type { SwitchedBank } from './switched-bank.js';

/** Banks with more count vectors than this are walked instead. */
const MOST_VECTORS = 1024;

/** What all stages give is cut into so many parts a vector, so that few levels share one. */
const PARTS_PER_VECTOR = 4;

type SizedStages = Pick<SwitchedBank, 'classes' | 'fixedKvar'>;

/** What a decision starts from and may do. */
type Reach = Pick<Decision, 'connected' | 'free' | 'mostSwitchings'>;

/** What a decision wants, from where, and where it is put. */
type Choice = Pick<Decision, 'wantedKvar' | 'connected' | 'chosen'>;

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
  readonly #fixedKvar: number;
  /** first vector of a higher level than each one */
  readonly #higher: Uint16Array;
  /** first vector of each of equal parts of what all stages give, and of nothing beyond */
  readonly #firstOfPart: Uint16Array;
  readonly #partsPerKvar: number;

  private constructor({ classes, fixedKvar }: SizedStages, vectors: number, tolerance: number) {
    this.#fixedKvar = fixedKvar;
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
    this.#higher = new Uint16Array(vectors);
    for (let v = vectors - 1; v >= 0; v--) {
      const isLast = v + 1 === vectors || this.#levelKvar[v + 1]! > this.#levelKvar[v]!;
      this.#higher[v] = isLast ? v + 1 : this.#higher[v + 1]!;
    }
    const parts = PARTS_PER_VECTOR * vectors;
    this.#partsPerKvar = parts / this.#levelKvar[vectors - 1]!;
    this.#firstOfPart = new Uint16Array(parts + 1);
    for (let part = 0, v = 0; part <= parts; part++) {
      while (v < vectors && Math.floor(this.#levelKvar[v]! * this.#partsPerKvar) < part) v++;
      this.#firstOfPart[part] = v;
    }
  }

  /**
   * The levels of a bank.
   * @param bank the controller's view of the bank
   * @param tolerance levels no further apart are as near [kvar]
   * @returns null where there are too many, or none
   */
  static of(bank: SizedStages, tolerance: number): FreeLevels | null {
    const { classes } = bank;
    const count = classes.reduce((product, { stages }) => product * (stages.length + 1), 1);
    if (classes.length === 0 || count > MOST_VECTORS || classes.some(({ stages }) => stages.length > 255)) return null;
    return new FreeLevels(bank, count, tolerance);
  }

  /**
   * Chooses among the vectors that can be reached: no class takes in more than is free, and all switch no more than they
   * may. The present vector is always one of them.
   * @param decision what is wanted, counts at present, free stages, most switchings; receives the counts
   */
  chooseReachableInto(decision: Reach & Choice): void {
    const { connected, free, mostSwitchings, chosen } = decision;
    const wantedKvar = decision.wantedKvar - this.#fixedKvar;
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
   * @param decision what is wanted, counts at present; receives the counts
   */
  chooseInto({ wantedKvar: inAllKvar, connected, chosen }: Choice): void {
    const wantedKvar = inAllKvar - this.#fixedKvar;
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

  // The first level that is no lower: from the part it lies in one or two steps are left, where halving would take six.
  #firstFrom(kvar: number): number {
    const levels = this.#levelKvar;
    const lastPart = this.#firstOfPart.length - 1;
    const part = Math.floor(kvar * this.#partsPerKvar);
    let v = part <= 0 ? 0 : this.#firstOfPart[Math.min(part, lastPart)]!;
    while (v < levels.length && levels[v]! < kvar) v = this.#higher[v]!;
    return v;
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
