import { firstAtLeast, type LevelTable, levelTable } from './level-table.js';
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
  /** the bank's vectors by level and the one taken so far; made when it is first needed */
  search?: LevelSearch;
}

interface LevelSearch {
  table: LevelTable;
  /** −1 for none */
  nearest: number;
  nearestSwitchings: number;
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

// Vectors are looked at from what is wanted outwards: the first reachable one sets the least distance, and only those
// as near as it are compared further. Present counts are always reachable, so one is found.
function nearestOfManyInto(bank: SwitchedBank, decision: Decision): void {
  const { voltageScale, wantedKvar } = decision;
  decision.search ??= { table: levelTable(bank), nearest: -1, nearestSwitchings: 0 };
  const { search } = decision;
  const { levelKvar, counts } = search.table;
  const tolerance = COMPARISON_SHARE * bank.smallestKvar;
  let above = firstAtLeast(search.table, wantedKvar / voltageScale);
  let below = above - 1;
  let mostOff = Number.POSITIVE_INFINITY;
  search.nearest = -1;
  while (above < levelKvar.length || below >= 0) {
    const offAbove =
      above < levelKvar.length ? Math.abs(levelKvar[above]! * voltageScale - wantedKvar) : Number.POSITIVE_INFINITY;
    const offBelow = below >= 0 ? Math.abs(wantedKvar - levelKvar[below]! * voltageScale) : Number.POSITIVE_INFINITY;
    const off = Math.min(offAbove, offBelow);
    if (off > mostOff) break;
    const vector = offBelow <= offAbove ? below-- : above++;
    if (takeNearer(decision, search, vector, tolerance)) mostOff = Math.min(mostOff, off + tolerance);
  }
  const classes = bank.classes.length;
  for (let c = 0; c < classes; c++) decision.chosen[c] = counts[search.nearest * classes + c]!;
}

// Of vectors equally near: fewest switchings, then the lower level, then the lexicographically smaller one.
function takeNearer(decision: Decision, search: LevelSearch, vector: number, tolerance: number): boolean {
  const switchings = switchingsTo(decision, search.table, vector);
  if (switchings < 0) return false;
  const { nearest, nearestSwitchings, table } = search;
  const apartKvar = nearest < 0 ? 0 : (table.levelKvar[vector]! - table.levelKvar[nearest]!) * decision.voltageScale;
  const lower = apartKvar < -tolerance || (apartKvar <= tolerance && table.rank[vector]! < table.rank[nearest]!);
  if (nearest < 0 || switchings < nearestSwitchings || (switchings === nearestSwitchings && lower)) {
    search.nearest = vector;
    search.nearestSwitchings = switchings;
  }
  return true;
}

// Switchings to a vector, −1 where it is out of reach.
function switchingsTo(decision: Decision, table: LevelTable, vector: number): number {
  const { connected, free, mostSwitchings } = decision;
  const classes = connected.length;
  let switchings = 0;
  for (let c = 0; c < classes; c++) {
    const change = table.counts[vector * classes + c]! - connected[c]!;
    if (change > free[c]!) return -1;
    switchings += Math.abs(change);
  }
  return switchings <= mostSwitchings ? switchings : -1;
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
