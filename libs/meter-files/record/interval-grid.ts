import { InputProblem } from '#libs/engine/index.js';
import { commonestStepS } from './commonest-step.js';
import { mixedIntervals } from './mixed-intervals.js';

/** Rows with a moment each, in any order. */
export interface MomentRows {
  /** UTC, one a row [s]; rows without a moment (NaN) are left out */
  utcS: Float64Array;
  rowNumber: Int32Array;
  /** columns that have to agree where two rows share a moment */
  values: readonly Float64Array[];
  /** length of the interval where the file states it [s]; NaN where it has to be found */
  spanS: number;
  /** room that nobody needs any more, for the order of the rows */
  spare?: Int32Array | undefined;
}

/** The rows of a record in time order, one a moment. */
export interface IntervalGrid {
  intervalS: number;
  /** rows that stay, in time order */
  kept: Int32Array;
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
  if (isRegular(rows.utcS, rows.spanS)) {
    const n = rows.utcS.length;
    const kept = rows.spare?.subarray(0, n) ?? new Int32Array(n);
    for (let i = 0; i < kept.length; i++) kept[i] = i;
    return { intervalS: rows.utcS[1]! - rows.utcS[0]!, kept, duplicates: 0, overruled: 0, misplaced: 0 };
  }
  const { order, misplaced } = timeOrder(rows.utcS);
  const { kept, duplicates, overruled } = oneAMoment(rows, order, keep);
  const intervalS = Number.isNaN(rows.spanS) ? shownStepS(rows.utcS, kept) : rows.spanS;
  refuseOffGrid(rows, kept, intervalS);
  if (Number.isNaN(rows.spanS)) refuseSecondInterval(rows, kept, intervalS);
  return { intervalS, kept, duplicates, overruled, misplaced };
}

/** Most files: every row one interval after the row before it. */
function isRegular(utcS: Float64Array, spanS: number): boolean {
  const stepS = utcS[1]! - utcS[0]!;
  if (!(stepS > 0) || (spanS !== stepS && !Number.isNaN(spanS))) return false;
  for (let i = 1; i < utcS.length; i++) if (utcS[i]! - utcS[i - 1]! !== stepS) return false;
  return true;
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

function oneAMoment(rows: MomentRows, order: Int32Array, keep: 'first' | 'last' | undefined) {
  const { utcS, rowNumber } = rows;
  const kept = new Int32Array(order.length);
  let count = 0;
  let duplicates = 0;
  const conflicts: [number, number][] = [];
  for (const row of order) {
    const earlier = count > 0 ? kept[count - 1]! : -1;
    if (earlier < 0 || utcS[earlier] !== utcS[row]) {
      kept[count++] = row;
      continue;
    }
    if (sameValues(rows.values, earlier, row)) duplicates++;
    else conflicts.push(rowNumber[earlier]! < rowNumber[row]! ? [row, earlier] : [earlier, row]);
    const later = rowNumber[row]! > rowNumber[earlier]!;
    if (later === (keep === 'last')) kept[count - 1] = row;
  }
  if (conflicts.length > 0 && keep === undefined) refuseConflict(rowNumber, conflicts);
  return { kept: kept.subarray(0, count), duplicates, overruled: conflicts.length };
}

function refuseConflict(rowNumber: Int32Array, conflicts: [number, number][]): never {
  const [row, earlier] = conflicts.reduce((a, b) => (rowNumber[b[0]]! < rowNumber[a[0]]! ? b : a));
  throw new ConflictingRows(rowNumber[row]!, rowNumber[earlier]!, conflicts.length);
}

function sameValues(values: readonly Float64Array[], a: number, b: number): boolean {
  for (const column of values) {
    if (column[a] !== column[b] && !(Number.isNaN(column[a]!) && Number.isNaN(column[b]!))) return false;
  }
  return true;
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
