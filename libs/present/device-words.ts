import type { DeviceName, DeviceRow, DeviceState } from '#libs/engine/index.js';
import { engineName } from './engine-name.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say, words } from './language.js';

/** How a device stands, as a person reads it. */
export const DEVICE_STATE_WORDS: Record<DeviceState, string> = words({
  fits: 'fits',
  short: 'falls short',
  open: 'open',
  noted: '–',
});

/**
 * Device, what it meets, and what it needs. `{value}`, `{least}`, `{most}` are the row's numbers with their unit; a
 * sentence in [brackets] is left out where one of its numbers is absent.
 */
const WORDS: Record<DeviceName, { device: string; met: string; need: string }> = words({
  'capacitor.voltage': {
    device: 'capacitor, rated voltage',
    met: '{value} on it at the highest, with the rise of the kvar connected',
    need: '{least} or more, its continuous voltage counted',
  },
  'capacitor.crest': {
    device: 'capacitor, crest voltage',
    met: '{value} crest, all orders added, with the rise of the kvar connected',
    need: '[{least} or more rated voltage]',
  },
  'capacitor.current': {
    device: 'capacitor, current',
    met: '{value} rms, harmonics in',
    need: '{least} or more rated current',
  },
  'capacitor.kvar': {
    device: 'capacitor, reactive power',
    met: '{value}, all orders',
    need: '[{least} or more rated]',
  },
  'capacitor.overvoltage': {
    device: 'capacitor, overvoltage',
    met: '{value} times its rated voltage',
    need: 'may last: {least}',
  },
  'capacitor.ambient': {
    device: 'capacitor, ambient',
    met: '[air up to {value}]',
    need: '[category {least}]',
  },
  'capacitor.altitude': { device: 'capacitor, altitude', met: '[{value}]', need: 'at most {most}' },
  'capacitor.connection': { device: 'capacitor, connection', met: '[earthing {value}]', need: '{least}' },
  'reactor.current': {
    device: 'reactor, thermal current',
    met: '{value} rms, harmonics in',
    need: '{least} or more continuous',
  },
  'reactor.linearity': {
    device: 'reactor, linearity',
    met: '{value}, all orders added',
    need: 'inductance held to {least}',
  },
  'switch.kvar': {
    device: 'switch, capacitor duty',
    met: '{value} at the bus voltage',
    need: 'rated for capacitors, {least} or more',
  },
  'switch.peak': { device: 'switch, inrush', met: '{value} peak', need: 'makes {least} or more' },
  'fuse.rating': { device: 'fuse of a stage', met: '{value} rated current', need: '{least} to {most}' },
  'discharge.resistor': {
    device: 'discharge resistor',
    met: 'the charge to {value} V in the standard’s time, and the reconnection delay',
    need: '{most} or less across a phase',
  },
  'discharge.delay': {
    device: 'reconnection delay',
    met: '{value} to 10 % of rated voltage',
    need: '{least} or more',
  },
  'stage.voltageChange': {
    device: 'voltage change of a stage',
    met: '{value} at the least fault level',
    need: 'seldom noticed up to {most}',
  },
  'stage.ripple': {
    device: 'ripple signal',
    met: 'a signal at {value}',
    need: 'tuned to {most} or less, and most of it left',
  },
  'mainDevice.rating': {
    device: 'upstream device, rating',
    met: '{value} fundamental, all stages',
    need: '{least} or more',
  },
  'mainDevice.setting': {
    device: 'upstream device, overload setting',
    met: '{value} fundamental, all stages',
    need: '{least} or more[, at most {most}]',
  },
  'mainDevice.instantaneous': {
    device: 'upstream device, instantaneous setting',
    met: '{value} fundamental, all stages',
    need: '{least} to {most}, the least fault current',
  },
  'mainDevice.breaking': {
    device: 'upstream device and fuses, breaking capacity',
    met: '{value} equipment fault current',
    need: '{least} or more',
  },
  'busbar.withstand': { device: 'busbars, peak withstand', met: '{value} peak fault current', need: '{least} or more' },
  'busbar.shortTime': {
    device: 'busbars, short-time withstand for 1 s',
    met: '{value} thermal equivalent of the fault current',
    need: '{least} or more',
  },
  'conductor.rating': { device: 'conductors', met: '{value} fundamental, all stages', need: '{least} or more' },
  'protection.earthFault': { device: 'earth fault', met: '[earthing {value}]', need: 'cleared[ by {least}]' },
  'protection.overTemperature': {
    device: 'over-temperature',
    met: 'a fan that stops, a filter that clogs',
    need: 'disconnects all stages',
  },
  'protection.overPressure': {
    device: 'over-pressure',
    met: 'a winding that ends its life',
    need: 'every capacitor disconnects itself',
  },
  'protection.undervoltage': {
    device: 'undervoltage',
    met: 'a supply that fails and returns',
    need: 'all stages drop, and return by the reconnection delay',
  },
  'cabinet.heat': {
    device: 'cabinet, heat',
    met: '{value} in reactors and resistors',
    need: '{least} to {most} to be carried away',
  },
  'cabinet.airFlow': { device: 'cabinet, air', met: 'air {value} warmer inside', need: '{least} or more' },
  'cabinet.enclosure': { device: 'cabinet, enclosure', met: '', need: '[{least} or more]' },
  'currentTransformer.place': {
    device: 'current transformer, place',
    met: '',
    need: 'where loads and bank flow through it: {least}',
  },
  'currentTransformer.response': {
    device: 'current transformer, response',
    met: '[{value} at its secondary for the smallest stage]',
    need: '[the controller answers to {most} or less]',
  },
  'generator.holdOff': {
    device: 'on a generator',
    met: '{value} would over-excite it',
    need: 'bank held off[, or at most {most}]',
  },
});

