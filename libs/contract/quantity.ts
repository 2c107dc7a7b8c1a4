/** Spellings of a unit without its prefix, and what they measure. */
const BASE_UNITS: Record<string, string> = {
  V: 'V',
  A: 'A',
  W: 'W',
  var: 'var',
  VAr: 'var',
  VAR: 'var',
  VA: 'VA',
  '\u03a9': 'ohm', // Greek capital omega
  '\u2126': 'ohm', // ohm sign
  ohm: 'ohm',
  F: 'F',
  H: 'H',
  Hz: 'Hz',
  s: 's',
  Wh: 'Wh',
  varh: 'varh',
  VArh: 'varh',
  VAh: 'VAh',
  m: 'm',
};

/** Units that take no prefix: what they measure, and their size in it. */
const WHOLE_UNITS: Record<string, { dimension: string; factor: number }> = {
  '%': { dimension: '%', factor: 1 },
  min: { dimension: 's', factor: 60 },
  h: { dimension: 's', factor: 3600 },
  // mechanical horsepower, 550 ft·lbf/s
  hp: { dimension: 'W', factor: 745.699_871_582_270_2 },
  '\u00b0C': { dimension: '\u00b0C', factor: 1 },
  K: { dimension: 'K', factor: 1 },
  mm2: { dimension: 'mm2', factor: 1 },
  'mm\u00b2': { dimension: 'mm2', factor: 1 },
  kcmil: { dimension: 'mm2', factor: 0.506_707_479_097_497_7 },
  MCM: { dimension: 'mm2', factor: 0.506_707_479_097_497_7 },
  ft: { dimension: 'm', factor: 0.3048 },
  kft: { dimension: 'm', factor: 304.8 },
  'm3/h': { dimension: 'm3/h', factor: 1 },
  'm\u00b3/h': { dimension: 'm3/h', factor: 1 },
};

/** Powers of ten; the micro sign and the Greek mu are two characters. */
const PREFIXES: Record<string, number> = {
  p: -12,
  n: -9,
  u: -6,
  '\u00b5': -6, // micro sign
  '\u03bc': -6, // Greek small mu
  m: -3,
  k: 3,
  M: 6,
  G: 9,
};

/** Last words of names that stand for a unit, longest first where one ends another. */
const UNITS_OF_NAMES: [suffix: string, unit: string][] = [
  ['OhmPerKm', 'ohm/km'],
  ['M3PerH', 'm3/h'],
  ['Mm2', 'mm\u00b2'],
  ['Kvarh', 'kvarh'],
  ['Kvah', 'kVAh'],
  ['Kwh', 'kWh'],
  ['Kvar', 'kvar'],
  ['Kva', 'kVA'],
  ['Mva', 'MVA'],
  ['Kw', 'kW'],
  ['Ohm', 'ohm'],
  ['Pct', '%'],
  ['Hz', 'Hz'],
  ['Uf', '\u00b5F'],
  ['Uh', '\u00b5H'],
  ['Mh', 'mH'],
  ['V', 'V'],
  ['A', 'A'],
  ['S', 's'],
  ['W', 'W'],
  ['Ka', 'kA'],
  ['Kv', 'kV'],
  ['C', '\u00b0C'],
  ['K', 'K'],
  ['M', 'm'],
];

const LONGEST_TEXT = 80;
const NUMBER_AND_UNIT = /^([+-]?(?:\d+\.?\d*|\.\d+))(?:e([+-]?\d{1,3}))?\s*(.*)$/i;

/** Why a text is no quantity: `unit` means the number is sound but the unit is missing, unknown or of another dimension. */
export type QuantityFault = 'number' | 'no-unit' | 'unknown-unit' | 'other-dimension';

/** A text read as a quantity, or the reason it isn't one. */
export type QuantityReading = { value: number } | { fault: QuantityFault };

/**
 * The unit a name ends in: `ratedKva` is in kVA, `kvar` in kvar.
 * @param name a name of the site file
 * @returns the unit's spelling, or null where the name ends in none
 */
export function unitOfName(name: string): string | null {
  for (const [suffix, unit] of UNITS_OF_NAMES) {
    if (name.endsWith(suffix) && name.length > suffix.length) return unit;
    if (name === suffix.toLowerCase() && suffix.length > 1) return unit;
  }
  return null;
}

/**
 * Reads a number with a unit, such as "1.25 MVA", into another unit of the same dimension.
 * The prefix shifts the decimal point before the digits become a number, so that "1.005 MVA" is exactly 1005 kVA.
 * @param text digits with a decimal point, then a unit
 * @param unit the unit the value is wanted in, for example "kVA"
 * @returns the value in `unit`, or why there is none
 */
export function readQuantity(text: string, unit: string): QuantityReading {
  if (text.length > LONGEST_TEXT) return { fault: 'number' };
  const parts = NUMBER_AND_UNIT.exec(text.trim().replace('−', '-'));
  if (parts === null) return { fault: 'number' };
  const [, digits = '', exponent = '0', spelled = ''] = parts;
  if (spelled === '') return { fault: 'no-unit' };
  if (/^[\d.,]/.test(spelled)) return { fault: 'number' };
  const from = unitOf(spelled);
  const to = unitOf(unit);
  if (to === null) throw new Error(`no unit "${unit}" in the table of units`);
  if (from === null) return { fault: 'unknown-unit' };
  if (from.dimension !== to.dimension) return { fault: 'other-dimension' };
  const shifted = Number(`${digits}e${Number(exponent) + from.power - to.power}`);
  return { value: (shifted * from.factor) / to.factor };
}

interface Unit {
  dimension: string;
  /** decimal prefix as a power of ten */
  power: number;
  factor: number;
}

function unitOf(spelled: string): Unit | null {
  const whole = own(WHOLE_UNITS, spelled);
  if (whole !== undefined) return { ...whole, power: 0 };
  const plain = own(BASE_UNITS, spelled);
  if (plain !== undefined) return { dimension: plain, power: 0, factor: 1 };
  const power = own(PREFIXES, spelled.slice(0, 1));
  const dimension = own(BASE_UNITS, spelled.slice(1));
  if (power !== undefined && dimension !== undefined) return { dimension, power, factor: 1 };
  return unitOfRatio(spelled);
}

/** "ohm/km": one unit for another, each with its own prefix. */
function unitOfRatio(spelled: string): Unit | null {
  const [top, bottom, more] = spelled.split('/');
  if (top === undefined || bottom === undefined || more !== undefined) return null;
  const [over, under] = [unitOf(top), unitOf(bottom)];
  if (over === null || under === null) return null;
  return {
    dimension: `${over.dimension}/${under.dimension}`,
    power: over.power - under.power,
    factor: over.factor / under.factor,
  };
}

/** A table's own entry: "constructor" is in no table of ours. */
function own<T>(table: Record<string, T>, key: string): T | undefined {
  return Object.hasOwn(table, key) ? table[key] : undefined;
}
