import { MAX_INTERVALS } from '../meter-format.js';
import { refuseTooLong } from '../time/stamped-rows.js';

const FIRST_READINGS = 16;

/** How the readings of a series were come by, where the file says so. */
export interface ReadingCounts {
  /** estimated, edited, derived or projected */
  substituted: number;
  /** that failed a check or are in doubt */
  questionable: number;
}

/** Readings in the order of the file; their meaning may stand behind them in it. */
export class TimedReadings {
  count = 0;
  /** NaN where it follows from the place in its block [s] */
  stampS = new Float64Array(FIRST_READINGS);
  /** length of the interval where the file states it, else NaN [s] */
  spanS = new Float64Array(FIRST_READINGS);
  /** NaN where there is none */
  values = new Float64Array(FIRST_READINGS);
  rowNumber = new Int32Array(FIRST_READINGS);
  readonly counts: ReadingCounts = { substituted: 0, questionable: 0 };

  /** @throws InputProblem where there are more than any record has */
  add(reading: { stampS: number; spanS: number; value: number; row: number }): void {
    const index = this.#roomFor(1, reading.row);
    this.stampS[index] = reading.stampS;
    this.spanS[index] = reading.spanS;
    this.values[index] = reading.value;
    this.rowNumber[index] = reading.row;
    this.count++;
  }

  /** Adds other readings behind these. */
  append(other: TimedReadings): void {
    const index = this.#roomFor(other.count, other.rowNumber[0]!);
    this.stampS.set(other.stampS.subarray(0, other.count), index);
    this.spanS.set(other.spanS.subarray(0, other.count), index);
    this.values.set(other.values.subarray(0, other.count), index);
    this.rowNumber.set(other.rowNumber.subarray(0, other.count), index);
    this.count += other.count;
    this.counts.substituted += other.counts.substituted;
    this.counts.questionable += other.counts.questionable;
  }

  #roomFor(more: number, row: number): number {
    const wanted = this.count + more;
    if (wanted > MAX_INTERVALS) refuseTooLong(row);
    if (wanted > this.values.length) {
      const room = Math.min(Math.max(2 * this.values.length, wanted), MAX_INTERVALS);
      this.stampS = larger(this.stampS, new Float64Array(room));
      this.spanS = larger(this.spanS, new Float64Array(room));
      this.values = larger(this.values, new Float64Array(room));
      this.rowNumber = larger(this.rowNumber, new Int32Array(room));
    }
    return this.count;
  }
}

function larger<T extends Int32Array | Float64Array>(from: T, to: T): T {
  to.set(from);
  return to;
}
