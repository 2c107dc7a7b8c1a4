import type { Bank } from '../layout/bank.js';
import { bankLevels } from '../layout/levels.js';
import type { Flow } from '../network/bus-flow.js';
import { bankModel, eachFlow } from '../network/flow.js';
import { hasNearPeak, summarizeNetwork } from '../network/network-check.js';
import type { NetworkModel } from '../network/network-model.js';
import { PeakFinder } from '../network/peaks.js';
import type { Duty } from './duty-row.js';
import { inrushStages } from './inrush.js';
import {
  absorbedRipple,
  closingDuties,
  dischargeDuties,
  inrushDuty,
  type JudgeBasis,
  networkIsUnknown,
  PEAK_REACH_H,
  plainSharePct,
} from './judge-bank.js';
import { NetworkCapacitorDuties } from './network-capacitor-duties.js';
import { NetworkDuties, networkLimits } from './network-duties.js';
import { graver, type Verdict } from './rules.js';
import { StageDuties } from './stage-duties.js';

/** What the flows alone say of a bank. */
export interface QuickJudgement {
  /** worst verdict of the voltage duties */
  voltages: Verdict;
  /** worst verdict of all duties; the full judgement adds the peaks of |Z| and is never milder */
  verdict: Verdict;
  /** the duties that were looked at */
  duties: Duty[];
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
  const beside = new NetworkCapacitorDuties(model, basis, known);
  const take = (flow: Flow): void => {
    network.take(flow);
    beside.take(flow);
    for (const stage of stages) stage.take(flow);
  };
  eachFlow(model, bankModel(model, bank, levels), take, { bareOnce: true, withSource: limits.current !== null });
  const site = { ...basis, nominalV: basis.voltages.nominalV, shortCircuitMva: ends.shortCircuitMva };
  const inrush = inrushStages(bank, site).flatMap((stage) => inrushDuty(bank, stage, basis.rules));
  const duties = [...stages.flatMap((stage) => stage.duties()), ...network.duties(), ...beside.duties(), ...inrush];
  const worst = (rows: typeof duties): Verdict =>
    rows.reduce<Verdict>((verdict, duty) => graver(verdict, duty.verdict), 'clear');
  const absorbed = absorbedRipple(model, bank, levels, basis) !== null;
  const watched = !known || absorbed || plainSharePct(bank, basis) !== null;
  return {
    voltages: worst(duties.filter((duty) => duty.name.startsWith('capacitor voltage'))),
    verdict: graver(worst(duties), watched ? 'watch' : 'clear'),
    duties,
  };
}

/** Corners that are looked at first; what ruled one bank out is likely to rule the next one out as well. */
const MOST_WITNESSES = 4;

/**
 * Remembers in which corners banks passed a limit, so that most of those that do are known after a few flows instead of
 * all. Nothing is said of a bank that passes no limit there. Networks that differ in numbers alone share their corners'
 * places.
 */
export class LimitWitnesses {
  #places: number[] = [];

  /**
   * @param model the network without the bank
   * @param judged a bank judged on it; where it passes limits, their corners are remembered
   */
  learn({ corners: { corners } }: NetworkModel, { verdict, duties }: Pick<QuickJudgement, 'verdict' | 'duties'>): void {
    if (verdict !== 'avoid') return;
    const found = duties
      .filter((duty) => duty.verdict === 'avoid')
      .map((duty) => corners.findIndex(({ corner }) => corner === duty.corner))
      .filter((place) => place >= 0);
    this.#places = [...new Set([...found, ...this.#places])].slice(0, MOST_WITNESSES);
  }

  /**
   * @param model the network without the bank
   * @param bank the bank
   * @param basis rules, voltages, supply, loads
   * @returns true where the bank passes a limit in one of those corners, so that `quickJudge` would say `avoid`
   * @source method-limits
   */
  speakAgainst(model: NetworkModel, bank: Bank, basis: JudgeBasis): boolean {
    const corners = this.#places.flatMap((place) => model.corners.corners[place] ?? []);
    if (corners.length === 0) return false;
    return quickJudge({ ...model, corners: { ...model.corners, corners } }, bank, basis).verdict === 'avoid';
  }
}

/** The verdict of the full judgement, without its figures. */
export interface FirmVerdict {
  verdict: Verdict;
  /** the judged duty with the largest ratio, or null */
  worst: Duty | null;
  /** every duty that was looked at */
  duties: Duty[];
}

/**
 * The verdict the full judgement would give, found as cheaply as it can be: peaks are looked for only until one is near
 * an order present, and not at all where a limit is passed already. For moving an input until the verdict changes.
 * @param model the network without the bank
 * @param bank the bank
 * @param basis rules, voltages, supply, loads, reconnection delay
 * @param closing rows of exact inrush where they are known: distorting loads and background have no part in them
 * @returns verdict and the worst duty
 * @source method-limits
 */
export function firmVerdict(
  model: NetworkModel,
  bank: Bank,
  basis: JudgeBasis,
  closing?: readonly Duty[],
): FirmVerdict {
  const quick = quickJudge(model, bank, basis);
  const levels = bankLevels(bank, basis.voltages.nominalV);
  const inrush = closing ?? closingDuties(model, bank, levels, basis);
  const duties = [...quick.duties, ...inrush, ...dischargeDuties(bank, basis)];
  const worst = duties.reduce<Duty | null>(
    (most, duty) => ((duty.ratio ?? -1) > (most?.ratio ?? -1) ? duty : most),
    null,
  );
  const verdict = duties.reduce<Verdict>((gravest, duty) => graver(gravest, duty.verdict), quick.verdict);
  if (verdict !== 'clear') return { verdict, worst, duties };
  const near = hasNearPeak(
    model,
    bankModel(model, bank, levels),
    new PeakFinder(model, bank, PEAK_REACH_H),
    PEAK_REACH_H,
  );
  return { verdict: near ? 'watch' : 'clear', worst, duties };
}
