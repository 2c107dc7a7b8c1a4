import type { Control } from './control.js';
import type { ControllerView } from './controller-view.js';
import type { SwitchedBank } from './switched-bank.js';

/** Comparisons of candidates carry this share of the smallest stage. */
const COMPARISON_SHARE = 1e-9;

/** Stages of one size and what is known of each. */
interface OneSize {
  stages: Int32Array;
  on: Uint8Array;
  offSinceS: Float64Array;
  switchings: Int32Array;
  delayS: number;
  even: boolean;
}

/**
 * `nearestLevel` over a record without voltage and standby columns, for a bank whose switchable stages are of one size:
 * the rules of `simulate` with the whole state in locals, since this is the loop a search runs thousands of times.
 * @param bank the controller's view, one size class
 * @param control settings, mode `nearestLevel`
 * @param view what the controller sees, length n
 * @param connectedKvar receives the connected kvar, length n
 * @returns switchings per physical stage
 * @source method-controller
 */
// biome-ignore lint/complexity/noExcessiveCognitiveComplexity: a kernel; its state stays in locals
export function oneSizeInto(
  bank: SwitchedBank,
  control: Control,
  view: ControllerView,
  connectedKvar: Float64Array,
): Int32Array {
  const { wantedKvar, beginS, intervalS } = view;
  const { kvar, stages } = bank.classes[0]!;
  const size: OneSize = {
    stages,
    on: new Uint8Array(bank.stageCount),
    offSinceS: new Float64Array(bank.stageCount).fill(Number.NEGATIVE_INFINITY),
    switchings: new Int32Array(bank.stageCount),
    delayS: control.reconnectDelayS,
    even: control.wear === 'even',
  };
  const fixedKvar = bank.fixedKvar;
  const band = control.responseRatio * kvar;
  const tolerance = COMPARISON_SHARE * kvar;
  const most = control.stepDelayS === 0 ? stages.length : Math.max(1, Math.floor(intervalS / control.stepDelayS));
  const n = wantedKvar.length;
  let count = 0;
  let level = fixedKvar;
  let allFreeFromS = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < n; i++) {
    const d = wantedKvar[i]! - level;
    if (d > band || d < -band) {
      const begin = beginS[i]!;
      const free = begin >= allFreeFromS ? stages.length - count : freeStages(size, begin);
      const low = Math.max(0, count - most);
      const high = count + Math.min(free, most);
      // The nearest count lies beside wanted/kvar, held within reach; of two equally near the one with fewer switchings.
      const wanted = wantedKvar[i]! - fixedKvar;
      const beside = Math.floor(wanted / kvar);
      let next = Math.min(high, Math.max(low, beside));
      if (next < high) {
        const below = wanted - next * kvar;
        const nearer = Math.abs(below - kvar) - Math.abs(below);
        if (nearer < -tolerance || (nearer <= tolerance && count > next)) next++;
      }
      if (next < count) allFreeFromS = begin + size.delayS;
      for (let k = count; k < next; k++) connectOne(size, begin);
      for (let k = count; k > next; k--) disconnectOne(size, begin);
      count = next;
      level = fixedKvar + count * kvar;
    }
    connectedKvar[i] = level;
  }
  return size.switchings;
}

function freeStages({ stages, on, offSinceS, delayS }: OneSize, beginS: number): number {
  let free = 0;
  for (let k = 0; k < stages.length; k++) {
    if (on[stages[k]!] === 0 && beginS >= offSinceS[stages[k]!]! + delayS) free++;
  }
  return free;
}

function connectOne({ stages, on, offSinceS, switchings, delayS, even }: OneSize, beginS: number): void {
  let pick = -1;
  for (let k = 0; k < stages.length; k++) {
    const stage = stages[k]!;
    if (on[stage] !== 0 || beginS < offSinceS[stage]! + delayS) continue;
    if (pick < 0 || (even && switchings[stage]! < switchings[pick]!)) pick = stage;
  }
  on[pick] = 1;
  switchings[pick]!++;
}

function disconnectOne({ stages, on, offSinceS, switchings, even }: OneSize, beginS: number): void {
  let pick = -1;
  for (let k = 0; k < stages.length; k++) {
    const stage = stages[k]!;
    if (on[stage] === 0) continue;
    if (pick < 0 || !even || switchings[stage]! > switchings[pick]!) pick = stage;
  }
  on[pick] = 0;
  offSinceS[pick] = beginS;
  switchings[pick]!++;
}
