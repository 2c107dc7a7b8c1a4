import type { SwitchedBank } from './switched-bank.js';

/** Comparisons of candidates carry this share of the smallest stage; the two response thresholds are exact. */
const COMPARISON_SHARE = 1e-9;

/** What a decision starts from and what it may do; one object, reused from interval to interval. */
export interface Decision {
  /** connected stages per class, largest size first */
  connected: Int32Array;
  /** stages per class that are off and past their reconnection delay */
  free: Int32Array;
  /** most switchings in the interval */
  mostSwitchings: number;
  /** kvar one nominal kvar gives at the interval's voltage: (U/U_nom)² */
  voltageScale: number;
  /** Q − P⁺·tan φ_set, what should be connected [kvar] */
  wantedKvar: number;
  /** response threshold a·q_min [kvar], not scaled by voltage */
  bandKvar: number;
  /** receives the count per class to go to */
  chosen: Int32Array;
}

/**
 * `nearestLevel`: among the reachable counts, the present ones included, the least |d|; then fewest switchings,
 * then the lower level, then lexicographically smallest, largest class first.
 * @param bank the controller's view of the bank
 * @param decision state of the interval; `chosen` is filled
 * @source method-controller
 */
export function nearestLevelInto(bank: SwitchedBank, decision: Decision): void {
  if (bank.classes.length === 1) nearestOfOneSizeInto(bank, decision);
  else nearestOfManyInto(bank, decision);
}

// One size: the level nearest to what is wanted lies beside wanted/kvar, held within reach. The lower of two equally
// near levels is taken unless the higher needs fewer switchings.
function nearestOfOneSizeInto(bank: SwitchedBank, decision: Decision): void {
  const kvar = bank.classes[0]!.kvar * decision.voltageScale;
  const present = decision.connected[0]!;
  const fixed = bank.fixedKvar * decision.voltageScale;
  const low = Math.max(0, present - decision.mostSwitchings);
  const high = present + Math.min(decision.free[0]!, decision.mostSwitchings);
  const tolerance = COMPARISON_SHARE * bank.smallestKvar;
  const below = Math.min(high, Math.max(low, Math.floor((decision.wantedKvar - fixed) / kvar)));
  // The present count first: on a dead bus every level is as far off, and nothing is switched.
  let best = present;
  let bestOff = Math.abs(decision.wantedKvar - fixed - present * kvar);
  for (let count = Math.max(low, below - 1); count <= Math.min(high, below + 2); count++) {
    const off = Math.abs(decision.wantedKvar - fixed - count * kvar);
    const fewer = Math.abs(count - present) < Math.abs(best - present);
    const asFew = Math.abs(count - present) === Math.abs(best - present);
    const nearer = off < bestOff - tolerance;
    const asNear = Math.abs(off - bestOff) <= tolerance;
    if (nearer || (asNear && (fewer || (asFew && count < best)))) {
      best = count;
      bestOff = off;
    }
  }
  decision.chosen[0] = best;
}

function nearestOfManyInto(bank: SwitchedBank, decision: Decision): void {
  const tolerance = COMPARISON_SHARE * bank.smallestKvar;
  const counts = new Int32Array(bank.classes.length);
  let leastOff = Number.POSITIVE_INFINITY;
  eachReachable(bank, decision, counts, (levelKvar) => {
    const off = Math.abs(decision.wantedKvar - levelKvar);
    if (off < leastOff) leastOff = off;
  });
  let leastSwitchings = Number.POSITIVE_INFINITY;
  let lowestKvar = Number.POSITIVE_INFINITY;
  eachReachable(bank, decision, counts, (levelKvar, switchings) => {
    if (Math.abs(decision.wantedKvar - levelKvar) > leastOff + tolerance) return;
    const fewer = switchings < leastSwitchings;
    const lower = switchings === leastSwitchings && levelKvar < lowestKvar - tolerance;
    // Counts are walked in ascending lexicographic order: a later equal never replaces an earlier one.
    if (!fewer && !lower) return;
    leastSwitchings = switchings;
    lowestKvar = levelKvar;
    decision.chosen.set(counts);
  });
}

// Walks every reachable count vector in ascending lexicographic order, largest class first.
function eachReachable(
  bank: SwitchedBank,
  decision: Decision,
  counts: Int32Array,
  visit: (levelKvar: number, switchings: number) => void,
): void {
  const walk = (c: number, levelKvar: number, switchings: number): void => {
    if (c === bank.classes.length) {
      visit(levelKvar, switchings);
      return;
    }
    const present = decision.connected[c]!;
    const kvar = bank.classes[c]!.kvar * decision.voltageScale;
    const left = decision.mostSwitchings - switchings;
    const low = Math.max(0, present - left);
    const high = present + Math.min(decision.free[c]!, left);
    for (let count = low; count <= high; count++) {
      counts[c] = count;
      walk(c + 1, levelKvar + count * kvar, switchings + Math.abs(count - present));
    }
  };
  walk(0, bank.fixedKvar * decision.voltageScale, 0);
}

/**
 * `oneByOne`: while d > a·q_min connect the largest free q with d − q ≥ −a·q_min; while d < −a·q_min disconnect the
 * largest connected q with d + q ≤ a·q_min; what was disconnected in the interval is not connected in it.
 * @param bank the controller's view of the bank
 * @param decision state of the interval; `chosen` is filled
 * @source method-controller
 */
export function oneByOneInto(bank: SwitchedBank, decision: Decision): void {
  const { connected, chosen, bandKvar, voltageScale, wantedKvar } = decision;
  const tolerance = COMPARISON_SHARE * bank.smallestKvar;
  chosen.set(connected);
  let d = wantedKvar - bank.fixedKvar * voltageScale;
  for (let c = 0; c < chosen.length; c++) d -= chosen[c]! * bank.classes[c]!.kvar * voltageScale;
  for (let switchings = 0; switchings < decision.mostSwitchings; switchings++) {
    const size =
      d > bandKvar ? sizeToConnect(bank, decision, d, tolerance) : sizeToDisconnect(bank, decision, d, tolerance);
    if (size < 0) return;
    const step = d > bandKvar ? 1 : -1;
    chosen[size]! += step;
    d -= step * bank.classes[size]!.kvar * voltageScale;
  }
}

function sizeToConnect(bank: SwitchedBank, decision: Decision, d: number, tolerance: number): number {
  for (let c = 0; c < bank.classes.length; c++) {
    const added = decision.chosen[c]! - decision.connected[c]!;
    const q = bank.classes[c]!.kvar * decision.voltageScale;
    if (added >= 0 && added < decision.free[c]! && d - q >= -decision.bandKvar - tolerance) return c;
  }
  return -1;
}

function sizeToDisconnect(bank: SwitchedBank, decision: Decision, d: number, tolerance: number): number {
  if (!(d < -decision.bandKvar)) return -1;
  for (let c = 0; c < bank.classes.length; c++) {
    const q = bank.classes[c]!.kvar * decision.voltageScale;
    const left = Math.min(decision.chosen[c]!, decision.connected[c]!);
    const untouched = decision.chosen[c]! <= decision.connected[c]!;
    if (untouched && left > 0 && d + q <= decision.bandKvar + tolerance) return c;
  }
  return -1;
}
