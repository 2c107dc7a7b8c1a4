import { type JudgeBasis, type Judgement, judgeBank } from '../duty/judge-bank.js';
import { graver, type Verdict } from '../duty/rules.js';
import type { Bank } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import { summarizeNetwork } from '../network/network-check.js';
import type { NetworkModel } from '../network/network-model.js';
import type { Control } from '../operation/control.js';
import type { SettledSite } from './settled-site.js';

/** What judging needs of a study: the settled site and its network. */
export interface Judged {
  site: SettledSite;
  model: NetworkModel;
}

/**
 * What a bank on this study is judged by.
 * @param study site and record
 * @param control settings
 * @returns rules, voltages, supply, loads and delay
 */
export function basisOf(study: Judged, control: Control): JudgeBasis {
  const { site } = study;
  return {
    rules: site.rules,
    frequencyHz: site.frequencyHz,
    voltages: { nominalV: site.nominalV, highestV: site.highestV },
    emcClass: site.emcClass,
    limits: site.limits,
    supply: site.supply,
    loads: site.loads,
    reconnectDelayS: control.reconnectDelayS,
  };
}

/**
 * Judges a bank on a study's network.
 * @param study site and record
 * @param bank the bank
 * @param control settings; the reconnection delay sets the resistors
 * @returns judgement
 * @source method-limits
 */
export function judge(study: Judged, bank: Bank, control: Control): Judgement {
  return judgeBank(study.model, bank, bankLevels(bank, study.site.nominalV), basisOf(study, control));
}

/**
 * Does the load ask for more than a short circuit at the bank's bus would give: then nothing computed from the fault
 * level means much.
 * @param study site and record
 * @param shortCircuitMinMva least fault level at the bank's bus [MVA]
 * @returns the greatest load [kVA], or null where the supply is stronger
 * @source method-limits
 */
export function overwhelmingKva(study: Judged, shortCircuitMinMva: number): number | null {
  const loadKva = (Math.sqrt(3) * study.site.nominalV * study.model.loadA) / 1000;
  return loadKva > shortCircuitMinMva * 1000 ? loadKva : null;
}

/**
 * The verdict with what the record itself leaves open: an unknown old bank, or more load than the supply could carry, is
 * at best `watch`.
 * @param study settled site and its network
 * @param judgement the bank judged
 * @returns overall verdict
 * @source method-controller
 */
export function overallVerdict(study: Judged, judgement: { verdict: Verdict }): Verdict {
  if (judgement.verdict !== 'clear') return judgement.verdict;
  const { shortCircuitMinMva } = summarizeNetwork(study.model, []);
  const open = study.site.recordedBank.state === 'unknown' || overwhelmingKva(study, shortCircuitMinMva) !== null;
  return open ? graver(judgement.verdict, 'watch') : judgement.verdict;
}
