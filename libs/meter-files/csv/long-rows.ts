import type { MeterMap } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { InputProblem } from '#libs/engine/index.js';
import { MAX_INTERVALS } from '../meter-format.js';
import { RowProblems } from '../row-problems.js';
import { RowSet } from '../row-set.js';
import { StampedRows } from '../time/stamped-rows.js';
import type { Stamp } from '../time/stamp-text.js';
import { CellNumbers } from './cell-numbers.js';
import { columnChoices } from './column-choice.js';
import type { CsvLayout } from './csv-layout.js';
import type { ReadRows } from './csv-meaning.js';
import { DecimalMark, KEPT_COLUMNS } from './decimal-mark.js';
import { headerColumns } from './header-sets.js';
import { withUnit } from './header-units.js';
import { isMeasured, type LongLayout } from './long-layout.js';
import type { RowCells } from './row-cells.js';
import { RowQualities } from './row-qualities.js';
import { isHeaderRow, isTextRow, isTotalRow, type SkippedRows, shapeProblem, skip } from './row-shape.js';
import { RowStamps } from './row-stamps.js';

/** Numbers of all channels together; those of three quantities in the longest record there is. */
const MOST_NUMBERS = 3 * MAX_INTERVALS;
/** A channel is looked for so many rows ahead before all rows are listed by their stamp. */
const ROWS_AHEAD = 64;
const MOST_LEFT_OUT = 200;
/** A longer name is no channel's, and as many of them as there are rows would have to be kept [characters]. */
const LONGEST_NAME = 300;

/** A channel: its column of numbers, the row it had last, and the rows it has. */
interface Channel {
  k: number;
  last: number;
  has: RowSet;
}

/**
 * Reads a file that has a row for each channel and moment into rows of moments. The n-th row that a channel has under a
 * stamp belongs to the n-th of every other channel, whether channels follow each other or stand in turns.
 */
export class LongRows implements ReadRows {
  readonly rows = new StampedRows(0);
  readonly mark: DecimalMark;
  readonly problems = new RowProblems();
  readonly stamps: RowStamps;
  readonly qualities: RowQualities;
  readonly headers: SkippedRows = { count: 0, first: 0 };
  readonly totals: SkippedRows = { count: 0, first: 0 };
  readonly texts: SkippedRows = { count: 0, first: 0 };
  readonly sided: ReadonlySet<number> = new Set();
  readonly columns: number[] = [];
  readonly leftOut = new Set<string>();
  readonly #names: string[] = [];
  readonly #layout: CsvLayout;
  readonly #long: LongLayout;
  readonly #numbers: CellNumbers;
  readonly #channels = new Map<string, Channel | null>();
  /** rows by their stamp, made where channels do not go along with each other */
  #byStamp: Map<string, number[]> | null = null;

  constructor(layout: CsvLayout, long: LongLayout, map: MeterMap) {
    this.mark = new DecimalMark(map.decimal, layout.delimiter);
    this.#numbers = new CellNumbers(this.mark, this.problems);
    this.stamps = new RowStamps(this.rows, layout.time, this.problems);
    this.qualities = new RowQualities(layout.side.quality);
    this.#layout = layout;
    this.#long = long;
  }

  /** Nothing of a long file needs the quick lane's shape. */
  quickPlan(): null {
    return null;
  }

  get counted() {
    return this.stamps.counted;
  }

  valuesOf(column: number): Float64Array {
    return this.rows.values[column]!.subarray(0, this.rows.count);
  }

