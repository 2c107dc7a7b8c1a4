import type { MeterMap } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { InputProblem } from '#libs/engine/index.js';
import { RowProblems } from '../row-problems.js';
import { StampedRows } from '../time/stamped-rows.js';
import { CellNumbers } from './cell-numbers.js';
import { columnChoices } from './column-choice.js';
import type { CsvLayout } from './csv-layout.js';
import type { ReadRows } from './csv-meaning.js';
import { type DayLayout, saysQuantity } from './day-layout.js';
import type { DaySlot } from './day-slots.js';
import { DecimalMark, KEPT_COLUMNS } from './decimal-mark.js';
import { headerColumns } from './header-sets.js';
import type { RowCells } from './row-cells.js';
import { RowQualities } from './row-qualities.js';
import { isHeaderRow, isTotalRow, type SkippedRows, shapeProblem, skip } from './row-shape.js';
import { RowStamps } from './row-stamps.js';

const DAY_S = 86_400;

/** The rows of one date: where each of its slots is kept, and which quantities it has. */
interface Day {
  index: Map<number, number>;
  quantities: Set<number>;
}

/**
 * Reads a file that has a row a day into rows of intervals. What a row holds is said by its names, by a column of units or
 * quantities, or by the line above it; rows of one date and different quantities belong together.
 */
export class DayRows implements ReadRows {
  readonly rows = new StampedRows(0);
  readonly mark: DecimalMark;
  readonly problems = new RowProblems();
  readonly stamps: RowStamps;
  readonly qualities = new RowQualities([]);
  readonly headers: SkippedRows = { count: 0, first: 0 };
  readonly totals: SkippedRows = { count: 0, first: 0 };
  readonly texts: SkippedRows = { count: 0, first: 0 };
  readonly counted = null;
  readonly sided: ReadonlySet<number> = new Set();
  readonly columns: number[] = [];
  /** names of the quantities, in the order in which they came */
  readonly #names: string[] = [];
  readonly #layout: CsvLayout;
  readonly #days: DayLayout;
  readonly #numbers: CellNumbers;
  readonly #dates = new Map<number, Day[]>();
  #title: string;

  constructor(layout: CsvLayout, days: DayLayout, map: MeterMap) {
    this.mark = new DecimalMark(map.decimal, layout.delimiter);
    this.#numbers = new CellNumbers(this.mark, this.problems);
    this.stamps = new RowStamps(this.rows, layout.time, this.problems);
    this.rows.spanS = days.stepS;
    this.#layout = layout;
    this.#days = days;
    this.#title = days.title;
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
    const problem = shapeProblem(cells, this.#layout.names, rowNumber);
    if (problem !== null) {
      this.problems.add(problem);
      return;
    }
    const column = this.#layout.time.stamp;
    if (stamp === null) {
      const found = shown(cells.text(column));
      this.problems.add({ code: 'bad-time', row: rowNumber, column: column + 1, expected: 'a date', found });
      return;
    }
    const said = [this.#title, ...this.#days.labels.map((label) => cells.text(label))];
    const blocks = new Set(this.#days.slots.map(({ rest }) => rest));
    for (const rest of blocks) {
      const k = this.#quantity([...said, rest].filter((text) => text !== '').join(' '), rowNumber);
      const slots = this.#days.slots.filter((slot) => slot.rest === rest && !isSpare(slot, cells));
      const day = this.#dayFor(stamp.dateKey!, k);
      for (const slot of slots) {
        const index = this.#rowOf(day, slot, () => {
          const added = this.rows.add(rowNumber);
          for (const values of this.rows.values) values[added] = Number.NaN;
          this.stamps.keep(added, { ...stamp, clockS: slot.beginS, offsetS: null, untilS: null }, cells);
          return added;
        });
        const place = { column: slot.column, row: rowNumber, index, k };
        this.rows.values[k]![index] = this.#numbers.read(cells, place, false);
      }
    }
  }

  /**
   * The layout with the quantities as its columns, once all rows are read.
   * @param map what a person says
   * @throws InputProblem where active or reactive power is missing
   */
  layoutOf(map: MeterMap): CsvLayout {
    this.problems.refuse();
    const header = headerColumns(this.#names);
    const { time: _time, date: _date, clock: _clock, meter: _meter, quality: _quality, ...columns } = map.columns ?? {};
    const choices = columnChoices(header, { ...map, columns }, this.#layout.headerRow);
    return { ...this.#layout, names: this.#names, header, choices };
  }

  valuesOf(column: number): Float64Array {
    return this.rows.values[column]!.subarray(0, this.rows.count);
  }

  /** Repeated headers, totals, and lines that say what the rows below hold. */
  #isSkipped(cells: RowCells, rowNumber: number): boolean {
    const texts = cells.texts();
    if (isHeaderRow(texts, this.#layout.names)) return skip(this.headers, rowNumber);
    if (isTotalRow(texts, this.#layout.time.stamp)) return skip(this.totals, rowNumber);
    const said = texts.filter((text) => text !== '');
    if (said.length > 3 || !saysQuantity(said.join(' '))) return false;
    this.#title = said.join(' ');
    return true;
  }

  #quantity(name: string, row: number): number {
    const known = this.#names.indexOf(name);
    if (known >= 0) return known;
    if (this.#names.length >= KEPT_COLUMNS) {
      const expected = `at most ${KEPT_COLUMNS} quantities`;
      throw new InputProblem([{ code: 'too-large', row, expected, found: 'more' }]);
    }
    this.rows.values.push(new Float64Array(this.rows.rowNumber.length).fill(Number.NaN));
    this.columns.push(this.#names.length);
    return this.#names.push(name) - 1;
  }

  /** The first day of a date that has no such quantity yet: a date may stand there twice. */
  #dayFor(dateKey: number, k: number): Day {
    const days = this.#dates.get(dateKey) ?? [];
    this.#dates.set(dateKey, days);
    let day = days.find(({ quantities }) => !quantities.has(k));
    if (day === undefined) {
      day = { index: new Map(), quantities: new Set() };
      days.push(day);
    }
    day.quantities.add(k);
    return day;
  }

  #rowOf({ index }: Day, { beginS, second }: DaySlot, add: () => number): number {
    const key = second ? beginS + 7 * DAY_S : beginS;
    const known = index.get(key);
    if (known !== undefined) return known;
    const added = add();
    index.set(key, added);
    return added;
  }
}

/** Columns for the hour that some days have more stay empty on the others. */
function isSpare({ column, second, beginS }: DaySlot, cells: RowCells): boolean {
  return (second || beginS >= DAY_S) && (column >= cells.count || cells.isBlank(column));
}
