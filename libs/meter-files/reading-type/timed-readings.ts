import { MAX_INTERVALS } from '../meter-format.js';
import { refuseTooLong } from '../time/stamped-rows.js';
import { RunColumn } from './run-column.js';

const FIRST_READINGS = 16;
/** Up to here room is doubled. */
const FEW_READINGS = 131_072;

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
  stampS = new RunColumn();
  /** length of the interval where the file states it, else NaN [s] */
  spanS = new RunColumn();
  /** NaN where there is none */
  values = new Float64Array(FIRST_READINGS);
  rowNumber = new RunColumn();
  readonly counts: ReadingCounts = { substituted: 0, questionable: 0 };

  /** @throws InputProblem where there are more than any record has */
  add(reading: { stampS: number; spanS: number; value: number; row: number }): void {
    this.#addAt(this.#roomFor(1, reading.row), reading);
  }

  /** Adds other readings behind these; nobody adds to those any more. */
  append(other: TimedReadings): void {
    this.counts.substituted += other.counts.substituted;
    this.counts.questionable += other.counts.questionable;
    if (this.count === 0) {
      const { count, stampS, spanS, values, rowNumber } = other;
      Object.assign(this, { count, stampS, spanS, values, rowNumber });
      return;
    }
    const index = this.#roomFor(other.count, other.rowNumber.at(0));
    for (let i = 0; i < other.count; i++) {
      const [stampS, spanS] = [other.stampS.at(i), other.spanS.at(i)];
      this.#addAt(index + i, { stampS, spanS, value: other.values[i]!, row: other.rowNumber.at(i) });
    }
  }

  #addAt(index: number, { stampS, spanS, value, row }: { stampS: number; spanS: number; value: number; row: number }) {
    this.stampS.add(stampS);
    this.spanS.add(spanS);
    this.values[index] = value;
    this.rowNumber.add(row);
    this.count++;
  }

  #roomFor(more: number, row: number): number {
    const wanted = this.count + more;
    if (wanted > MAX_INTERVALS) refuseTooLong(row);
    if (wanted > this.values.length) {
      const { values } = this;
      // room that nobody writes to is not taken up: a long series gets all it can need, and is copied no more
      this.values = new Float64Array(wanted > FEW_READINGS ? MAX_INTERVALS : Math.max(2 * values.length, wanted));
      this.values.set(values);
    }
    return this.count;
  }
}
