import type { Level } from '../layout/levels.js';
import { compensatedSum } from '../quantity/compensated-sum.js';
import { energyPowerFactor, tanFromPowerFactor } from '../quantity/power-factor.js';
import type { MonthIndex } from '../record/zone-table.js';
import type { BusLoad } from '../requirement/bus-load.js';
import { type Target, targetKw } from '../requirement/need.js';
import type { MeterAfter } from './meter-after.js';
import type { SwitchingRun } from './simulate.js';

/** Energies of one calendar month at the meter, after the bank. */
export interface OperationMonth {
  month: string;
  powerFactorLagging: number | null;
  activeKwh: number;
  laggingKvarh: number;
  leadingKvarh: number;
}

/** An interval in which the target was missed by most. */
export interface WorstInterval {
  beginS: number;
  /** at the bus [kW] */
  activeKw: number;
  /** the load's own, at the bus [kvar] */
  reactiveKvar: number;
  connectedKvar: number;
  residualKvar: number;
  /** kvar at the meter beyond the target's [kvar] */
  shortfallKvar: number;
}

/** The year with the bank working. */
export interface OperationSummary {
  /** one entry a physical stage */
  switchings: number[];
  totalSwitchings: number;
  laggingKvarh: number;
  leadingKvarh: number;
  maxResidualKvar: number;
  minResidualKvar: number;
  shareInTargetPct: number;
  worstIntervals: WorstInterval[];
  months: OperationMonth[];
  hoursAtLevel: { levelKvar: number; hours: number }[];
}

/** What a simulated record is summed from; columns of length n. */
export interface Simulated {
  beginS: Float64Array;
  intervalS: number;
  load: BusLoad;
  run: SwitchingRun;
  /** connected kvar as delivered at the interval's voltage [kvar] */
  deliveredKvar: Float64Array;
  meter: MeterAfter;
}

/** How many of the worst intervals are listed. */
const WORST_LISTED = 10;
/** An excess at the meter below this is inside the target [kvar]. */
const TARGET_WIDTH_KVAR = 1e-6;

/**
 * Monthly energies at the meter after the bank.
 * @param meter columns at the meter [kW, kvar], length n
 * @param months calendar months of the intervals
 * @param hours length of an interval [h]
 * @returns one entry a month
 * @source method-energy
 */
export function operationMonths(meter: MeterAfter, months: MonthIndex, hours: number): OperationMonth[] {
  return months.names.map((_, m) => operationMonth(meter, months, m, hours));
}

/**
 * Energies of one month at the meter after the bank.
 * @param meter columns at the meter [kW, kvar], length n; only the month's intervals are read
 * @param months calendar months of the intervals
 * @param m index of the month
 * @param hours length of an interval [h]
 * @returns the month
 * @source method-energy
 */
export function operationMonth(meter: MeterAfter, months: MonthIndex, m: number, hours: number): OperationMonth {
  const from = months.starts[m]!;
  const end = months.starts[m + 1]!;
  const activeKwh = compensatedSum(meter.activeKw, from, end, 0) * hours;
  const laggingKvarh = compensatedSum(meter.laggingKvar, from, end) * hours;
  return {
    month: months.names[m]!,
    powerFactorLagging: energyPowerFactor(activeKwh, laggingKvarh),
    activeKwh,
    laggingKvarh,
    leadingKvarh: compensatedSum(meter.leadingKvar, from, end) * hours,
  };
}

/**
 * Does the target hold in every billing month; a month without energy meets every target.
 * @param months energies at the meter
 * @param targetPowerFactor λ
 * @returns true where every month's energy factor reaches λ (1e-12 relative, the last digits of the division)
 * @source method-controller
 */
export function meetsTarget(months: readonly OperationMonth[], targetPowerFactor: number): boolean {
  return months.every(
    ({ powerFactorLagging }) => powerFactorLagging === null || powerFactorLagging >= targetPowerFactor * (1 - 1e-12),
  );
}

/**
 * Sums the simulated record: energies and months at the meter, residuals Q − B at the bus.
 * @param simulated columns of the simulated record
 * @param months calendar months
 * @param target what the target asks for
 * @param levels the bank's levels, ascending
 * @returns operation in figures
 * @source method-controller
 */
