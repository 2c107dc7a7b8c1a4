import { MAX_INTERVALS } from '../meter-format.js';
import type { StampedRows } from '../time/stamped-rows.js';
import type { DecimalSign } from './decimal-mark.js';
import { TENTHS } from './number-cell.js';
import type { RowBuffer } from './row-buffer.js';
import type { RowCells } from './row-cells.js';

/** What is done with a column behind the stamps; from NUMBER on its number is kept in column `action − NUMBER` of the rows. */
const PASS = 0;
const NUMBER = 1;

const LF = 0x0a;
const CR = 0x0d;
const QUOTE = 0x22;
const MINUS = 0x2d;
const ZERO = 0x30;
/** No byte has this value. */
const NO_BYTE = 0x100;
const DATE_BYTES = 10;
const MOST_DIGITS = 9;
/** Rows at a time: short turns let the engine change to better code soon after it has made it. */
const TURN_ROWS = 512;

const YEAR_FIRST = /^\d{4}[-/.]\d\d[-/.]\d\d[ T]\d\d:\d\d(:\d\d)?(?:Z|[+-]\d\d:?\d\d)?$/;
const YEAR_LAST = /^\d\d[-/.]\d\d[-/.]\d{4}[ T]\d\d:\d\d(:\d\d)?$/;

/** The stamp of the row before, as the form that the next has to have. */
class StampForm {
  readonly bytes: Uint8Array;
  /** length of date and clock, without what follows them */
  readonly length: number;
  readonly offsetS: number;
  /** where the year and the two other parts begin, and where the marks between them stand */
  readonly year: number;
  readonly first: number;
  readonly second: number;
  readonly oneMark: number;
  readonly otherMark: number;

  constructor(text: string, yearFirst: boolean, offsetS: number) {
    this.bytes = new TextEncoder().encode(text);
    this.length = text[16] === ':' ? 19 : 16;
    this.offsetS = offsetS;
    this.year = yearFirst ? 0 : 6;
    this.first = yearFirst ? 5 : 0;
    this.second = yearFirst ? 8 : 3;
    this.oneMark = yearFirst ? 4 : 2;
    this.otherMark = yearFirst ? 7 : 5;
  }
}

/** What the quick lane needs to know of a file. */
export interface QuickPlan {
  delimiter: number;
  /** number of columns */
  width: number;
  /** columns of the stamp, and of the interval's end right behind it or −1; counted from 0 */
  stamp: number;
  end: number;
  /** columns of numbers, all of them behind the stamps, in the order of the rows' values */
  columns: readonly number[];
}

/**
 * Reads rows of the usual shape straight from the bytes: one stamp in the form of the row before, bare numbers of at most
 * nine digits, nothing quoted, nothing missing. It stops before any other row and leaves that to the general reader.
 */
export class QuickRows {
  readonly #rows: StampedRows;
  readonly #plan: QuickPlan;
  readonly #actions: Int32Array;
  #form: StampForm | null = null;
  // the stamp read last
  #dateKey = 0;
  #clockS = 0;
  // its bytes up to the minute as numbers, those behind the minute, and what both are worth [s]
  #bytes0 = 0;
  #bytes4 = 0;
  #bytes8 = 0;
  #bytes12 = 0;
  #bytes16 = 0;
  #byte18 = 0;
  #hourS = 0;
  #secondS = 0;

  constructor(rows: StampedRows, plan: QuickPlan) {
    this.#rows = rows;
    this.#plan = plan;
    this.#actions = new Int32Array(plan.width).fill(PASS);
    plan.columns.forEach((column, k) => {
      this.#actions[column] = NUMBER + k;
    });
  }

  /**
   * Takes the form of stamps from the row that the general reader has added last.
   * @param cells the row
   */
  learn(cells: RowCells): void {
    const { stamp } = this.#plan;
    const text = cells.quoting[stamp] === 0 ? cells.text(stamp) : '';
    const yearFirst = YEAR_FIRST.test(text);
    this.#form = null;
    this.#bytes0 = 0;
    if (!yearFirst && !YEAR_LAST.test(text)) return;
    if (cells.to[stamp]! - cells.from[stamp]! !== text.length) return;
    this.#form = new StampForm(text, yearFirst, this.#rows.offsetS?.[this.#rows.count - 1] ?? 0);
  }

