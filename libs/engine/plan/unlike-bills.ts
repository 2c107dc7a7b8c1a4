import type { Bill } from '../money/bill.js';
import { type Remark, remark } from '../problem.js';
import { monthCoverage } from '../record/month-coverage.js';
import type { Study } from './study.js';

/** Rounding, a day of reading that is not the first and a few lost intervals stay below this share. */
const ENERGY_SHARE = 0.05;
/** A tariff leaves out a levy here and there; a ratio that was taken wrongly comes to more. */
const TOTAL_SHARE = 0.2;
/** Months with less of them in the record say nothing of their bill [%]. */
const LEAST_COVERED_PCT = 99;

/** A bill and what the record makes of it. */
interface Compared {
  month: string;
  found: number;
  billed: number;
}

/**
 * Where the bills that were typed in do not go with the record: the kWh of a month, and a bill's total against the one
 * reckoned by the tariff. A meter's ratio taken wrongly shows nowhere else.
 * @param study site, record, bills
 * @param before bills as metered, by the tariff; null without one
 * @returns one remark for the energies and one for the totals, each naming the month that is farthest off
 * @source method-plausibility
 */
export function unlikeBills(study: Study, before: Bill | null): Remark[] {
  return [...unlikeEnergy(study), ...(before === null ? [] : unlikeTotals(before))];
}

function unlikeEnergy({ record, zone, requirement, bills }: Study): Remark[] {
  if (bills.length === 0) return [];
  const covered = monthCoverage(record, zone).filter(({ coveredPct }) => coveredPct >= LEAST_COVERED_PCT);
  const compared = bills.flatMap(({ month, activeKwh }): Compared[] => {
    const own = requirement.months.find((one) => one.month === month);
    if (own === undefined || !covered.some((one) => one.month === month)) return [];
    return [{ month, found: own.activeKwh, billed: activeKwh }];
  });
  const worst = farthest(compared, ENERGY_SHARE);
  if (worst === null) return [];
  const { month, found: recordKwh, billed: billKwh, months } = worst;
  const values = { month, recordKwh, billKwh, months };
  return [remark('record.unlikeBills', values, { path: 'estimate.bills', source: 'practice' })];
}

function unlikeTotals({ months }: Bill): Remark[] {
  const compared = months.flatMap(({ month, partial, total, billed }): Compared[] =>
    partial || billed === null ? [] : [{ month, found: total, billed }],
  );
  const worst = farthest(compared, TOTAL_SHARE);
  if (worst === null) return [];
  const values = { month: worst.month, sharePct: (100 * worst.found) / worst.billed, months: worst.months };
  return [remark('record.unlikeTotals', values, { path: 'tariff.billed', source: 'practice' })];
}

/** The month that is farthest off, with how many are; null where none is. */
function farthest(compared: readonly Compared[], share: number): (Compared & { months: number }) | null {
  const off = ({ found, billed }: Compared): number => Math.abs(found - billed) / Math.max(Math.abs(billed), 1e-9);
  const beyond = compared.filter((one) => off(one) > share);
  const [first, ...rest] = beyond;
  if (first === undefined) return null;
  return { ...rest.reduce((worst, one) => (off(one) > off(worst) ? one : worst), first), months: beyond.length };
}
