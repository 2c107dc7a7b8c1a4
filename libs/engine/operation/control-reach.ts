import type { Control } from './control.js';
import type { ControllerView } from './controller-view.js';

/** What a reach depends on of a bank, none of whose stages is fixed. */
export interface ReachedBank {
  stageCount: number;
  /** effective [kvar] */
  largestKvar: number;
  /** effective [kvar] */
  smallestKvar: number;
}

/** What a reach depends on of a controller's settings. */
export type ControllerPace = Pick<Control, 'mode' | 'responseRatio' | 'stepDelayS' | 'reconnectDelayS'>;

/** How far the connected kvar may stand from what is wanted; infinite where the controller may be held back further. */
export interface ControlReach {
  /** connected ≤ all stages, and ≤ 0, wanted + this or what was connected before − `paceKvar`, whichever is most [kvar] */
  aboveKvar: number;
  /**
   * connected ≥ 0, and ≥ all stages, the least wanted of this interval and of `waitIntervals` before it − this, or what was
   * connected before + `paceKvar`, whichever is least [kvar]
   */
  belowKvar: number;
  /** in so many intervals after it was taken out a stage may be waiting still */
  waitIntervals: number;
  /** what the switchings of one interval move at the least, where they don't suffice; infinite where they always do [kvar] */
  paceKvar: number;
}

/** Where a stage waits for longer than so many intervals nothing is claimed from below. */
const MOST_WAIT_INTERVALS = 999;

/**
 * How near a controller keeps the connected kvar to what is wanted, interval by interval. It holds within a·q_min. Beyond,
 * taking out any one connected stage is allowed while switchings are left, so `nearestLevel` ends no more than half a stage
 * above or has taken out as many as it may. Putting in any one that is out is allowed where none waits for its reconnection
 * delay. One that waits was taken out not long before: the last to be taken out left no less than what was wanted then less
 * half a stage, and all that followed were put in.
 * `oneByOne` stops where no stage fits: less than one stage, the threshold taken off, on either side; of it nothing is
 * claimed while it may be held back.
 * @param bank its stages
 * @param control settings
 * @param view times, voltage and standby of the record
 * @returns distances [kvar]
 * @source derived
 */
export function controlReach(
  bank: ReachedBank,
  control: ControllerPace,
  view: Pick<ControllerView, 'intervalS' | 'voltageScale' | 'standby'>,
): ControlReach {
  const most =
    control.stepDelayS === 0 ? bank.stageCount : Math.max(1, Math.floor(view.intervalS / control.stepDelayS));
  const isPaced = most < bank.stageCount;
  const isNearest = control.mode === 'nearestLevel';
  if (view.voltageScale !== null || view.standby !== null || (isPaced && !isNearest)) return UNHELD;
  const bandKvar = control.responseRatio * bank.smallestKvar;
  const settled = isNearest ? bank.largestKvar / 2 : bank.largestKvar - bandKvar;
  // comparisons of the controller carry a billionth of the smallest stage
  const reach = Math.max(bandKvar, settled) + 2e-9 * bank.smallestKvar;
  const waits = Math.max(Math.ceil(control.reconnectDelayS / view.intervalS) - 1, 0);
  const isBounded = waits === 0 || (isNearest && waits <= MOST_WAIT_INTERVALS);
  return {
    aboveKvar: reach,
    belowKvar: isBounded ? reach : Number.POSITIVE_INFINITY,
    waitIntervals: isBounded ? waits : 0,
    paceKvar: isPaced ? most * bank.smallestKvar * (1 - 2e-9) : Number.POSITIVE_INFINITY,
  };
}

const UNHELD: ControlReach = {
  aboveKvar: Number.POSITIVE_INFINITY,
  belowKvar: Number.POSITIVE_INFINITY,
  waitIntervals: 0,
  paceKvar: Number.POSITIVE_INFINITY,
};
