import { words } from './language.js';

/** What the engine and the readers call by a name of their own: duties, quantities, sources, and values of a remark. */
const NAMES: Readonly<Record<string, string>> = words({
  'capacitor voltage, continuous': 'capacitor voltage, continuous',
  'capacitor voltage, highest': 'capacitor voltage, highest',
  'capacitor voltage, crest': 'capacitor voltage, crest',
  'capacitor current': 'capacitor current',
  'capacitor reactive power': 'capacitor reactive power',
  discharge: 'discharge',
  'inrush current': 'inrush current',
  'inrush current, exact': 'inrush current, exact',
  'voltage distortion': 'voltage distortion',
  'harmonic voltage': 'harmonic voltage',
  'harmonic voltage at the primary': 'harmonic voltage at the primary',
  'current distortion': 'current distortion',
  'harmonic current': 'harmonic current',
  'fault level': 'fault level',
  load: 'load',
  background: 'background',
  capacitance: 'capacitance',
  costs: 'costs',
  tariff: 'tariff',
  stages: 'stages',
  voltage: 'voltage',
  current: 'current',
  mean: 'mean',
  base: 'base',
  peak: 'peak',
  full: 'full',
  usable: 'usable',
  limited: 'limited',
  insufficient: 'insufficient',
  least: 'least',
  greatest: 'greatest',
  first: 'first',
  last: 'last',
  bills: 'bills',
  equipment: 'equipment',
  'bills and equipment': 'bills and equipment',
  derived: 'derived',
  site: 'site',
  'annuity tables': 'annuity tables',
  'method, bank': 'method, bank',
  'method, controller': 'method, controller',
  'method, network': 'method, network',
  'method, network, damping left out': 'method, network, damping left out',
  'method, network, the strongest standing': 'method, network, the strongest standing',
  'method, operation': 'method, operation',
  'method, requirement': 'method, requirement',
  'method, requirement, meter at the primary': 'method, requirement, meter at the primary',
  'method, estimate': 'method, estimate',
  'method, money': 'method, money',
  'method-ageing': 'method-ageing',
  'IEC 60909-0, no voltage factor': 'IEC 60909-0, no voltage factor',
  'derived: zero-sequence currents add in the neutral': 'derived: zero-sequence currents add in the neutral',
  'closed form after IEEE C37.99, an estimate': 'closed form after IEEE C37.99, an estimate',
});

/**
 * A name that the engine or a reader gives, in the language in force.
 * @param name as it was given
 * @returns the name itself where it is a standard’s, a user’s or none of the table
 */
export function engineName(name: string): string {
  return NAMES[name] ?? name;
}
