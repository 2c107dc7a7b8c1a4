import { InputProblem } from '#libs/engine/index.js';
import { commonestStepS } from './commonest-step.js';
import { mixedIntervals } from './mixed-intervals.js';

/** The longest month [s]. */
const MOST_INTERVAL_S = 31 * 86_400;

/** Rows with a moment each, in any order. */
export interface MomentRows {
  /** UTC, one a row [s]; rows without a moment (NaN) are left out */
  utcS: Float64Array;
  rowNumber: Int32Array;
  /** whether two rows that share a moment say the same */
  agree: (a: number, b: number) => boolean;
  /** length of the interval where the file states it [s]; NaN where it has to be found */
  spanS: number;
  /** how long after the row before it every row stands, where that is known already [s] */
  stepS?: number;
  /** room that nobody needs any more, for the order of the rows */
  spare?: Int32Array | undefined;
}

/** The rows of a record in time order, one a moment. */
export interface IntervalGrid {
  intervalS: number;
  /** rows that stay, in time order; listed when they are first asked for */
  readonly kept: Int32Array;
  /** all rows stay, as they stand */
  isEveryRow: boolean;
  /** rows dropped because another of the same moment says the same */
  duplicates: number;
  /** rows dropped because a row of the same moment was chosen before them */
  overruled: number;
  /** rows that stood before a row of an earlier moment */
  misplaced: number;
}

/** Thrown where two rows of one moment disagree and nobody has said which of them counts. */
export class ConflictingRows extends InputProblem {
  /** row of the first that contradicts an earlier one */
  readonly row: number;

  constructor(row: number, earlier: number, conflicts: number) {
    super([
      {
        code: 'conflicting-repeat',
        row,
        expected: `the values of row ${earlier}, which has the same time`,
        found: conflicts === 1 ? 'other values' : `other values, as in ${conflicts} rows of the file`,
      },
    ]);
    this.row = row;
  }
}

/**
 * Puts rows in time order on one grid.
 * @param rows what was read
 * @param keep which of two rows of one moment counts where they differ
 * @returns the grid
 * @throws ConflictingRows where they differ and `keep` is undefined
 * @throws InputProblem where intervals are of different lengths, or there are fewer than two
 */
export function gridRows(rows: MomentRows, keep: 'first' | 'last' | undefined): IntervalGrid {
  if (isRegular(rows)) {
    const { utcS, spare } = rows;
    refuseLongInterval(rows.rowNumber[1]!, utcS[1]! - utcS[0]!);
    let listed: Int32Array | undefined;
    return {
      intervalS: utcS[1]! - utcS[0]!,
      get kept() {
        listed ??= everyRow(spare?.subarray(0, utcS.length) ?? new Int32Array(utcS.length));
        return listed;
      },
      isEveryRow: true,
      duplicates: 0,
      overruled: 0,
      misplaced: 0,
    };
  }
  const { order, misplaced } = timeOrder(rows.utcS);
  const { kept, duplicates, overruled } = oneAMoment(rows, order, keep);
  const intervalS = Number.isNaN(rows.spanS) ? shownStepS(rows.utcS, kept) : rows.spanS;
  if (kept.length > 1) refuseLongInterval(rows.rowNumber[kept[1]!]!, intervalS);
  refuseOffGrid(rows, kept, intervalS);
  if (Number.isNaN(rows.spanS)) refuseSecondInterval(rows, kept, intervalS);
  return { intervalS, kept, isEveryRow: false, duplicates, overruled, misplaced };
}

/** Rows further apart than any month are no intervals: one of two stamps is wrong. */
function refuseLongInterval(row: number, intervalS: number): void {
  if (!(intervalS > MOST_INTERVAL_S)) return;
  const expected = `an interval of at most ${MOST_INTERVAL_S} s`;
  throw new InputProblem([{ code: 'out-of-range', row, expected, found: `${intervalS} s`, unit: 's' }]);
}

/** Most files: every row one interval after the row before it. */
function isRegular({ utcS, spanS, stepS: knownS }: MomentRows): boolean {
  const stepS = utcS[1]! - utcS[0]!;
  if (!(stepS > 0) || (spanS !== stepS && !Number.isNaN(spanS))) return false;
  if (stepS === knownS) return true;
  for (let i = 1; i < utcS.length; i++) if (utcS[i]! - utcS[i - 1]! !== stepS) return false;
  return true;
}

function everyRow(rows: Int32Array): Int32Array {
  for (let i = 0; i < rows.length; i++) rows[i] = i;
  return rows;
}

