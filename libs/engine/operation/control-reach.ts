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

/** How far the connected kvar may stand from what is wanted; infinite where the controller may be held back. */
export interface ControlReach {
  /** connected ≤ max(0, wanted + this) and ≤ all stages [kvar] */
  aboveKvar: number;
  /** connected ≥ min(all stages, wanted − this) and ≥ 0 [kvar] */
  belowKvar: number;
}

/**
 * How near a controller keeps the connected kvar to what is wanted, interval by interval. It holds within a·q_min. Beyond,
 * taking out any one connected stage is always allowed, so `nearestLevel` ends no more than half a stage above; putting
 * in any one that is out is allowed where none waits for its reconnection delay, so no more than half a stage below.
 * `oneByOne` stops where no stage fits: less than one stage, the threshold taken off, on either side.
 * @param bank its stages
 * @param control settings
 * @param view times, voltage and standby of the record
 * @returns distances [kvar]
 * @source derived
 */
export function controlReach(
  bank: ReachedBank,
  control: Pick<Control, 'mode' | 'responseRatio' | 'stepDelayS' | 'reconnectDelayS'>,
  view: Pick<ControllerView, 'intervalS' | 'voltageScale' | 'standby'>,
): ControlReach {
  const UNHELD = { aboveKvar: Number.POSITIVE_INFINITY, belowKvar: Number.POSITIVE_INFINITY };
  const most =
    control.stepDelayS === 0 ? bank.stageCount : Math.max(1, Math.floor(view.intervalS / control.stepDelayS));
  if (view.voltageScale !== null || view.standby !== null || most < bank.stageCount) return UNHELD;
  const bandKvar = control.responseRatio * bank.smallestKvar;
  const settled = control.mode === 'nearestLevel' ? bank.largestKvar / 2 : bank.largestKvar - bandKvar;
  // comparisons of the controller carry a billionth of the smallest stage
  const reach = Math.max(bandKvar, settled) + 2e-9 * bank.smallestKvar;
  return { aboveKvar: reach, belowKvar: control.reconnectDelayS <= view.intervalS ? reach : Number.POSITIVE_INFINITY };
}
