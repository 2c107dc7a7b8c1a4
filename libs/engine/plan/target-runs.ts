import type { Bank } from '../layout/bank.js';
import type { Control } from '../operation/control.js';
import type { ControllerView } from '../operation/controller-view.js';
import { meterAfterInto } from '../operation/meter-after.js';
import { type OperationMonth, operationMonth } from '../operation/operation.js';
import { Simulation } from '../operation/simulate.js';
import { switchedBank } from '../operation/switched-bank.js';
import { type RunColumns, runColumns } from './run-columns.js';
import { controllerView, type Operated, type Study } from './study.js';

/** Simulates candidates month by month and gives one up at the first month that speaks against it. */
export class TargetRuns {
  readonly #study: Study;
  /** what the controller sees, by set point */
  readonly #views = new Map<number, ControllerView>();
  /** columns of a run that was given up, for the next to write over */
  #spare: RunColumns | null = null;

  /** @param study site and record */
  constructor(study: Study) {
    this.#study = study;
  }

  /**
   * Simulates a bank as `operate` does.
   * @param bank the bank
   * @param control settings
   * @param goesOn looks at each month; false gives the run up
   * @returns the whole record, or null where the run was given up
   * @source method-controller
   */
  run(bank: Bank, control: Control, goesOn: (month: OperationMonth) => boolean): Operated | null {
    const { record, load, months, site, voltageScale } = this.#study;
    this.#spare ??= runColumns(record.beginS.length);
    const { connectedKvar, meter } = this.#spare;
    const deliveredKvar = voltageScale === null ? connectedKvar : new Float64Array(connectedKvar.length);
    const simulation = new Simulation(switchedBank(bank, site.nominalV), control, this.#view(control));
    const done: OperationMonth[] = [];
    for (let m = 0; m < months.names.length; m++) {
      const from = months.starts[m]!;
      const end = months.starts[m + 1]!;
      simulation.runInto(connectedKvar, end);
      if (voltageScale !== null) {
        for (let i = from; i < end; i++) deliveredKvar[i] = connectedKvar[i]! * voltageScale[i]!;
      }
      meterAfterInto(meter, { record, load, connectedKvar: deliveredKvar }, from, end);
      const month = operationMonth(meter, months, m, record.intervalS / 3600);
      if (!goesOn(month)) return null;
      done.push(month);
    }
    this.#spare = null;
    const run = {
      connectedKvar,
      switchings: simulation.switchings(),
      connectedIntervals: simulation.connectedIntervals(),
    };
    const { beginS, intervalS } = record;
    return { beginS, intervalS, load, run, deliveredKvar, meter, control, months: done };
  }

  #view({ setPointPowerFactor }: Control): ControllerView {
    let view = this.#views.get(setPointPowerFactor);
    if (view === undefined) {
      view = controllerView(this.#study, setPointPowerFactor);
      this.#views.set(setPointPowerFactor, view);
    }
    return view;
  }
}
