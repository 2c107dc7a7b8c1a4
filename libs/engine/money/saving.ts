import type { TariffMonth } from './tariff-calendar.js';

/** What is saved in each calendar month. */
export interface Saving {
  /** January first, length 12 */
  byMonth: Float64Array;
  /** calendar months the record does not hold */
  monthsFilled: number;
}

/**
 * Saving of each calendar month, January first: Σ(before − after)/Σcoverage over the record's months of that name;
 * months the record does not hold take the mean of the others.
 * @param months the record's months
 * @param before their bills without the bank
 * @param after their bills with it
 * @returns savings a month, and how many were filled in
 * @source method-money
 */
export function savingByMonth(
  months: readonly TariffMonth[],
  before: ArrayLike<number>,
  after: ArrayLike<number>,
): Saving {
  const saved = new Float64Array(12);
  const covered = new Float64Array(12);
  for (const [m, { month, coverage }] of months.entries()) {
    saved[month - 1]! += before[m]! - after[m]!;
    covered[month - 1]! += coverage;
  }
  let sum = 0;
  let held = 0;
  for (let name = 0; name < 12; name++) {
    if (covered[name] === 0) continue;
    saved[name]! /= covered[name]!;
    sum += saved[name]!;
    held++;
  }
  for (let name = 0; name < 12; name++) {
    if (covered[name] === 0) saved[name] = held === 0 ? 0 : sum / held;
  }
  return { byMonth: saved, monthsFilled: 12 - held };
}