export function summarizeOperation(
  simulated: Simulated,
  months: MonthIndex,
  target: Target,
  levels: readonly Level[],
): OperationSummary {
  const { load, run, deliveredKvar, intervalS } = simulated;
  const hours = intervalS / 3600;
  let maxResidualKvar = Number.NEGATIVE_INFINITY;
  let minResidualKvar = Number.POSITIVE_INFINITY;
  for (let i = 0; i < deliveredKvar.length; i++) {
    const residual = load.reactiveKvar[i]! - deliveredKvar[i]!;
    maxResidualKvar = Math.max(maxResidualKvar, residual);
    minResidualKvar = Math.min(minResidualKvar, residual);
  }
  const monthly = operationMonths(simulated.meter, months, hours);
  const shortfallKvar = shortfallColumn(simulated.meter, target);
  const inTarget = shortfallKvar.reduce((count, short) => count + (short <= TARGET_WIDTH_KVAR ? 1 : 0), 0);
  return {
    switchings: [...run.switchings],
    totalSwitchings: run.switchings.reduce((sum, count) => sum + count, 0),
    laggingKvarh: monthly.reduce((sum, month) => sum + month.laggingKvarh, 0),
    leadingKvarh: monthly.reduce((sum, month) => sum + month.leadingKvarh, 0),
    maxResidualKvar,
    minResidualKvar,
    shareInTargetPct: (100 * inTarget) / shortfallKvar.length,
    worstIntervals: worstIntervals(simulated, shortfallKvar),
    months: monthly,
    hoursAtLevel: hoursAtLevel(run.connectedKvar, levels, hours),
  };
}

function shortfallColumn(meter: MeterAfter, target: Target): Float64Array {
  const tan = tanFromPowerFactor(target.powerFactor);
  const { activeKw, laggingKvar, leadingKvar } = meter;
  const shortfallKvar = new Float64Array(activeKw.length);
  for (let i = 0; i < shortfallKvar.length; i++) {
    const net = laggingKvar[i]! - leadingKvar[i]!;
    shortfallKvar[i] = Math.max(0, net - targetKw(activeKw[i]!, target.onExport) * tan);
  }
  return shortfallKvar;
}

function worstIntervals(simulated: Simulated, shortfallKvar: Float64Array): WorstInterval[] {
  const { beginS, load, deliveredKvar } = simulated;
  const worst: number[] = [];
  for (let i = 0; i < shortfallKvar.length; i++) {
    const short = shortfallKvar[i]!;
    if (short <= TARGET_WIDTH_KVAR) continue;
    if (worst.length === WORST_LISTED && short <= shortfallKvar[worst[WORST_LISTED - 1]!]!) continue;
    const place = worst.findIndex((other) => shortfallKvar[other]! < short);
    worst.splice(place < 0 ? worst.length : place, 0, i);
    if (worst.length > WORST_LISTED) worst.pop();
  }
  return worst.map((i) => ({
    beginS: beginS[i]!,
    activeKw: load.activeKw[i]!,
    reactiveKvar: load.reactiveKvar[i]!,
    connectedKvar: deliveredKvar[i]!,
    residualKvar: load.reactiveKvar[i]! - deliveredKvar[i]!,
    shortfallKvar: shortfallKvar[i]!,
  }));
}

function hoursAtLevel(
  connectedKvar: Float64Array,
  levels: readonly Level[],
  hours: number,
): OperationSummary['hoursAtLevel'] {
  const counts = new Float64Array(levels.length);
  let at = 0;
  let last = Number.NaN;
  for (let i = 0; i < connectedKvar.length; i++) {
    const kvar = connectedKvar[i]!;
    if (kvar !== last) {
      at = nearestLevelIndex(levels, kvar);
      last = kvar;
    }
    counts[at]!++;
  }
  return levels.map(({ levelKvar }, k) => ({ levelKvar, hours: counts[k]! * hours }));
}

/**
 * Index of the level nearest to a connected kvar.
 * @param levels ascending, length ≥ 1
 * @param kvar connected [kvar]
 * @returns index into `levels`
 */
export function nearestLevelIndex(levels: readonly Level[], kvar: number): number {
  let low = 0;
  let high = levels.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (levels[middle]!.levelKvar < kvar) low = middle + 1;
    else high = middle;
  }
  const above = levels[low]!.levelKvar - kvar;
  const below = low > 0 ? kvar - levels[low - 1]!.levelKvar : Number.POSITIVE_INFINITY;
  return below < above ? low - 1 : low;
}
