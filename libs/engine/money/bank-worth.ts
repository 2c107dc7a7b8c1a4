import type { Bank } from '../layout/bank.js';
import type { Bill } from './bill.js';
import { type Capital, type CostBasis, capitalOf } from './capital.js';
import { annuityPerYear, cashFlow, netColumn, presentValue, type SettledFinance } from './cash-flow.js';
import type { NoWorth, Worth } from './money-result.js';
import { paybacks, rateOfReturn } from './return-on-capital.js';
import { type BankUse, NO_RUNNING, type Running, runningCosts } from './running-cost.js';
import { type Saving, savingByMonth } from './saving.js';
import type { TariffMonth } from './tariff-calendar.js';

/** What a bank's worth is reckoned with. */
export interface WorthBasis {
  cost: CostBasis;
  finance: SettledFinance;
  /** the record's months */
  months: readonly TariffMonth[];
}

/** A bank that costs nothing new. */
export const NO_CAPITAL: Capital = { total: 0, lines: [] };

/** Every part of a worth where there are no prices. */
export const NO_WORTH: NoWorth = {
  capital: null,
  running: null,
  cashFlow: null,
  npv: null,
  irrPct: null,
  irrReason: null,
  paybackYears: null,
  paybackReason: null,
  discountedPaybackYears: null,
  annuityPerYear: null,
};

/**
 * What is saved by a bank, from the bills of the record without and with it.
 * @param months the record's months
 * @param bills before and after
 * @returns savings by calendar month
 * @source method-money
 */
export function savingOf(months: readonly TariffMonth[], bills: { before: Bill; after: Bill }): Saving {
  const totals = (bill: Bill): number[] => bill.months.map(({ total }) => total);
  return savingByMonth(months, totals(bills.before), totals(bills.after));
}

/** Both sides of a net present value. */
export interface PresentParts {
  /** of savings less losses: what moves with the tariff */
  gain: number;
  /** of capital, maintenance and replacements: what moves with the costs */
  cost: number;
}

/**
 * The two sides of a net present value, which is gain − cost.
 * @param savingByMonth saving of each calendar month, January first
 * @param firstMonth calendar month of month 1, 1 … 12
 * @param costs capital and running costs
 * @param finance discount, horizon and growth
 * @returns present values
 * @source method-money
 */
export function presentParts(
  savingByMonth: ArrayLike<number>,
  firstMonth: number,
  costs: { capital: number; running: Running },
  finance: SettledFinance,
): PresentParts {
  const { capital, running } = costs;
  const lossOnly = { ...NO_RUNNING, lossPerYear: running.lossPerYear };
  const gain = netColumn(savingByMonth, firstMonth, { capital: 0, running: lossOnly }, finance);
  const cost = netColumn(
    new Float64Array(12),
    firstMonth,
    { capital, running: { ...running, lossPerYear: 0 } },
    finance,
  );
  return { gain: presentValue(gain, finance.discountPct), cost: -presentValue(cost, finance.discountPct) };
}

/**
 * What a bank is worth: capital, running costs, cash flow, present value, rate, payback, annuity.
 * @param bank the bank; null where nothing is built or kept
 * @param saving what it saves
 * @param use its use over the record, null without a bank
 * @param basis prices, finance and months; `isNew` where the bank has yet to be paid
 * @returns its worth
 * @source method-money
 */
export function worthOf(
  bank: Bank | null,
  saving: Saving,
  use: BankUse | null,
  basis: WorthBasis & { isNew: boolean },
): Worth {
  const { cost, finance } = basis;
  const of = { switchKind: cost.switchKind, horizonYears: finance.horizonYears };
  const running: Running = bank === null || use === null ? NO_RUNNING : runningCosts(bank, cost.prices, use, of);
  const capital = bank === null || !basis.isNew ? NO_CAPITAL : capitalOf(bank, cost);
  const net = netColumn(saving.byMonth, basis.months[0]!.month, { capital: capital.total, running }, finance);
  const npv = presentValue(net, finance.discountPct);
  return {
    capital,
    running,
    cashFlow: cashFlow(net, finance.discountPct),
    npv,
    ...rateOfReturn(net),
    ...paybacks(net, finance.discountPct),
    annuityPerYear: annuityPerYear(npv, finance),
  };
}
