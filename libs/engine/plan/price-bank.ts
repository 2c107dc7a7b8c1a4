import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import { NO_WORTH, savingOf, type WorthBasis, worthOf } from '../money/bank-worth.js';
import { type Bill, billYear } from '../money/bill.js';
import { type ContractAdvice, contractAdvice } from '../money/contract-advice.js';
import type { Alternative, Money, SearchProof, Worth } from '../money/money-result.js';
import type { BankUse } from '../money/running-cost.js';
import type { Saving } from '../money/saving.js';
import { type Remark, remark } from '../problem.js';
import { type MoneyStudy, siteSwitchKind } from './money-study.js';
import type { Site } from './site.js';
import type { Operated, Study } from './study.js';

/**
 * A bank's use over the record, as its running costs are reckoned from.
 * @param study site and record
 * @param bank the bank
 * @param run what its simulation counted, one entry a physical stage
 * @returns hours connected, kvar and switchings of each stage
 * @source method-money
 */
export function usageOf(
  study: Study,
  bank: Bank,
  run: { connectedIntervals: Float64Array; switchings: Int32Array },
): BankUse {
  const hours = study.record.intervalS / 3600;
  const stageKvar = bank.groups.flatMap((group) =>
    new Array<number>(group.count).fill(effectiveKvar(group, study.site.nominalV)),
  );
  return {
    validHours: study.record.beginS.length * hours,
    connectedHours: run.connectedIntervals.map((intervals) => intervals * hours),
    stageKvar: Float64Array.from(stageKvar),
    switchings: run.switchings,
  };
}

/** A bank that is priced, and how it came to be there. */
export interface PricedBank {
  /** null where there is none */
  bank: Bank | null;
  operated: Operated;
  switchKind: string | null;
  /** it has yet to be paid */
  isNew: boolean;
}

/** A bank's bills and worth. */
export interface Priced {
  after: Bill;
  saving: Saving;
  contracts: ContractAdvice[];
  /** null without prices */
  worth: Worth | null;
}

/**
 * Prices a bank on the record: bills after it, what they save, and what that is worth.
 * @param study site and record
 * @param money the site's money without a bank
 * @param priced the bank as simulated
 * @returns bills and worth
 * @source method-money
 */
export function priceBank(study: Study, money: MoneyStudy, priced: PricedBank): Priced {
  const { bank, operated } = priced;
  const months = money.prepared.calendar.months;
  // Nothing is the record as metered, whatever an old bank did while it was taken.
  const meter = bank === null ? study.record : operated.meter;
  const after = billYear(money.prepared, meter, false);
  const contracts = contractAdvice(money.prepared, study.record, meter);
  const saving = savingOf(months, { before: money.before, after });
  if (money.prices === null) return { after, saving, contracts, worth: null };
  const cost = { ...money.prices, switchKind: priced.switchKind };
  const basis: WorthBasis = { cost, finance: money.finance, months };
  const use = bank === null ? null : usageOf(study, bank, operated.run);
  return { after, saving, contracts, worth: worthOf(bank, saving, use, { ...basis, isNew: priced.isNew }) };
}

/** What is said of a choice besides its own money. */
export interface MoneyChoice {
  recommended: Money['recommended'];
  switchKind: string | null;
  alternatives: Alternative[];
  proof: SearchProof | null;
}

/**
 * The money block of a result.
 * @param money the site's money without a bank
 * @param priced the bank's bills and worth
 * @param choice what was recommended, among what
 * @returns the block
 * @source method-money
 */
export function moneyOf(money: MoneyStudy, priced: Priced, choice: MoneyChoice): Money {
  return {
    recommended: choice.recommended,
    switchKind: choice.switchKind,
    bills: { after: priced.after, before: money.before },
    savingPerYear: priced.saving.byMonth.reduce((sum, saving) => sum + saving, 0),
    savingByMonth: [...priced.saving.byMonth],
    monthsFilled: priced.saving.monthsFilled,
    alternatives: choice.alternatives,
    proof: choice.proof,
    contracts: priced.contracts,
    savingRange: null,
    robustness: null,
    ...(priced.worth ?? NO_WORTH),
  };
}

/**
 * The money of a bank that was not searched for: priced as new, beside doing nothing.
 * @param study site and record
 * @param site validated site
 * @param money the site's money without a bank, null without a tariff
 * @param bank the bank; null where none is built
 * @returns the block once the bank is simulated, or undefined
 * @source method-money
 */
export function newMoney(
  study: Study,
  site: Site,
  money: MoneyStudy | null,
  bank: Bank | null,
): ((operated: Operated) => Money) | undefined {
  if (money === null) return undefined;
  const switchKind = bank === null ? null : siteSwitchKind(site);
  return (operated) => {
    const priced = priceBank(study, money, { bank, operated, switchKind, isNew: true });
    return moneyOf(money, priced, { recommended: null, switchKind, alternatives: [], proof: null });
  };
}

/**
 * Parts of the site file that are validated and not used: prices without a tariff, finance without prices.
 * @param site validated site
 * @returns one assumption each
 */
export function unusedPapers(site: Site): Remark[] {
  const unused = [
    ...(site.prices !== undefined && site.tariff === undefined ? ['prices'] : []),
    ...(site.finance !== undefined && (site.tariff === undefined || site.prices === undefined) ? ['finance'] : []),
  ];
  return unused.map((name) => remark('money.unused', { name }, { path: name }));
}