  end(): void {
    this.stamps.end();
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
    if (stamp === null) {
      const { stamp: column } = this.#layout.time;
      const found = shown(cells.text(column));
      this.problems.add({ code: 'bad-time', row: rowNumber, column: column + 1, expected: 'a date and a time', found });
      return;
    }
    const channel = this.#channelOf(cells, rowNumber);
    if (channel === null) return;
    const index = this.#rowOf(channel, stamp, cells, rowNumber);
    this.qualities.take(cells, index, rowNumber);
    const place = { column: this.#long.value, row: rowNumber, index, k: channel.k };
    this.rows.values[channel.k]![index] = this.#numbers.read(cells, place, false);
  }

  /**
   * The layout with the channels as its columns, once all rows are read.
   * @param map what a person says
   * @throws InputProblem where active or reactive power is missing
   */
  layoutOf(map: MeterMap): CsvLayout {
    const header = headerColumns(this.#names);
    const { time: _time, date: _date, clock: _clock, meter: _meter, quality: _quality, ...columns } = map.columns ?? {};
    const choices = columnChoices(header, { ...map, columns }, this.#layout.headerRow);
    return { ...this.#layout, names: this.#names, header, choices };
  }

  #isSkipped(cells: RowCells, rowNumber: number): boolean {
    const texts = cells.texts();
    if (isHeaderRow(texts, this.#layout.names)) return skip(this.headers, rowNumber);
    if (isTotalRow(texts, this.#layout.time.stamp)) return skip(this.totals, rowNumber);
    return isTextRow(texts) && skip(this.texts, rowNumber);
  }

  #channelOf(cells: RowCells, row: number): Channel | null {
    const { channel, unit, value } = this.#long;
    const said = cells.text(channel);
    const key = unit < 0 ? said : `${said}\n${cells.text(unit)}`;
    const known = this.#channels.get(key);
    if (known !== undefined) return known;
    const place = { row, column: channel + 1 };
    if (said === '') {
      this.problems.add({ code: 'missing', ...place, expected: 'the name of the channel', found: 'nothing' });
      return null;
    }
    if (key.length > LONGEST_NAME) {
      const expected = `a channel of at most ${LONGEST_NAME} characters, its unit among them`;
      this.problems.add({ code: 'too-large', ...place, expected, found: shown(said) });
      return null;
    }
    const name = withUnit(said, unit < 0 ? unitOf(this.#layout.names[value] ?? '') : cells.text(unit));
    const made = isMeasured(name) ? this.#newChannel(name, row) : null;
    if (made === null && this.leftOut.size < MOST_LEFT_OUT) this.leftOut.add(said);
    if (this.#channels.size < 10 * MOST_LEFT_OUT) this.#channels.set(key, made);
    return made;
  }

  #newChannel(name: string, row: number): Channel {
    if (this.#names.length >= KEPT_COLUMNS) {
      const expected = `at most ${KEPT_COLUMNS} channels`;
      throw new InputProblem([{ code: 'too-large', row, expected, found: 'more' }]);
    }
    this.rows.values.push(new Float64Array(this.rows.rowNumber.length).fill(Number.NaN));
    this.columns.push(this.#names.length);
    return { k: this.#names.push(name) - 1, last: -1, has: new RowSet() };
  }

  /** The row of a moment: the next the channel has not had, one with its stamp further on, or a new one. */
  #rowOf(channel: Channel, stamp: Stamp, cells: RowCells, rowNumber: number): number {
    const index = this.#knownRow(channel, stamp) ?? this.#newRow(stamp, cells, rowNumber);
    channel.last = index;
    channel.has.add(index);
    return index;
  }

  #knownRow({ last, has }: Channel, stamp: Stamp): number | null {
    const fits = (index: number) => !has.has(index) && this.#isAt(index, stamp);
    const { count } = this.rows;
    if (last + 1 < count && fits(last + 1)) return last + 1;
    if (this.#byStamp === null) {
      for (let index = last + 2; index < Math.min(count, last + ROWS_AHEAD); index++) if (fits(index)) return index;
      // at the end of the rows a stamp that none of the last ones has is a new one
      if (last + 1 >= count && !this.#isEarlier(stamp)) return null;
      this.#byStamp = this.#listed();
    }
    return this.#byStamp.get(this.#keyOf(stamp))?.find(fits) ?? null;
  }

  /** Whether a stamp may stand further up: rows before are in no order, or behind it. */
  #isEarlier({ dateKey, clockS }: Stamp): boolean {
    const last = this.rows.count - 1;
    if (last < 0) return false;
    const { dateKey: dates, clockS: clocks } = this.rows;
    return dateKey! < dates[last]! || (dateKey === dates[last] && (clockS ?? 0) <= clocks[last]!);
  }

  #isAt(index: number, { dateKey, clockS, offsetS }: Stamp): boolean {
    const { rows } = this;
    return (
      rows.dateKey[index] === dateKey &&
      rows.clockS[index] === (clockS ?? 0) &&
      (rows.offsetS === null || rows.offsetS[index] === (offsetS ?? 0))
    );
  }

  #listed(): Map<string, number[]> {
    const { dateKey, clockS, offsetS, count } = this.rows;
    const listed = new Map<string, number[]>();
    for (let index = 0; index < count; index++) {
      listInto(listed, `${dateKey[index]} ${clockS[index]} ${offsetS?.[index] ?? 0}`, index);
    }
    return listed;
  }

  #keyOf({ dateKey, clockS, offsetS }: Stamp): string {
    return `${dateKey} ${clockS ?? 0} ${this.rows.offsetS === null ? 0 : (offsetS ?? 0)}`;
  }

  #newRow(stamp: Stamp, cells: RowCells, rowNumber: number): number {
    const index = this.rows.add(rowNumber);
    if (this.rows.count * this.rows.values.length > MOST_NUMBERS) {
      const expected = `at most ${MOST_NUMBERS} numbers in all channels together`;
      throw new InputProblem([{ code: 'too-large', row: rowNumber, expected, found: 'more' }]);
    }
    for (const values of this.rows.values) values[index] = Number.NaN;
    this.stamps.keep(index, stamp, cells);
    if (this.#byStamp !== null) listInto(this.#byStamp, this.#keyOf(stamp), index);
    return index;
  }
}

function listInto(listed: Map<string, number[]>, key: string, index: number): void {
  const known = listed.get(key);
  if (known === undefined) listed.set(key, [index]);
  else known.push(index);
}

/** The unit in the name of the column of values, such as “Value (kWh)”. */
function unitOf(name: string): string | undefined {
  return /[([{<]([^()[\]{}<>]*)[)\]}>]/.exec(name)?.[1];
}
