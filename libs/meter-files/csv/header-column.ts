import type { MeterColumn } from '#libs/contract/meter-map.js';
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
  /** a single phase */
  phase: boolean;
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
  const role = roleOf(words, unit);
  const measured = role !== null && role !== 'time' && role !== 'standby';
  return {
    index,
    name,
    unit,
    foreignUnit: misread || (measured && unit === null && hasForeignUnit(name)),
    role,
    mark: role === 'time' ? markOf(words) : null,
    zone: role === 'time' ? zoneOf(name) : null,
    extreme: says(words, 'extreme'),
    phase: says(words, 'phase') || /\b(?:phase|l)[ _-]?[123abc]\b/i.test(rest),
    reactiveInWatt: unit?.family === 'active' && isReactiveRole(role),
  };
}

/** A short bracket that holds none of the trade's words, such as [MJ] or (hp), is a unit that is not read. */
function hasForeignUnit(name: string): boolean {
  const brackets = [...name.matchAll(/[([{<]\s*([\p{L}%°µ/²³]{1,6})\s*[)\]}>]/gu)];
  return brackets.some(([, content]) => !areKnown(wordsOf(content!)) || wordsOf(content!).length === 0);
}

function isReactiveRole(role: MeterColumn | null): boolean {
  return role === 'reactive' || role === 'lagging' || role === 'leading';
}

/** P+, P−, Q+, Q− (also A and R) name the direction by their sign. */
function signWords(rest: string): string[] {
  const sign = /(?:^|[\s_(])([paqr])\s?([+−-])(?=$|[\s_)])/i.exec(rest);
  if (sign === null) return [];
  const reactive = /[qr]/i.test(sign[1]!);
  const plus = sign[2] === '+';
  if (reactive) return ['reactive', plus ? 'lagging' : 'leading'];
  return ['active', plus ? 'import' : 'export'];
}

function roleOf(words: string[], unit: ReadUnit | null): MeterColumn | null {
  if (says(words, 'ratio') || says(words, 'distortion')) return null;
  switch (unit?.family) {
    case 'active':
      return says(words, 'reactive') ? reactiveRole(words) : activeRole(words);
    case 'reactive':
      return isBank(words) ? 'connected' : reactiveRole(words);
    case 'apparent':
      // kVAr is sometimes written kVA with the word reactive before it
      return says(words, 'reactive') ? reactiveRole(words) : null;
    case 'voltage':
      return 'voltage';
    case 'current':
      return null;
    default:
      return roleWithoutUnit(words);
  }
}

function roleWithoutUnit(words: string[]): MeterColumn | null {
  if (says(words, 'other')) return null;
  if (says(words, 'standby')) return 'standby';
  if (says(words, 'reactive') || says(words, 'lagging') || says(words, 'leading'))
    return isBank(words) ? 'connected' : reactiveRole(words);
  const quantity = says(words, 'active') && !says(words, 'apparent');
  if (says(words, 'time') && !quantity) return 'time';
  if (says(words, 'voltage')) return 'voltage';
  return quantity ? activeRole(words) : null;
}

function activeRole(words: string[]): MeterColumn | null {
  if (says(words, 'other') || says(words, 'cumulative')) return null;
  if (says(words, 'apparent') && !says(words, 'active')) return null;
  return says(words, 'exported') && !says(words, 'imported') ? 'exported' : 'active';
}

function reactiveRole(words: string[]): MeterColumn | null {
  if (says(words, 'other') || says(words, 'cumulative')) return null;
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
