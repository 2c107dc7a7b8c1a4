import { InputProblem, type Problem } from '../problem.js';
import { energyPowerFactor, tanFromPowerFactor } from '../quantity/power-factor.js';
import { monthSpan } from '../record/month-span.js';
import type { ZoneTable } from '../record/zone-table.js';
import type { MonthlyBill } from './estimate-input.js';

/** What a month's reactive power at its peak was found from. */
export type PeakBasis = 'maxKw at the month’s factor' | 'maxKva at the month’s factor' | 'maxKw and maxKva';

/** What one bill says of the need, at the meter. */
export interface BillBounds {
  month: string;
  /** length of the calendar month by the site's clock [h] */
  hours: number;
  activeKwh: number;
  /** as billed [kvarh] */
  laggingKvarh: number;
  powerFactorLagging: number;
  meanKw: number;
  meanKvar: number;
  /** as billed, or from maxKva at the month's factor [kW] */
  maxKw: number;
  /** as billed; null where the bill has none [kVA] */
  maxKva: number | null;
  peakBasis: PeakBasis;
  /** reactive power at the peak, an old bank's kvar left out [kvar] */
  peakKvar: number;
  /** constant kvar that lifts the month's energy factor to the target: no smaller bank can [kvar] */
  lowerKvar: number;
  /** kvar at the peak if the peak has the month's factor, and what maxKw and maxKva give, the greater [kvar] */
  upperKvar: number;
}

/** What bills are read by. */
export interface BillBasis {
  zone: ZoneTable;
  targetPowerFactor: number;
  /** of an old bank that was connected throughout [kvar] */
  addedKvar: number;
}

/** A mean may pass the maximum of its month by this share: bills are rounded. */
const ROUNDING_SHARE = 0.01;

/**
 * Bounds of the needed kvar from each month's bill. Below: the constant kvar that lifts the month's energy factor, the
 * `energyNeedKvar` of a record. Above: the kvar at the month's peak.
 * @param bills validated, one a month
 * @param basis zone, target, old bank
 * @returns one entry a bill, in time order
 * @throws InputProblem where a month's mean is above its maximum
 * @source method-estimate
 */
export function billBounds(bills: readonly MonthlyBill[], basis: BillBasis): BillBounds[] {
  const problems = bills.flatMap((bill, k) => maximumProblems(bill, k, monthHours(bill.month, basis.zone)));
  if (problems.length > 0) throw new InputProblem(problems);
  return bills.map((bill) => boundsOf(bill, basis)).sort((a, b) => (a.month < b.month ? -1 : 1));
}

function boundsOf(bill: MonthlyBill, { zone, targetPowerFactor, addedKvar }: BillBasis): BillBounds {
  const { month, activeKwh, laggingKvarh } = bill;
  const hours = monthHours(month, zone);
  const factor = energyPowerFactor(activeKwh, laggingKvarh)!;
  const tanTarget = tanFromPowerFactor(targetPowerFactor);
  const maxKw = bill.maxKw ?? bill.maxKva! * factor;
  const atMonthsFactor = (maxKw * laggingKvarh) / activeKwh;
  const exact = bill.maxKw !== undefined && bill.maxKva !== undefined;
  const peakKvar = exact ? Math.sqrt(Math.max(0, bill.maxKva! ** 2 - maxKw ** 2)) : atMonthsFactor;
  const lowerKvar = Math.max(0, (laggingKvarh - activeKwh * tanTarget) / hours + addedKvar);
  // Lagging kvar at light load can ask for more than the peak does, so the month's factor is never left out.
  const atPeakKvar = Math.max(peakKvar, atMonthsFactor) - maxKw * tanTarget + addedKvar;
  return {
    month,
    hours,
    activeKwh,
    laggingKvarh,
    powerFactorLagging: factor,
    meanKw: activeKwh / hours,
    meanKvar: laggingKvarh / hours,
    maxKw,
    maxKva: bill.maxKva ?? null,
    peakBasis: peakBasis(bill),
    peakKvar,
    lowerKvar,
    upperKvar: Math.max(lowerKvar, atPeakKvar),
  };
}

function peakBasis({ maxKw, maxKva }: MonthlyBill): PeakBasis {
  if (maxKw === undefined) return 'maxKva at the month’s factor';
  return maxKva === undefined ? 'maxKw at the month’s factor' : 'maxKw and maxKva';
}

function monthHours(month: string, zone: ZoneTable): number {
  const { beginS, endS } = monthSpan(zone, Number(month.slice(0, 4)), Number(month.slice(5)));
  return (endS - beginS) / 3600;
}

// No mean can pass the greatest of its month, nor the apparent power of the mean the mean apparent power.
function maximumProblems(bill: MonthlyBill, k: number, hours: number): Problem[] {
  const { activeKwh, laggingKvarh, maxKw, maxKva } = bill;
  const bounds = [
    { key: 'maxKw', most: maxKw, mean: activeKwh / hours, unit: 'kW' },
    { key: 'maxKva', most: maxKva, mean: Math.hypot(activeKwh, laggingKvarh) / hours, unit: 'kVA' },
  ];
  return bounds.flatMap(({ key, most, mean, unit }): Problem[] => {
    if (most === undefined || mean <= most * (1 + ROUNDING_SHARE)) return [];
    const expected = `at least the mean of the month, ${Number(mean.toPrecision(4))} over its ${hours} hours`;
    return [{ code: 'inconsistent', path: `estimate.bills[${k}].${key}`, expected, found: `${most}`, unit }];
  });
}
