import type { Control } from './control.js';
import type { ControllerView } from './controller-view.js';
import { type Decision, oneByOneInto } from './decide.js';
import { NearestLevel } from './nearest-level.js';
import type { SwitchedBank } from './switched-bank.js';

/**
 * Which stages are in, since when the others are off, and how often each has been switched. Intervals go from function to
 * function by their index: a number with decimals would be a new object in each of a search's million decisions.
 */
export class SwitchState {
  readonly switchings: Int32Array;
  readonly bandKvar: number;
  levelKvar: number;
  /** levels with no stage in and with all, as they are added up while switching */
  readonly leastLevelKvar: number;
  readonly mostLevelKvar: number;
  readonly #view: ControllerView;
  /** the interval that is decided */
  #interval = 0;
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

  constructor(bank: SwitchedBank, control: Control, view: ControllerView) {
    this.#view = view;
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
    const perInterval = Math.floor(view.intervalS / control.stepDelayS);
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

  /** @param i the interval: what is wanted lies beyond the band around the level */
  decide(i: number): void {
    const { wantedKvar, voltageScale } = this.#view;
    const decision = this.#decision;
    const scale = voltageScale === null ? 1 : voltageScale[i]!;
    this.#interval = i;
    decision.wantedKvar = wantedKvar[i]!;
    decision.voltageScale = scale;
    this.#countFree();
    if (!this.#canFollow(wantedKvar[i]! > this.levelKvar * scale)) return;
    if (this.#control.mode === 'nearestLevel') this.#nearest.choose();
    else oneByOneInto(this.#bank, decision);
    const { chosen, connected } = decision;
    for (let c = 0; c < chosen.length; c++) {
      if (chosen[c] === connected[c]) continue;
      for (let k = connected[c]!; k < chosen[c]!; k++) this.#connectOne(c);
      for (let k = connected[c]!; k > chosen[c]!; k--) this.#disconnectOne(c);
      connected[c] = chosen[c]!;
    }
    this.#settleLevel();
  }

  // More is wanted and nothing is free, or less and nothing is in: the present level is the nearest there is.
  #canFollow(isMore: boolean): boolean {
    const { connected, free } = this.#decision;
    const left = isMore ? free : connected;
    for (let c = 0; c < left.length; c++) if (left[c]! > 0) return true;
    return false;
  }

  get on(): Uint8Array {
    return this.#on;
  }

  /** @param i an interval in which everything is out */
  holdOff(i: number): void {
    const { connected } = this.#decision;
    this.#interval = i;
    for (let c = 0; c < connected.length; c++) {
      while (connected[c]! > 0) {
        this.#disconnectOne(c);
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

  #settleLevel(): void {
    const { connected } = this.#decision;
    let level = this.#bank.fixedKvar;
    for (let c = 0; c < connected.length; c++) level += connected[c]! * this.#bank.classes[c]!.kvar;
    this.levelKvar = level;
  }

  #countFree(): void {
    const { free, connected } = this.#decision;
    const beginS = this.#view.beginS[this.#interval]!;
    for (let c = 0; c < free.length; c++) {
      const { stages } = this.#bank.classes[c]!;
      const allFree = beginS >= this.#allFreeFromS[c]!;
      free[c] = allFree ? stages.length - connected[c]! : this.#freeStages(stages);
    }
  }

  #freeStages(stages: Int32Array): number {
    const delayS = this.#control.reconnectDelayS;
    const beginS = this.#view.beginS[this.#interval]!;
    const [on, offSinceS] = [this.#on, this.#offSinceS];
    let free = 0;
    for (let k = 0; k < stages.length; k++) {
      const stage = stages[k]!;
      if (on[stage] === 0 && beginS >= offSinceS[stage]! + delayS) free++;
    }
    return free;
  }

  #connectOne(c: number): void {
    const beginS = this.#view.beginS[this.#interval]!;
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
    this.#onSince[pick] = this.#interval;
    this.switchings[pick]!++;
  }

  #disconnectOne(c: number): void {
    const beginS = this.#view.beginS[this.#interval]!;
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
    this.#intervalsOn[pick]! += this.#interval - this.#onSince[pick]!;
    this.#offSinceS[pick] = beginS;
    this.#allFreeFromS[c] = beginS + this.#control.reconnectDelayS;
    this.switchings[pick]!++;
  }
}
