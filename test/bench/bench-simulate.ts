import { type Bank, type Control, type ControllerView, simulate, switchedBank } from '#libs/engine/index.js';
import type { TwinWork } from './compare-twins.js';
import { madeUpYear } from './made-up-year.js';

const NOMINAL_V = 400;
const TAN_SET = Math.sqrt(1 / (0.97 * 0.97) - 1);

const control: Control = {
  setPointPowerFactor: 0.97,
  mode: 'nearestLevel',
  responseRatio: 0.65,
  stepDelayS: 10,
  reconnectDelayS: 60,
  wear: 'even',
};

/** A year's switching of eight equal stages, and of a bank of three sizes. */
export function simulationWorks(): TwinWork[] {
  const mixed: [number, number][] = [
    [1, 12.5],
    [2, 25],
    [7, 50],
  ];
  return [simulationWork('eight equal stages', [[8, 50]]), simulationWork('stages of three sizes', mixed)];
}

function simulationWork(layout: string, groups: [count: number, ratedKvar: number][]): TwinWork {
  const view = controllerView();
  const n = view.beginS.length;
  const bank = switchedBank(plainBank(groups), NOMINAL_V);
  const connectedKvar = new Float64Array(n);
  let run = simulate(bank, control, view, connectedKvar);
  const settings = [n, control.responseRatio * bank.smallestKvar, bank.smallestKvar];
  const timing = [Math.floor(view.intervalS / control.stepDelayS), control.reconnectDelayS];
  const classes = bank.classes.flatMap(({ kvar, stages }) => [kvar, stages.length]);
  return {
    title: `year's simulation, ${n} intervals, ${layout}`,
    twin: 'simulate',
    limit: 2,
    runs: { ours: 100, twin: 100 },
    input: Float64Array.from([
      ...settings,
      ...timing,
      bank.classes.length,
      ...classes,
      ...view.wantedKvar,
      ...view.beginS,
    ]),
    ours: () => {
      run = simulate(bank, control, view, connectedKvar);
    },
    output: () => {
      // The twin lists its stages class by class.
      const order = bank.classes.flatMap(({ stages }) => [...stages]);
      return Float64Array.from([...run.connectedKvar, ...order.map((stage) => run.switchings[stage]!)]);
    },
  };
}

function plainBank(groups: [count: number, ratedKvar: number][]): Bank {
  return {
    groups: groups.map(([count, ratedKvar]) => ({
      count,
      ratedKvar,
      ratedV: NOMINAL_V,
      reactorPct: 0,
      reactorQuality: 30,
      dischargeOhm: null,
      reactorMaxA: null,
      switchPeakA: null,
      fixed: false,
    })),
    interStageUh: 2,
    interStageGiven: false,
    ambientCategory: null,
  };
}

function controllerView(): ControllerView {
  const { beginS, activeKw, laggingKvar } = madeUpYear();
  return {
    intervalS: 900,
    beginS,
    wantedKvar: laggingKvar.map((kvar, i) => kvar - Math.max(activeKw[i]!, 0) * TAN_SET),
    voltageScale: null,
    standby: null,
  };
}
