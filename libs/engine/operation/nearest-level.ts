import type { Decision } from './decide.js';
import { FreeLevels } from './free-levels.js';
import type { SwitchedBank } from './switched-bank.js';

/** Comparisons of candidates carry this share of the smallest stage. */
const COMPARISON_SHARE = 1e-9;

/**
 * `nearestLevel`: among the reachable counts, the present ones included, the least |d|; then fewest switchings, then the
 * lower level, then lexicographically smallest, largest class first. One object a simulation, so that a decision makes
 * nothing new.
 * @source method-controller
 */
export class NearestLevel {
  readonly #decision: Decision;
  readonly #nominalKvar: Float64Array;
  readonly #fixedKvar: number;
  readonly #tolerance: number;
  /** kvar of each class at the interval's voltage */
  readonly #kvar: Float64Array;
  readonly #counts: Int32Array;
  /** classes in the order they are walked: the one with most stages last */
  readonly #order: Int32Array;
  /** least and most the classes from a place of the order on can give, switchings not counted [kvar] */
  readonly #leastFrom: Float64Array;
  readonly #mostFrom: Float64Array;
  readonly #bank: SwitchedBank;
  /** absent until it is asked for */
  #levels: FreeLevels | null | undefined;
  #choosing = false;
  #leastOff = 0;
  #fewest = 0;
  #lowestKvar = 0;

  /**
   * @param bank the controller's view of the bank
   * @param decision state of the interval, read and filled at every choice
   */
  constructor(bank: SwitchedBank, decision: Decision) {
    this.#bank = bank;
    this.#decision = decision;
    this.#nominalKvar = Float64Array.from(bank.classes, ({ kvar }) => kvar);
    this.#kvar = new Float64Array(bank.classes.length);
    this.#counts = new Int32Array(bank.classes.length);
    const stages = bank.classes.map((sizeClass) => sizeClass.stages.length);
    this.#order = Int32Array.from(stages.keys()).sort((a, b) => stages[a]! - stages[b]! || a - b);
    this.#leastFrom = new Float64Array(stages.length + 1);
    this.#mostFrom = new Float64Array(stages.length + 1);
    this.#fixedKvar = bank.fixedKvar;
    this.#tolerance = COMPARISON_SHARE * bank.smallestKvar;
  }

