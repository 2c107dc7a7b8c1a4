import { InputProblem } from '../problem.js';
import { tanFromPowerFactor } from '../quantity/power-factor.js';
import { type Power, primaryFromBus } from '../supply/transformer-passage.js';
import type { Metering } from './bus-load.js';
import type { EquipmentEntry } from './estimate-input.js';
import { loadNeedKvar, type Target } from './need.js';

/** One entry of an equipment list with what it draws at the time of greatest demand. */
export interface EquipmentRow {
  name: string;
  count: number;
  ratedKw: number;
  efficiencyPct: number;
  powerFactor: number;
  loadFactor: number;
  coincidence: number;
  /** all of the entry together [kW] */
  activeKw: number;
  /** lagging [kvar] */
  reactiveKvar: number;
}

/** What an equipment list comes to at the time of greatest demand. */
export interface ListNeed {
  rows: EquipmentRow[];
  /** at the bus [kW] */
  activeKw: number;
  /** at the bus, lagging [kvar] */
  reactiveKvar: number;
  powerFactor: number;
  /** at the meter, transformers included where it stands at the primary */
  meter: Power;
  /** kvar needed at the bus for the target at the meter [kvar] */
  neededKvar: number;
}

/**
 * The load an equipment list makes: P = Σ count · rated/efficiency · load factor · coincidence, Q = Σ P · tan φ, and what
 * it needs by the rule of one interval.
 * @param equipment validated entries
 * @param metering where the target holds
 * @param target power factor and how export counts
 * @returns rows, sums and need
 * @throws InputProblem where the transformers can't carry the load
 * @source method-estimate
 */
export function listNeed(equipment: readonly EquipmentEntry[], metering: Metering, target: Target): ListNeed {
  const rows = equipment.map(equipmentRow);
  const activeKw = rows.reduce((sum, row) => sum + row.activeKw, 0);
  const reactiveKvar = rows.reduce((sum, row) => sum + row.reactiveKvar, 0);
  const load = { activeKw, reactiveKvar };
  const meter = metering.at === 'bus' ? load : primaryFromBus(metering.passage, activeKw, reactiveKvar);
  const neededKvar = loadNeedKvar(metering, load, target);
  if (meter === null || neededKvar === null) throw tooLarge(load);
  const { activeKw: meterKw, reactiveKvar: meterKvar } = meter;
  return {
    rows,
    activeKw,
    reactiveKvar,
    powerFactor: activeKw / Math.hypot(activeKw, reactiveKvar),
    meter: { activeKw: meterKw, reactiveKvar: meterKvar },
    neededKvar,
  };
}

function equipmentRow(entry: EquipmentEntry): EquipmentRow {
  const { name, ratedKw, efficiencyPct, powerFactor, count = 1, loadFactor = 1, coincidence = 1 } = entry;
  const activeKw = ((count * ratedKw) / (efficiencyPct / 100)) * loadFactor * coincidence;
  const reactiveKvar = activeKw * tanFromPowerFactor(powerFactor);
  return { name, count, ratedKw, efficiencyPct, powerFactor, loadFactor, coincidence, activeKw, reactiveKvar };
}

function tooLarge({ activeKw, reactiveKvar }: Power): InputProblem {
  return new InputProblem([
    {
      code: 'load-too-large',
      path: 'estimate.equipment',
      expected: 'a load that the transformers can carry',
      found: `${activeKw} kW and ${reactiveKvar} kvar, beyond the greatest power the impedance lets through`,
    },
  ]);
}
