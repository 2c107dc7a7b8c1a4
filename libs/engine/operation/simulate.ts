import type { Control } from './control.js';
import type { ControllerView } from './controller-view.js';
import { type Decision, oneByOneInto } from './decide.js';
import { NearestLevel } from './nearest-level.js';
import { oneSizeInto } from './one-size-into.js';
import type { SwitchedBank } from './switched-bank.js';

/** The year as switched; length n but for `switchings`. */
export interface SwitchingRun {
  /** effective kvar connected, at nominal voltage [kvar] */
  connectedKvar: Float64Array;
  /** one entry a physical stage */
  switchings: Int32Array;
}

/**
 * The controller over the record, in time order. A decision uses the interval's own averages, its switchings happen
 * at the interval's beginning and the level holds through it. Missing intervals: state kept, clock runs. Before the
 * first interval all switchable stages are off and free. Held while |d| ≤ a·q_min, d = wanted − connected.
 * @param bank the controller's view of the bank
 * @param control settings
 * @param view what the controller sees, length n
 * @param connectedKvar receives the connected kvar, length n; new where absent
 * @returns connected kvar per interval and switchings per stage
 * @source method-controller
 */
export function simulate(
  bank: SwitchedBank,
  control: Control,
  view: ControllerView,
  connectedKvar = new Float64Array(view.beginS.length),
): SwitchingRun {
  const plain = view.voltageScale === null && view.standby === null;
  if (plain && bank.classes.length === 1 && control.mode === 'nearestLevel') {
    return { connectedKvar, switchings: oneSizeInto(bank, control, view, connectedKvar) };
  }
  const state = new SwitchState(bank, control, view.intervalS);
  if (plain) runPlainInto(state, view, connectedKvar);
  else runFullInto(state, view, connectedKvar);
  return { connectedKvar, switchings: state.switchings };
}

/**
 * Which stages are in through a stretch of the record; what happened before it is run through first.
 * @param bank the controller's view of the bank
 * @param control settings
 * @param view what the controller sees, length n
 * @param stretch first interval and the one after the last, 0 ≤ from ≤ to ≤ n
 * @returns 1 where a stage is in, stage after stage for each interval, length (to − from) · stages
 * @source method-controller
 */
export function stagesThrough(
  bank: SwitchedBank,
  control: Control,
  view: ControllerView,
  stretch: { from: number; to: number },
): Uint8Array {
  const state = new SwitchState(bank, control, view.intervalS);
  const stagesIn = new Uint8Array((stretch.to - stretch.from) * bank.stageCount);
  for (let i = 0; i < stretch.to; i++) {
    const scale = view.voltageScale === null ? 1 : view.voltageScale[i]!;
    if (view.standby !== null && view.standby[i] === 1) state.holdOff(view.beginS[i]!);
    else {
      const d = view.wantedKvar[i]! - state.levelKvar * scale;
      if (d > state.bandKvar || d < -state.bandKvar) state.decide(view.beginS[i]!, view.wantedKvar[i]!, scale);
    }
    if (i >= stretch.from) stagesIn.set(state.on, (i - stretch.from) * bank.stageCount);
  }
  return stagesIn;
}

// The common interval is two compares: everything else is in the state's own functions.
function runPlainInto(state: SwitchState, view: ControllerView, connectedKvar: Float64Array): void {
  const { wantedKvar, beginS } = view;
  const n = wantedKvar.length;
  const band = state.bandKvar;
  let level = state.levelKvar;
  for (let i = 0; i < n; i++) {
    const d = wantedKvar[i]! - level;
    if (d > band || d < -band) level = state.decide(beginS[i]!, wantedKvar[i]!, 1);
    connectedKvar[i] = level;
  }
}

function runFullInto(state: SwitchState, view: ControllerView, connectedKvar: Float64Array): void {
  const { wantedKvar, beginS, voltageScale, standby } = view;
  for (let i = 0; i < wantedKvar.length; i++) {
    const scale = voltageScale === null ? 1 : voltageScale[i]!;
    if (standby !== null && standby[i] === 1) state.holdOff(beginS[i]!);
    else {
      const d = wantedKvar[i]! - state.levelKvar * scale;
      if (d > state.bandKvar || d < -state.bandKvar) state.decide(beginS[i]!, wantedKvar[i]!, scale);
    }
    connectedKvar[i] = state.levelKvar;
  }
}

/** Which stages are in, since when the others are off, and how often each has been switched. */
class SwitchState {
  readonly switchings: Int32Array;
  readonly bandKvar: number;
  levelKvar: number;
  readonly #bank: SwitchedBank;
  readonly #control: Control;
  readonly #on: Uint8Array;
  readonly #offSinceS: Float64Array;
  /** per class, the moment from which every stage that is off is free */
  readonly #allFreeFromS: Float64Array;
  readonly #decision: Decision;
  readonly #nearest: NearestLevel;

