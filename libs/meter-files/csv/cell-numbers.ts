import { shown } from '#libs/contract/shown.js';
import type { RowProblems } from '../row-problems.js';
import type { CellTails } from './cell-tails.js';
import type { DecimalMark } from './decimal-mark.js';
import { type NumberCell, readNumberInto, readNumberText } from './number-cell.js';
import type { RowCells } from './row-cells.js';

/** Where a number stands in the file and where it is kept. */
export interface NumberPlace {
  /** cell of the row, counted from 0 */
  column: number;
  /** counted from 1 */
  row: number;
  /** row and column of the values it is kept in */
  index: number;
  k: number;
}

/** Reads the numbers in cells under the file's decimal mark and notes what is none. */
export class CellNumbers {
  readonly mark: DecimalMark;
  readonly #problems: RowProblems;
  readonly #tails: CellTails | null;
  readonly #cell: NumberCell = { form: 'missing', value: 0 };

  /**
   * @param mark the file's decimal mark
   * @param problems takes what is wrong
   * @param tails reads what stands behind numbers, where that may be anything
   */
  constructor(mark: DecimalMark, problems: RowProblems, tails: CellTails | null = null) {
    this.mark = mark;
    this.#problems = problems;
    this.#tails = tails;
  }

  /**
   * The number in a cell.
   * @param cells the row
   * @param place which cell
   * @param lenient whether a text may stand there
   * @returns the number; NaN where there is none
   */
  read(cells: RowCells, { column, row, index, k }: NumberPlace, lenient: boolean): number {
    if (column >= cells.count) return Number.NaN;
    const cell = this.#cell;
    if (cells.quoting[column] === 2) readNumberText(cells.text(column), cell);
    else readNumberInto(cells.bytes, cells.from[column]!, cells.to[column]!, cell);
    if (cell.form === 'missing') return Number.NaN;
    const tailed = cell.form === 'wrong' ? (this.#tails?.read(cells.text(column), { column, index }) ?? null) : null;
    if (tailed !== null) readNumberText(tailed.number, cell);
    if (cell.form === 'wrong') return this.refuse(cells, { column, row }, 'a number', lenient);
    const place = { quoted: cells.quoting[column]! > 0, row, index, k };
    const value = this.mark.numberOf(cell, place);
    if (!Number.isNaN(value)) return tailed?.leads && value !== 0 ? -value : value;
    const asBefore = this.mark.settledAtRow > 0 ? `, as in row ${this.mark.settledAtRow}` : '';
    return this.refuse(
      cells,
      { column, row },
      `a number with the decimal mark "${this.mark.sign}"${asBefore}`,
      lenient,
    );
  }

  /**
   * Notes what can't stand in a cell.
   * @param cells the row
   * @param place which cell
   * @param expected what should stand there
   * @param lenient whether it may be anything
   * @returns NaN
   */
  refuse(
    cells: RowCells,
    { column, row }: Pick<NumberPlace, 'column' | 'row'>,
    expected: string,
    lenient = false,
  ): number {
    const found = shown(cells.text(column));
    if (!lenient) this.#problems.add({ code: 'bad-number', row, column: column + 1, expected, found });
    return Number.NaN;
  }
}
