import type { Bank } from '../layout/bank.js';
import type { Level } from '../layout/levels.js';
import { bankModel, eachFlow } from '../network/flow.js';
import type { Loads } from '../network/loads.js';
import {
  LevelCollector,
  type NearPeak,
  type NetworkSummary,
  nearestPeak,
  summarizeNetwork,
} from '../network/network-check.js';
import { type RippleShare, rippleShare } from '../network/ripple-share.js';
import type { NetworkModel } from '../network/network-model.js';
import { PeakFinder } from '../network/peaks.js';
import type { Supply } from '../supply/supply.js';
import { type ChargeStage, chargeStages } from './charge.js';
import { closingStandings } from './closing-standings.js';
import { type Duty, DutyRow, NEAR_RATIO } from './duty-row.js';
import { type ExactInrush, exactInrush, type InrushStage, inrushStages } from './inrush.js';
import type { LimitChoice } from './limit-editions.js';
import { NetworkCapacitorDuties } from './network-capacitor-duties.js';
import { NetworkDuties, networkLimits } from './network-duties.js';
import { CAPACITOR_RULES, graver, type RuleSet, type Verdict } from './rules.js';
import { type DutyVoltages, StageDuties } from './stage-duties.js';

/** What a bank is judged by. */
export interface JudgeBasis {
  rules: RuleSet;
  frequencyHz: number;
  voltages: DutyVoltages;
  emcClass: 1 | 2 | 3;
  /** the rule set's first edition where absent */
  limits?: LimitChoice;
  supply: Supply;
  loads: Loads;
  reconnectDelayS: number;
}

/** The bank judged: network, duties, stored charge, inrush, and what speaks against it. */
export interface Judgement {
  network: NetworkSummary;
  duties: Duty[];
  charge: ChargeStage[];
  inrush: InrushStage[];
  verdict: Verdict;
  /** the peak that comes nearest to an order present, within reach */
  nearPeak: NearPeak | null;
  /** distorting load in % of transformer rating where plain stages meet more than is customary, else null */
  distortingSharePct: number | null;
  /** what is left of a ripple-control signal where it is less than is customary, else null */
  ripple: RippleShare | null;
  /** distorting loads or background are unknown */
  networkUnknown: boolean;
  /** a limit exceeded without the bank already */
  exceededAlready: boolean;
}

/** A peak this near to an order present is a reason to look again [order]. */
export const PEAK_REACH_H = 0.3;
/** A bank that leaves less than this share of the network's ripple-control signal is looked at again; common practice. */
export const RIPPLE_FLOOR = 0.8;
/** Plain stages are looked at again where distorting loads pass this share of transformer rating [%]. */
export const PLAIN_SHARE_PCT = 15;

/**
 * Judges a bank on a network: every level, every corner.
 * @param model the network without the bank
 * @param bank the bank
 * @param levels its levels, ascending
 * @param basis rules, voltages, supply, loads, reconnection delay
 * @returns network, duties and verdict
 * @source method-limits
 */
