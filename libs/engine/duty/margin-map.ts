import type { Bank } from '../layout/bank.js';
import type { Level } from '../layout/levels.js';
import { bankModel, eachFlow } from '../network/flow.js';
import type { NetworkModel } from '../network/network-model.js';
import { type LimitChoice, limitChoice } from './limit-editions.js';
import type { RuleSet } from './rules.js';
import { chosenVoltageLimits } from './voltage-limits.js';

/** Harmonic voltage as a share of its own limit, worst over every corner. */
export interface MarginMap {
  /** ascending, 0 included [kvar] */
  levelsKvar: number[];
  /** orders with a limit, ascending */
  ordersH: number[];
  /** limit of each order [% of nominal] */
  limitPct: number[];
  /** [level][order], the worst voltage [% of nominal] */
  voltagePct: number[][];
  /** [level][order], % of the limit */
  sharePct: number[][];
}

/**
 * Share of the harmonic voltage limit at every level and order, the worst of all corners and count vectors.
 * @param model the network without the bank
 * @param bank the bank
 * @param levels its levels
 * @param basis rule set, voltages and class
 * @returns shares [%]
 * @source method-limits
 */
export function marginMap(
  model: NetworkModel,
  bank: Bank,
  levels: Level[],
  basis: { rules: RuleSet; voltages: { nominalV: number }; emcClass: 1 | 2 | 3; limits?: LimitChoice },
): MarginMap {
  const choice = basis.limits ?? limitChoice(basis.rules, undefined);
  const limits = chosenVoltageLimits(basis.voltages.nominalV, basis.emcClass, choice);
  const judged = [...model.excitation.ordersH.entries()].flatMap(([i, orderH]) => {
    const limitPct = limits.orderPct(orderH);
    return limitPct === null ? [] : [{ i, orderH, limitPct }];
  });
  const worstV = levels.map(() => judged.map(() => 0));
  const phaseV = model.nominalV / Math.sqrt(3);
  eachFlow(model, bankModel(model, bank, levels), (flow) => {
    const row = worstV[flow.level]!;
    for (const [k, { i }] of judged.entries()) {
      for (const { voltageV } of flow.buses) row[k] = Math.max(row[k]!, voltageV[i]!);
    }
  });
  return {
    levelsKvar: levels.map((level) => level.levelKvar),
    ordersH: judged.map(({ orderH }) => orderH),
    limitPct: judged.map(({ limitPct }) => limitPct),
    voltagePct: worstV.map((row) => row.map((volt) => (100 * volt) / phaseV)),
    sharePct: worstV.map((row) => row.map((volt, k) => (1e4 * volt) / phaseV / judged[k]!.limitPct)),
  };
}
