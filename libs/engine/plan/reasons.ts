import { naturalReconnectDelayS } from '../duty/charge.js';
import type { Duty } from '../duty/duty-row.js';
import type { Judgement } from '../duty/judge-bank.js';
import { PEAK_REACH_H } from '../duty/judge-bank.js';
import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import { meetsTarget } from '../operation/operation.js';
import { type Remark, remark } from '../problem.js';
import { checkAgainstSupply } from '../supply/check-against-supply.js';
import { overwhelmingKva } from './judge-basis.js';
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
  const duties = (verdict: Duty['verdict']): Duty[] => judgement.duties.filter((duty) => duty.verdict === verdict);
  return [
    ...duties('avoid').map((duty) => dutyReason('limit.exceeded', duty)),
    ...duties('watch').map((duty) => dutyReason(watchCode(duty), duty)),
    ...supplyReasons(study, judgement),
    ...networkReasons(study, bank, judgement),
    ...recordReasons(study),
    ...operationReasons(study, bank, operated),
    ...reconnectionReasons(study, bank, operated, judgement),
  ];
}

function watchCode(duty: Duty): string {
  if (duty.ratio === null || duty.ratio <= 1) return 'limit.near';
  return duty.name === 'inrush current' ? 'inrush.assumedInductance' : 'limit.exceededAlready';
}

function dutyReason(code: string, duty: Duty): Remark {
  const values: Record<string, number | string> = { duty: duty.name, value: duty.value };
  if (duty.limit !== null) values.limit = duty.limit;
  if (duty.group !== null) values.group = duty.group + 1;
  if (duty.levelKvar !== null) values.levelKvar = duty.levelKvar;
  if (duty.orderH !== null) values.orderH = duty.orderH;
  if (duty.corner !== null) Object.assign(values, duty.corner);
  return remark(code, values, { unit: duty.unit, source: duty.source });
}

function supplyReasons(study: Study, { network: { shortCircuitMinMva } }: Judgement): Remark[] {
  const loadKva = overwhelmingKva(study, shortCircuitMinMva);
  if (loadKva === null) return [];
  return [remark('supply.weakerThanLoad', { shortCircuitMinMva, loadKva }, { path: 'supply.faultLevelMva' })];
}

function networkReasons(study: Study, bank: Bank, judgement: Judgement): Remark[] {
  const found: Remark[] = [];
  const { nearPeak, distortingSharePct } = judgement;
  if (nearPeak !== null) {
    const { levelKvar, corner, peakOrderH, presentOrderH } = nearPeak;
    found.push(remark('peak.near', { levelKvar, peakOrderH, presentOrderH, reachH: PEAK_REACH_H, ...corner }));
  }
  if (distortingSharePct !== null) {
    found.push(remark('plain.distortingShare', { sharePct: distortingSharePct }, { unit: '%', source: 'practice' }));
  }
  if (judgement.networkUnknown && bank.groups.length > 0) {
    if (study.site.loads.distorting === null) {
      found.push(remark('network.unknownLoads', {}, { path: 'loads.distorting' }));
    }
    if (study.site.loads.backgroundPct === null) {
      found.push(remark('network.unknownBackground', {}, { path: 'loads.backgroundPct' }));
    }
  }
  return found;
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

// A delay shorter than the rule's own resistor allows needs a faster one: named, and kept.
function reconnectionReasons(study: Study, bank: Bank, operated: Operated, judgement: Judgement): Remark[] {
  const { reconnectDelayS } = operated.control;
  return bank.groups.flatMap((group, g) => {
    if (group.dischargeOhm !== null) return [];
    const naturalS = naturalReconnectDelayS([group], study.site.rules, study.site.frequencyHz);
    if (reconnectDelayS >= naturalS * (1 - 1e-9)) return [];
    const values = { group: g + 1, reconnectDelayS, naturalS, requiredOhm: judgement.charge[g]!.requiredOhm };
    return [remark('reconnection.short', values, { path: 'control.reconnectDelayS', unit: 's' })];
  });
}