export function judgeBank(model: NetworkModel, bank: Bank, levels: Level[], basis: JudgeBasis): Judgement {
  const finder = new PeakFinder(model, bank);
  const tables = bankModel(model, bank, levels);
  const collector = new LevelCollector(model);
  const empty = summarizeNetwork(model, []);
  const networkUnknown = networkIsUnknown(basis.loads);
  const limits = networkLimits({ ...basis, ...basis.voltages, ...empty, loadA: model.loadA });
  const stages = bank.groups.map((_, g) => new StageDuties(model, bank, g, basis));
  const bankDuties = new NetworkDuties(model, limits, !networkUnknown);
  const beside = new NetworkCapacitorDuties(model, basis, !networkUnknown);
  eachFlow(model, tables, (flow) => {
    collector.take(flow);
    bankDuties.take(flow);
    beside.take(flow);
    for (const stage of stages) stage.take(flow);
  });
  const charge = chargeStages(bank, basis.rules, basis.frequencyHz, basis.reconnectDelayS);
  const exact = exactInrushes(model, bank, levels, basis);
  const inrush = inrushStages(bank, {
    nominalV: basis.voltages.nominalV,
    frequencyHz: basis.frequencyHz,
    shortCircuitMva: empty.shortCircuitMva,
    rules: basis.rules,
  }).map((stage, g) => ({ ...stage, worstPeakA: exact[g]?.worstPeakA ?? null }));
  const duties = [
    ...stages.flatMap((stage, g) => [
      ...stage.duties(),
      ...dischargeDuty(bank, charge[g]!, basis.rules),
      ...inrushDuty(bank, inrush[g]!, basis.rules),
      ...exactInrushDuty(bank, inrush[g]!, exact[g] ?? null, basis.rules),
    ]),
    ...bankDuties.duties(),
    ...beside.duties(),
  ];
  const nearPeak = nearestPeak(model, tables, new PeakFinder(model, bank, PEAK_REACH_H), PEAK_REACH_H);
  const distortingSharePct = plainSharePct(bank, basis);
  const ripple = absorbedRipple(model, bank, levels, basis);
  const unjudged = networkUnknown && bank.groups.length > 0;
  const watched = nearPeak !== null || distortingSharePct !== null || ripple !== null || unjudged;
  const worst = duties.reduce<Verdict>((verdict, duty) => graver(verdict, duty.verdict), 'clear');
  return {
    network: summarizeNetwork(model, collector.levels(finder)),
    duties,
    charge,
    inrush,
    verdict: graver(worst, watched ? 'watch' : 'clear'),
    nearPeak,
    distortingSharePct,
    ripple,
    networkUnknown,
    exceededAlready: bankDuties.exceededAlready || beside.exceededAlready,
  };
}

function dischargeDuty(bank: Bank, charge: ChargeStage, rules: RuleSet): Duty[] {
  const fittedOhm = bank.groups[charge.group]!.dischargeOhm;
  if (fittedOhm === null) return [];
  const source = CAPACITOR_RULES[rules].dischargeSource;
  const row = new DutyRow({ name: 'discharge', group: charge.group, unit: 'Ω', source, nearRatio: 1 });
  row.take(fittedOhm, charge.requiredOhm, { levelKvar: null, corner: null, orderH: null });
  return [row.duty()!];
}

/**
 * The inrush row of a group by the closed forms, where it has a limit.
 * @param bank the bank
 * @param inrush its closed forms
 * @param rules rule set
 * @returns one row or none
 * @source method-limits
 */
export function inrushDuty(bank: Bank, inrush: InrushStage, rules: RuleSet): Duty[] {
  const peakA = Math.max(inrush.singlePeakA, inrush.ontoBankPeakA ?? 0);
  return inrushRow(bank, inrush, { name: 'inrush current', peakA, singleA: inrush.singlePeakA, rules });
}

function exactInrushes(model: NetworkModel, bank: Bank, levels: Level[], basis: JudgeBasis): (ExactInrush | null)[] {
  const standings = closingStandings(model, basis.frequencyHz);
  return bank.groups.map((_, g) =>
    exactInrush(bank, g, {
      nominalV: basis.voltages.nominalV,
      frequencyHz: basis.frequencyHz,
      standings,
      vectors: levels.flatMap(({ vectors }) => vectors),
    }),
  );
}

/**
 * The rows of exact inrush, where there is a limit; without one nothing is solved.
 * @param model the network without the bank
 * @param bank the bank
 * @param levels its levels
 * @param basis rules, voltages, supply
 * @returns rows
 * @source method-inrush
 */
export function closingDuties(model: NetworkModel, bank: Bank, levels: Level[], basis: JudgeBasis): Duty[] {
  if (bank.limitsInrush === true) return [];
  const closed = inrushStages(bank, {
    nominalV: basis.voltages.nominalV,
    frequencyHz: basis.frequencyHz,
    shortCircuitMva: summarizeNetwork(model, []).shortCircuitMva,
    rules: basis.rules,
  });
  if (closed.every(({ limitPeakA }) => limitPeakA === null)) return [];
  const exact = exactInrushes(model, bank, levels, basis);
  return closed.flatMap((stage, g) => exactInrushDuty(bank, stage, exact[g] ?? null, basis.rules));
}