/** Words of an entered value. */
const ENTERED: Readonly<Record<string, string>> = words({
  yes: 'fitted',
  no: 'not fitted',
  delta: 'delta',
  star: 'unearthed star',
  earthedStar: 'earthed star',
  incomer: 'at the incomer',
  load: 'sees the loads alone',
  bank: 'sees the bank alone',
  none: 'no ventilation',
  natural: 'natural ventilation',
});

/** One row of the table of devices, as a person reads it. */
export interface DeviceWords {
  device: string;
  met: string;
  need: string;
  fitted: string;
  state: string;
  basis: string;
}

/**
 * The table of devices in words.
 * @param outcome the plan or judgement, or as much of it as holds the devices
 * @returns one entry a row, in the engine's order
 */
export function deviceTable({ result }: { result: { devices: readonly DeviceRow[] } }): DeviceWords[] {
  const groups = new Set(result.devices.flatMap(({ group }) => (group === null ? [] : [group])));
  return result.devices.map((row) => deviceWords(row, groups.size > 1));
}

function deviceWords(row: DeviceRow, severalGroups: boolean): DeviceWords {
  const { device, met, need } = WORDS[row.device];
  const group = row.group === null || !severalGroups ? '' : say`, group\u00a0${row.group + 1}`;
  return {
    device: `${device}${group}`,
    met: filled(met, row),
    need: filled(need, row),
    fitted: row.fitted === null ? (row.state === 'noted' ? '–' : say`not entered`) : shown(row.fitted, row.unit),
    state: DEVICE_STATE_WORDS[row.state],
    basis: row.source === 'practice' ? say`common practice` : engineName(row.source),
  };
}

/**
 * What a device is called in a sentence.
 * @param device its name in the engine
 * @returns small letters
 */
export function deviceName(device: string): string {
  return WORDS[device as DeviceName]?.device ?? device;
}

/**
 * A word that was entered, as a person reads it.
 * @param value as the engine has it
 * @returns the word; itself where the table holds none
 */
export function enteredWords(value: string): string {
  return ENTERED[value] ?? engineName(value);
}

const OWN_UNITS: Partial<Record<DeviceName, { value: string }>> = {
  'discharge.resistor': { value: '' },
  'cabinet.airFlow': { value: 'K' },
};

function filled(template: string, row: DeviceRow): string {
  const part = (name: 'value' | 'least' | 'most'): string | null => {
    const value = row[name];
    if (value === null) return null;
    const unit = name === 'value' ? (OWN_UNITS[row.device]?.value ?? row.unit) : row.unit;
    return shown(value, unit);
  };
  const chosen = template.replace(/\[([^\]]*)\]/g, (_, optional: string) =>
    [...optional.matchAll(/\{(\w+)\}/g)].every(([, name]) => part(name as 'value') !== null) ? optional : '',
  );
  return chosen.replace(/\{(\w+)\}/g, (_, name: string) => part(name as 'value') ?? '–');
}

function shown(value: number | string, unit: string): string {
  if (typeof value === 'string') return enteredWords(value);
  return unit === '' ? formatNumber(value) : formatQuantity(value, unit);
}

/**
 * How many devices were not entered.
 * @param rows all devices
 * @returns count of open rows
 */
export function openDevices(rows: readonly DeviceRow[]): number {
  return rows.filter(({ state }) => state === 'open').length;
}
