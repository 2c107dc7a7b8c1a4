import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import type { CabinetHeat } from './cabinet-heat.js';
import { type DeviceRow, deviceRow, yesOrNo } from './device-row.js';
import { FAULT_CURRENT_EDITION, type FaultCurrent } from './fault-current.js';
import { AMBIENT_CATEGORIES, CAPACITOR_RULES, type RuleSet } from './rules.js';
import type { BankPlace, SiteFacts } from './site-facts.js';

/** Instantaneous trip of the upstream device, as a multiple of the bank's current; common practice, no source. */
export const INSTANTANEOUS_RATIO = 10;
/** Capacitors are made for altitudes up to this [m]. */
const MOST_ALTITUDE_M = 2000;

/** What the devices of the bank as a whole are worked out from. */
export interface BankDeviceBasis {
  rules: RuleSet;
  nominalV: number;
  conductorMinA: number;
  fault: FaultCurrent;
  heat: CabinetHeat;
  facts: SiteFacts;
}

/**
 * Devices of the bank as a whole: place, upstream device, conductors, protection, cabinet.
 * @param bank the bank
 * @param basis rules, fault currents, heat, and what the site has
 * @returns rows
 * @source method-devices, practice
 */
export function bankDevices(bank: Bank, basis: BankDeviceBasis): DeviceRow[] {
  return [
    ...mainDeviceRows(bank, basis),
    ...protectionRows(basis),
    ...placeRows(bank, basis.facts),
    ...cabinetRows(basis),
  ];
}

function mainDeviceRows(bank: Bank, basis: BankDeviceBasis): DeviceRow[] {
  const { rules, conductorMinA, fault, facts } = basis;
  const given = facts.bank?.mainDevice ?? {};
  const { conductorSource } = CAPACITOR_RULES[rules];
  const bankA = bankCurrentA(bank, basis.nominalV);
  const kind = { unit: 'A', value: bankA } as const;
  const standard = { basis: 'standard', source: conductorSource } as const;
  const rated = { least: conductorMinA, ...kind, ...standard };
  const faultRow = { unit: 'kA', basis: 'standard', source: FAULT_CURRENT_EDITION } as const;
  return [
    deviceRow({ device: 'mainDevice.rating', ...rated, fitted: given.ratedA ?? null }),
    deviceRow({
      device: 'mainDevice.setting',
      ...rated,
      most: given.ratedA ?? facts.bank?.conductorA ?? null,
      fitted: given.settingA ?? null,
      basis: 'practice',
      source: 'practice',
    }),
    deviceRow({
      device: 'mainDevice.instantaneous',
      ...kind,
      least: INSTANTANEOUS_RATIO * bankA,
      most: 1000 * fault.leastKa,
      fitted: given.instantaneousA ?? null,
      basis: 'practice',
      source: 'practice',
    }),
    deviceRow({
      device: 'mainDevice.breaking',
      ...faultRow,
      value: fault.greatestKa,
      least: fault.greatestKa,
      fitted: given.breakingKa ?? null,
    }),
    deviceRow({
      device: 'busbar.withstand',
      ...faultRow,
      value: fault.peakKa,
      least: fault.peakKa,
      fitted: given.withstandKa ?? null,
    }),
    deviceRow({
      device: 'busbar.shortTime',
      ...faultRow,
      value: fault.thermalKa,
      least: fault.thermalKa,
      fitted: given.shortTimeKa ?? null,
    }),
    deviceRow({ device: 'conductor.rating', ...rated, fitted: facts.bank?.conductorA ?? null }),
  ];
}

/**
 * Fundamental current of the whole bank at nominal voltage: I = ΣQ/(√3·U).
 * @param bank the bank
 * @param nominalV U, line to line [V]
 * @returns I [A]
 * @source method-bank
 */
export function bankCurrentA(bank: Bank, nominalV: number): number {
  const kvar = bank.groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, nominalV), 0);
  return (kvar * 1000) / (Math.sqrt(3) * nominalV);
}

function protectionRows({ facts }: BankDeviceBasis): DeviceRow[] {
  const given = facts.bank?.protection ?? {};
  const practice = { basis: 'practice', source: 'practice' } as const;
  return [
    deviceRow({
      device: 'protection.earthFault',
      ...practice,
      value: facts.earthing,
      least: earthFaultNeed(facts),
      fitted: yesOrNo(given.earthFault),
    }),
    deviceRow({ device: 'protection.overTemperature', ...practice, fitted: yesOrNo(given.overTemperature) }),
    deviceRow({ device: 'protection.overPressure', ...practice, fitted: yesOrNo(given.overPressure) }),
    deviceRow({ device: 'protection.undervoltage', ...practice, fitted: yesOrNo(given.undervoltage) }),
  ];
}

