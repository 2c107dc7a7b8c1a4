import type { Control } from './control.js';
import type { ControllerView } from './simulate.js';
import type { SwitchedBank } from './switched-bank.js';

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
 * @param bank the controller's view of the bank, nothing of it fixed
 * @param control settings
 * @param view times, voltage and standby of the record
 * @returns distances [kvar]
 * @source derived
 */
export function controlReach(
  bank: SwitchedBank,
  control: Control,
  view: Pick<ControllerView, 'intervalS' | 'voltageScale' | 'standby'>,
): ControlReach {
  const UNHELD = { aboveKvar: Number.POSITIVE_INFINITY, belowKvar: Number.POSITIVE_INFINITY };
  const most =
    control.stepDelayS === 0 ? bank.stageCount : Math.max(1, Math.floor(view.intervalS / control.stepDelayS));
  if (view.voltageScale !== null || view.standby !== null || bank.fixedKvar > 0 || most < bank.stageCount)
    return UNHELD;
  const bandKvar = control.responseRatio * bank.smallestKvar;
  const largestKvar = bank.classes[0]?.kvar ?? 0;
  const settled = control.mode === 'nearestLevel' ? largestKvar / 2 : largestKvar - bandKvar;
  // comparisons of the controller carry a billionth of the smallest stage
  const reach = Math.max(bandKvar, settled) + 2e-9 * bank.smallestKvar;
  return { aboveKvar: reach, belowKvar: control.reconnectDelayS <= view.intervalS ? reach : Number.POSITIVE_INFINITY };
}
