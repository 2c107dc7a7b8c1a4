import type { Bank } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import { bankModel, eachFlow } from '../network/flow.js';
import { summarizeNetwork } from '../network/network-check.js';
import type { NetworkModel } from '../network/network-model.js';
import { inrushStages } from './inrush.js';
import { inrushDuty, type JudgeBasis, networkIsUnknown, plainSharePct } from './judge-bank.js';
import { NetworkDuties, networkLimits } from './network-duties.js';
import { graver, type Verdict } from './rules.js';
import { StageDuties } from './stage-duties.js';

/** What the flows alone say of a bank. */
export interface QuickJudgement {
  /** worst verdict of the voltage duties */
  voltages: Verdict;
  /** worst verdict of all duties; the full judgement adds the peaks of |Z| and is never milder */
  verdict: Verdict;
}

/**
 * Judges a bank by its flows, without looking for peaks; the full judgement is never milder. For narrowing candidates.
 * @param model the network without the bank
 * @param bank the bank
 * @param basis rules, voltages, supply, loads
 * @returns verdicts of the voltages and of all duties
 * @source method-limits
 */
export function quickJudge(model: NetworkModel, bank: Bank, basis: JudgeBasis): QuickJudgement {
  const levels = bankLevels(bank, basis.voltages.nominalV);
  const ends = summarizeNetwork(model, []);
  const known = !networkIsUnknown(basis.loads);
  const limits = networkLimits({ ...basis, ...basis.voltages, ...ends, loadA: model.loadA });
  const stages = bank.groups.map((_, g) => new StageDuties(model, bank, g, basis));
  const network = new NetworkDuties(model, limits, known);
  eachFlow(model, bankModel(model, bank, levels), (flow) => {
    network.take(flow);
    for (const stage of stages) stage.take(flow);
  });
  const site = { ...basis, nominalV: basis.voltages.nominalV, shortCircuitMva: ends.shortCircuitMva };
  const closing = basis.limitsInrush === true ? [] : inrushStages(bank, site);
  const inrush = closing.flatMap((stage) => inrushDuty(bank, stage, basis.rules));
  const duties = [...stages.flatMap((stage) => stage.duties()), ...network.duties(), ...inrush];
  const worst = (rows: typeof duties): Verdict =>
    rows.reduce<Verdict>((verdict, duty) => graver(verdict, duty.verdict), 'clear');
  const watched = !known || plainSharePct(bank, basis) !== null;
  return {
    voltages: worst(duties.filter((duty) => duty.name.startsWith('capacitor voltage'))),
    verdict: graver(worst(duties), watched ? 'watch' : 'clear'),
  };
}
