import type { Control } from './control.js';
import type { ControllerView } from './controller-view.js';
import { type Decision, oneByOneInto } from './decide.js';
import { NearestLevel } from './nearest-level.js';
import { oneSizeInto } from './one-size-into.js';
import type { SwitchedBank } from './switched-bank.js';

/** The year as switched. */
export interface SwitchingRun {
  /** effective kvar connected, at nominal voltage, length n [kvar] */
  connectedKvar: Float64Array;
  /** one entry a physical stage */
  switchings: Int32Array;
  /** valid intervals each physical stage was connected in */
  connectedIntervals: Float64Array;
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
  connectedKvar: Float64Array = new Float64Array(view.beginS.length),
): SwitchingRun {
  const plain = view.voltageScale === null && view.standby === null;
  if (plain && bank.classes.length === 1 && control.mode === 'nearestLevel') {
    return { connectedKvar, ...oneSizeInto(bank, control, view, connectedKvar) };
  }
  const simulation = new Simulation(bank, control, view);
  simulation.runInto(connectedKvar, view.beginS.length);
  return { connectedKvar, switchings: simulation.switchings(), connectedIntervals: simulation.connectedIntervals() };
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

/** A controller at work that can be stopped between two intervals and go on later. */
export class Simulation {
  readonly #state: SwitchState;
  readonly #view: ControllerView;
  #next = 0;

  /**
   * @param bank the controller's view of the bank
   * @param control settings
   * @param view what the controller sees, length n
   */
  constructor(bank: SwitchedBank, control: Control, view: ControllerView) {
    this.#state = new SwitchState(bank, control, view.intervalS);
    this.#view = view;
  }

  /**
   * Goes on to an interval.
   * @param connectedKvar receives the connected kvar of the intervals passed, each at its own place, length n [kvar]
   * @param end the interval to stop before
   */
  runInto(connectedKvar: Float64Array, end: number): void {
    if (this.#view.voltageScale === null && this.#view.standby === null) this.#runPlainInto(connectedKvar, end);
    else this.#runFullInto(connectedKvar, end);
    this.#next = end;
  }

  // The common interval is two compares: everything else is in the state's own functions. With all stages in more can't be
  // had, with none in not less: so it is whenever a bank is too small for the load, and through many nights.
  #runPlainInto(connectedKvar: Float64Array, end: number): void {
    const state = this.#state;
    const { wantedKvar, beginS } = this.#view;
    const { bandKvar: band, leastLevelKvar: least, mostLevelKvar: most } = state;
    // a plus keeps the level a plain number: what a function returns would be looked at in every interval
    let level = +state.levelKvar;
    for (let i = this.#next; i < end; i++) {
      const d = wantedKvar[i]! - level;
      if (d > band ? level < most : d < -band && level > least) {
        state.interval = i;
        level = +state.decide(beginS[i]!, wantedKvar[i]!, 1);
      }
      connectedKvar[i] = level;
    }
  }

  #runFullInto(connectedKvar: Float64Array, end: number): void {
    const state = this.#state;
    const { wantedKvar, beginS, voltageScale, standby } = this.#view;
    for (let i = this.#next; i < end; i++) {
      const scale = voltageScale === null ? 1 : voltageScale[i]!;
      state.interval = i;
      if (standby !== null && standby[i] === 1) state.holdOff(beginS[i]!);
      else {
        const d = wantedKvar[i]! - state.levelKvar * scale;
        if (d > state.bandKvar || d < -state.bandKvar) state.decide(beginS[i]!, wantedKvar[i]!, scale);
      }
      connectedKvar[i] = state.levelKvar;
    }
  }

  /** @returns switchings so far, one entry a physical stage */
  switchings(): Int32Array {
    return this.#state.switchings.slice();
  }

  /** @returns valid intervals so far in which each physical stage was connected */
  connectedIntervals(): Float64Array {
    return this.#state.connectedIntervals(this.#next);
  }
}

/** Which stages are in, since when the others are off, and how often each has been switched. */
class SwitchState {
  readonly switchings: Int32Array;
  readonly bandKvar: number;
  levelKvar: number;
  /** levels with no stage in and with all, as they are added up while switching */
  readonly leastLevelKvar: number;
  readonly mostLevelKvar: number;
  /** the interval that is decided */
  interval = 0;
  readonly #bank: SwitchedBank;
  readonly #control: Control;
  readonly #on: Uint8Array;
  readonly #offSinceS: Float64Array;
  /** interval in which a stage was connected last */
  readonly #onSince: Int32Array;
  readonly #intervalsOn: Float64Array;
  /** per class, the moment from which every stage that is off is free */
  readonly #allFreeFromS: Float64Array;
  readonly #decision: Decision;
  readonly #nearest: NearestLevel;

  constructor(bank: SwitchedBank, control: Control, intervalS: number) {
    this.#bank = bank;
    this.#control = control;
    this.switchings = new Int32Array(bank.stageCount);
    this.levelKvar = bank.fixedKvar;
    this.leastLevelKvar = bank.fixedKvar;
    this.mostLevelKvar = bank.classes.reduce((sum, { kvar, stages }) => sum + stages.length * kvar, bank.fixedKvar);
    this.bandKvar = bank.classes.length === 0 ? Number.POSITIVE_INFINITY : control.responseRatio * bank.smallestKvar;
    this.#on = new Uint8Array(bank.stageCount);
    this.#offSinceS = new Float64Array(bank.stageCount).fill(Number.NEGATIVE_INFINITY);
    this.#onSince = new Int32Array(bank.stageCount);
    this.#intervalsOn = new Float64Array(bank.stageCount);
    // what is in no size class is never switched, and always in
    this.#on.fill(1);
    for (const { stages } of bank.classes) for (const stage of stages) this.#on[stage] = 0;
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
    if (!this.#canFollow(wantedKvar - this.levelKvar * scale)) return this.levelKvar;
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

  // More is wanted and nothing is free, or less and nothing is in: the present level is the nearest there is.
  #canFollow(d: number): boolean {
    const { connected, free } = this.#decision;
    const left = d > 0 ? free : connected;
    for (let c = 0; c < left.length; c++) if (left[c]! > 0) return true;
    return false;
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

  connectedIntervals(end: number): Float64Array {
    return this.#intervalsOn.map((intervals, stage) =>
      this.#on[stage] === 1 ? intervals + end - this.#onSince[stage]! : intervals,
    );
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
    this.#onSince[pick] = this.interval;
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
    this.#intervalsOn[pick]! += this.interval - this.#onSince[pick]!;
    this.#offSinceS[pick] = beginS;
    this.#allFreeFromS[c] = beginS + this.#control.reconnectDelayS;
    this.switchings[pick]!++;
  }
}
