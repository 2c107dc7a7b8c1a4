import type { Bill } from '../money/bill.js';
import type { Remark } from '../problem.js';
import type { ZoneTable } from '../record/zone-table.js';
import type { LoadEstimate } from '../requirement/load-estimate.js';
import type { BankOutcome, Outcome } from './outcome.js';
import type { BankResult } from './result.js';

/** A month of a requirement that stands on bills: the names of a record's months, null what a bill can't say. */
export interface EstimateMonth {
  month: string;
  activeKwh: number;
  laggingKvarh: number;
  leadingKvarh: null;
  powerFactorLagging: number;
  maxKw: number;
  neededKvar: null;
  /** constant kvar that would lift the month's energy factor to the target: the lower bound [kvar] */
  energyNeedKvar: number;
  /** [kvar] */
  upperKvar: number;
}

/** The needed kvar as far as an estimate goes; statistics of intervals are null. */
export interface EstimateRequirement {
  targetPowerFactor: number;
  maxKvar: null;
  p99Kvar: null;
  p95Kvar: null;
  p50Kvar: null;
  meanKvar: null;
  intervalsInNeed: null;
  /** greatest over the months; null without bills [kvar] */
  lowerKvar: number | null;
  /** greatest over the months; null without bills [kvar] */
  upperKvar: number | null;
  /** of the equipment list; null without one [kvar] */
  listKvar: number | null;
  /** what a bank is sized by [kvar] */
  sizedKvar: number;
  months: EstimateMonth[];
}

/** The load as it was estimated, and what can't be said of it. */
export interface EstimateSummary extends LoadEstimate {
  refused: Remark[];
}

/** Bills before and after a bank that holds the target in every month; savings need intervals. */
export interface EstimateMoney {
  bills: { after: Bill; before: Bill };
}

/** The answer of `plan` and `assess` without a record. */
export interface EstimateResult extends BankResult {
  record: null;
  estimate: EstimateSummary;
  requirement: EstimateRequirement;
  operation: null;
  /** null where the tariff asks for more than the bills hold, or there is none */
  money: EstimateMoney | null;
}

/** What a page or a paper needs of a plan without a record: there are no series behind it. */
export interface EstimateOutcome extends BankOutcome {
  zone: ZoneTable;
  result: EstimateResult;
}

/**
 * Whether an outcome stands on an estimate.
 * @param outcome of a plan or an assessment
 * @returns true where there is no record behind it
 */
export function isEstimate(outcome: Outcome | EstimateOutcome): outcome is EstimateOutcome {
  return outcome.result.record === null;
}