function timeOrder(utcS: Float64Array): { order: Int32Array; misplaced: number } {
  const n = utcS.length;
  const order = new Int32Array(n);
  let count = 0;
  for (let i = 0; i < n; i++) if (!Number.isNaN(utcS[i]!)) order[count++] = i;
  const filled = order.subarray(0, count);
  const forward = stepsBack(utcS, filled);
  if (forward === 0) return { order: filled, misplaced: 0 };
  filled.reverse();
  const backward = stepsBack(utcS, filled);
  if (backward > 0) filled.sort((a, b) => utcS[a]! - utcS[b]! || a - b);
  return { order: filled, misplaced: Math.min(forward, backward) };
}

function stepsBack(utcS: Float64Array, order: Int32Array): number {
  let back = 0;
  for (let i = 1; i < order.length; i++) if (utcS[order[i]!]! < utcS[order[i - 1]!]!) back++;
  return back;
}

/** Keeps the rows that stay, in the place of `order`: what is written lies before what is read. */
function oneAMoment(rows: MomentRows, order: Int32Array, keep: 'first' | 'last' | undefined) {
  const { utcS, rowNumber } = rows;
  const conflicts = new Conflicts(rowNumber);
  let count = 0;
  let duplicates = 0;
  for (const row of order) {
    const earlier = count > 0 ? order[count - 1]! : -1;
    if (earlier < 0 || utcS[earlier] !== utcS[row]) {
      order[count++] = row;
      continue;
    }
    if (rows.agree(earlier, row)) duplicates++;
    else conflicts.add(earlier, row);
    const later = rowNumber[row]! > rowNumber[earlier]!;
    if (later === (keep === 'last')) order[count - 1] = row;
  }
  if (keep === undefined) conflicts.refuse();
  return { kept: order.subarray(0, count), duplicates, overruled: conflicts.count };
}

/** Rows of one moment that disagree: how many, and which comes first in the file. */
class Conflicts {
  count = 0;
  #row = Number.POSITIVE_INFINITY;
  #earlier = 0;
  readonly #rowNumber: Int32Array;

  constructor(rowNumber: Int32Array) {
    this.#rowNumber = rowNumber;
  }

  add(a: number, b: number): void {
    this.count++;
    const [one, other] = [this.#rowNumber[a]!, this.#rowNumber[b]!];
    if (Math.max(one, other) >= this.#row) return;
    this.#row = Math.max(one, other);
    this.#earlier = Math.min(one, other);
  }

  refuse(): void {
    if (this.count > 0) throw new ConflictingRows(this.#row, this.#earlier, this.count);
  }
}

/**
 * Whether two rows hold the same in every column; a missing value is like another.
 * @param values columns
 */
export function sameIn(values: readonly Float64Array[]): MomentRows['agree'] {
  return (a, b) => values.every((column) => isSame(column[a]!, column[b]!));
}

/**
 * Whether two values are the same, or both missing.
 * @param a one
 * @param b other
 */
export function isSame(a: number, b: number): boolean {
  return a === b || (Number.isNaN(a) && Number.isNaN(b));
}

function shownStepS(utcS: Float64Array, kept: Int32Array): number {
  const stepS = commonestStepS(utcS, kept);
  if (!Number.isNaN(stepS)) return stepS;
  const expected = 'at least two intervals, so that their length shows';
  throw new InputProblem([{ code: 'wrong-length', expected, found: `${kept.length}` }]);
}

function refuseOffGrid(rows: MomentRows, kept: Int32Array, intervalS: number): void {
  for (let i = 1; i < kept.length; i++) {
    const stepS = rows.utcS[kept[i]!]! - rows.utcS[kept[i - 1]!]!;
    if (stepS === intervalS) continue;
    if (stepS < intervalS || stepS % intervalS !== 0) {
      throw new InputProblem([mixedIntervals(rows.rowNumber[kept[i]!]!, intervalS, stepS)]);
    }
  }
}

/**
 * A stretch of equal longer steps is a second interval length, not a number of gaps that happen to be alike.
 * Other gaps, strewn at random with share p, make a run of r with probability about p^r at each place: a run is refused where that
 * would be met less than once in a hundred files, and from three steps on at the earliest.
 */
function refuseSecondInterval(rows: MomentRows, kept: Int32Array, intervalS: number): void {
  const n = kept.length - 1;
  const step = (i: number) => rows.utcS[kept[i + 1]!]! - rows.utcS[kept[i]!]!;
  let gaps = 0;
  for (let i = 0; i < n; i++) if (step(i) !== intervalS) gaps++;
  for (let i = 0; i < n; ) {
    const stepS = step(i);
    let end = i + 1;
    while (end < n && step(end) === stepS) end++;
    const run = end - i;
    const share = (gaps - run) / n;
    if (stepS !== intervalS && run >= 3 && n * share ** run < 0.01) {
      throw new InputProblem([mixedIntervals(rows.rowNumber[kept[i + 1]!]!, intervalS, stepS)]);
    }
    i = end;
  }
}
