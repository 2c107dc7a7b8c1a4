import type { Bank } from '../layout/bank.js';
import { billMonth, newCarried } from '../money/bill.js';
import type { PreparedTariff } from '../money/prepare-tariff.js';
import type { Control } from '../operation/control.js';
import type { ControllerView } from '../operation/controller-view.js';
import { meterAfterInto } from '../operation/meter-after.js';
import { Simulation } from '../operation/simulate.js';
import { switchedBank } from '../operation/switched-bank.js';
import { plainSum } from '../quantity/plain-sum.js';
import { energyPowerFactor } from '../quantity/power-factor.js';
import type { ActiveSums } from './active-sums.js';
import type { RunColumns } from './run-columns.js';
import type { Study } from './study.js';

/** Intervals that are worked on at a time. */
const STRETCH = 2048;

/** What a run shares with all others. */
export interface RunGround {
  study: Study;
  prepared: PreparedTariff;
  columns: RunColumns;
  active: ActiveSums;
}

/** A bank and its controller, simulated and priced month by month; what a month leaves is kept. */
export class CandidateRun {
  readonly bank: Bank;
  readonly control: Control;
  /** totals of the months done */
  readonly afterTotals: Float64Array;
  /** kvarh connected up to the end of each month done [kvarh] */
  readonly connectedKvarh: Float64Array;
  /** lagging kvarh at the meter up to the end of each month done [kvarh] */
  readonly laggingKvarh: Float64Array;
  /** switchings up to the end of each month done, one entry a stage */
  readonly switchings: Int32Array[] = [];
  /** months done in which the target holds, counted from the first until one misses it */
  monthsInTarget = 0;
  /** lowest monthly power factor so far, 1 where no month had energy */
  lowestFactor = 1;
  readonly #ground: RunGround;
  readonly #simulation: Simulation;
  readonly #carried: Float64Array;

  /**
   * @param ground study, tariff and shared columns
   * @param bank the bank
   * @param control settings
   * @param view what the controller sees
   */
  constructor(ground: RunGround, bank: Bank, control: Control, view: ControllerView) {
    this.#ground = ground;
    this.bank = bank;
    this.control = control;
    this.#simulation = new Simulation(switchedBank(bank, ground.study.site.nominalV), control, view);
    this.#carried = newCarried(ground.prepared);
    const months = ground.prepared.calendar.months.length;
    this.afterTotals = new Float64Array(months);
    this.connectedKvarh = new Float64Array(months);
    this.laggingKvarh = new Float64Array(months);
  }

  /** @returns months done */
  get months(): number {
    return this.switchings.length;
  }

  /** @returns valid intervals so far in which each stage was connected */
  connectedIntervals(): Float64Array {
    return this.#simulation.connectedIntervals();
  }

  /** Simulates and prices the next month. */
  advance(): void {
    const { study, prepared, columns } = this.#ground;
    const m = this.months;
    const { from, end } = prepared.calendar.months[m]!;
    const { record, load } = study;
    const given = { record, load, connectedKvar: columns.connectedKvar };
    let [connected, lagging] = [0, 0];
    // what a step leaves is read by the next while it is near
    for (let at = from; at < end; at += STRETCH) {
      const stop = Math.min(at + STRETCH, end);
      this.#simulation.runInto(columns.connectedKvar, stop);
      connected = plainSum(columns.connectedKvar, at, stop, connected);
      this.#deliverInto(at, stop);
      meterAfterInto(columns.meter, given, at, stop);
      lagging = plainSum(columns.meter.laggingKvar, at, stop, lagging);
    }
    this.afterTotals[m] = billMonth(prepared, m, columns.meter, this.#carried);
    const hoursOf = (kvar: number): number => (kvar * record.intervalS) / 3600;
    this.connectedKvarh[m] = (this.connectedKvarh[m - 1] ?? 0) + hoursOf(connected);
    this.laggingKvarh[m] = (this.laggingKvarh[m - 1] ?? 0) + hoursOf(lagging);
    this.#takeTarget(m, lagging);
    this.switchings.push(this.#simulation.switchings());
  }

  // Losses are those of the nominal kvar; the meter sees what the voltage makes of it.
  #deliverInto(from: number, end: number): void {
    const { study, columns } = this.#ground;
    const { connectedKvar } = columns;
    const { voltageScale } = study;
    if (voltageScale !== null) for (let i = from; i < end; i++) connectedKvar[i]! *= voltageScale[i]!;
  }

  #takeTarget(m: number, lagging: number): void {
    const { study, prepared, columns, active: sums } = this.#ground;
    const { from, end } = prepared.calendar.months[m]!;
    const active = sums.sum(m, columns.meter.activeKw, from, end);
    const factor = energyPowerFactor(active, lagging);
    this.lowestFactor = Math.min(this.lowestFactor, factor ?? 1);
    const meets = factor === null || factor >= study.site.targetPowerFactor * (1 - 1e-12);
    if (meets && this.monthsInTarget === m) this.monthsInTarget = m + 1;
  }
}
