import type { SettledFinance } from './cash-flow.js';
import type { TariffMonth } from './tariff-calendar.js';

/** What one unit of money, at its place in the cash flow, adds to the net present value; all more than 0. */
export interface PresentWeights {
  /** of a saving in each of the record's months */
  savingOfMonth: Float64Array;
  /** of a loss a year */
  lossPerYear: number;
  /** of maintenance a year */
  maintenancePerYear: number;
  /** of a replacement in each month of the horizon, month 0 first */
  replacementIn: Float64Array;
  /** least of those up to each month: a replacement no later than a month costs at least this */
  leastReplacementBy: Float64Array;
  /** what a replacement each month but the last weighs in all, at the least, and one of them */
  everyMonth: { all: number; once: number };
}

/**
 * The weights that make the net present value a sum: NPV = −capital + Σ saving·w − loss·w − maintenance·w −
 * Σ replacement·w, growth and discount included; a calendar month the record lacks is spread over those it holds.
 * @param months the record's months
 * @param finance discount, horizon and growth
 * @returns weights
 * @source derived: the cash flow is linear in each of its parts
 */
export function presentWeights(months: readonly TariffMonth[], finance: SettledFinance): PresentWeights {
  const last = 12 * finance.horizonYears;
  const byName = new Float64Array(12);
  const replacementIn = new Float64Array(last + 1);
  const leastReplacementBy = new Float64Array(last + 1).fill(Number.POSITIVE_INFINITY);
  const firstMonth = months[0]!.month;
  let bills = 0;
  let costs = 0;
  for (let j = 1; j <= last; j++) {
    const year = Math.floor((j - 1) / 12);
    const discount = (1 + finance.discountPct / 100) ** (-j / 12);
    const bill = (1 + finance.billGrowthPct / 100) ** year * discount;
    byName[(firstMonth - 1 + j - 1) % 12]! += bill;
    bills += bill;
    replacementIn[j] = (1 + finance.costGrowthPct / 100) ** year * discount;
    costs += replacementIn[j]!;
    leastReplacementBy[j] = Math.min(leastReplacementBy[j - 1]!, replacementIn[j]!);
  }
  return {
    savingOfMonth: savingWeights(months, byName),
    lossPerYear: bills / 12,
    maintenancePerYear: costs / 12,
    replacementIn,
    leastReplacementBy,
    everyMonth: everyMonth(replacementIn.subarray(1, last)),
  };
}

// While the weights never rise each weighs no less than any after it; where they do, each weighs no less than the least.
function everyMonth(weights: Float64Array): PresentWeights['everyMonth'] {
  const falls = weights.every((weight, m) => m === 0 || weight <= weights[m - 1]!);
  if (falls) return { all: weights.reduce((sum, weight) => sum + weight, 0), once: weights[0] ?? 0 };
  const least = Math.min(...weights);
  return { all: least * weights.length, once: least };
}

function savingWeights(months: readonly TariffMonth[], byName: Float64Array): Float64Array {
  const covered = new Float64Array(12);
  for (const { month, coverage } of months) covered[month - 1]! += coverage;
  let absent = 0;
  let held = 0;
  for (let name = 0; name < 12; name++) {
    if (covered[name] === 0) absent += byName[name]!;
    else held++;
  }
  return Float64Array.from(months, ({ month }) => (byName[month - 1]! + absent / held) / covered[month - 1]!);
}