  constructor(bank: SwitchedBank, control: Control, intervalS: number) {
    this.#bank = bank;
    this.#control = control;
    this.switchings = new Int32Array(bank.stageCount);
    this.levelKvar = bank.fixedKvar;
    this.bandKvar = bank.classes.length === 0 ? Number.POSITIVE_INFINITY : control.responseRatio * bank.smallestKvar;
    this.#on = new Uint8Array(bank.stageCount);
    this.#offSinceS = new Float64Array(bank.stageCount).fill(Number.NEGATIVE_INFINITY);
    this.#allFreeFromS = new Float64Array(bank.classes.length).fill(Number.NEGATIVE_INFINITY);
    const perInterval = Math.floor(intervalS / control.stepDelayS);
    this.#decision = {
      connected: new Int32Array(bank.classes.length),
      free: new Int32Array(bank.classes.length),
      chosen: new Int32Array(bank.classes.length),
      mostSwitchings: control.stepDelayS === 0 ? bank.stageCount : Math.max(1, perInterval),
      voltageScale: 1,
      wantedKvar: 0,
      bandKvar: this.bandKvar,
    };
    this.#nearest = new NearestLevel(bank, this.#decision);
  }

  decide(beginS: number, wantedKvar: number, scale: number): number {
    const decision = this.#decision;
    decision.wantedKvar = wantedKvar;
    decision.voltageScale = scale;
    this.#countFree(beginS);
    if (this.#control.mode === 'nearestLevel') this.#nearest.choose();
    else oneByOneInto(this.#bank, decision);
    for (let c = 0; c < decision.chosen.length; c++) {
      if (decision.chosen[c] === decision.connected[c]) continue;
      for (let k = decision.connected[c]!; k < decision.chosen[c]!; k++) this.#connectOne(c, beginS);
      for (let k = decision.connected[c]!; k > decision.chosen[c]!; k--) this.#disconnectOne(c, beginS);
      decision.connected[c] = decision.chosen[c]!;
    }
    return this.#settleLevel();
  }

  get on(): Uint8Array {
    return this.#on;
  }

  holdOff(beginS: number): void {
    const { connected } = this.#decision;
    for (let c = 0; c < connected.length; c++) {
      while (connected[c]! > 0) {
        this.#disconnectOne(c, beginS);
        connected[c]!--;
      }
    }
    this.#settleLevel();
  }

  #settleLevel(): number {
    const { connected } = this.#decision;
    let level = this.#bank.fixedKvar;
    for (let c = 0; c < connected.length; c++) level += connected[c]! * this.#bank.classes[c]!.kvar;
    this.levelKvar = level;
    return level;
  }

  #countFree(beginS: number): void {
    const { free, connected } = this.#decision;
    for (let c = 0; c < free.length; c++) {
      const { stages } = this.#bank.classes[c]!;
      const allFree = beginS >= this.#allFreeFromS[c]!;
      free[c] = allFree ? stages.length - connected[c]! : this.#freeStages(stages, beginS);
    }
  }

  #freeStages(stages: Int32Array, beginS: number): number {
    const delayS = this.#control.reconnectDelayS;
    let free = 0;
    for (let k = 0; k < stages.length; k++) {
      if (this.#on[stages[k]!] === 0 && beginS >= this.#offSinceS[stages[k]!]! + delayS) free++;
    }
    return free;
  }

  #connectOne(c: number, beginS: number): void {
    const delayS = this.#control.reconnectDelayS;
    const even = this.#control.wear === 'even';
    const { stages } = this.#bank.classes[c]!;
    let pick = -1;
    for (let k = 0; k < stages.length; k++) {
      const stage = stages[k]!;
      if (this.#on[stage] !== 0 || beginS < this.#offSinceS[stage]! + delayS) continue;
      if (pick < 0 || (even && this.switchings[stage]! < this.switchings[pick]!)) pick = stage;
    }
    if (pick < 0) throw new Error('no free stage to connect');
    this.#on[pick] = 1;
    this.switchings[pick]!++;
  }

  #disconnectOne(c: number, beginS: number): void {
    const even = this.#control.wear === 'even';
    const { stages } = this.#bank.classes[c]!;
    let pick = -1;
    for (let k = 0; k < stages.length; k++) {
      const stage = stages[k]!;
      if (this.#on[stage] === 0) continue;
      if (pick < 0 || !even || this.switchings[stage]! > this.switchings[pick]!) pick = stage;
    }
    if (pick < 0) throw new Error('no connected stage to disconnect');
    this.#on[pick] = 0;
    this.#offSinceS[pick] = beginS;
    this.#allFreeFromS[c] = beginS + this.#control.reconnectDelayS;
    this.switchings[pick]!++;
  }
}