  /**
   * Reads rows from the buffer's start on and moves it behind the last one read.
   * @param buffer whole and broken rows
   * @param sign decimal mark, or null where numbers with a mark have to wait
   */
  takeFrom(buffer: RowBuffer, sign: DecimalSign | null): void {
    const form = this.#form;
    if (form === null || buffer.rowEnd !== LF || buffer.end === buffer.start) return;
    const { delimiter } = this.#plan;
    const markByte = sign === null || sign.charCodeAt(0) === delimiter ? NO_BYTE : sign.charCodeAt(0);
    const limit = buffer.bytes.lastIndexOf(LF, buffer.end - 1) + 1;
    const rows = this.#rows;
    while (buffer.start < limit) {
      if (rows.count === MAX_INTERVALS) return;
      if (rows.count === rows.rowNumber.length) rows.grow();
      if (!this.#takeTurn(buffer, form, limit, markByte)) return;
    }
  }

  /** Reads rows until the turn is over, and says so; or until one is not of the usual shape. */
  // biome-ignore lint/complexity/noExcessiveCognitiveComplexity: the kernel that every byte of a usual file runs through
  // biome-ignore lint/complexity/noExcessiveLinesPerFunction: the same
  #takeTurn(buffer: RowBuffer, form: StampForm, limit: number, markByte: number): boolean {
    const { delimiter, width, stamp, end } = this.#plan;
    const { bytes, view } = buffer;
    const actions = this.#actions;
    const { dateKey: dateKeys, clockS: clocks, rowNumber: rowNumbers, offsetS: offsets, values } = this.#rows;
    const { count } = this.#rows;
    const room = Math.min(rowNumbers.length, count + TURN_ROWS);
    const spanS = this.#rows.spanS;
    const stampBytes = form.bytes.length;
    const behindStamps = (end < 0 ? stamp : end) + 1;
    let at = buffer.start;
    let index = count;
    let rowNumber = buffer.rowsBefore;
    for (; index < room && at < limit; index++) {
      let to = at;
      let column = 0;
      for (; column < stamp; column++) {
        if (bytes[to] === QUOTE) break;
        while (bytes[to] !== delimiter && bytes[to] !== LF) to++;
        if (bytes[to] !== delimiter) break;
        to++;
      }
      if (column < stamp || to + stampBytes > limit) break;
      if (!this.#isSameHour(view, to, form) && !this.#isStampAt(bytes, view, to, form)) break;
      const dateKey = this.#dateKey;
      const clockS = this.#clockS;
      to += stampBytes;
      if (end >= 0) {
        if (bytes[to] !== delimiter || to + 1 + stampBytes > limit) break;
        to++;
        if (!this.#isSameHour(view, to, form) && !this.#isStampAt(bytes, view, to, form)) break;
        if (this.#dateKey !== dateKey || this.#clockS - clockS !== spanS) break;
        to += stampBytes;
      }
      for (column = behindStamps; column < width; column++) {
        if (bytes[to] !== delimiter) break;
        to++;
        const action = actions[column]!;
        if (action === PASS) {
          if (bytes[to] === QUOTE) break;
          while (bytes[to] !== delimiter && bytes[to] !== LF) to++;
          continue;
        }
        const negative = bytes[to] === MINUS;
        if (negative) to++;
        const from = to;
        let digits = 0;
        // more than nine digits leave the 32 bits, and are left to the general reader
        for (let digit = bytes[to]! - ZERO; digit >= 0 && digit <= 9; digit = bytes[++to]! - ZERO) {
          digits = (Math.imul(digits, 10) + digit) | 0;
        }
        let length = to - from;
        let tenths = 0;
        if (bytes[to] === markByte) {
          const behind = ++to;
          for (let digit = bytes[to]! - ZERO; digit >= 0 && digit <= 9; digit = bytes[++to]! - ZERO) {
            digits = (Math.imul(digits, 10) + digit) | 0;
          }
          tenths = to - behind;
          if (tenths === 0) break;
          length += tenths;
        }
        if (length === 0 || length > MOST_DIGITS) break;
        const value = digits / TENTHS[tenths]!;
        values[action - NUMBER]![index] = negative && digits !== 0 ? -value : value;
      }
      if (column < width) break;
      if (bytes[to] === CR) to++;
      if (bytes[to] !== LF) break;
      dateKeys[index] = dateKey;
      clocks[index] = clockS;
      if (offsets !== null) offsets[index] = form.offsetS;
      rowNumbers[index] = ++rowNumber;
      at = to + 1;
    }
    this.#rows.count = index;
    buffer.rowsBefore = rowNumber;
    buffer.start = at;
    return index === room;
  }

  /** Whether a stamp differs from the one read last in its minute alone; most do. */
  #isSameHour(view: DataView, at: number, form: StampForm): boolean {
    if (view.getInt32(at, true) !== this.#bytes0 || view.getInt32(at + 4, true) !== this.#bytes4) return false;
    if (view.getInt32(at + 8, true) !== this.#bytes8 || view.getInt16(at + 12, true) !== this.#bytes12) return false;
    const tens = view.getUint8(at + 14) - ZERO;
    const ones = view.getUint8(at + 15) - ZERO;
    if (!(tens >= 0 && tens <= 5 && ones >= 0 && ones <= 9)) return false;
    const { length, bytes } = form;
    if (length === 19) {
      if (view.getInt16(at + 16, true) !== this.#bytes16 || view.getUint8(at + 18) !== this.#byte18) return false;
    }
    for (let i = length; i < bytes.length; i++) if (view.getUint8(at + i) !== bytes[i]) return false;
    this.#clockS = this.#hourS + (tens * 10 + ones) * 60 + this.#secondS;
    return true;
  }

  /** Reads a stamp of the given form into date and clock. */
  #isStampAt(bytes: Uint8Array, view: DataView, at: number, form: StampForm): boolean {
    const { bytes: known, length, oneMark, otherMark } = form;
    const year = twoDigits(bytes, at + form.year) * 100 + twoDigits(bytes, at + form.year + 2);
    const first = twoDigits(bytes, at + form.first);
    const second = twoDigits(bytes, at + form.second);
    if (!(year >= 0 && first >= 0 && second >= 0)) return false;
    const hours = twoDigits(bytes, at + 11);
    const minutes = twoDigits(bytes, at + 14);
    const seconds = length === 19 ? twoDigits(bytes, at + 17) : 0;
    if (!(hours >= 0 && hours < 24 && minutes >= 0 && minutes < 60 && seconds >= 0 && seconds < 60)) return false;
    if (bytes[at + oneMark] !== known[oneMark] || bytes[at + otherMark] !== known[otherMark]) return false;
    if (bytes[at + DATE_BYTES] !== known[DATE_BYTES] || bytes[at + 13] !== known[13]) return false;
    if (length === 19 && bytes[at + 16] !== known[16]) return false;
    for (let i = length; i < known.length; i++) if (bytes[at + i] !== known[i]) return false;
    this.#dateKey = year * 10_000 + first * 100 + second;
    this.#clockS = hours * 3600 + minutes * 60 + seconds;
    this.#bytes0 = view.getInt32(at, true);
    this.#bytes4 = view.getInt32(at + 4, true);
    this.#bytes8 = view.getInt32(at + 8, true);
    this.#bytes12 = view.getInt16(at + 12, true);
    this.#hourS = hours * 3600;
    this.#secondS = seconds;
    if (length < 19) return true;
    this.#bytes16 = view.getInt16(at + 16, true);
    this.#byte18 = view.getUint8(at + 18);
    return true;
  }
}

/** Two digits as a number; far below zero where a byte is none. */
function twoDigits(bytes: Uint8Array, at: number): number {
  const tens = bytes[at]! - ZERO;
  const ones = bytes[at + 1]! - ZERO;
  return tens >= 0 && tens <= 9 && ones >= 0 && ones <= 9 ? tens * 10 + ones : -1_000_000;
}
