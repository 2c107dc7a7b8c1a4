import type { Bank } from '../layout/bank.js';
import type { Level } from '../layout/levels.js';
import { summarizeNetwork } from '../network/network-check.js';
import type { NetworkModel } from '../network/network-model.js';
import type { Control } from '../operation/control.js';
import { bankDevices } from './bank-devices.js';
import { type CabinetHeat, cabinetHeat } from './cabinet-heat.js';
import { controllerDevices } from './controller-devices.js';
import type { DeviceRow } from './device-row.js';
import { type FaultCurrent, faultCurrent } from './fault-current.js';
import type { JudgeBasis, Judgement } from './judge-bank.js';
import type { SiteFacts } from './site-facts.js';
import { type BankDemand, bankDemand } from './stage-demand.js';
import { stageDevices } from './stage-devices.js';

/** The table of devices and the numbers it was worked out from. */
export interface Devices {
  rows: DeviceRow[];
  fault: FaultCurrent;
  heat: CabinetHeat;
  demand: BankDemand;
}

/**
 * Every device of a bank with its duty, the rating that asks for, and what the site has.
 * @param model the network without the bank
 * @param bank the bank, not empty
 * @param levels its levels
 * @param basis what it is judged by, its judgement, settings, conductor current [A] and the site's facts
 * @returns rows and the numbers behind them
 * @source method-devices, practice, iec-60909-0
 */
export function devices(
  model: NetworkModel,
  bank: Bank,
  levels: Level[],
  basis: { judge: JudgeBasis; judgement: Judgement; control: Control; conductorMinA: number; facts: SiteFacts },
): Devices {
  const { judge, judgement, control, conductorMinA, facts } = basis;
  const { shortCircuitMinMva } = summarizeNetwork(model, []);
  const voltages = { ...judge.voltages, shortCircuitMinMva };
  const fault = faultCurrent(judge.supply, judge.loads, { ...voltages, frequencyHz: judge.frequencyHz }, model);
  const demand = bankDemand(model, bank, levels, { ...voltages, rules: judge.rules });
  const heat = cabinetHeat(bank, judgement.charge, demand, facts.place);
  const shared = { rules: judge.rules, facts, ...voltages };
  return {
    rows: [
      ...stageDevices(bank, {
        ...shared,
        frequencyHz: judge.frequencyHz,
        supply: judge.supply,
        reconnectDelayS: control.reconnectDelayS,
        charge: judgement.charge,
        inrush: judgement.inrush,
        demand,
        absorbsRipple: judgement.ripple !== null,
      }),
      ...bankDevices(bank, {
        ...shared,
        conductorMinA,
        fault,
        heat,
      }),
      ...controllerDevices(bank, { ...shared, control, generator: (model.nodal?.topology.generators.length ?? 0) > 0 }),
    ],
    fault,
    heat,
    demand,
  };
}
