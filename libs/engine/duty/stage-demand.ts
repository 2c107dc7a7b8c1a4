import type { Bank } from '../layout/bank.js';
import type { Level } from '../layout/levels.js';
import type { Flow } from '../network/bus-flow.js';
import { bankModel, eachFlow } from '../network/flow.js';
import type { NetworkModel } from '../network/network-model.js';
import { branchRatio, stageBranch } from '../network/stage-admittance.js';
import { resistanceGrowth } from '../quantity/resistance-growth.js';
import { CAPACITOR_RULES, type RuleSet } from './rules.js';
import type { DutyVoltages } from './stage-duties.js';

/** What one stage of a group is asked for, the worst over levels and corners. */
export interface StageDemand {
  /** rms current at the highest bus voltage [A] */
  rmsA: number;
  /** sum of the currents of all orders, whose crest the reactor must not saturate at [A] */
  sumA: number;
  /** fundamental voltage on the capacitor at the nominal bus voltage, line to line [V] */
  continuousV: number;
  /** rms voltage on the capacitor at the highest bus voltage, line to line, the level's own rise counted [V] */
  risenV: number;
  /** its crest, the voltages of all orders added, the level's own rise counted [V] */
  risenCrestV: number;
  /** rms current, over the capacitance factor where the limit grows with it [A] */
  limitedA: number;
  /** reactive power of the capacitor, all orders, √3·Σ U_h·I_h [kvar] */
  kvar: number;
}

/** What a bank is asked for. */
export interface BankDemand {
  groups: StageDemand[];
  /** loss in the resistance of all reactors connected, the worst level and corner [W] */
  reactorLossW: number;
}

/**
 * What stages and reactors are asked for over every level and corner, at the highest bus voltage; the level's own rise,
 * Q/S_k at the least fault level, is added for the capacitor's voltage.
 * @param model the network without the bank
 * @param bank the bank
 * @param levels its levels
 * @param site voltages [V], least fault level [MVA], rule set
 * @returns one entry a group, and the reactors' loss
 * @source method-devices
 */
export function bankDemand(
  model: NetworkModel,
  bank: Bank,
  levels: Level[],
  site: DutyVoltages & { shortCircuitMinMva: number; rules: RuleSet },
): BankDemand {
  const none = { rmsA: 0, sumA: 0, continuousV: 0, risenV: 0, risenCrestV: 0, limitedA: 0, kvar: 0 };
  const demand: BankDemand = { groups: bank.groups.map(() => ({ ...none })), reactorLossW: 0 };
  const { currentGrowsWithCapacitance } = CAPACITOR_RULES[site.rules];
  const exponent = model.corners.networks[0]!.path.resistanceExponent;
  const branches = model.corners.factors.map((factors) =>
    bank.groups.map((group) => stageBranch(group, factors, exponent)),
  );
  eachFlow(model, bankModel(model, bank, levels), (flow) => {
    let lossW = 0;
    for (const [g, branch] of branches[flow.corner.factors]!.entries()) {
      if (flow.connected[g] === 0) continue;
      const rise = 1 + flow.levelKvar / (site.shortCircuitMinMva * 1000);
      const ratio = branchRatio(branch);
      const fundamentalA = site.highestV / Math.sqrt(3) / (branch.capacitiveOhm * (1 - ratio));
      const met = stageMet(flow, g, branch, { fundamentalA, fundamentalV: site.highestV / (1 - ratio), rise });
      const group = demand.groups[g]!;
      group.rmsA = Math.max(group.rmsA, met.rmsA);
      group.sumA = Math.max(group.sumA, met.sumA);
      group.continuousV = Math.max(group.continuousV, site.nominalV / (1 - ratio));
      group.risenV = Math.max(group.risenV, met.rmsV);
      group.risenCrestV = Math.max(group.risenCrestV, Math.SQRT2 * met.sumV);
      const growth = currentGrowsWithCapacitance ? flow.corner.corner.capacitanceFactor : 1;
      group.limitedA = Math.max(group.limitedA, met.rmsA / growth);
      group.kvar = Math.max(group.kvar, met.kvar);
      lossW += flow.vector[g]! * met.lossW;
    }
    demand.reactorLossW = Math.max(demand.reactorLossW, lossW);
  });
  return demand;
}

/**
 * The least rated voltage a capacitor may have: for hours at the highest voltage, and all the time at the nominal one where
 * the rules limit that too.
 * @param demand of one stage [V]
 * @param rules rule set
 * @returns rated voltage, line to line [V]
 * @source method-devices
 */
export function leastRatedV({ risenV, continuousV }: StageDemand, rules: RuleSet): number {
  const { highestVoltageRatio, continuousVoltageRatio } = CAPACITOR_RULES[rules];
  const forHoursV = risenV / highestVoltageRatio;
  return continuousVoltageRatio === null ? forHoursV : Math.max(forHoursV, continuousV / continuousVoltageRatio);
}

function stageMet(
  flow: Flow,
  g: number,
  branch: ReturnType<typeof stageBranch>,
  { fundamentalA, fundamentalV, rise }: { fundamentalA: number; fundamentalV: number; rise: number },
): { rmsA: number; sumA: number; rmsV: number; sumV: number; kvar: number; lossW: number } {
  let square = fundamentalA ** 2;
  let sumA = fundamentalA;
  let voltageSquare = (rise * fundamentalV) ** 2;
  let sumV = rise * fundamentalV;
  let powerVa = fundamentalV * fundamentalA;
  let loss = branch.resistanceOhm * fundamentalA ** 2;
  const currents = flow.stageA[g]!;
  for (let i = 0; i < currents.length; i++) {
    const a = currents[i]!;
    const h = flow.ordersH[i]!;
    const harmonicV = (Math.sqrt(3) * a * branch.capacitiveOhm) / h;
    square += a * a;
    sumA += a;
    voltageSquare += harmonicV ** 2;
    sumV += harmonicV;
    powerVa += harmonicV * a;
    loss += branch.resistanceOhm * resistanceGrowth(h, branch.resistanceExponent) * a * a;
  }
  return {
    rmsA: Math.sqrt(square),
    sumA,
    rmsV: Math.sqrt(voltageSquare),
    sumV,
    kvar: (Math.sqrt(3) * powerVa) / 1000,
    lossW: 3 * loss,
  };
}
