import type { Bank } from '../layout/bank.js';
import { effectiveKvar, ratedA, stageOhm, tunedOrderH } from '../layout/stage.js';
import type { Supply } from '../supply/supply.js';
import { type ChargeStage, naturalReconnectDelayS } from './charge.js';
import { type DeviceRow, deviceRow } from './device-row.js';
import type { InrushStage } from './inrush.js';
import { CAPACITOR_RULES, OVERVOLTAGE_DURATIONS, type RuleSet } from './rules.js';
import type { SiteFacts } from './site-facts.js';
import { type BankDemand, leastRatedV } from './stage-demand.js';

/** A fuse for a stage, as a multiple of its rated current; common practice, no source. */
export const FUSE_RATIO = { low: 1.6, high: 2 } as const;
/** A reactor keeps its inductance to this multiple of its fundamental current; common practice, no source. */
export const LINEAR_RATIO = 1.8;
/** Voltage change of one stage that is seldom complained of [%]; common practice, no source. */
export const VOLTAGE_CHANGE_PCT = 3;
/** A stage blocks a ripple signal where it is tuned to at most this share of its frequency; common practice. */
export const RIPPLE_SHARE = 0.9;

/** What the devices of the stages are worked out from. */
export interface StageDeviceBasis {
  rules: RuleSet;
  nominalV: number;
  highestV: number;
  frequencyHz: number;
  supply: Supply;
  shortCircuitMinMva: number;
  reconnectDelayS: number;
  charge: readonly ChargeStage[];
  inrush: readonly InrushStage[];
  demand: BankDemand;
  /** the bank as a whole takes up more of a ripple signal than is customary */
  absorbsRipple: boolean;
  facts: SiteFacts;
}

/**
 * Devices of every group: capacitor, reactor, switch, fuse, discharge, and what a stage does to the bus.
 * @param bank the bank
 * @param basis rules, voltages, currents met, and what the site has
 * @returns rows, group after group
 * @source method-devices, practice
 */
export function stageDevices(bank: Bank, basis: StageDeviceBasis): DeviceRow[] {
  return bank.groups.flatMap((_, g) => [
    ...capacitorRows(bank, g, basis),
    ...reactorRows(bank, g, basis),
    ...switchRows(bank, g, basis),
    ...dischargeRows(bank, g, basis),
    ...busRows(bank, g, basis),
  ]);
}

function capacitorRows(bank: Bank, g: number, { rules, demand }: StageDeviceBasis): DeviceRow[] {
  const group = bank.groups[g]!;
  const { ratedV } = group;
  const limits = CAPACITOR_RULES[rules];
  const { source } = limits;
  const { risenV, risenCrestV, rmsA, limitedA, kvar } = demand.groups[g]!;
  const standard = { group: g, basis: 'standard', source } as const;
  // Without a limit in the rule set the number is for whoever chooses the rating.
  const judged = (ratio: number | null, needed: (ratio: number) => number, fitted: number) =>
    ratio === null ? ({ state: 'noted' } as const) : { least: needed(ratio), fitted };
  const allowed = OVERVOLTAGE_DURATIONS.find(({ ratio }) => risenV <= ratio * ratedV * (1 + 1e-9));
  return [
    deviceRow({
      device: 'capacitor.voltage',
      ...standard,
      value: risenV,
      least: leastRatedV(demand.groups[g]!, rules),
      unit: 'V',
      fitted: ratedV,
    }),
    deviceRow({
      device: 'capacitor.crest',
      ...standard,
      value: risenCrestV,
      unit: 'V',
      ...judged(limits.crestVoltageRatio, (ratio) => risenCrestV / (Math.SQRT2 * ratio), ratedV),
    }),
    deviceRow({
      device: 'capacitor.current',
      ...standard,
      value: rmsA,
      unit: 'A',
      ...judged(limits.currentRatio, (ratio) => limitedA / ratio, ratedA(group)),
    }),
    deviceRow({
      device: 'capacitor.kvar',
      ...standard,
      value: kvar,
      unit: 'kvar',
      ...judged(limits.reactivePowerRatio, (ratio) => kvar / ratio, group.ratedKvar),
    }),
    deviceRow({
      device: 'capacitor.overvoltage',
      group: g,
      value: risenV / ratedV,
      least: allowed?.duration ?? 'not at all',
      state: 'noted',
      basis: 'standard',
      source: 'IEC 60831-1:2014',
    }),
  ];
}

function reactorRows(bank: Bank, g: number, basis: StageDeviceBasis): DeviceRow[] {
  const group = bank.groups[g]!;
  if (group.reactorPct === 0) return [];
  const { rmsA, sumA } = basis.demand.groups[g]!;
  return [
    deviceRow({
      device: 'reactor.current',
      group: g,
      value: rmsA,
      least: rmsA,
      unit: 'A',
      fitted: group.reactorMaxA,
      basis: 'derived',
      source: 'derived',
    }),
    deviceRow({
      device: 'reactor.linearity',
      group: g,
      value: sumA,
      least: Math.max(sumA, LINEAR_RATIO * stageA(group, basis.nominalV)),
      unit: 'A',
      fitted: basis.facts.bank?.stages[g]?.reactorLinearA ?? null,
      basis: 'practice',
      source: 'practice',
    }),
  ];
}

