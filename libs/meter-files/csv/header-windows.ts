import type { CsvView } from './csv-view.js';

const ZERO = 0x30;
const COLON = 0x3a;
/** dash, dot, slash */
const MARKS = new Set([0x2d, 0x2e, 0x2f]);

/** Lines before the first data that may hold names, units and blanks, and lines of data that are looked at. */
const LINES_BEFORE = 6;
const LINES_BEHIND = 30;
/** More places than this in one view are made to cost time. */
const MOST_WINDOWS = 40;
/** A date without marks has so many digits. */
const DATE_DIGITS = 8;

/**
 * The places of a view where data may begin: where a line that holds something like a date or a clock time follows one
 * that does not. Looks at bytes only, so that a preamble of any length costs next to nothing.
 * @param view whole lines of a file
 * @returns parts of the view around each such place
 */
export function* headerWindows(view: CsvView): Generator<CsvView> {
  const { bytes, end, rowEnd } = view;
  const starts: number[] = [];
  let wasDated = false;
  let line = 0;
  let found = 0;
  for (let at = view.start; at < end && found < MOST_WINDOWS; line++) {
    const next = bytes.indexOf(rowEnd, at) + 1;
    if (next === 0 || next > end) return;
    starts.push(at);
    if (starts.length > LINES_BEFORE + 1) starts.shift();
    const dated = isDatedLine(bytes, at, next);
    if (dated && !wasDated) {
      found++;
      const rowsBefore = view.rowsBefore + line + 1 - starts.length;
      yield { ...view, start: starts[0]!, end: linesBehind(view, next), rowsBefore };
    }
    wasDated = dated;
    at = next;
  }
}

function linesBehind({ bytes, end, rowEnd }: CsvView, from: number): number {
  let at = from;
  for (let lines = 0; lines < LINES_BEHIND; lines++) {
    const next = bytes.indexOf(rowEnd, at) + 1;
    if (next === 0 || next > end) return at;
    at = next;
  }
  return at;
}

/** A digit, a colon and two digits; one mark twice between three numbers; or eight digits in a row. */
function isDatedLine(bytes: Uint8Array, from: number, to: number): boolean {
  let digits = 0;
  let marked = 0;
  for (let at = from; at < to; at++) {
    if (isDigit(bytes[at])) {
      if (++digits >= DATE_DIGITS) return true;
      continue;
    }
    const mark = digits > 0 && isDigit(bytes[at + 1]) ? bytes[at]! : 0;
    if (mark === COLON && isDigit(bytes[at + 2])) return true;
    if (mark === marked && MARKS.has(mark)) return true;
    marked = mark;
    digits = 0;
  }
  return false;
}

function isDigit(byte: number | undefined): boolean {
  return byte !== undefined && byte >= ZERO && byte < ZERO + 10;
}
