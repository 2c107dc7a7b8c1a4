import { compensatedSum } from '../quantity/compensated-sum.js';
import { percentile } from '../quantity/percentile.js';
import { energyPowerFactor, tanFromPowerFactor } from '../quantity/power-factor.js';
import type { LoadRecord } from '../record/load-record.js';
import type { MonthIndex } from '../record/zone-table.js';

/** Need and energies of one calendar month in the site's zone; energies are the meter's own. */
export interface RequirementMonth {
  month: string;
  activeKwh: number;
  laggingKvarh: number;
  leadingKvarh: number;
  powerFactorLagging: number | null;
  maxKw: number;
  /** greatest need of an interval [kvar] */
  neededKvar: number;
  /** constant kvar that would lift the month's energy factor to the target [kvar] */
  energyNeedKvar: number;
}

/** The needed kvar over the whole record. */
export interface RequirementSummary {
  targetPowerFactor: number;
  maxKvar: number;
  p99Kvar: number;
  p95Kvar: number;
  p50Kvar: number;
  meanKvar: number;
  intervalsInNeed: number;
  months: RequirementMonth[];
}

/** A need above this counts as one [kvar]. */
const NEED_FLOOR_KVAR = 1e-9;

/**
 * Statistics of the need over all valid intervals, zeros included, and per month.
 * @param record the meter's record, length n
 * @param needKvar need at the bus [kvar], length n
 * @param months calendar months of the intervals
 * @param targetPowerFactor λ of the target
 * @returns maximum, percentiles, mean, count and months
 * @source method-requirement
 */
export function summarizeRequirement(
  record: LoadRecord,
  needKvar: Float64Array,
  months: MonthIndex,
  targetPowerFactor: number,
): RequirementSummary {
  const ascending = needKvar.slice().sort();
  return {
    targetPowerFactor,
    maxKvar: ascending[ascending.length - 1]!,
    p99Kvar: percentile(ascending, 0.99),
    p95Kvar: percentile(ascending, 0.95),
    p50Kvar: percentile(ascending, 0.5),
    meanKvar: compensatedSum(needKvar) / needKvar.length,
    intervalsInNeed: needKvar.reduce((count, need) => count + (need > NEED_FLOOR_KVAR ? 1 : 0), 0),
    months: months.names.map((_, m) => requirementMonth(record, needKvar, months, { m, targetPowerFactor })),
  };
}

function requirementMonth(
  record: LoadRecord,
  needKvar: Float64Array,
  months: MonthIndex,
  { m, targetPowerFactor }: { m: number; targetPowerFactor: number },
): RequirementMonth {
  const from = months.starts[m]!;
  const end = months.starts[m + 1]!;
  let maxKw = Number.NEGATIVE_INFINITY;
  let neededKvar = 0;
  for (let i = from; i < end; i++) {
    maxKw = Math.max(maxKw, record.activeKw[i]!);
    neededKvar = Math.max(neededKvar, needKvar[i]!);
  }
  const hours = record.intervalS / 3600;
  const activeKwh = compensatedSum(record.activeKw, from, end, 0) * hours;
  const laggingKvarh = compensatedSum(record.laggingKvar, from, end) * hours;
  return {
    month: months.names[m]!,
    activeKwh,
    laggingKvarh,
    leadingKvarh: compensatedSum(record.leadingKvar, from, end) * hours,
    powerFactorLagging: energyPowerFactor(activeKwh, laggingKvarh),
    maxKw,
    neededKvar,
    energyNeedKvar:
      Math.max(0, laggingKvarh - activeKwh * tanFromPowerFactor(targetPowerFactor)) / ((end - from) * hours),
  };
}
