import { say, spokenCatalogue } from './language.js';

/** U+00A0: the gap between thousands and between a number and its unit; never a place to break a line. */
export const GAP = '\u00a0';
/** U+2212 */
export const MINUS = '\u2212';

/** A decimal mark that readers know; thousands are apart by a gap in either case, so that no number reads two ways. */
export type DecimalMark = '.' | ',';

let pageMark: DecimalMark = '.';

/**
 * Chooses the decimal mark of everything printed from here on. A page does so once, before it shows anything; paper,
 * terminal and files keep the point.
 * @param mark the reader's
 */
export function setDecimalMark(mark: DecimalMark): void {
  pageMark = mark;
}

/** The mark of the language in force; without one the page's. */
function decimalMark(): DecimalMark {
  return spokenCatalogue()?.decimalMark ?? pageMark;
}

/**
 * A sentence that was put in words elsewhere, with the reader's decimal mark in its numbers.
 * @param text printed with points
 */
export function inShownMark(text: string): string {
  const mark = decimalMark();
  return mark === '.' ? text : text.replace(/(?<![\d.])(\d+(?:\u00a0\d{3})*)\.(?=\d+(?![\d.]))/g, `$1${mark}`);
}

/**
 * A shown text with points for decimal marks again: for a file, or for arithmetic.
 * @param text printed here
 */
export function inPoints(text: string): string {
  return decimalMark() === '.' ? text : text.replace(/(?<=\d),(?=\d)/g, '.');
}

/**
 * A formula, or a working with its values, as a paper prints it: with the language's decimal mark, and a semicolon
 * between arguments where that mark is the comma.
 * @param text arithmetic with points
 */
export function printedArithmetic(text: string): string {
  return decimalMark() === '.' ? text : inShownMark(text.replaceAll(', ', '; '));
}

/** Digits a computed number is printed with; never fewer than its whole units. */
const COMPUTED_DIGITS = 3;
/** Digits of a number in a working, enough that the printed arithmetic gives the printed answer. */
const WORKING_DIGITS = 9;
/** Digits of the answer of a working. */
const ANSWER_DIGITS = 5;
/** A number as entered is printed in full up to here; beyond, it came from a conversion. */
const GIVEN_DIGITS = 6;
/** Smaller than this prints as 0: it is what rounding left of an exact zero. */
const LEAST = 5e-10;

/**
 * How many digits a number is printed with.
 * computed: three significant; given: as entered; working: nine significant, trailing zeros dropped; answer: five significant.
 */
export type Digits = 'computed' | 'given' | 'working' | 'answer' | 'whole';

/**
 * A number as a person reads it: thousands apart, a true minus, digits by what kind of number it is.
 * @param value any finite number
 * @param digits what kind of number it is
 * @returns text without a unit, free of plain spaces
 */
export function formatNumber(value: number, digits: Digits = 'computed'): string {
  if (!Number.isFinite(value)) throw new Error(`a number to print must be finite, got ${value}`);
  if (Math.abs(value) < LEAST) return '0';
  const size = Math.abs(value);
  const plain = plainDigits(size, digits);
  const text = grouped(plain);
  return value < 0 && /[1-9]/.test(text) ? `${MINUS}${text}` : text;
}

function plainDigits(size: number, digits: Digits): string {
  switch (digits) {
    case 'computed':
      return significant(size, COMPUTED_DIGITS);
    case 'answer':
      return significant(size, ANSWER_DIGITS);
    case 'given':
      return isShort(size) ? trimmed(significant(size, GIVEN_DIGITS)) : significant(size, COMPUTED_DIGITS);
    case 'working':
      return trimmed(significant(size, WORKING_DIGITS));
    case 'whole':
      return size.toFixed(0);
  }
}

/** True where six digits hold the number, so that printing them loses nothing. */
function isShort(size: number): boolean {
  return Math.abs(Number(size.toPrecision(GIVEN_DIGITS)) - size) <= 1e-9 * size;
}

function significant(size: number, digits: number): string {
  const magnitude = Math.floor(Math.log10(Number(size.toPrecision(digits))));
  const decimals = Math.min(Math.max(digits - 1 - magnitude, 0), 12);
  return size.toFixed(decimals);
}

function trimmed(text: string): string {
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text;
}

function grouped(plain: string): string {
  const [whole = '', fraction] = plain.split('.');
  const apart = whole.replace(/\B(?=(\d{3})+$)/g, GAP);
  return fraction === undefined ? apart : `${apart}${decimalMark()}${fraction}`;
}

