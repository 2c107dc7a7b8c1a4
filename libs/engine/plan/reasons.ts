import type { Judgement } from '../duty/judge-bank.js';
import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import { meetsTarget } from '../operation/operation.js';
import { type Remark, remark } from '../problem.js';
import { checkAgainstSupply } from '../supply/check-against-supply.js';
import { judgementReasons, reconnectionReasons } from './judgement-reasons.js';
import type { Operated, Study } from './study.js';

/** A record shorter than this says little about a year [days]. */
const SHORT_RECORD_DAYS = 28;
const YEAR_DAYS = 360;

/**
 * Why the verdict is what it is, gravest first, and what limits it.
 * @param study site and record
 * @param bank the bank
 * @param operated the bank simulated
 * @param judgement the bank judged
 * @returns reasons, without words
 * @source method-limits
 */
export function reasons(study: Study, bank: Bank, operated: Operated, judgement: Judgement): Remark[] {
  return [
    ...judgementReasons(study, bank, judgement),
    ...recordReasons(study),
    ...operationReasons(study, bank, operated),
    ...reconnectionReasons(study, bank, operated.control, judgement),
  ];
}

function recordReasons(study: Study): Remark[] {
  const found: Remark[] = [];
  const { recordSummary } = study;
  if (recordSummary.grade === 'insufficient') {
    found.push(remark('record.insufficient', recordSummary.gradeRule.values));
  }
  found.push(...checkAgainstSupply(recordSummary, study.site));
  const days = (study.record.endS - study.record.firstS) / 86_400;
  if (study.site.recordedBank.state === 'unknown') {
    found.push(remark('recordedBank.unknown', {}, { path: 'recordedBank.state' }));
  }
  if (days < SHORT_RECORD_DAYS) found.push(remark('record.short', { days }));
  else if (days < YEAR_DAYS) found.push(remark('record.partYear', { days }));
  return found;
}

function operationReasons(study: Study, bank: Bank, operated: Operated): Remark[] {
  const found: Remark[] = [];
  const { targetPowerFactor } = study.site;
  if (study.requirement.maxKvar <= 1e-9) found.push(remark('need.none', { targetPowerFactor }));
  else if (!meetsTarget(operated.months, targetPowerFactor)) {
    const missed = operated.months.filter(({ powerFactorLagging: pf }) => pf !== null && pf < targetPowerFactor);
    const lowest = missed.reduce((low, month) =>
      (month.powerFactorLagging ?? 1) < (low.powerFactorLagging ?? 1) ? month : low,
    );
    const values = { months: missed.length, month: lowest.month, powerFactor: lowest.powerFactorLagging ?? 1 };
    found.push(remark('target.missed', { ...values, targetPowerFactor }));
  } else if (bank.groups.length > 0) found.push(remark('target.met', { targetPowerFactor }));
  const overKvar = overCorrectionKvar(operated);
  const smallestKvar = smallestStageKvar(study, bank);
  if (bank.groups.length > 0 && overKvar > smallestKvar * (1 + 1e-9)) {
    found.push(remark('operation.overCorrection', { overKvar, smallestKvar }, { unit: 'kvar' }));
  }
  if (bank.groups.length > 0) {
    found.push(remark('switchings.lowerBound', { intervalS: study.record.intervalS }, { unit: 's' }));
  }
  return found;
}

/**
 * What the bank adds to leading, at most: max over the record of max(B − max(Q, 0), 0).
 * @param operated the bank simulated
 * @returns greatest over-correction [kvar]
 * @source method-bank
 */
export function overCorrectionKvar(operated: Operated): number {
  let most = 0;
  const { reactiveKvar } = operated.load;
  for (let i = 0; i < reactiveKvar.length; i++) {
    most = Math.max(most, operated.deliveredKvar[i]! - Math.max(reactiveKvar[i]!, 0));
  }
  return most;
}

/**
 * The smallest stage of a bank.
 * @param study site and record
 * @param bank the bank
 * @returns effective kvar; 0 for an empty bank
 */
export function smallestStageKvar(study: Study, bank: Bank): number {
  return bank.groups.length === 0 ? 0 : Math.min(...bank.groups.map((g) => effectiveKvar(g, study.site.nominalV)));
}
