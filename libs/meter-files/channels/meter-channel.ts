import { MAX_INTERVALS } from '../meter-format.js';
import type { RunColumn } from '../reading-type/run-column.js';
import type { Quantity } from '../record/build-columns.js';
import { refuseTooLong } from '../time/stamped-rows.js';

const FIRST_POINTS = 1024;

/** What the numbers of a channel are. */
export interface ChannelKind {
  /** as the file calls it */
  name: string;
  quantity: Quantity;
  /** energies, not means of the interval */
  energy: boolean;
  /** readings of a register that counts up, not the energy of each interval */
  cumulative: boolean;
  /** value × times ÷ over is in kW, kvar, kWh, kvarh or V */
  times: number;
  over: number;
}

/** Rows of a file by index, as a list or packed. */
export type RowNumbers = Int32Array | RunColumn;

/** Values of one quantity over time, as formats give it that keep every quantity apart. */
export class MeterChannel {
  readonly kind: ChannelKind;
  count = 0;
  /** beginning of each interval, or the moment of each register reading, UTC [s]; in any order */
  beginS: Float64Array = new Float64Array(FIRST_POINTS);
  /** NaN where the file says that it has none */
  values: Float64Array = new Float64Array(FIRST_POINTS);
  #rows = new Int32Array(FIRST_POINTS);
  /** row of the file, or whatever the format counts in place of rows, from 1 */
  rowNumber: RowNumbers = this.#rows;
  /** length of the intervals where the file states it [s]; NaN where it does not */
  intervalS = Number.NaN;

  constructor(kind: ChannelKind) {
    this.kind = kind;
  }

  /**
   * Adds a value behind those there are.
   * @param beginS beginning of its interval, or moment of the reading, UTC [s]
   * @param value in the channel's own unit, or NaN
   * @param rowNumber where it stands in the file
   * @throws InputProblem where the channel outgrows every meter
   */
  add(beginS: number, value: number, rowNumber: number): void {
    const index = this.count;
    if (index >= MAX_INTERVALS) refuseTooLong(rowNumber);
    if (index === this.beginS.length) this.#grow();
    this.beginS[index] = beginS;
    this.values[index] = value;
    this.#rows[index] = rowNumber;
    this.count++;
  }

  /** Takes the values of the whole channel at once, in place of adding them. */
  take({ beginS, values, rowNumber }: Pick<MeterChannel, 'beginS' | 'values' | 'rowNumber'>): void {
    this.count = beginS.length;
    this.beginS = beginS;
    this.values = values;
    this.rowNumber = rowNumber;
  }

  #grow(): void {
    const room = Math.min(2 * this.beginS.length, MAX_INTERVALS);
    const { beginS, values } = this;
    const rows = this.#rows;
    this.beginS = new Float64Array(room);
    this.values = new Float64Array(room);
    this.#rows = new Int32Array(room);
    this.rowNumber = this.#rows;
    this.beginS.set(beginS);
    this.values.set(values);
    this.#rows.set(rows);
  }
}
