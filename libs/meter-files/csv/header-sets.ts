import { type HeaderColumn, readHeaderColumn } from './header-column.js';
import { says, wordsOf } from './header-words.js';
import { findUnit } from './unit-text.js';

/**
 * Reads the names of a header together: some say what they mean beside each other only, such as P1, P2 and P3 (phases),
 * Q1 to Q4 (quadrants) or AE, which is export beside AI and import beside AS.
 * @param names cells of the header row, units of a second row behind them
 */
export function headerColumns(names: readonly string[]): HeaderColumn[] {
  const alone = names.map(readHeaderColumn);
  return withQuadrants(withDirections(withPhases(alone)));
}

const PHASES = ['123', 'abc', 'rst', 'uvw'];

/** Three names that differ in one sign only, which counts 1 to 3 or names the conductors; there is no fourth. */
function withPhases(header: HeaderColumn[]): HeaderColumn[] {
  const known = new Map(header.map((column) => [column.name.toLowerCase(), column]));
  const found = new Map<number, HeaderColumn>();
  for (const { name, index, phase } of header) {
    const signs = phase > 0 || found.has(index) ? [] : [...name].keys();
    for (const at of signs) for (const column of threeBeside(known, name, at)) found.set(column.index, column);
  }
  return header.map((column) => found.get(column.index) ?? column);
}

/** A column and the two whose names differ from its own in the sign at a place, as phases. */
function threeBeside(known: Map<string, HeaderColumn>, name: string, at: number): HeaderColumn[] {
  const signs = PHASES.find((all) => all.startsWith(name[at]!.toLowerCase()));
  if (signs === undefined || (signs === '123' && known.has(changed(name, at, '4')))) return [];
  const three = [...signs].map((sign) => known.get(changed(name, at, sign)));
  return three.every((column) => column !== undefined) ? phasesOf(three, at) : [];
}

function changed(name: string, at: number, sign: string): string {
  return `${name.slice(0, at)}${sign}${name.slice(at + 1)}`.toLowerCase();
}

/** Words that may stand beside the sign of a phase: of quantities, not of meters, feeders or tariffs. */
const QUANTITY_WORDS = [
  'active',
  'reactive',
  'apparent',
  'voltage',
  'current',
  'power',
  'powerFactor',
  'ratio',
  'lagging',
  'leading',
  'imported',
  'exported',
] as const;
const BESIDE_PHASE = /^(?:phase|ph|line|l|[uvi]|total|sum|avg|average|mean)$/;

/** The columns as phases; none where the names say anything but a quantity, or nothing of one. */
function phasesOf(three: readonly HeaderColumn[], at: number): HeaderColumn[] {
  const names = three.map(({ name }) => name);
  const stem = `${names[0]!.slice(0, at)}${names[0]!.slice(at + 1)}`;
  const stemmed = readHeaderColumn(stem, 0);
  const { role } = stemmed;
  if (role === null || ['time', 'meter', 'quality', 'standby', 'connected'].includes(role)) return [];
  const words = wordsOf(findUnit(stem).rest).filter((word) => !BESIDE_PHASE.test(word));
  if (!words.every((word) => QUANTITY_WORDS.some((group) => says([word], group)))) return [];
  // “Power 1” counts anything; P1, kW1 and “Power A” are the conductors
  const counted = /\d/.test(names[0]![at]!) && !/[\p{L}_]$/u.test(names[0]!.slice(0, at));
  const open = counted && three.every(({ role: own }) => own !== null);
  return three.map((column, k) => {
    const phase = (k + 1) as 1 | 2 | 3;
    const read = { ...stemmed, name: column.name, index: column.index, between: column.between ?? stemmed.between };
    return open ? { ...read, countedPhase: phase } : { ...read, phase };
  });
}

/** AI and AE, EA and ES, AE and AS: active energy one way and the other, by its first letters in French and Spanish. */
const DIRECTIONS = [
  ['ai', 'ae'],
  ['ae', 'as'],
] as const;

function withDirections(header: HeaderColumn[]): HeaderColumn[] {
  const first = header.map(({ name }) => wordsOf(findUnit(name).rest)[0] ?? '');
  const pair = DIRECTIONS.find((both) => both.every((word) => first.includes(word)));
  if (pair === undefined) return header;
  return header.map((column, index) => {
    const place = pair.indexOf(first[index] as never);
    if (place < 0 || (column.unit !== null && column.unit.family !== 'active')) return column;
    return { ...column, role: place === 0 ? 'active' : 'exported' };
  });
}

const NAMED = /(?:quadrant|cuadrante|cuadr|quad)[\s._-]*(?:q[\s._-]?)?(iv|i{1,3}|[1-4])(?![\p{L}\d])/iu;
const LETTERED = /(?<![\p{L}\d])[qr][\s._-]?(iv|i{1,3}|[1-4])(?![\p{L}\d])/iu;
const QUADRANTS = ['i', 'ii', 'iii', 'iv'];

/** Reactive energy a quadrant (IEC 62053-23): I and II lag, III and IV lead. Q1 to Q3 alone are three phases. */
function withQuadrants(header: HeaderColumn[]): HeaderColumn[] {
  const numbers = header.map(quadrantOf);
  const lettered = header.filter(({ name }, index) => numbers[index]! > 0 && !NAMED.test(name));
  const all = new Set(lettered.map(({ index }) => numbers[index]));
  const sure = lettered.length === 0 || all.has(4);
  if (!sure || numbers.every((number) => number === 0)) return header;
  return header.map((column, index) => {
    const quadrant = numbers[index]!;
    if (quadrant === 0) return column;
    return { ...column, quadrant, phase: 0, countedPhase: 0, role: quadrant <= 2 ? 'lagging' : 'leading' };
  });
}

function quadrantOf({ name, unit, role }: HeaderColumn): HeaderColumn['quadrant'] {
  const isReactive =
    unit?.family === 'reactive' || (unit === null && ['reactive', 'lagging', 'leading', null].includes(role));
  const found = isReactive ? (NAMED.exec(name) ?? LETTERED.exec(name)) : null;
  if (found === null) return 0;
  const sign = found[1]!.toLowerCase();
  return (/\d/.test(sign) ? Number(sign) : QUADRANTS.indexOf(sign) + 1) as HeaderColumn['quadrant'];
}
