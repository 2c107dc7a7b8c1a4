import { tanFromPowerFactor } from '../quantity/power-factor.js';
import { type Power, primaryFromBus, type TransformerPassage } from '../supply/transformer-passage.js';
import { type BusLoad, cannotCarry, type Metering } from './bus-load.js';

/** What the target asks for. */
export interface Target {
  powerFactor: number;
  onExport: 'importOnly' | 'absolute';
}

/**
 * The active power the target is held against: max(P, 0), or |P| where the target says `absolute`.
 * @param activeKw P [kW]
 * @param onExport how exported power counts
 * @returns P⁺ [kW]
 * @source method-requirement
 */
export function targetKw(activeKw: number, onExport: Target['onExport']): number {
  return onExport === 'absolute' ? Math.abs(activeKw) : Math.max(activeKw, 0);
}

/**
 * kvar needed at the bus so that the target holds at the meter, one value an interval.
 * At the bus q = max(0, Q − P⁺·tan φ); behind transformers the q for which the primary has Q₁ = P₁⁺·tan φ.
 * @param load power at the bus, length n
 * @param target power factor and how export counts
 * @param beginS interval beginnings, for the message of a refusal [s]
 * @returns need [kvar], length n, ≥ 0, to 1e-6 kvar
 * @throws InputProblem where the transformers can't carry an interval
 * @source method-requirement
 */
export function needColumn(load: BusLoad, target: Target, beginS: Float64Array): Float64Array {
  const slope = { tan: tanFromPowerFactor(target.powerFactor), onExport: target.onExport };
  const n = load.activeKw.length;
  const needKvar = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const p = load.activeKw[i]!;
    const q = load.reactiveKvar[i]!;
    const need = slopeNeedKvar(load.metering, p, q, slope);
    if (need === null) throw cannotCarry(beginS[i]!, p, q);
    needKvar[i] = need;
  }
  return needKvar;
}

/**
 * kvar needed at the bus for one load, the same rule as an interval's.
 * @param metering where the target holds
 * @param load power at the bus
 * @param target power factor and how export counts
 * @returns need [kvar], ≥ 0; null where the transformers can't carry the load
 * @source method-requirement
 */
export function loadNeedKvar(metering: Metering, load: Power, target: Target): number | null {
  const slope = { tan: tanFromPowerFactor(target.powerFactor), onExport: target.onExport };
  return slopeNeedKvar(metering, load.activeKw, load.reactiveKvar, slope);
}

function slopeNeedKvar(metering: Metering, p: number, q: number, slope: TargetSlope): number | null {
  if (metering.at === 'bus') return Math.max(0, q - targetKw(p, slope.onExport) * slope.tan);
  return primaryNeedKvar(metering.passage, p, q, slope);
}

interface TargetSlope {
  tan: number;
  onExport: Target['onExport'];
}

// Excess at the primary falls almost one for one with the bus kvar, so the secant settles in three or four steps.
function primaryNeedKvar(passage: TransformerPassage, p: number, q: number, slope: TargetSlope): number | null {
  const excess = (bankKvar: number): number => {
    const primary = primaryFromBus(passage, p, q - bankKvar);
    if (primary === null) return Number.NaN;
    return primary.reactiveKvar - targetKw(primary.activeKw, slope.onExport) * slope.tan;
  };
  let low = 0;
  let fLow = excess(0);
  if (Number.isNaN(fLow)) return null;
  if (fLow <= 0) return 0;
  let high = fLow;
  let fHigh = excess(high);
  for (let step = 0; step < 60 && Math.abs(high - low) > 1e-10 && fHigh !== fLow; step++) {
    const next = high - (fHigh * (high - low)) / (fHigh - fLow);
    low = high;
    fLow = fHigh;
    high = next;
    fHigh = excess(next);
    if (Number.isNaN(fHigh)) return null;
  }
  return Math.max(0, high);
}