/**
 * A number with its decimals fixed, as amounts of money stand under each other.
 * @param value any finite number
 * @param decimals how many, 0 for whole numbers
 * @returns "1 234.50", without a minus where all digits are 0
 */
export function formatFixed(value: number, decimals: number): string {
  if (!Number.isFinite(value)) throw new Error(`a number to print must be finite, got ${value}`);
  const text = grouped(Math.abs(value).toFixed(decimals));
  return value < 0 && /[1-9]/.test(text) ? `${MINUS}${text}` : text;
}

/**
 * A number with its unit, joined so that no line breaks between them.
 * @param value the number, or null where there is none
 * @param unit the unit, empty for a pure number
 * @param digits what kind of number it is
 * @returns "37.3 kvar", or an en dash for null
 */
export function formatQuantity(value: number | null, unit: string, digits: Digits = 'computed'): string {
  if (value === null) return '–';
  const number = formatNumber(value, digits);
  return unit === '' ? number : `${number}${GAP}${unit}`;
}

/**
 * A value beside its limit: takes more digits until the two read apart, so that a limit barely passed does not look met.
 * @param value what was found
 * @param limit what it is held against
 * @returns both numbers without their unit
 */
export function formatApart(value: number, limit: number): { value: string; limit: string } {
  const limitText = formatNumber(limit, 'given');
  const exact = Math.abs(value - limit) <= 1e-9 * Math.abs(limit);
  for (let digits = COMPUTED_DIGITS; digits <= WORKING_DIGITS; digits++) {
    const text = withDigits(value, digits);
    const shown = Number(Math.abs(value).toFixed(decimalsOf(text)));
    const shownLimit = Number(inPoints(limitText).replaceAll(GAP, '').replace(MINUS, '-'));
    if (exact || shown !== shownLimit) return { value: text, limit: limitText };
  }
  return { value: formatNumber(value, 'working'), limit: formatNumber(limit, 'working') };
}

function withDigits(value: number, digits: number): string {
  if (Math.abs(value) < LEAST) return '0';
  const text = grouped(significant(Math.abs(value), digits));
  return value < 0 ? `${MINUS}${text}` : text;
}

function decimalsOf(text: string): number {
  const at = text.indexOf(decimalMark());
  return at < 0 ? 0 : text.length - at - 1;
}

/**
 * A range of two like quantities: "180–250 MVA", or one number where both are equal.
 * @param low lower end
 * @param high upper end
 * @param unit their common unit
 * @param digits what kind of numbers they are
 * @returns text with an en dash
 */
export function formatRange(range: { low: number; high: number }, unit: string, digits: Digits = 'given'): string {
  const low = formatNumber(range.low, digits);
  const high = formatNumber(range.high, digits);
  return low === high ? joined(low, unit) : joined(`${low}–${high}`, unit);
}

function joined(number: string, unit: string): string {
  return unit === '' ? number : `${number}${GAP}${unit}`;
}

/**
 * A share of a limit for a narrow cell: whole per cents, with decimals where rounding would hide on which side of 100 it lies.
 * @param sharePct share of the limit [%]
 * @returns number without the sign
 */
export function formatShare(sharePct: number): string {
  if (Math.abs(sharePct - 100) >= 0.5) return formatNumber(sharePct, 'whole');
  return formatApart(sharePct, 100).value;
}

/** The unit a name ends in, by the last word of the name. */
const UNIT_OF_SUFFIX: Record<string, string> = {
  Kvar: 'kvar',
  Kvarh: 'kvarh',
  Kwh: 'kWh',
  Kw: 'kW',
  Kva: 'kVA',
  Mva: 'MVA',
  Pct: '%',
  Ohm: 'Ω',
  Hz: 'Hz',
  Uf: 'µF',
  Uh: 'µH',
  Mh: 'mH',
  Days: 'days',
  Ka: 'kA',
  Kv: 'kV',
  C: '°C',
  K: 'K',
  M: 'm',
  V: 'V',
  A: 'A',
  W: 'W',
  S: 's',
  H: '',
};

/**
 * The unit that stands as the last word of a name, as every name that crosses a boundary has it.
 * @param name for example `levelKvar`
 * @returns its unit, empty where the name carries none
 */
export function unitOfName(name: string): string {
  const lastWord = /[A-Z][a-z]*$/.exec(name)?.[0] ?? '';
  const unit = UNIT_OF_SUFFIX[lastWord] ?? '';
  return unit === 'days' ? say`days` : unit;
}
