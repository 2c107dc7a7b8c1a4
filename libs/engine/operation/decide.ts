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
 * `oneByOne`: while d > a·q_min connect the largest free q with d − q ≥ −a·q_min; while d < −a·q_min disconnect the
 * largest connected q with d + q ≤ a·q_min; what was disconnected in the interval is not connected in it. On a dead bus
 * no stage changes d, and nothing is switched.
 * @param bank the controller's view of the bank
 * @param decision state of the interval; `chosen` is filled
 * @source method-controller
 */
export function oneByOneInto(bank: SwitchedBank, decision: Decision): void {
  const { connected, chosen, bandKvar, voltageScale, wantedKvar } = decision;
  const tolerance = COMPARISON_SHARE * bank.smallestKvar;
  chosen.set(connected);
  if (voltageScale === 0) return;
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
