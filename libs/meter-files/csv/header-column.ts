import type { MeterColumn, VoltageBetween } from '#libs/contract/meter-map.js';
import { obisQuantity } from '../obis/obis-quantity.js';
import { areKnown, says, wordsOf } from './header-words.js';
import { findUnit, type ReadUnit } from './unit-text.js';

/** What a column name says. */
export interface HeaderColumn {
  /** counted from 0 */
  index: number;
  name: string;
  unit: ReadUnit | null;
  /** the name holds a unit, and it is none that is read */
  foreignUnit: boolean;
  /** what the column holds, or null where the reader has no use for it */
  role: MeterColumn | null;
  /** which end of the interval a time column marks */
  mark: 'begin' | 'end' | null;
  /** zone a time column is said to be in */
  zone: string | null;
  /** a greatest or least value within the interval */
  extreme: boolean;
  /** 1, 2 or 3 of a column of one phase, 0 of any other */
  phase: 0 | 1 | 2 | 3;
  /** 1, 2 or 3 where a number may count phases or anything else, 0 of any other */
  countedPhase: 0 | 1 | 2 | 3;
  /** quadrant of reactive energy, 0 of any other */
  quadrant: 0 | 1 | 2 | 3 | 4;
  /** what the name says a voltage is measured between */
  between: VoltageBetween | null;
  /** the name says a register that only rises; `reading` is a word that may mean the interval too */
  register: 'said' | 'maybe' | null;
  /** reactive power whose unit is written kW or kWh */
  reactiveInWatt: boolean;
}

/**
 * Reads a column name.
 * @param name a cell of the header row
 * @param index its column, counted from 0
 */
export function readHeaderColumn(name: string, index: number): HeaderColumn {
  const found = findUnit(name);
  const words = [...wordsOf(found.rest), ...signWords(found.rest)];
  // “reactive energy (kv rh)” is no voltage
  const misread = (found.unit?.family === 'voltage' || found.unit?.family === 'current') && says(words, 'reactive');
  const unit = misread ? null : found.unit;
  const { rest } = found;
  const code = codeIn(name);
  const role = code === null ? roleOf(words, unit) : code.role;
  const measured = role !== null && !UNMEASURED.includes(role);
  return {
    index,
    name,
    unit,
    foreignUnit: misread || (measured && unit === null && hasForeignUnit(name)),
    role,
    mark: role === 'time' ? markOf(words) : null,
    zone: role === 'time' ? zoneOf(name) : null,
    extreme: says(wordsOf(rest.replace(/\d[\s_-]*min(?!\p{L})/giu, ' ')), 'extreme'),
    phase: phaseOf(rest),
    countedPhase: 0,
    quadrant: code?.quadrant ?? 0,
    between: role === 'voltage' ? betweenOf(rest) : null,
    register: registerOf(words, code?.cumulative === true),
    reactiveInWatt: unit?.family === 'active' && isReactiveRole(role),
  };
}

function registerOf(words: string[], coded: boolean): HeaderColumn['register'] {
  if (says(words, 'cumulative')) return 'said';
  return coded || says(words, 'reading') ? 'maybe' : null;
}

const CODE = /(?<![\d.:])(?:\d{1,3}-\d{1,3}:)?(\d{1,3})\.\d{1,3}\.\d{1,3}(?:[*&]\d{1,3})?(?![\d.:])/;

/** What an identification code (OBIS) in a name says; a rate or a greatest value of a total is no column of a record. */
function codeIn(name: string): (Pick<HeaderColumn, 'role' | 'quadrant'> & { cumulative: boolean }) | null {
  const [code, group] = CODE.exec(name) ?? [];
  if (code === undefined || Number(group) > 8) return null;
  const found = obisQuantity(code);
  if (found === null) return { role: null, quadrant: 0, cumulative: false };
  const quadrant = found.quadrant ? ((Number(group) - 4) as 1 | 2 | 3 | 4) : 0;
  return { role: found.quantity, quadrant, cumulative: found.cumulative };
}

const UNMEASURED: readonly MeterColumn[] = ['time', 'standby', 'powerFactor', 'meter', 'quality'];

/** L1 … L3, phase A … C and R, S, T; L1-L2 and the like lie between two phases. */
function phaseOf(rest: string): 0 | 1 | 2 | 3 {
  const mark = /(?<![\p{L}\d])(?:(?:phase|ph|phases?)[ _-]?([123abcrst])|l[ _-]?([123abc]))(?![\p{L}\d])/iu.exec(
    rest.replaceAll('_', ' '),
  );
  if (mark === null) return 0;
  const letter = (mark[1] ?? mark[2])!.toLowerCase();
  return (['1ar', '2bs', '3ct'].findIndex((same) => same.includes(letter)) + 1) as 1 | 2 | 3;
}

const LINE_TO_LINE =
  /\b(?:l\s?[-–]?\s?l|l[123]\s?[-–]?\s?l[123]|[vul]?(?:12|23|31)|v?(?:ab|bc|ca)|(?:line|phase)[ -](?:to[ -])?(?:line|phase)|verkettet|composee)\b/i;
