import { engineName } from './engine-name.js';
import { fieldName } from './language.js';

/** Units that end a key of the site file or of a result, as they are printed; the longest first. */
const UNITS: readonly (readonly [ending: string, unit: string])[] = [
  ['PerKwh', 'per kWh'],
  ['PerUnit', 'per unit'],
  ['PerYear', 'a year'],
  ['PerDay', 'a day'],
  ['WPerKvar', 'W/kvar'],
  ['PerKvar', 'per kvar'],
  ['M3PerH', 'm³/h'],
  ['OhmPerKm', 'Ω/km'],
  ['Years', 'years'],
  ['Kvarh', 'kvarh'],
  ['Kvar', 'kvar'],
  ['Kwh', 'kWh'],
  ['Kva', 'kVA'],
  ['Mva', 'MVA'],
  ['Ohm', 'Ω'],
  ['Mm2', 'mm²'],
  ['Pct', '%'],
  ['Deg', '°'],
  ['Kw', 'kW'],
  ['Kv', 'kV'],
  ['Ka', 'kA'],
  ['Hz', 'Hz'],
  ['Uf', 'µF'],
  ['Uh', 'µH'],
  ['Mh', 'mH'],
  ['H', ''],
  ['V', 'V'],
  ['A', 'A'],
  ['S', 's'],
  ['W', 'W'],
  ['C', '°C'],
  ['K', 'K'],
  ['M', 'm'],
];

/** Steps whose words are not those of their key. */
const STEPS: Readonly<Record<string, string>> = {
  min: 'least',
  max: 'greatest',
  rOverX: 'R/X',
  xOverR: 'X/R',
  asOf: 'as of',
  npv: 'net present value',
  irrPct: 'internal rate (%)',
  kw: 'kW',
  pct: '%',
  emcClass: 'class of the bus',
  enclosureIp: 'enclosure, IP',
  interStageUh: 'between stages (µH)',
  kvaShare: 'share of kVA',
  kvarBasis: 'basis of kvar',
  sizeAwg: 'size, AWG',
  ambientMaxC: 'highest ambient (°C)',
  ambientDayC: 'ambient, mean of a day (°C)',
  ambientYearC: 'ambient, mean of a year (°C)',
};

/** What one entry of a list is called, where that is not the list's name without its s. */
const ENTRIES: Readonly<Record<string, string>> = {
  stages: 'group',
  buses: 'bus',
  classes: 'class',
  switches: 'switch',
};

/**
 * Where a field stands, in words.
 * @param path as in refusals: `bank.stages[0].ratedKvar`
 * @returns "bank, group 1, rated (kvar)"; entries are counted from 1
 */
export function pathWords(path: string): string {
  return path.split('.').map(stepWords).join(', ');
}

/** A field's path within a sentence, and the value it has where the sentence goes on with that. */
const NAMED_FIELD = /(?<!["\w./])([a-z]\w*(?:\[\d+\])?(?:\.[a-z]\w*(?:\[\d+\])?)+)(?:, (\d[\d\u00a0.]*))?(?!["\w/])/g;

/**
 * What a refusal asks for, with the fields it names in words.
 * @param expected "at most supply.faultLevelMva.max, 250"
 * @returns "at most 250, the “supply, fault level (MVA), greatest”"
 */
export function expectedWords(expected: string): string {
  return expected.replace(NAMED_FIELD, (_, path: string, value?: string) =>
    value === undefined ? `“${pathWords(path)}”` : `${value}, the “${pathWords(path)}”`,
  );
}

function stepWords(step: string): string {
  const key = step.replace(/\[.*$/, '');
  const places = [...step.matchAll(/\[(\d+)\]/g)].map(([, at]) => ` ${Number(at) + 1}`).join('');
  return places === '' ? keyWords(key) : `${entryWords(key)}${places}`;
}

function entryWords(list: string): string {
  const { said, unit } = takenApart(list);
  const entry = ENTRIES[list] ?? said.replace(/ies$/, 'y').replace(/([^s])s$/, '$1');
  return withUnit(entry, unit);
}

/**
 * A key in words, its unit in brackets.
 * @param key `reconnectDelayS`
 * @returns "reconnect delay (s)"
 */
export function keyWords(key: string): string {
  const { said, unit } = takenApart(key);
  return withUnit(said, unit);
}

function withUnit(said: string, unit: string): string {
  return unit === '' ? fieldName(said) : `${fieldName(said)} (${fieldName(unit)})`;
}

function takenApart(key: string): { said: string; unit: string } {
  if (STEPS[key] !== undefined) {
    const [, said = STEPS[key], unit = ''] = /^(.+) \((.+)\)$/.exec(STEPS[key]) ?? [];
    return { said, unit };
  }
  const ending = UNITS.find(([end]) => key.endsWith(end) && key.length > end.length);
  const bare = ending === undefined ? key : key.slice(0, -ending[0].length);
  return { said: spaced(bare), unit: ending?.[1] ?? '' };
}

function spaced(key: string): string {
  return key.replace(/([a-z\d])([A-Z])/g, '$1 $2').toLowerCase();
}

/**
 * A code that stands as a field's value, in words.
 * @param code `nearestLevel`; other texts, names that somebody gave among them, stay as they are
 * @returns "nearest level"
 */
export function codeWords(code: string): string {
  const said = /^[a-z]+(?:[A-Z][a-z]+)*(?:-[a-z]+)*$/.test(code) ? spaced(code).replaceAll('-', ' ') : code;
  const name = fieldName(said);
  return name === said ? engineName(said) : name;
}

/**
 * A value as it is compared: numbers with their digits, a part by its fields in words.
 * @param value of a JSON document; undefined where there is none
 * @param shown how a single value is printed
 * @returns one line
 */
export function partWords(value: unknown, shown: (leaf: unknown) => string): string {
  if (value === null || typeof value !== 'object') return shown(value);
  if (Array.isArray(value)) return value.map((entry) => partWords(entry, shown)).join('; ');
  return Object.entries(value)
    .filter(([, entry]) => entry !== undefined)
    .map(([key, entry]) => `${keyWords(key)} ${partWords(entry, shown)}`)
    .join(', ');
}
