import type { MeterMap } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { RowProblems } from '../row-problems.js';
import type { RowSet } from '../row-set.js';
import type { CountedClock } from '../time/counted-clock.js';
import { StampedRows } from '../time/stamped-rows.js';
import { CellNumbers } from './cell-numbers.js';
import { CellTails } from './cell-tails.js';
import type { CsvLayout } from './csv-layout.js';
import type { ReadRows } from './csv-meaning.js';
import { DecimalMark } from './decimal-mark.js';
import { type NumberCell, readNumberText } from './number-cell.js';
import type { QuickPlan } from './quick-rows.js';
import type { RowCells } from './row-cells.js';
import { RowQualities } from './row-qualities.js';
import { isHeaderRow, isTextRow, isTotalRow, type SkippedRows, shapeProblem, skip, sumsUp } from './row-shape.js';
import { RowStamps } from './row-stamps.js';

const YES = /^(?:1|1\.0|true|yes|on|y|ja|an|oui|si|sí|ein)$/i;
const NO = /^(?:0|0\.0|false|no|off|n|nein|aus|non)$/i;

/** Rows without a stamp that are held against the sums of the columns. */
const MOST_UNSTAMPED = 4;

/** Reads row after row into columns: any quoting, any stamp, any number; slow and complete. */
export class RowReader implements ReadRows {
  readonly rows: StampedRows;
  readonly mark: DecimalMark;
  readonly problems = new RowProblems();
  readonly stamps: RowStamps;
  readonly qualities: RowQualities;
  readonly headers: SkippedRows = { count: 0, first: 0 };
  readonly totals: SkippedRows = { count: 0, first: 0 };
  readonly texts: SkippedRows = { count: 0, first: 0 };
  /** columns of numbers, counted from 0, in the order of `rows.values` */
  readonly columns: readonly number[];
  readonly #layout: CsvLayout;
  readonly #standby: ReadonlySet<number>;
  /** columns that only some readings use: a text in one of them may be no fault */
  readonly #lenient: ReadonlySet<number>;
  readonly #numbers: CellNumbers;
  readonly #tails: CellTails;
  readonly #cell: NumberCell = { form: 'missing', value: 0 };
  #unstamped = 0;

  constructor(layout: CsvLayout, map: MeterMap) {
    const used = layout.choices.flatMap(({ columns }) => columns);
    this.columns = [...new Set(used.map(({ column }) => column))].sort((a, b) => a - b);
    this.rows = new StampedRows(this.columns.length);
    this.mark = new DecimalMark(map.decimal, layout.delimiter);
    this.#tails = new CellTails(layout.choices);
    this.#numbers = new CellNumbers(this.mark, this.problems, this.#tails);
    this.stamps = new RowStamps(this.rows, layout.time, this.problems);
    this.qualities = new RowQualities(layout.side.quality);
    this.#layout = layout;
    this.#standby = new Set(used.filter(({ quantity }) => quantity === 'standby').map(({ column }) => column));
    const inAll = (column: number) =>
      layout.choices.every(({ columns }) => columns.some((other) => other.column === column));
    this.#lenient = new Set(this.columns.filter((column) => !inAll(column)));
  }

  /**
   * What the quick lane may do for this file, or null where it needs the general one: states, qualities, meters, serial
   * dates, a clock time apart, numbers before the stamp.
   */
  quickPlan(): QuickPlan | null {
    const { time, names, delimiter, side } = this.#layout;
    if (time.clock >= 0 || time.serial || time.epoch || this.#standby.size > 0) return null;
    if (side.meter.length + side.quality.length > 0) return null;
    if (time.end >= 0 && time.end !== time.stamp + 1) return null;
    const behind = Math.max(time.stamp, time.end);
    if (this.columns.some((column) => column < behind)) return null;
    return { delimiter, width: names.length, stamp: time.stamp, end: time.end, columns: this.columns };
  }

  get sided(): ReadonlySet<number> {
    return new Set(this.#tails.sides.keys());
  }

  /** Looks at the rows as a whole, once all are read. */
  end(): void {
    this.stamps.end();
    for (const [column, rows] of this.#tails.sides) this.#refuseOneSided(column, rows);
  }

  get counted(): CountedClock | null {
    return this.stamps.counted;
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
    // a row whose quotation marks are broken is none of the rows that may be left out
    if (stamp === null && cells.badQuote === 0 && this.#isSkipped(cells, rowNumber)) return;
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

  /** Beside power factors that say their side, one that says none can only be 1. */
  #refuseOneSided(column: number, sided: RowSet): void {
    const at = this.valuesOf(column).findIndex(
      (value, row) => !Number.isNaN(value) && value !== 1 && value !== 100 && value !== 0 && !sided.has(row),
    );
    if (at < 0) return;
    const place = { row: this.rows.rowNumber[at]!, column: column + 1 };
    const expected = 'a power factor that says lagging or leading, as in other rows';
    this.problems.add({
      code: 'bad-number',
      ...place,
      expected,
      found: `${this.valuesOf(column)[at]}`,
    });
  }

  /** Repeated headers, rows of totals and lines of text. */
  #isSkipped(cells: RowCells, rowNumber: number): boolean {
    const texts = cells.texts();
    const { names, time } = this.#layout;
    if (isHeaderRow(texts, names)) return skip(this.headers, rowNumber);
    if (isTotalRow(texts, time.stamp) || this.#sumsUpRows(texts)) return skip(this.totals, rowNumber);
    return isTextRow(texts) && skip(this.texts, rowNumber);
  }

  /** A row without a stamp holds totals where each of its numbers sums up the column above it. */
  #sumsUpRows(texts: readonly string[]): boolean {
    const { stamp, clock } = this.#layout.time;
    if (texts[stamp] !== '' || (clock >= 0 && texts[clock] !== '') || ++this.#unstamped > MOST_UNSTAMPED) return false;
    return this.columns.every((column) => {
      readNumberText(texts[column] ?? '', this.#cell);
      return sumsUp(texts[column] ?? '', this.#cell.value, this.valuesOf(column));
    });
  }

  #isWhole(cells: RowCells, row: number): boolean {
    const problem = shapeProblem(cells, this.#layout.names, row);
    if (problem !== null) this.problems.add(problem);
    return problem === null;
  }

  #number(cells: RowCells, k: number, index: number): number {
    const column = this.columns[k]!;
    const row = this.rows.rowNumber[index]!;
    if (this.#standby.has(column)) return this.#state(cells, column, row);
    return this.#numbers.read(cells, { column, row, index, k }, this.#lenient.has(column));
  }

  #state(cells: RowCells, column: number, row: number): number {
    const text = cells.text(column);
    if (YES.test(text)) return 1;
    if (NO.test(text)) return 0;
    readNumberText(text, this.#cell);
    if (this.#cell.form === 'missing') return Number.NaN;
    return this.#numbers.refuse(cells, { column, row }, '0 or 1', this.#lenient.has(column));
  }
}
