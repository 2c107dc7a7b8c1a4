import { MAX_INTERVALS } from '../meter-format.js';
import type { StampedRows } from '../time/stamped-rows.js';
import type { DecimalSign } from './decimal-mark.js';
import { TENTHS } from './number-cell.js';
import type { RowBuffer } from './row-buffer.js';
import type { RowCells } from './row-cells.js';

/** What is done with a column; from NUMBER on its number is kept in column `action − NUMBER` of the rows. */
const PASS = 0;
const STAMP = 1;
const END = 2;
const NUMBER = 4;

const LF = 0x0a;
const CR = 0x0d;
const QUOTE = 0x22;
const MINUS = 0x2d;
const ZERO = 0x30;
/** No byte has this value. */
const NO_BYTE = 0x100;
const DATE_BYTES = 10;
const MOST_DIGITS = 9;

const YEAR_FIRST = /^\d{4}[-/.]\d\d[-/.]\d\d[ T]\d\d:\d\d(:\d\d)?(?:Z|[+-]\d\d:?\d\d)?$/;
const YEAR_LAST = /^\d\d[-/.]\d\d[-/.]\d{4}[ T]\d\d:\d\d(:\d\d)?$/;

/** The stamp of the row before, as the form that the next has to have. */
interface StampForm {
  /** bytes of the stamp; the places of digits are given below */
  bytes: Uint8Array;
  /** where the year and the two other parts begin, and where the marks between them stand */
  year: number;
  first: number;
  second: number;
  marks: readonly [number, number];
  /** length of date and clock, without what follows them */
  length: number;
  offsetS: number;
}

/** What the quick lane needs to know of a file. */
export interface QuickPlan {
  delimiter: number;
  /** number of columns */
  width: number;
  /** columns of the stamp, and of the interval's end or −1; counted from 0 */
  stamp: number;
  end: number;
  /** columns of numbers, in the order of the rows' values */
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
  // the stamp read last, and where in the buffer its date stands
  #dateKey = 0;
  #clockS = 0;
  #dateAt = -1;

  constructor(rows: StampedRows, plan: QuickPlan) {
    this.#rows = rows;
    this.#plan = plan;
    this.#actions = new Int32Array(plan.width).fill(PASS);
    plan.columns.forEach((column, k) => {
      this.#actions[column] = NUMBER + k;
    });
    this.#actions[plan.stamp] = STAMP;
    if (plan.end >= 0) this.#actions[plan.end] = END;
  }

