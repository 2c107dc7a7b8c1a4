import { type Remark, remark } from '../problem.js';
import type { EstimateCompared } from '../requirement/load-estimate.js';
import type { EstimateStudy } from './estimate-study.js';

/** Bills and list that differ by more than this are a finding; common practice [share]. */
const DISAGREE_SHARE = 0.25;
const YEAR_MONTHS = 12;
/** Bank and bound are told apart beyond this share. */
const EQUAL_SHARE = 1e-9;

/**
 * Why an estimate decides no better than `watch`, and how a bank stands to it.
 * @param study site and estimated load
 * @param effectiveKvar of the bank, 0 for none [kvar]
 * @returns reasons, without words
 * @source method-estimate
 */
export function estimateReasons(study: EstimateStudy, effectiveKvar: number): Remark[] {
  const { load, site } = study;
  return [
    remark('estimate.basis', { basis: load.basis }, { path: 'estimate' }),
    ...(site.recordedBank.state === 'unknown'
      ? [remark('estimate.recordedBankUnknown', {}, { path: 'recordedBank.state' })]
      : []),
    ...bankReasons(study, effectiveKvar),
    ...(load.compared === null ? [] : comparedReasons(load.compared)),
    ...(load.months.length > 0 && load.months.length < YEAR_MONTHS
      ? [remark('estimate.fewMonths', { months: load.months.length }, { path: 'estimate.bills' })]
      : []),
  ];
}

function bankReasons({ load, site }: EstimateStudy, effectiveKvar: number): Remark[] {
  const { targetPowerFactor } = site;
  const { lowerKvar, upperKvar, sizedKvar } = load;
  if (!(sizedKvar > 0)) return [remark('estimate.noNeed', { targetPowerFactor })];
  if (lowerKvar === null || upperKvar === null) {
    const values = { effectiveKvar, sizedKvar, targetPowerFactor };
    if (reaches(effectiveKvar, sizedKvar)) return [remark('estimate.coversList', values)];
    return [remark('estimate.belowList', values)];
  }
  const values = { effectiveKvar, lowerKvar, upperKvar, targetPowerFactor };
  if (reaches(effectiveKvar, upperKvar)) return [remark('estimate.coversUpper', values)];
  if (reaches(effectiveKvar, lowerKvar)) return [remark('estimate.betweenBounds', values)];
  return [remark('estimate.belowLower', values)];
}

function reaches(kvar: number, bound: number): boolean {
  return kvar >= bound * (1 - EQUAL_SHARE);
}

function comparedReasons({ month, billedKw, listedKw, billedKvar, listedKvar }: EstimateCompared): Remark[] {
  const found: Remark[] = [];
  if (disagree(billedKw, listedKw)) {
    found.push(remark('estimate.kwDisagree', { month, billedKw, listedKw }, { path: 'estimate', source: 'practice' }));
  }
  if (disagree(billedKvar, listedKvar)) {
    const values = { month, billedKvar, listedKvar };
    found.push(remark('estimate.kvarDisagree', values, { path: 'estimate', source: 'practice' }));
  }
  return found;
}

function disagree(billed: number, listed: number): boolean {
  return Math.abs(listed - billed) > DISAGREE_SHARE * Math.max(listed, billed);
}

/**
 * What an estimate can't support, one code each.
 * @param hasBank false where there is nothing that could be switched
 * @returns remarks, without words
 * @source method-estimate
 */
export function refusedByEstimate(hasBank: boolean): Remark[] {
  const always = [remark('estimate.noDuration'), remark('estimate.noReplay'), remark('estimate.noLeading')];
  if (!hasBank) return always;
  return [...always, remark('estimate.noSwitchings'), remark('estimate.noSetPoint')];
}