  /** Fills the decision's `chosen`. */
  choose(): void {
    const { voltageScale, connected, chosen } = this.#decision;
    // On a dead bus every level is as far off, and nothing is switched.
    if (voltageScale === 0) {
      chosen.set(connected);
      return;
    }
    if (this.#kvar.length === 1) {
      chosen[0] = this.#nearestOfOneSize();
      return;
    }
    if (voltageScale === 1) {
      if (this.#levels === undefined) this.#levels = FreeLevels.of(this.#bank, this.#tolerance);
      if (this.#levels !== null) {
        if (this.#allAreFree()) this.#levels.chooseInto(this.#decision);
        else this.#levels.chooseReachableInto(this.#decision);
        return;
      }
    }
    for (let c = 0; c < this.#kvar.length; c++) this.#kvar[c] = this.#nominalKvar[c]! * voltageScale;
    this.#reachInto();
    const fixedKvar = this.#fixedKvar * voltageScale;
    // The first walk finds the least distance; the second takes among those as near.
    this.#choosing = false;
    this.#leastOff = Number.POSITIVE_INFINITY;
    this.#walk(0, fixedKvar, 0);
    this.#choosing = true;
    this.#fewest = Number.MAX_SAFE_INTEGER;
    this.#lowestKvar = Number.POSITIVE_INFINITY;
    this.#walk(0, fixedKvar, 0);
  }

  // Whatever is out may be connected, and as much be switched as there is.
  #allAreFree(): boolean {
    const { connected, free, mostSwitchings } = this.#decision;
    let switched = 0;
    for (let c = 0; c < connected.length; c++) {
      const stages = this.#bank.classes[c]!.stages.length;
      if (connected[c]! + free[c]! !== stages) return false;
      switched += stages;
    }
    return mostSwitchings >= switched;
  }

  // The nearest count lies beside wanted/kvar, held within reach; of two equally near the one with fewer switchings.
  #nearestOfOneSize(): number {
    const { voltageScale, wantedKvar, mostSwitchings } = this.#decision;
    const kvar = this.#nominalKvar[0]! * voltageScale;
    const wanted = wantedKvar - this.#fixedKvar * voltageScale;
    const present = this.#decision.connected[0]!;
    const low = Math.max(0, present - mostSwitchings);
    const high = present + Math.min(this.#decision.free[0]!, mostSwitchings);
    const below = Math.min(high, Math.max(low, Math.floor(wanted / kvar)));
    if (below === high) return below;
    const offBelow = Math.abs(wanted - below * kvar);
    const offAbove = Math.abs(wanted - (below + 1) * kvar);
    if (offAbove < offBelow - this.#tolerance) return below + 1;
    if (offAbove > offBelow + this.#tolerance) return below;
    return Math.abs(below + 1 - present) < Math.abs(below - present) ? below + 1 : below;
  }

  #reachInto(): void {
    const { connected, free, mostSwitchings } = this.#decision;
    for (let place = this.#order.length - 1; place >= 0; place--) {
      const c = this.#order[place]!;
      const low = Math.max(0, connected[c]! - mostSwitchings);
      const high = connected[c]! + Math.min(free[c]!, mostSwitchings);
      this.#leastFrom[place] = this.#leastFrom[place + 1]! + low * this.#kvar[c]!;
      this.#mostFrom[place] = this.#mostFrom[place + 1]! + high * this.#kvar[c]!;
    }
  }

  // Every reachable count of all classes but the last of the order; of that one only the two counts beside what is
  // still wanted can be nearest. Where even all or none of what is left lies further off than the nearest so far, by more
  // than sums of the same stages differ, nothing is looked at.
  #walk(place: number, levelKvar: number, switchings: number): void {
    const { connected, free, mostSwitchings, wantedKvar } = this.#decision;
    const beyond = Math.max(
      wantedKvar - levelKvar - this.#mostFrom[place]!,
      levelKvar + this.#leastFrom[place]! - wantedKvar,
    );
    if (beyond > this.#leastOff + 2 * this.#tolerance) return;
    const c = this.#order[place]!;
    const present = connected[c]!;
    const kvar = this.#kvar[c]!;
    const left = mostSwitchings - switchings;
    const low = Math.max(0, present - left);
    const high = present + Math.min(free[c]!, left);
    if (place === this.#order.length - 1) {
      const beside = Math.floor((wantedKvar - levelKvar) / kvar);
      const below = Math.min(high, Math.max(low, beside));
      this.#counts[c] = below;
      this.#meet(levelKvar + below * kvar, switchings + Math.abs(below - present));
      if (below === high) return;
      this.#counts[c] = below + 1;
      this.#meet(levelKvar + (below + 1) * kvar, switchings + Math.abs(below + 1 - present));
      return;
    }
    for (let count = low; count <= high; count++) {
      this.#counts[c] = count;
      const moves = count < present ? present - count : count - present;
      this.#walk(place + 1, levelKvar + count * kvar, switchings + moves);
    }
  }

  #meet(levelKvar: number, switchings: number): void {
    const off = Math.abs(this.#decision.wantedKvar - levelKvar);
    if (!this.#choosing) {
      if (off < this.#leastOff) this.#leastOff = off;
      return;
    }
    if (off > this.#leastOff + this.#tolerance || switchings > this.#fewest) return;
    if (switchings === this.#fewest && !this.#before(levelKvar)) return;
    this.#fewest = switchings;
    this.#lowestKvar = levelKvar;
    this.#decision.chosen.set(this.#counts);
  }

  // Of as near and as few: the lower level, then lexicographically smallest, largest class first.
  #before(levelKvar: number): boolean {
    if (levelKvar < this.#lowestKvar - this.#tolerance) return true;
    if (levelKvar > this.#lowestKvar + this.#tolerance) return false;
    const { chosen } = this.#decision;
    for (let c = 0; c < chosen.length; c++) {
      if (this.#counts[c] !== chosen[c]) return this.#counts[c]! < chosen[c]!;
    }
    return false;
  }
}
