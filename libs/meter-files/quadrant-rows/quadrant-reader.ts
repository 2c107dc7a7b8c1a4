import type { MeterMap } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { InputProblem } from '#libs/engine/index.js';
import { CellNumbers } from '../csv/cell-numbers.js';
import { DecimalMark } from '../csv/decimal-mark.js';
import type { RowCells } from '../csv/row-cells.js';
import { shapeProblem } from '../csv/row-shape.js';
import { RowStamps } from '../csv/row-stamps.js';
import { RowProblems } from '../row-problems.js';
import { StampedRows } from '../time/stamped-rows.js';
import { QUADRANT_CELLS } from './quadrant-line.js';

const SEMICOLON = 0x3b;
/** Energies are columns 0 to 5 of the rows' values, the flag is the last. */
export const ENERGIES = ['AI', 'AE', 'R1', 'R2', 'R3', 'R4'] as const;
export const FLAG = ENERGIES.length;
const NAMES = ['stamp', 'season', ...ENERGIES];

/** Takes the rows of a file in order. */
export class QuadrantReader {
  readonly rows = new StampedRows(FLAG + 1);
  readonly mark: DecimalMark;
  readonly #problems = new RowProblems();
  readonly #stamps: RowStamps;
  readonly #numbers: CellNumbers;

  constructor(map: MeterMap) {
    this.mark = new DecimalMark(map.decimal, SEMICOLON);
    this.#numbers = new CellNumbers(this.mark, this.#problems);
    const beginning = {
      stamp: 0,
      clock: -1,
      end: -1,
      serial: false,
      parts: null,
      minute: -1,
      epoch: false,
      counted: false,
    };
    const time = { ...beginning, mark: map.stamp ?? null, zone: null };
    this.#stamps = new RowStamps(this.rows, time, this.#problems);
  }

  /**
   * Reads a row.
   * @param cells the row
   * @param row counted from 1
   */
  take(cells: RowCells, row: number): void {
    if (cells.isBlankFrom(0)) return;
    const problem = shapeProblem(cells, NAMES, row);
    if (problem !== null) {
      this.#problems.add(problem);
      return;
    }
    const stamp = this.#stamps.read(cells);
    const season = cells.text(1);
    if (stamp === null) {
      const found = shown(cells.text(0));
      this.#problems.add({ code: 'bad-time', row, column: 1, expected: 'a date and a time', found });
      return;
    }
    if (season !== '0' && season !== '1') {
      const expected = '1 in summer time, 0 else';
      this.#problems.add({ code: 'bad-time', row, column: 2, expected, found: shown(season) });
      return;
    }
    const index = this.rows.add(row);
    this.#stamps.keep(index, stamp, cells);
    for (let k = 0; k < FLAG; k++) {
      const place = { column: QUADRANT_CELLS - FLAG + k, row, index, k };
      this.rows.values[k]![index] = this.#numbers.read(cells, place, false);
    }
    this.rows.values[FLAG]![index] = Number(season);
  }

  /** @param openRow row of a quotation mark that is never closed, or 0 */
  end(openRow: number): void {
    if (openRow > 0) {
      const expected = 'a closing quotation mark';
      this.#problems.add({ code: 'unreadable', row: openRow, expected, found: 'the end of the file' });
    }
    this.#stamps.end();
    this.#problems.refuse();
    if (this.rows.count > 0) return;
    throw new InputProblem([{ code: 'empty-file', expected: 'rows of data', found: 'none' }]);
  }
}
