import type { Bank } from '../layout/bank.js';
import { effectiveKvar } from '../layout/stage.js';
import type { Control } from '../operation/control.js';
import { type DeviceRow, deviceRow, yesOrNo } from './device-row.js';
import type { CurrentTransformer, SiteFacts } from './site-facts.js';

/** What the devices around the controller are worked out from. */
export interface ControllerDeviceBasis {
  nominalV: number;
  control: Control;
  facts: SiteFacts;
  /** a generator may feed the bus */
  generator: boolean;
}

/**
 * Devices around the controller: its current transformer, and what it does on a generator.
 * @param bank the bank
 * @param basis voltage, settings, and what the site has
 * @returns rows
 * @source method-devices, practice
 */
export function controllerDevices(bank: Bank, basis: ControllerDeviceBasis): DeviceRow[] {
  return [...transformerRows(bank, basis), ...generatorRows(bank, basis)];
}

function transformerRows(bank: Bank, { facts, nominalV, control }: ControllerDeviceBasis): DeviceRow[] {
  if (bank.groups.every((group) => group.fixed)) return [];
  const given = facts.currentTransformer;
  const practice = { basis: 'practice', source: 'practice' } as const;
  return [
    deviceRow({
      device: 'currentTransformer.place',
      ...practice,
      least: 'incomer',
      fitted: given?.place ?? null,
      ...(given?.place === undefined ? {} : { state: given.place === 'incomer' ? 'fits' : 'short' }),
    }),
    deviceRow({
      device: 'currentTransformer.response',
      basis: 'site',
      source: 'site',
      value: given === null ? null : responseA(bank, nominalV, control, given),
      ...sensitivity(bank, nominalV, control, given),
    }),
  ];
}

/**
 * Current at the transformer's secondary at which the controller has to answer: a·q_min/(√3·U)·(I_s/I_p).
 * @param bank the bank
 * @param nominalV U [V]
 * @param control response ratio a
 * @param transformer ratio; of the sum where incomers are summed
 * @returns I [A]
 * @source method-controller
 */
export function responseA(bank: Bank, nominalV: number, control: Control, transformer: CurrentTransformer): number {
  const { ratioPrimaryA, ratioSecondaryA } = transformer;
  const primaryA = (control.responseRatio * smallestKvar(bank, nominalV) * 1000) / (Math.sqrt(3) * nominalV);
  return (primaryA * ratioSecondaryA) / ratioPrimaryA;
}

/**
 * Effective kvar of the smallest stage that is switched.
 * @param bank the bank
 * @param nominalV U [V]
 * @returns q_min [kvar]
 * @source method-bank
 */
export function smallestKvar(bank: Bank, nominalV: number): number {
  return Math.min(...bank.groups.filter(({ fixed }) => !fixed).map((group) => effectiveKvar(group, nominalV)));
}

function sensitivity(
  bank: Bank,
  nominalV: number,
  control: Control,
  given: CurrentTransformer | null,
): Pick<DeviceRow, 'most' | 'fitted' | 'unit' | 'state'> {
  if (given === null) return { most: null, fitted: null, unit: 'A', state: 'open' };
  const most = responseA(bank, nominalV, control, given);
  const fitted = given.sensitivityA ?? null;
  const state = fitted === null ? 'open' : fitted <= most * (1 + 1e-9) ? 'fits' : 'short';
  return { most, fitted, unit: 'A', state };
}

function generatorRows(bank: Bank, { facts, generator, nominalV }: ControllerDeviceBasis): DeviceRow[] {
  const { holdOff, allowedKvar } = facts.generator;
  if (!generator && holdOff === undefined && allowedKvar === undefined) return [];
  const kvar = bank.groups.reduce((sum, group) => sum + group.count * effectiveKvar(group, nominalV), 0);
  const held = holdOff === true || (allowedKvar !== undefined && allowedKvar >= kvar);
  const known = holdOff !== undefined || allowedKvar !== undefined;
  return [
    deviceRow({
      device: 'generator.holdOff',
      value: kvar,
      most: allowedKvar ?? null,
      unit: 'kvar',
      fitted: yesOrNo(holdOff),
      state: held ? 'fits' : known ? 'short' : 'open',
      basis: 'practice',
      source: 'practice',
    }),
  ];
}
