import { shown } from '#libs/contract/shown.js';
import type { RowProblems } from '../row-problems.js';
import type { XmlElement } from './walk-xml.js';

/** More digits than any meter writes. */
const LONGEST = 60;
const DECIMAL = /^[-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d{1,3})?$/;
const WHOLE = /^[-+]?\d+$/;

/**
 * Reads the number in an element, correctly rounded.
 * @param element with its text
 * @param problems takes the refusal
 * @returns the number, NaN where the element is empty or refused
 */
export function readDecimal(element: XmlElement, problems: RowProblems): number {
  const { text, row, column } = element;
  if (text === '') return Number.NaN;
  const value = text.length <= LONGEST && DECIMAL.test(text) ? Number(text) : Number.NaN;
  // a negative zero is a zero
  if (Number.isFinite(value)) return value + 0;
  problems.add({ code: 'bad-number', row, column, expected: 'a number with a decimal point', found: shown(text) });
  return Number.NaN;
}

/**
 * Reads the whole number in an element.
 * @param element with its text
 * @param range least and greatest, both included
 * @param problems takes the refusal
 * @returns the number, NaN where the element is empty or refused
 */
export function readWhole(element: XmlElement, range: { min: number; max: number }, problems: RowProblems): number {
  const { name, text, row, column } = element;
  if (text === '') return Number.NaN;
  const value = text.length <= LONGEST && WHOLE.test(text) ? Number(text) : Number.NaN;
  if (value >= range.min && value <= range.max) return value + 0;
  const code = Number.isNaN(value) ? 'bad-number' : 'out-of-range';
  const expected = `${name} as a whole number from ${range.min} to ${range.max}`;
  problems.add({ code, row, column, expected, found: shown(text) });
  return Number.NaN;
}
