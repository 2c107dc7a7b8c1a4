import type { Control } from './control.js';
import type { ControllerView } from './controller-view.js';
import { oneSizeInto } from './one-size-into.js';
import { SwitchState } from './switch-state.js';
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
  const state = new SwitchState(bank, control, view);
  const stagesIn = new Uint8Array((stretch.to - stretch.from) * bank.stageCount);
  for (let i = 0; i < stretch.to; i++) {
    const scale = view.voltageScale === null ? 1 : view.voltageScale[i]!;
    if (view.standby !== null && view.standby[i] === 1) state.holdOff(i);
    else {
      const d = view.wantedKvar[i]! - state.levelKvar * scale;
      if (d > state.bandKvar || d < -state.bandKvar) state.decide(i);
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
    this.#state = new SwitchState(bank, control, view);
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
    const { wantedKvar } = this.#view;
    const { bandKvar: band, leastLevelKvar: least, mostLevelKvar: most } = state;
    // a plus keeps the level a plain number: what may be anything would be looked at in every interval
    let level = +state.levelKvar;
    for (let i = this.#next; i < end; i++) {
      const d = wantedKvar[i]! - level;
      if (d > band ? level < most : d < -band && level > least) {
        state.decide(i);
        level = +state.levelKvar;
      }
      connectedKvar[i] = level;
    }
  }

  #runFullInto(connectedKvar: Float64Array, end: number): void {
    const state = this.#state;
    const { wantedKvar, voltageScale, standby } = this.#view;
    for (let i = this.#next; i < end; i++) {
      const scale = voltageScale === null ? 1 : voltageScale[i]!;
      if (standby !== null && standby[i] === 1) state.holdOff(i);
      else {
        const d = wantedKvar[i]! - state.levelKvar * scale;
        if (d > state.bandKvar || d < -state.bandKvar) state.decide(i);
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
