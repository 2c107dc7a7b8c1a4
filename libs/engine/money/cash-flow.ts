import type { Finance } from './papers.js';
import type { Running } from './running-cost.js';

/** How money is reckoned over the years, defaults filled in. */
export interface SettledFinance {
  /** effective a year [%] */
  discountPct: number;
  horizonYears: number;
  billGrowthPct: number;
  costGrowthPct: number;
}

/** What is taken where the site file gives nothing. */
export const FINANCE_DEFAULTS: SettledFinance = {
  discountPct: 8,
  horizonYears: 10,
  billGrowthPct: 0,
  costGrowthPct: 0,
};

/**
 * The site's finance with the defaults where it gives none.
 * @param given as given
 * @returns finance in full, and the keys that were absent
 */
export function settleFinance(given: Finance | undefined): {
  finance: SettledFinance;
  absent: (keyof SettledFinance)[];
} {
  const keys = Object.keys(FINANCE_DEFAULTS) as (keyof SettledFinance)[];
  const finance = { ...FINANCE_DEFAULTS };
  for (const key of keys) finance[key] = given?.[key] ?? FINANCE_DEFAULTS[key];
  return { finance, absent: keys.filter((key) => given?.[key] === undefined) };
}

/** Months of the cash flow and their sums. */
export interface CashFlow {
  months: CashMonth[];
  years: { year: number; net: number }[];
}

/** One month of the cash flow, money at its end; the capital is paid before month 1. */
export interface CashMonth {
  month: number;
  net: number;
  /** net at its present value */
  discounted: number;
  /** sum of all nets so far, the capital taken off */
  cumulative: number;
}

/**
 * Net of each month: (saving − loss/12)(1+g_bill)^y − (maintenance/12 + replacements)(1+g_cost)^y, y = ⌊(j−1)/12⌋;
 * month 0 is the capital.
 * @param savingByMonth saving of each calendar month, January first, length 12
 * @param firstMonth calendar month of month 1, 1 … 12
 * @param costs capital and running costs
 * @param finance horizon and growth
 * @returns nets, length 12·horizon + 1
 * @source method-money
 */
export function netColumn(
  savingByMonth: ArrayLike<number>,
  firstMonth: number,
  costs: { capital: number; running: Running },
  finance: SettledFinance,
): Float64Array {
  const { running, capital } = costs;
  const last = 12 * finance.horizonYears;
  const net = new Float64Array(last + 1);
  const replaced = new Float64Array(last + 1);
  for (const { month, amount } of running.replacements) replaced[month]! += amount;
  net[0] = 0 - capital;
  for (let j = 1; j <= last; j++) {
    const year = Math.floor((j - 1) / 12);
    const saving = savingByMonth[(firstMonth - 1 + j - 1) % 12]!;
    net[j] =
      (saving - running.lossPerYear / 12) * (1 + finance.billGrowthPct / 100) ** year -
      (running.maintenancePerYear / 12 + replaced[j]!) * (1 + finance.costGrowthPct / 100) ** year;
  }
  return net;
}

/**
 * Present value of each month's net: net_j·(1+d)^(−j/12), d effective a year.
 * @param net nets, month 0 first
 * @param discountPct d [%], above −100
 * @returns same length
 * @source method-money
 */
export function discountedColumn(net: Float64Array, discountPct: number): Float64Array {
  return net.map((amount, j) => amount * (1 + discountPct / 100) ** (-j / 12));
}

/**
 * Net present value: Σ net_j·(1+d)^(−j/12).
 * @param net nets, month 0 first
 * @param discountPct d [%]
 * @returns in the nets' currency
 * @source method-money
 */
export function presentValue(net: Float64Array, discountPct: number): number {
  return discountedColumn(net, discountPct).reduce((sum, amount) => sum + amount, 0);
}

/**
 * The net present value as an equal amount at the end of each year: NPV·d/(1−(1+d)^−years), NPV/years where d is 0.
 * @param npv net present value
 * @param finance discount and horizon
 * @returns amount a year
 * @source annuity-tables
 */
export function annuityPerYear(npv: number, { discountPct, horizonYears }: SettledFinance): number {
  const d = discountPct / 100;
  return d === 0 ? npv / horizonYears : (npv * d) / (1 - (1 + d) ** -horizonYears);
}

/**
 * The cash flow as it is shown: every month with its present value and the sum so far, and the sum of every year.
 * @param net nets, month 0 first
 * @param discountPct d [%]
 * @returns months 1 … and years 1 …
 * @source method-money
 */
export function cashFlow(net: Float64Array, discountPct: number): CashFlow {
  const discounted = discountedColumn(net, discountPct);
  const months: CashMonth[] = [];
  const years: CashFlow['years'] = [];
  let cumulative = net[0]!;
  for (let month = 1; month < net.length; month++) {
    cumulative += net[month]!;
    months.push({ month, net: net[month]!, discounted: discounted[month]!, cumulative });
    const year = Math.floor((month - 1) / 12);
    years[year] ??= { year: year + 1, net: 0 };
    years[year].net += net[month]!;
  }
  return { months, years };
}