  /**
   * Takes the form of stamps from the row that the general reader has added last.
   * @param cells the row
   */
  learn(cells: RowCells): void {
    const { stamp } = this.#plan;
    const text = cells.quoting[stamp] === 0 ? cells.text(stamp) : '';
    const yearFirst = YEAR_FIRST.exec(text);
    const parts = yearFirst ?? YEAR_LAST.exec(text);
    this.#form = null;
    if (parts === null || cells.to[stamp]! - cells.from[stamp]! !== text.length) return;
    this.#form = {
      ...(yearFirst === null
        ? { first: 0, second: 3, year: 6, marks: [2, 5] as const }
        : { year: 0, first: 5, second: 8, marks: [4, 7] as const }),
      bytes: new TextEncoder().encode(text),
      length: parts[1] === undefined ? 16 : 19,
      offsetS: this.#rows.offsetS?.[this.#rows.count - 1] ?? 0,
    };
  }

  /**
   * Reads rows from the buffer's start on and moves it behind the last one read.
   * @param buffer whole and broken rows
   * @param sign decimal mark, or null where numbers with a mark have to wait
   */
  // biome-ignore lint/complexity/noExcessiveCognitiveComplexity: the kernel that every byte of a usual file runs through
  // biome-ignore lint/complexity/noExcessiveLinesPerFunction: the same
  takeFrom(buffer: RowBuffer, sign: DecimalSign | null): void {
    const form = this.#form;
    const { delimiter, width } = this.#plan;
    if (form === null || buffer.rowEnd !== LF || buffer.end === buffer.start) return;
    const { bytes } = buffer;
    const rows = this.#rows;
    const actions = this.#actions;
    const markByte = sign === null || sign.charCodeAt(0) === delimiter ? NO_BYTE : sign.charCodeAt(0);
    const limit = bytes.lastIndexOf(LF, buffer.end - 1) + 1;
    let { dateKey: dateKeys, clockS: clocks, rowNumber: rowNumbers, offsetS: offsets, values } = rows;
    let room = rowNumbers.length;
    let at = buffer.start;
    this.#dateAt = -1;
    while (at < limit) {
      const index = rows.count;
      if (index === MAX_INTERVALS) return;
      if (index === room) {
        rows.grow();
        ({ dateKey: dateKeys, clockS: clocks, rowNumber: rowNumbers, offsetS: offsets, values } = rows);
        room = rowNumbers.length;
      }
      let dateKey = -1;
      let clockS = 0;
      let endKey = -1;
      let endS = 0;
      let to = at;
      let column = 0;
      for (; column < width; column++) {
        const action = actions[column]!;
        if (action >= NUMBER) {
          const negative = bytes[to] === MINUS;
          if (negative) to++;
          const from = to;
          let digits = 0;
          for (let digit = bytes[to]! - ZERO; digit >= 0 && digit <= 9; digit = bytes[++to]! - ZERO) {
            digits = digits * 10 + digit;
          }
          let count = to - from;
          let value = digits;
          if (bytes[to] === markByte) {
            const behind = ++to;
            for (let digit = bytes[to]! - ZERO; digit >= 0 && digit <= 9; digit = bytes[++to]! - ZERO) {
              digits = digits * 10 + digit;
            }
            if (to === behind) break;
            count = to - from - 1;
            if (count > MOST_DIGITS) break;
            value = digits / TENTHS[to - behind]!;
          }
          if (count === 0 || count > MOST_DIGITS) break;
          values[action - NUMBER]![index] = negative && value !== 0 ? -value : value;
        } else if (action === PASS) {
          if (bytes[to] === QUOTE) break;
          while (bytes[to] !== delimiter && bytes[to] !== LF) to++;
        } else {
          to = this.#stampAt(bytes, to, form);
          if (to < 0) break;
          if (action === STAMP) {
            dateKey = this.#dateKey;
            clockS = this.#clockS;
          } else {
            endKey = this.#dateKey;
            endS = this.#clockS;
          }
        }
        if (column < width - 1) {
          if (bytes[to] !== delimiter) break;
          to++;
        }
      }
      if (column < width) break;
      if (bytes[to] === CR) to++;
      if (bytes[to] !== LF) break;
      if (endKey >= 0 && (endKey !== dateKey || endS - clockS !== rows.spanS)) break;
      dateKeys[index] = dateKey;
      clocks[index] = clockS;
      if (offsets !== null) offsets[index] = form.offsetS;
      rowNumbers[index] = ++buffer.rowsBefore;
      rows.count = index + 1;
      at = to + 1;
      buffer.start = at;
    }
  }

  /** Reads a stamp of the given form; sets date and clock and returns the byte behind it, or −1. */
  #stampAt(bytes: Uint8Array, at: number, form: StampForm): number {
    if (!this.#isSameDate(bytes, at) && !this.#isNewDate(bytes, at, form)) return -1;
    const hours = twoDigits(bytes, at + 11);
    const minutes = twoDigits(bytes, at + 14);
    const seconds = form.length === 19 ? twoDigits(bytes, at + 17) : 0;
    if (!(hours >= 0 && hours < 24 && minutes >= 0 && minutes < 60 && seconds >= 0 && seconds < 60)) return -1;
    if (bytes[at + DATE_BYTES] !== form.bytes[DATE_BYTES] || bytes[at + 13] !== form.bytes[13]) return -1;
    if (form.length === 19 && bytes[at + 16] !== form.bytes[16]) return -1;
    for (let i = form.length; i < form.bytes.length; i++) if (bytes[at + i] !== form.bytes[i]) return -1;
    this.#clockS = hours * 3600 + minutes * 60 + seconds;
    return at + form.bytes.length;
  }

  #isNewDate(bytes: Uint8Array, at: number, form: StampForm): boolean {
    const year = twoDigits(bytes, at + form.year) * 100 + twoDigits(bytes, at + form.year + 2);
    const first = twoDigits(bytes, at + form.first);
    const second = twoDigits(bytes, at + form.second);
    const [one, other] = form.marks;
    if (!(year >= 0 && first >= 0 && second >= 0)) return false;
    if (bytes[at + one] !== form.bytes[one] || bytes[at + other] !== form.bytes[other]) return false;
    this.#dateKey = year * 10_000 + first * 100 + second;
    this.#dateAt = at;
    return true;
  }

  #isSameDate(bytes: Uint8Array, at: number): boolean {
    const before = this.#dateAt;
    if (before < 0) return false;
    for (let i = DATE_BYTES - 1; i >= 0; i--) if (bytes[at + i] !== bytes[before + i]) return false;
    return true;
  }
}

/** Two digits as a number; far below zero where a byte is none. */
function twoDigits(bytes: Uint8Array, at: number): number {
  const tens = bytes[at]! - ZERO;
  const ones = bytes[at + 1]! - ZERO;
  return tens >= 0 && tens <= 9 && ones >= 0 && ones <= 9 ? tens * 10 + ones : -1_000_000;
}