const LINE_TO_NEUTRAL =
  /\b(?:l[123]?\s?[-–]?\s?n|[vu]?[123abc]n|(?:line|phase)[ -](?:to[ -])?neutral|sternspannung|strangspannung|simple)\b/i;

function betweenOf(rest: string): VoltageBetween | null {
  const plain = rest.replaceAll('_', ' ');
  const line = LINE_TO_LINE.test(plain);
  if (line === LINE_TO_NEUTRAL.test(plain)) return null;
  return line ? 'lineToLine' : 'lineToNeutral';
}

/** A short bracket that holds none of the trade's words, such as [MJ] or (hp), is a unit that is not read. */
function hasForeignUnit(name: string): boolean {
  const brackets = [...name.matchAll(/[([{<]\s*([\p{L}%°µ/²³]{1,6})\s*[)\]}>]/gu)];
  return brackets.some(([, content]) => !areKnown(wordsOf(content!)) || wordsOf(content!).length === 0);
}

function isReactiveRole(role: MeterColumn | null): boolean {
  return role === 'reactive' || role === 'lagging' || role === 'leading';
}

/** P+, P−, Q+, Q− (also A and R, EA and ER, and the sign before the letter) name the direction by their sign. */
function signWords(rest: string): string[] {
  const sign = /(?:^|[\s_(])(?:e?([paqr])\s?([+−-])|([+−-])\s?([paqr]))(?=$|[\s_)])/i.exec(rest);
  if (sign === null) return [];
  const reactive = /[qr]/i.test(sign[1] ?? sign[4]!);
  const plus = (sign[2] ?? sign[3]) === '+';
  if (reactive) return ['reactive', plus ? 'lagging' : 'leading'];
  return ['active', plus ? 'import' : 'export'];
}

function roleOf(words: string[], unit: ReadUnit | null): MeterColumn | null {
  if (says(words, 'distortion')) return null;
  if (says(words, 'ratio')) return unit === null && isPowerFactor(words) ? 'powerFactor' : null;
  switch (unit?.family) {
    case 'active':
      return says(words, 'reactive') ? reactiveRole(words) : activeRole(words);
    case 'reactive':
      return isBank(words) ? 'connected' : reactiveRole(words);
    case 'apparent':
      // kVAr is sometimes written kVA with the word reactive before it
      return says(words, 'reactive') ? reactiveRole(words) : apparentRole(words);
    case 'voltage':
      return 'voltage';
    case 'current':
      return 'current';
    default:
      return roleWithoutUnit(words);
  }
}

function roleWithoutUnit(words: string[]): MeterColumn | null {
  if (isMeterName(words)) return 'meter';
  if (says(words, 'quality')) return 'quality';
  if (says(words, 'other')) return null;
  if (says(words, 'standby')) return 'standby';
  if (says(words, 'reactive') || says(words, 'lagging') || says(words, 'leading'))
    return isBank(words) ? 'connected' : reactiveRole(words);
  const quantity = says(words, 'active') && !says(words, 'apparent');
  if (says(words, 'time') && !quantity) return 'time';
  if (says(words, 'voltage')) return 'voltage';
  if (quantity) return activeRole(words);
  if (says(words, 'apparentOnly')) return apparentRole(words);
  return says(words, 'current') ? 'current' : null;
}

/** Power factor, not load or diversity factor. */
function isPowerFactor(words: string[]): boolean {
  return !says(words, 'other') && (says(words, 'powerFactor') || says(words, 'power'));
}

function apparentRole(words: string[]): MeterColumn | null {
  return says(words, 'other') ? null : 'apparent';
}

function isMeterName(words: string[]): boolean {
  if (says(words, 'meterName')) return true;
  return says(words, 'meter') && (says(words, 'identity') || words.length === 1);
}

function activeRole(words: string[]): MeterColumn | null {
  if (says(words, 'other')) return null;
  if (says(words, 'apparent') && !says(words, 'active')) return null;
  return says(words, 'exported') && !says(words, 'imported') ? 'exported' : 'active';
}

function reactiveRole(words: string[]): MeterColumn | null {
  if (says(words, 'other')) return null;
  const lagging = says(words, 'lagging');
  const leading = says(words, 'leading');
  if (lagging !== leading) return lagging ? 'lagging' : 'leading';
  const imported = says(words, 'imported');
  const exported = says(words, 'exported');
  if (!lagging && imported !== exported) return imported ? 'lagging' : 'leading';
  return 'reactive';
}

/** A bank's own kvar; “reactive power after compensation” is the site's. */
function isBank(words: string[]): boolean {
  return (says(words, 'bank') || says(words, 'connected')) && !says(words, 'beside');
}

function markOf(words: string[]): 'begin' | 'end' | null {
  const begin = says(words, 'begin');
  const end = says(words, 'end');
  if (begin === end) return null;
  return begin ? 'begin' : 'end';
}

function zoneOf(name: string): string | null {
  const zone = /\b(?:utc|gmt)(?:\s?([+-]\d{1,2})(?::?(\d{2}))?)?(?![a-z])/i.exec(name.replaceAll('_', ' '));
  if (zone === null) return null;
  if (zone[1] === undefined) return 'UTC';
  const hours = zone[1].slice(1).padStart(2, '0');
  return `${zone[1][0]}${hours}:${zone[2] ?? '00'}`;
}
