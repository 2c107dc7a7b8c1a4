import type { Verdict } from '../duty/rules.js';
import type { Bill } from './bill.js';
import type { Capital } from './capital.js';
import type { CashFlow } from './cash-flow.js';
import type { ContractAdvice } from './contract-advice.js';
import type { Payback, RateOfReturn } from './return-on-capital.js';
import type { Running } from './running-cost.js';

/** What may be recommended. */
export type Recommended = 'do nothing' | "keep today's bank" | 'new bank';

/** One of the ways that were weighed. */
export interface Alternative {
  /** do nothing, keep today's bank, new bank; a candidate that was simulated whole carries its layout */
  name: string;
  capital: number;
  npv: number;
  /** over the record, at the meter [kvarh] */
  laggingKvarh: number;
  totalSwitchings: number;
  /** greatest over levels and corners [%] */
  voltageDistortionPct: number;
  targetMet: boolean;
  verdict: Verdict;
  /** a candidate of the search: a sample of those simulated whole, not the front */
  sample: boolean;
}

/** What became of every candidate of a search; the four counts add to `candidates`. */
export interface SearchProof {
  candidates: number;
  /** refused by verdict or target, unsimulated */
  refused: number;
  /** never simulated: their bound is not good enough */
  boundedAway: number;
  /** given up before the end of the record */
  partlySimulated: number;
  simulated: number;
  /** least bound on −NPV of the rest, less the optimum's; null where there is no rest */
  lowerBoundMargin: number | null;
}

/** What a bank is worth over the years. */
export interface Worth extends RateOfReturn {
  capital: Capital;
  running: Running;
  cashFlow: CashFlow;
  npv: number;
  paybackYears: number | null;
  paybackReason: Payback['reason'];
  discountedPaybackYears: number | null;
  annuityPerYear: number;
}

/** What a worth reads where there are no prices. */
export type NoWorth = { [Key in keyof Worth]: null };

/** How the controller and the bank are taken to work where a saving is shown as a range. */
export const SAVING_CASES = ['ideal', 'one interval late', '95 % available', 'one stage out'] as const;

/** A saving under one of the cases. */
export interface SavingCase {
  name: (typeof SAVING_CASES)[number];
  savingPerYear: number;
  /** null without prices */
  npv: number | null;
}

/** A saving as a range: an estimate, not a guarantee. */
export interface SavingRange {
  /** the lower of the ideal controller's and the late one's */
  headlinePerYear: number;
  /** least and greatest of the cases */
  leastPerYear: number;
  mostPerYear: number;
  cases: SavingCase[];
}

/** What is moved to see how far a worth stands. */
export const MONEY_QUANTITIES = ['load', 'capacitance', 'stages', 'fault level', 'costs', 'tariff'] as const;

export type MoneyQuantity = (typeof MONEY_QUANTITIES)[number];

/** A bank with one thing moved. */
export interface MovedWorth {
  quantity: MoneyQuantity;
  /** a factor on the quantity; of the fault level the level itself, of the stages how many are out */
  value: number;
  /** null for a factor */
  unit: 'MVA' | null;
  savingPerYear: number;
  /** null without prices */
  npv: number | null;
  targetMet: boolean;
  verdict: Verdict;
}

/** The factors on one quantity at which a net present value crosses 0. */
export interface BreakEven {
  quantity: MoneyQuantity;
  /** going down; null where it does not cross down to the least that was tried */
  lowFactor: number | null;
  highFactor: number | null;
  leastTried: number;
  mostTried: number;
}

/** The factors on one quantity at which another of the weighed ways is worth more. */
export interface PickChange extends BreakEven {
  /** what would be recommended beyond each end */
  nameBelow: Recommended | null;
  nameAbove: Recommended | null;
}

/** One of the named ways with its inputs moved. */
export interface WayRobustness {
  name: Recommended;
  npv: number | null;
  saving: SavingRange;
  moved: MovedWorth[];
  /** empty without prices */
  breakEvens: BreakEven[];
}

/** How firm the worth of the weighed ways is. */
export interface MoneyRobustness {
  /** those with a bank */
  ways: WayRobustness[];
  /** empty where nothing was compared */
  pickChanges: PickChange[];
}

/** The money of a result. */
export type Money = {
  /** null where nothing was to be chosen */
  recommended: Recommended | null;
  /** kind of the switches priced, null where there is none */
  switchKind: string | null;
  bills: { after: Bill; before: Bill };
  savingPerYear: number;
  /** January first */
  savingByMonth: number[];
  /** calendar months the record does not hold, taken as the mean of the others */
  monthsFilled: number;
  /** empty where nothing was compared */
  alternatives: Alternative[];
  proof: SearchProof | null;
  /** contracted demands and the values that would cost least; empty where the tariff has none */
  contracts: ContractAdvice[];
  /** of the bank the result tells of; null without a bank, and until it is asked for */
  savingRange: SavingRange | null;
  /** null without a bank, and until it is asked for */
  robustness: MoneyRobustness | null;
} & (Worth | NoWorth);