/**
 * The rows of the discharge resistors that are stated.
 * @param bank the bank
 * @param basis rules, frequency, reconnection delay
 * @returns rows
 * @source method-limits
 */
export function dischargeDuties(bank: Bank, basis: JudgeBasis): Duty[] {
  const charge = chargeStages(bank, basis.rules, basis.frequencyHz, basis.reconnectDelayS);
  return charge.flatMap((stage) => dischargeDuty(bank, stage, basis.rules));
}

function exactInrushDuty(bank: Bank, inrush: InrushStage, exact: ExactInrush | null, rules: RuleSet): Duty[] {
  if (exact === null) return [];
  const { worstPeakA: peakA, singlePeakA: singleA } = exact;
  return inrushRow(bank, inrush, { name: 'inrush current, exact', peakA, singleA, rules });
}

function inrushRow(
  bank: Bank,
  inrush: InrushStage,
  { name, peakA, singleA, rules }: { name: string; peakA: number; singleA: number; rules: RuleSet },
): Duty[] {
  const limitA = inrush.limitPeakA;
  if (limitA === null || bank.limitsInrush === true) return [];
  const source = bank.groups[inrush.group]!.switchPeakA === limitA ? 'site' : CAPACITOR_RULES[rules].source;
  const row = new DutyRow({ name, group: inrush.group, unit: 'A', source, nearRatio: NEAR_RATIO.other });
  row.take(peakA, limitA, { levelKvar: null, corner: null, orderH: null });
  const duty = row.duty()!;
  // Over the limit only because of a customary inductance between stages: reactors or an inrush-limiting switch are due.
  const assumed = !bank.interStageGiven && singleA <= limitA;
  return [duty.verdict === 'avoid' && assumed ? { ...duty, verdict: 'watch' } : duty];
}

/**
 * Distorting load as a share of transformer rating, where plain stages meet more than is customary.
 * @param bank the bank
 * @param basis supply, loads, voltage
 * @returns share [%], or null
 * @source method-limits
 */
export function plainSharePct(bank: Bank, basis: JudgeBasis): number | null {
  const ratedKva = basis.supply.transformers.reduce((sum, t) => sum + t.ratedKva, 0);
  if (ratedKva === 0 || !bank.groups.some((group) => group.reactorPct === 0 && group.count > 0)) return null;
  const distortingA = (basis.loads.distorting ?? []).reduce((sum, load) => sum + load.fundamentalA, 0);
  const sharePct = (100 * Math.sqrt(3) * basis.voltages.nominalV * distortingA) / 1000 / ratedKva;
  return sharePct > PLAIN_SHARE_PCT ? sharePct : null;
}

/**
 * What a bank leaves of the network's ripple-control signal, where that is less than is customary.
 * @param model the network without the bank
 * @param bank the bank
 * @param levels its levels
 * @param basis supply and frequency
 * @returns the least share, null where there is no signal or enough is left
 * @source method-network, practice
 */
export function absorbedRipple(
  model: NetworkModel,
  bank: Bank,
  levels: readonly Level[],
  { supply: { rippleHz }, frequencyHz }: Pick<JudgeBasis, 'supply' | 'frequencyHz'>,
): RippleShare | null {
  if (rippleHz === null) return null;
  const found = rippleShare(model, bank, levels, rippleHz / frequencyHz);
  return found !== null && found.share < RIPPLE_FLOOR ? found : null;
}

/**
 * Are the distorting loads or the background unknown; an empty list is a declaration, an absent one is not.
 * @param loads settled loads
 * @returns true where the network can't be judged
 * @source method-limits
 */
export function networkIsUnknown(loads: Loads): boolean {
  return loads.distorting === null || loads.backgroundPct === null;
}
