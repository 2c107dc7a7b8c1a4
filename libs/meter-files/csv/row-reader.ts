import type { MeterMap } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { RowProblems } from '../row-problems.js';
import { StampedRows } from '../time/stamped-rows.js';
import type { CsvLayout } from './csv-layout.js';
import { DecimalMark, KEPT_COLUMNS } from './decimal-mark.js';
import { type NumberCell, readNumberInto, readNumberText } from './number-cell.js';
import type { QuickPlan } from './quick-rows.js';
import type { RowCells } from './row-cells.js';
import { RowQualities } from './row-qualities.js';
import { RowStamps } from './row-stamps.js';

const TOTAL =
  /^(?:grand )?(?:total|totals|sum|summe|gesamt|gesamtsumme|somme|suma|mean|average|mittelwert|moyenne|promedio|max|maximum|min|minimum)\b/i;
const YES = /^(?:1|1\.0|true|yes|on|y|ja|an|oui|si|sí|ein)$/i;
const NO = /^(?:0|0\.0|false|no|off|n|nein|aus|non)$/i;

/** Rows that were read but hold no interval. */
export interface SkippedRows {
  count: number;
  /** row of the first of them, 0 where there is none */
  first: number;
}

/** Reads row after row into columns: any quoting, any stamp, any number; slow and complete. */
export class RowReader {
  readonly rows: StampedRows;
  readonly mark: DecimalMark;
  readonly problems = new RowProblems();
  readonly stamps: RowStamps;
  readonly qualities: RowQualities;
  readonly headers: SkippedRows = { count: 0, first: 0 };
  readonly totals: SkippedRows = { count: 0, first: 0 };
  /** columns of numbers, counted from 0, in the order of `rows.values` */
  readonly columns: readonly number[];
  readonly #layout: CsvLayout;
  readonly #standby: ReadonlySet<number>;
  /** columns that only some readings use: a text in one of them may be no fault */
  readonly #lenient: ReadonlySet<number>;
  readonly #cell: NumberCell = { form: 'missing', value: 0 };

  constructor(layout: CsvLayout, map: MeterMap) {
    const used = layout.choices.flatMap(({ columns }) => columns);
    this.columns = [...new Set(used.map(({ column }) => column))].sort((a, b) => a - b);
    this.rows = new StampedRows(this.columns.length);
    this.mark = new DecimalMark(map.decimal, layout.delimiter);
    this.stamps = new RowStamps(this.rows, layout.time, this.problems);
    this.qualities = new RowQualities(layout.side.quality);
    this.#layout = layout;
    this.#standby = new Set(used.filter(({ quantity }) => quantity === 'standby').map(({ column }) => column));
    const inAll = (column: number) =>
      layout.choices.every(({ columns }) => columns.some((other) => other.column === column));
    this.#lenient = new Set(this.columns.filter((column) => !inAll(column)));
  }

  /** What the quick lane may do for this file, or null where it needs the general one: states, qualities, meters, serial dates, a clock time apart. */
  quickPlan(): QuickPlan | null {
    const { time, names, delimiter, side } = this.#layout;
    if (time.clock >= 0 || time.serial || this.#standby.size > 0) return null;
    if (side.meter.length + side.quality.length > 0) return null;
    return { delimiter, width: names.length, stamp: time.stamp, end: time.end, columns: this.columns };
  }

  /**
   * The numbers of a column, an open decimal mark taken as such.
   * @param column counted from 0
   */
  valuesOf(column: number): Float64Array {
    return this.rows.values[this.columns.indexOf(column)]!.subarray(0, this.rows.count);
  }

  /**
   * Reads a row.
   * @param cells the row
   * @param rowNumber counted from 1
   */
  take(cells: RowCells, rowNumber: number): void {
    if (cells.isBlankFrom(0)) return;
    const stamp = this.stamps.read(cells);
    if (stamp === null && this.#isSkipped(cells, rowNumber)) return;
    if (!this.#isWhole(cells, rowNumber)) return;
    if (stamp === null) {
      const { stamp: column } = this.#layout.time;
      const found = shown(cells.text(column));
      this.problems.add({ code: 'bad-time', row: rowNumber, column: column + 1, expected: 'a date and a time', found });
      return;
    }
    const index = this.rows.add(rowNumber);
    this.stamps.keep(index, stamp, cells);
    this.qualities.take(cells, index, rowNumber);
    for (let k = 0; k < this.columns.length; k++) this.rows.values[k]![index] = this.#number(cells, k, index);
  }

  /** Repeated headers and rows of totals. */
  #isSkipped(cells: RowCells, rowNumber: number): boolean {
    const texts = cells.texts();
    if (texts.every((text, index) => sameName(text, this.#layout.names[index] ?? ''))) {
      return skip(this.headers, rowNumber);
    }
    const first = texts.findIndex((text) => text !== '');
    const { stamp } = this.#layout.time;
    const standsForStamp = first === stamp || texts[stamp] === '';
    return standsForStamp && TOTAL.test(texts[first] ?? '') && skip(this.totals, rowNumber);
  }

  #isWhole(cells: RowCells, row: number): boolean {
    if (cells.badQuote > 0) {
      const expected = 'the end of the cell behind its closing quotation mark';
      this.problems.add({ code: 'unreadable', row, column: cells.badQuote, expected, found: 'more text' });
      return false;
    }
    const { names } = this.#layout;
    const short = cells.count < names.length && names.slice(cells.count).some((name) => name !== '');
    const long = cells.count > names.length && !cells.isBlankFrom(names.length);
    if (!short && !long) return true;
    this.problems.add({ code: 'wrong-length', row, expected: `${names.length} cells`, found: `${cells.count}` });
    return false;
  }

  #number(cells: RowCells, k: number, index: number): number {
    const column = this.columns[k]!;
    const row = this.rows.rowNumber[index]!;
    if (column >= cells.count) return Number.NaN;
    if (this.#standby.has(column)) return this.#state(cells, column, row);
    const cell = this.#cell;
    if (cells.quoting[column] === 2) readNumberText(cells.text(column), cell);
    else readNumberInto(cells.bytes, cells.from[column]!, cells.to[column]!, cell);
    if (cell.form === 'missing') return Number.NaN;
    if (cell.form === 'wrong') return this.#refuse(cells, column, row, 'a number');
    const value = this.mark.numberOf(cell, { quoted: cells.quoting[column]! > 0, row, kept: index * KEPT_COLUMNS + k });
    if (!Number.isNaN(value)) return value;
    const asBefore = this.mark.settledAtRow > 0 ? `, as in row ${this.mark.settledAtRow}` : '';
    return this.#refuse(cells, column, row, `a number with the decimal mark "${this.mark.sign}"${asBefore}`);
  }

  #state(cells: RowCells, column: number, row: number): number {
    const text = cells.text(column);
    if (YES.test(text)) return 1;
    if (NO.test(text)) return 0;
    readNumberText(text, this.#cell);
    return this.#cell.form === 'missing' ? Number.NaN : this.#refuse(cells, column, row, '0 or 1');
  }

  #refuse(cells: RowCells, column: number, row: number, expected: string): number {
    const found = shown(cells.text(column));
    if (!this.#lenient.has(column)) this.problems.add({ code: 'bad-number', row, column: column + 1, expected, found });
    return Number.NaN;
  }
}

/** Names of the layout may have a unit of a second header row behind them. */
function sameName(text: string, name: string): boolean {
  return text === name || (text !== '' && name.startsWith(`${text} [`));
}

function skip(skipped: SkippedRows, row: number): true {
  skipped.count++;
  if (skipped.count === 1) skipped.first = row;
  return true;
}
