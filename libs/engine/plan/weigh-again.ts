import type { Bank } from '../layout/bank.js';
import { presentParts } from '../money/bank-worth.js';
import { billTotals } from '../money/bill.js';
import { capitalOf } from '../money/capital.js';
import type { SettledFinance } from '../money/cash-flow.js';
import { runningCosts } from '../money/running-cost.js';
import { savingByMonth } from '../money/saving.js';
import { meetsTarget } from '../operation/operation.js';
import type { MoneyStudy } from './money-study.js';
import { usageOf } from './price-bank.js';
import type { Operated, Study } from './study.js';
import type { WeighedBank } from './weighed-bank.js';

/** A record, moved or not, on which ways are weighed. */
export interface Scale {
  study: Study;
  money: MoneyStudy;
  /** totals of the bills of that record without anything new */
  beforeTotals: number[];
}

/** A bank as it works while it is weighed. */
export interface Working {
  operated: Operated;
  /** as it was simulated: aged, or with a stage out */
  bank: Bank;
  /** what is maintained and replaced: the bank, less a stage that is out */
  kept: Bank;
}

/** A way weighed once more. */
export interface WorthAgain {
  savingPerYear: number;
  targetMet: boolean;
  /** present value of savings less losses, and of all other costs; null without prices */
  gain: number | null;
  cost: number | null;
  npv: number | null;
}

/**
 * A record's bills before anything is done.
 * @param study site and record
 * @param money the site's money
 * @returns what ways are weighed on
 * @source method-money
 */
export function scaleOf(study: Study, money: MoneyStudy): Scale {
  return { study, money, beforeTotals: billTotals(money.prepared, study.record) };
}

/**
 * Weighs a way on a record.
 * @param scale record and bills
 * @param way the way; its capital is that of its whole bank
 * @param working how its bank works there
 * @param finance how money is reckoned
 * @returns saving and worth
 * @source method-money
 */
export function weighAgain(
  scale: Scale,
  way: WeighedBank,
  working: Working,
  finance: SettledFinance = scale.money.finance,
): WorthAgain {
  const { study, money, beforeTotals } = scale;
  const { months } = money.prepared.calendar;
  const { byMonth } = savingByMonth(months, beforeTotals, billTotals(money.prepared, working.operated.meter));
  const savingPerYear = byMonth.reduce((sum, saving) => sum + saving, 0);
  const targetMet = meetsTarget(working.operated.months, study.site.targetPowerFactor);
  if (money.prices === null) return { savingPerYear, targetMet, gain: null, cost: null, npv: null };
  const cost = { ...money.prices, switchKind: way.switchKind };
  const use = usageOf(study, working.bank, working.operated.run);
  const of = { switchKind: way.switchKind, horizonYears: finance.horizonYears };
  const running = runningCosts(working.kept, cost.prices, use, of);
  const capital = way.isNew ? capitalOf(way.bank, cost).total : 0;
  const parts = presentParts(byMonth, months[0]!.month, { capital, running }, finance);
  return { savingPerYear, targetMet, ...parts, npv: parts.gain - parts.cost };
}