// How an earth fault is cleared depends on what brings its current back.
function earthFaultNeed({ earthing }: SiteFacts): string | null {
  if (earthing === null) return null;
  if (earthing === 'TT') return 'residual current device';
  return earthing === 'IT' ? 'insulation monitor' : 'the stage’s own fuse';
}

function placeRows(bank: Bank, facts: SiteFacts): DeviceRow[] {
  const { place } = facts;
  const standard = { basis: 'standard', source: 'IEC 60831-1:2014' } as const;
  return [
    deviceRow({
      device: 'capacitor.ambient',
      ...standard,
      value: place.ambientMaxC ?? null,
      unit: '°C',
      ...ambientNeed(place, bank.ambientCategory),
    }),
    deviceRow({
      device: 'capacitor.altitude',
      ...standard,
      value: place.altitudeM ?? null,
      most: MOST_ALTITUDE_M,
      unit: 'm',
      fitted: place.altitudeM ?? null,
    }),
    deviceRow({
      device: 'capacitor.connection',
      basis: 'practice',
      source: 'practice',
      least: 'delta or unearthed star',
      ...connectionState(facts),
    }),
  ];
}

const CATEGORIES = ['A', 'B', 'C', 'D'] as const;

// The mildest category whose three temperatures all cover the place's; a temperature that was not entered asks nothing.
function ambientNeed(
  { ambientMaxC, ambientDayC, ambientYearC }: BankPlace,
  fitted: (typeof CATEGORIES)[number] | null,
): Pick<DeviceRow, 'least' | 'fitted' | 'state'> {
  const met = [ambientMaxC, ambientDayC, ambientYearC];
  if (met.every((c) => c === undefined)) return { least: null, fitted, state: 'open' };
  const covers = (name: (typeof CATEGORIES)[number]): boolean =>
    AMBIENT_CATEGORIES[name].every((limitC, k) => met[k] === undefined || met[k] <= limitC);
  const need = CATEGORIES.find(covers);
  if (fitted === null) return { least: need ?? 'beyond D', fitted, state: 'open' };
  return { least: need ?? 'beyond D', fitted, state: covers(fitted) ? 'fits' : 'short' };
}

// An earthed star carries zero-sequence triplens, which are kept out of the model.
function connectionState({ bank, earthing }: SiteFacts): Pick<DeviceRow, 'value' | 'fitted' | 'state'> {
  const connection = bank?.connection;
  if (connection === undefined) return { value: earthing, fitted: null, state: 'open' };
  return { value: earthing, fitted: connection, state: connection === 'earthedStar' ? 'short' : 'fits' };
}

function cabinetRows({ heat, facts }: BankDeviceBasis): DeviceRow[] {
  const { place } = facts;
  const forced = place.ventilation === 'forced';
  return [
    deviceRow({
      device: 'cabinet.heat',
      value: heat.reactorW + heat.resistorW,
      least: heat.lowW,
      most: heat.highW,
      unit: 'W',
      state: 'noted',
      basis: 'practice',
      source: 'practice',
    }),
    deviceRow({
      device: 'cabinet.airFlow',
      value: heat.allowedRiseK,
      least: heat.airFlowM3PerH,
      unit: 'm³/h',
      fitted: place.airFlowM3PerH ?? (place.ventilation === undefined || forced ? null : place.ventilation),
      ...(place.airFlowM3PerH === undefined && !forced && place.ventilation !== undefined
        ? ({ state: 'noted' } as const)
        : {}),
      basis: 'practice',
      source: 'practice',
    }),
    deviceRow({ device: 'cabinet.enclosure', basis: 'practice', source: 'practice', ...enclosure(place) }),
  ];
}

const ENCLOSURES = { inside: 'IP31', outside: 'IP54' } as const;

function enclosure({ indoors, enclosureIp }: BankPlace): Pick<DeviceRow, 'least' | 'fitted' | 'state'> {
  const fitted = enclosureIp ?? null;
  if (indoors === undefined) return { least: null, fitted, state: 'open' };
  const least = indoors ? ENCLOSURES.inside : ENCLOSURES.outside;
  if (fitted === null) return { least, fitted, state: 'open' };
  // "X" promises nothing.
  const digit = (ip: string, at: number): number => Number(ip[at]) || 0;
  const enough = [2, 3].every((at) => digit(fitted, at) >= digit(least, at));
  return { least, fitted, state: enough ? 'fits' : 'short' };
}
