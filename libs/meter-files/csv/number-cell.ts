import { decodeText } from './row-cells.js';

/**
 * What the writing of a number says about the decimal mark of its file.
 * `openDot` and `openComma` are numbers such as 1.234 and 1,234, in which the mark may divide thousands as well.
 */
export type NumberForm = 'missing' | 'plain' | 'dot' | 'comma' | 'openDot' | 'openComma' | 'wrong';

/** A cell read as a number; reused from cell to cell. */
export interface NumberCell {
  form: NumberForm;
  /** the number, an open mark taken as decimal mark */
  value: number;
}

const MINUS = 0x2d;
const PLUS = 0x2b;
const DOT = 0x2e;
const COMMA = 0x2c;
const SPACE = 0x20;
/** More than any double needs to be written out in full. */
const LONGEST_NUMBER = 1100;
/** Up to 15 digits are exact in a double, and so is a power of ten up to 22: one division rounds once, correctly. */
const EXACT_DIGITS = 15;
export const TENTHS: Float64Array = Float64Array.from({ length: 23 }, (_, power) => 10 ** power);

/**
 * Reads the number in a cell, correctly rounded.
 * @param bytes buffer the cell lies in
 * @param from first byte of the cell
 * @param to byte behind the cell
 * @param cell takes the result
 */
// biome-ignore lint/complexity/noExcessiveCognitiveComplexity: a kernel, run for every cell of a file
export function readNumberInto(bytes: Uint8Array, from: number, to: number, cell: NumberCell): void {
  let at = from;
  let end = to;
  if (to - from > LONGEST_NUMBER) {
    cell.form = 'wrong';
    cell.value = Number.NaN;
    return;
  }
  while (at < end && bytes[at] === SPACE) at++;
  while (end > at && bytes[end - 1] === SPACE) end--;
  const negative = bytes[at] === MINUS;
  const first = negative || bytes[at] === PLUS ? at + 1 : at;
  let digits = 0;
  let mark = -1;
  for (at = first; at < end; at++) {
    const byte = bytes[at]!;
    const digit = byte - 0x30;
    if (digit >= 0 && digit <= 9) digits = digits * 10 + digit;
    else if (mark < 0 && (byte === DOT || byte === COMMA)) mark = at;
    else break;
  }
  const count = end - first - (mark < 0 ? 0 : 1);
  if (at < end || count < 1 || count > EXACT_DIGITS) {
    readNumberText(decodeText(bytes.subarray(from, to)), cell);
    return;
  }
  const decimals = mark < 0 ? 0 : end - mark - 1;
  const size = decimals === 0 ? digits : digits / TENTHS[decimals]!;
  // a negative zero is a zero
  cell.value = negative && size !== 0 ? -size : size;
  if (mark < 0) cell.form = 'plain';
  else if (isOpen(mark - first, decimals, bytes[first] === 0x30))
    cell.form = bytes[mark] === DOT ? 'openDot' : 'openComma';
  else cell.form = bytes[mark] === DOT ? 'dot' : 'comma';
}

/** Three digits behind the only mark, one to three before it, no leading zero: thousands or a decimal fraction. */
function isOpen(before: number, after: number, leadingZero: boolean): boolean {
  return after === 3 && before >= 1 && before <= 3 && !leadingZero;
}

const MISSING = new Set(
  '|-|--|---|?|*|#|.|na|n/a|n.a.|n.a|nan|null|nil|none|missing|#n/a|#na|<na>|no data|nodata|fehlt|k.a.|s/o|nd|n.d.'.split(
    '|',
  ),
);
const GROUPED_BY_BLANKS = /^(\d{1,3})((?:[ '’\u00a0\u2009\u202f]\d{3})+)(?=[.,]|$)/;
const GROUPED_BY_DOTS = /^\d{1,3}(?:\.\d{3}){2,}$|^\d{1,3}(?:\.\d{3})+,\d*$/;
const GROUPED_BY_COMMAS = /^\d{1,3}(?:,\d{3}){2,}$|^\d{1,3}(?:,\d{3})+\.\d*$/;
const ONE_MARK = /^(\d*)([.,])(\d*)$/;
const EXPONENT = /^(?:\d+(?:[.,]\d*)?|[.,]\d+)e[+-]?\d{1,6}$/i;

/**
 * Reads a number from text: groups of thousands, exponents, a real minus sign, and the words for a missing value.
 * @param text the cell
 * @param cell takes the result
 */
export function readNumberText(text: string, cell: NumberCell): void {
  const bare = text.trim();
  cell.value = Number.NaN;
  if (bare.length > LONGEST_NUMBER) {
    cell.form = 'wrong';
    return;
  }
  if (MISSING.has(bare.toLowerCase())) {
    cell.form = 'missing';
    return;
  }
  const sign = /^[-+−]/.exec(bare)?.[0] ?? '';
  const size = bare.slice(sign.length).replace(GROUPED_BY_BLANKS, (_, first: string, groups: string) => {
    return first + groups.replace(/\D/g, '');
  });
  cell.form = /\d/.test(size) ? formOf(size) : 'wrong';
  if (cell.form === 'wrong') return;
  const value = Number(asDecimal(size, cell.form));
  if (!Number.isFinite(value)) cell.form = 'wrong';
  else cell.value = (sign === '-' || sign === '−') && value !== 0 ? -value : value;
}

function formOf(size: string): NumberForm {
  if (/^\d+$/.test(size)) return 'plain';
  const mark = ONE_MARK.exec(size);
  if (mark !== null) return markedForm(mark[1]!, mark[2]!, mark[3]!);
  if (EXPONENT.test(size)) return size.includes(',') ? 'comma' : size.includes('.') ? 'dot' : 'plain';
  if (GROUPED_BY_DOTS.test(size)) return 'comma';
  return GROUPED_BY_COMMAS.test(size) ? 'dot' : 'wrong';
}

function markedForm(before: string, mark: string, after: string): NumberForm {
  const open = isOpen(before.length, after.length, before.startsWith('0'));
  if (mark === '.') return open ? 'openDot' : 'dot';
  return open ? 'openComma' : 'comma';
}

/** Groups taken away and the decimal mark turned into a dot. */
function asDecimal(size: string, form: NumberForm): string {
  if (form === 'dot') return size.replaceAll(',', '');
  if (form === 'comma') return size.replaceAll('.', '').replace(',', '.');
  return size.replace(',', '.');
}
