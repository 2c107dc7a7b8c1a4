/** Devices of a bank, each with the quality it is held against. */
export const DEVICE_NAMES = [
  'capacitor.voltage',
  'capacitor.crest',
  'capacitor.current',
  'capacitor.kvar',
  'capacitor.overvoltage',
  'capacitor.ambient',
  'capacitor.altitude',
  'capacitor.connection',
  'reactor.current',
  'reactor.linearity',
  'switch.kvar',
  'switch.peak',
  'fuse.rating',
  'discharge.resistor',
  'discharge.delay',
  'stage.voltageChange',
  'stage.ripple',
  'mainDevice.rating',
  'mainDevice.setting',
  'mainDevice.instantaneous',
  'mainDevice.breaking',
  'busbar.withstand',
  'busbar.shortTime',
  'conductor.rating',
  'protection.earthFault',
  'protection.overTemperature',
  'protection.overPressure',
  'protection.undervoltage',
  'cabinet.heat',
  'cabinet.airFlow',
  'cabinet.enclosure',
  'currentTransformer.place',
  'currentTransformer.response',
  'generator.holdOff',
] as const;

export type DeviceName = (typeof DEVICE_NAMES)[number];

/** How a device stands: `noted` where the number is for the reader and nothing is fitted against it. */
export type DeviceState = 'fits' | 'short' | 'open' | 'noted';

/** What a requirement rests on. */
export type DeviceBasis = 'standard' | 'practice' | 'derived' | 'site';

/** One device: what it meets, what rating that asks for, and what the site has. */
export interface DeviceRow {
  device: DeviceName;
  /** entry of `bank.stages`, null for the bank as a whole */
  group: number | null;
  /** what it meets, in `unit` */
  value: number | string | null;
  /** rating it needs: from and to, in `unit` */
  least: number | string | null;
  most: number | string | null;
  unit: string;
  /** what the site has; null where not entered */
  fitted: number | string | null;
  state: DeviceState;
  basis: DeviceBasis;
  source: string;
}

/** What a row is made from; absent parts are null. */
export type DeviceParts = Pick<DeviceRow, 'device' | 'basis' | 'source'> & Partial<DeviceRow>;

/**
 * A row with its state worked out: open where nothing is fitted, short where the fitted number leaves its range.
 * @param parts device, basis, source and whatever is known
 * @returns the row
 */
export function deviceRow(parts: DeviceParts): DeviceRow {
  const row = { group: null, value: null, least: null, most: null, unit: '', fitted: null, ...parts };
  return { ...row, state: parts.state ?? stateOf(row) };
}

function stateOf({ least, most, fitted }: Pick<DeviceRow, 'least' | 'most' | 'fitted'>): DeviceState {
  if (fitted === null) return 'open';
  if (typeof fitted === 'string') return fitted === 'no' ? 'short' : 'fits';
  const within =
    !(typeof least === 'number' && fitted < least * (1 - 1e-9)) &&
    !(typeof most === 'number' && fitted > most * (1 + 1e-9));
  return within ? 'fits' : 'short';
}

/**
 * A yes, a no, or nothing entered.
 * @param fitted true, false or absent
 * @returns "yes", "no" or null
 */
export function yesOrNo(fitted: boolean | undefined): 'yes' | 'no' | null {
  return fitted === undefined ? null : fitted ? 'yes' : 'no';
}

/** Rows whose shortfall the duties have judged already. */
const JUDGED_BY_DUTIES: readonly DeviceName[] = [
  'capacitor.voltage',
  'capacitor.crest',
  'capacitor.current',
  'capacitor.kvar',
  'reactor.current',
  'switch.peak',
  'discharge.resistor',
  'discharge.delay',
];

/**
 * Devices that fall short and are judged nowhere else.
 * @param rows all devices
 * @returns the rows that count in the verdict: `avoid` where the basis is a standard or derived, else `watch`
 * @source method-devices
 */
export function shortDevices(rows: readonly DeviceRow[]): DeviceRow[] {
  return rows.filter(({ device, state }) => state === 'short' && !JUDGED_BY_DUTIES.includes(device));
}

/**
 * Does a short device rule the bank out, or ask for a second look.
 * @param row a short device
 * @returns `avoid` or `watch`
 * @source method-devices
 */
export function shortVerdict({ basis }: DeviceRow): 'watch' | 'avoid' {
  return basis === 'standard' || basis === 'derived' ? 'avoid' : 'watch';
}
