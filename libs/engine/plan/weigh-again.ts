import type { Bank } from '../layout/bank.js';
import { presentParts } from '../money/bank-worth.js';
import { billTotals } from '../money/bill.js';
import { capitalOf } from '../money/capital.js';
import type { SettledFinance } from '../money/cash-flow.js';
import { type BankUse, runningCosts } from '../money/running-cost.js';
import { type Saving, savingByMonth } from '../money/saving.js';
import type { Control } from '../operation/control.js';
import type { ControllerView } from '../operation/controller-view.js';
import { meetsTarget } from '../operation/operation.js';
import type { MoneyStudy } from './money-study.js';
import { usageOf } from './price-bank.js';
import type { RunColumns } from './run-columns.js';
import { controllerView, meterColumns, operate, type Study } from './study.js';
import type { WeighedBank } from './weighed-bank.js';

/** A record, moved or not, on which ways are weighed. */
export interface Scale {
  study: Study;
  money: MoneyStudy;
  /** totals of the bills of that record without anything new */
  beforeTotals: number[];
  /** what simulations on it write into in turn */
  columns: RunColumns;
  /** what controllers see on it, by set point */
  views: Map<number, ControllerView>;
}

/** A bank as it works while it is weighed: what its simulation left, for money to be reckoned from. */
export interface Working {
  byMonth: Saving['byMonth'];
  targetMet: boolean;
  use: BankUse;
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
 * @param columns what simulations on it write into in turn; new ones where absent
 * @returns what ways are weighed on
 * @source method-money
 */
export function scaleOf(study: Study, money: MoneyStudy, columns: RunColumns = meterColumns(study)): Scale {
  const beforeTotals = billTotals(money.prepared, study.record);
  return { study, money, beforeTotals, columns, views: new Map() };
}

/**
 * What controllers of one set point see on a scale, formed once.
 * @param scale record and bills
 * @param control settings
 * @returns columns of length n
 */
export function viewOn({ study, views }: Scale, { setPointPowerFactor }: Control): ControllerView {
  const view = views.get(setPointPowerFactor) ?? controllerView(study, setPointPowerFactor);
  views.set(setPointPowerFactor, view);
  return view;
}

/**
 * Simulates a bank on a scale.
 * @param scale record and bills; its columns are written over
 * @param bank as it works: aged, or with a stage out
 * @param control settings
 * @param given what the controller sees, its own averages where absent; what is kept of the bank, all where absent
 * @returns how it works there
 * @source method-money
 */
export function workOn(
  scale: Scale,
  bank: Bank,
  control: Control,
  { view = viewOn(scale, control), kept = bank }: { view?: ControllerView; kept?: Bank } = {},
): Working {
  const { study, money, beforeTotals, columns } = scale;
  const { months } = money.prepared.calendar;
  const operated = operate(study, bank, control, { view, columns });
  return {
    byMonth: savingByMonth(months, beforeTotals, billTotals(money.prepared, operated.meter)).byMonth,
    targetMet: meetsTarget(operated.months, study.site.targetPowerFactor),
    use: usageOf(study, bank, operated.run),
    kept,
  };
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
  const { money } = scale;
  const { months } = money.prepared.calendar;
  const { byMonth, targetMet, use } = working;
  const savingPerYear = byMonth.reduce((sum, saving) => sum + saving, 0);
  if (money.prices === null) return { savingPerYear, targetMet, gain: null, cost: null, npv: null };
  const cost = { ...money.prices, switchKind: way.switchKind };
  const of = { switchKind: way.switchKind, horizonYears: finance.horizonYears };
  const running = runningCosts(working.kept, cost.prices, use, of);
  const capital = way.isNew ? capitalOf(way.bank, cost).total : 0;
  const parts = presentParts(byMonth, months[0]!.month, { capital, running }, finance);
  return { savingPerYear, targetMet, ...parts, npv: parts.gain - parts.cost };
}
