import { InputProblem } from '#libs/engine/index.js';
import { MAX_INTERVALS } from '../meter-format.js';
import type { DateForm } from './stamp-text.js';

const FIRST_ROWS = 4096;
/** Up to here room is made generously: most records are a year of quarter hours. */
const FEW_ROWS = 262_144;

/**
 * The rows of a file as read, in file order: stamps in parts, because the order of day and month is known only at the
 * end, and one column of numbers for each quantity, NaN where the file has none.
 */
export class StampedRows {
  count = 0;
  /** see Stamp.dateKey */
  dateKey = new Int32Array(FIRST_ROWS);
  /** form of every date; null before the first row */
  dateForm: DateForm | null = null;
  /** seconds since midnight by the clock [s] */
  clockS = new Int32Array(FIRST_ROWS);
  /** the stamp's own offset [s]; null where stamps carry none */
  offsetS: Int32Array | null = null;
  /** row of the file, counted from 1 */
  rowNumber = new Int32Array(FIRST_ROWS);
  values: Float64Array[];
  /** rows the file will have as far as its size tells, 0 where it does not: room is made for all of them at once */
  likelyRows = 0;
  /** length of an interval as far as rows with a begin and an end state it [s]; NaN where none does */
  spanS = Number.NaN;
  /** the stamps named the last second of each interval, and were rounded up to its end */
  lastSeconds = false;

  constructor(columns: number) {
    this.values = Array.from({ length: columns }, () => new Float64Array(FIRST_ROWS));
  }

  /**
   * Makes room for a row behind the last one.
   * @param rowNumber row of the file it stands in
   * @returns its index; `count` already includes it
   * @throws InputProblem where the record outgrows every meter
   */
  add(rowNumber: number): number {
    const index = this.count;
    if (index >= MAX_INTERVALS) refuseTooLong(rowNumber);
    if (index === this.rowNumber.length) this.grow();
    this.rowNumber[index] = rowNumber;
    this.count++;
    return index;
  }

  /** Makes room for more rows. */
  grow(): void {
    const have = this.rowNumber.length;
    const more = have < FEW_ROWS ? 4 * have : 2 * have;
    const rows = Math.min(this.likelyRows > have ? this.likelyRows : more, MAX_INTERVALS);
    this.dateKey = larger(this.dateKey, new Int32Array(rows));
    this.clockS = larger(this.clockS, new Int32Array(rows));
    this.rowNumber = larger(this.rowNumber, new Int32Array(rows));
    if (this.offsetS !== null) this.offsetS = larger(this.offsetS, new Int32Array(rows));
    this.values = this.values.map((column) => larger(column, new Float64Array(rows)));
  }
}

/** @throws InputProblem naming the limit */
export function refuseTooLong(rowNumber: number): never {
  throw new InputProblem([
    {
      code: 'too-large',
      row: rowNumber,
      expected: `a record of at most ${MAX_INTERVALS} intervals`,
      found: 'a longer one',
    },
  ]);
}

function larger<T extends Int32Array | Float64Array>(from: T, to: T): T {
  to.set(from);
  return to;
}
