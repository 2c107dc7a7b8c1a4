import type { Verdict } from '../duty/rules.js';
import type { Bill } from './bill.js';
import type { Capital } from './capital.js';
import type { CashFlow } from './cash-flow.js';
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
} & (Worth | NoWorth);