function switchRows(bank: Bank, g: number, { facts, inrush, nominalV }: StageDeviceBasis): DeviceRow[] {
  const group = bank.groups[g]!;
  const given = facts.bank?.stages[g];
  const kvar = effectiveKvar(group, nominalV);
  const { worstPeakA, singlePeakA, ontoBankPeakA } = inrush[g]!;
  const peakA = Math.max(worstPeakA ?? 0, singlePeakA, ontoBankPeakA ?? 0);
  const { low, high } = FUSE_RATIO;
  const fuse = deviceRow({
    device: 'fuse.rating',
    group: g,
    value: ratedA(group),
    least: low * ratedA(group),
    most: high * ratedA(group),
    unit: 'A',
    fitted: given?.fuseA ?? null,
    basis: 'practice',
    source: 'practice',
  });
  if (group.fixed) return [fuse];
  return [
    deviceRow({
      device: 'switch.kvar',
      group: g,
      value: kvar,
      least: kvar,
      unit: 'kvar',
      fitted: given?.switchKvar ?? null,
      basis: 'derived',
      source: 'derived',
    }),
    deviceRow({
      device: 'switch.peak',
      group: g,
      value: peakA,
      least: peakA,
      unit: 'A',
      fitted: group.switchPeakA,
      basis: 'derived',
      source: 'derived',
    }),
    fuse,
  ];
}

function dischargeRows(bank: Bank, g: number, basis: StageDeviceBasis): DeviceRow[] {
  const group = bank.groups[g]!;
  const { requiredOhm, dischargeToV } = basis.charge[g]!;
  const source = CAPACITOR_RULES[basis.rules].dischargeSource;
  const resistor = deviceRow({
    device: 'discharge.resistor',
    group: g,
    value: dischargeToV,
    most: requiredOhm,
    unit: 'Ω',
    fitted: group.dischargeOhm,
    basis: 'standard',
    source,
  });
  if (group.fixed) return [resistor];
  const naturalS = naturalReconnectDelayS([group], basis.rules, basis.frequencyHz);
  // Without a stated resistor the delay names one, and a reason of its own asks for it.
  const waiting = group.dischargeOhm === null ? ({ state: 'noted' } as const) : {};
  return [
    resistor,
    deviceRow({
      device: 'discharge.delay',
      group: g,
      value: naturalS,
      least: naturalS,
      unit: 's',
      fitted: basis.reconnectDelayS,
      basis: 'standard',
      source,
      ...waiting,
    }),
  ];
}

function busRows(bank: Bank, g: number, basis: StageDeviceBasis): DeviceRow[] {
  const group = bank.groups[g]!;
  const rows = [
    deviceRow({
      device: 'stage.voltageChange',
      group: g,
      value: voltageChangePct(effectiveKvar(group, basis.nominalV), basis.shortCircuitMinMva),
      most: VOLTAGE_CHANGE_PCT,
      unit: '%',
      state: 'noted',
      basis: 'practice',
      source: 'practice',
    }),
  ];
  const { rippleHz } = basis.supply;
  if (rippleHz !== null) rows.push(rippleRow(bank, g, { ...basis, rippleHz }));
  return rows;
}

/**
 * Voltage change when a stage is switched: 100·Q/S_k.
 * @param kvar Q [kvar]
 * @param shortCircuitMva S_k, the least for the greatest change [MVA]
 * @returns change [%]
 * @source method-requirement
 */
export function voltageChangePct(kvar: number, shortCircuitMva: number): number {
  return (100 * kvar) / (shortCircuitMva * 1000);
}

// Below its tuned frequency a stage is a capacitor and draws the signal in; well above it the reactor keeps it out.
function rippleRow(
  bank: Bank,
  g: number,
  { rippleHz, frequencyHz, absorbsRipple }: { rippleHz: number; frequencyHz: number; absorbsRipple: boolean },
) {
  const group = bank.groups[g]!;
  const tuned = tunedOrderH(group.reactorPct);
  const tunedHz = tuned === null ? null : tuned * frequencyHz;
  const blocks = tunedHz !== null && tunedHz <= RIPPLE_SHARE * rippleHz && !absorbsRipple;
  return deviceRow({
    device: 'stage.ripple',
    group: g,
    value: rippleHz,
    most: RIPPLE_SHARE * rippleHz,
    unit: 'Hz',
    fitted: tunedHz ?? 'no reactor',
    state: blocks ? 'fits' : 'noted',
    basis: 'practice',
    source: 'practice',
  });
}

/**
 * Reactance of a stage at a frequency: X = n·X_L − X_C/n, n = f_r/f; positive where it blocks.
 * @param group nameplate
 * @param rippleHz f_r [Hz]
 * @param frequencyHz f [Hz]
 * @returns X per phase [Ω]
 * @source method-network
 */
export function stageReactanceOhm(group: Bank['groups'][number], rippleHz: number, frequencyHz: number): number {
  const { inductiveOhm, capacitiveOhm } = stageOhm(group);
  const n = rippleHz / frequencyHz;
  return n * inductiveOhm - capacitiveOhm / n;
}

/**
 * Fundamental current of a stage: I = Q/(√3·U).
 * @param group nameplate
 * @param busV U, line to line [V]
 * @returns I [A]
 * @source method-bank
 */
export function stageA(group: Bank['groups'][number], busV: number): number {
  return (effectiveKvar(group, busV) * 1000) / (Math.sqrt(3) * busV);
}
