import { InputProblem } from '../problem.js';
import { createLoadRecord, type LoadRecord } from './load-record.js';

/** Which of two records counts where they disagree. */
export type KeptRecord = 'earlier' | 'later';

/** A stretch in which two records disagree interval after interval. */
export interface DisagreedSpan {
  /** UTC [s] */
  beginS: number;
  /** exclusive [s] */
  endS: number;
  intervals: number;
}

/** Columns of a record that hold values. */
export type RecordSeries = 'activeKw' | 'laggingKvar' | 'leadingKvar' | 'voltageV' | 'connectedKvar' | 'standby';

/** What two records have in common, and where they disagree. */
export interface RecordOverlap {
  /** intervals that the later record alone has */
  added: number;
  /** intervals that both have, with the same values */
  agreed: number;
  /** intervals that both have, with different values */
  disagreed: number;
  spanCount: number;
  /** the first hundred, in time order */
  spans: DisagreedSpan[];
  /** largest difference of each column that disagrees somewhere, in the unit of its name */
  largest: Partial<Record<RecordSeries, number>>;
}

const SERIES = ['activeKw', 'laggingKvar', 'leadingKvar', 'voltageV', 'connectedKvar', 'standby'] as const;
const OPTIONAL = ['voltageV', 'connectedKvar', 'standby'] as const;
const MOST_SPANS = 100;
/**
 * Two files state one value alike in every digit; energies turned into powers differ in the last bits of a 64-bit number,
 * some 10⁻¹⁶ of it. No meter resolves 10⁻⁹.
 */
const SAME_SHARE = 1e-9;

/**
 * Holds a later record against an earlier one. An interval disagrees where any column differs that both records have.
 * @param earlier the record as it stands
 * @param later the record that extends or corrects it
 * @returns counts, spans and the largest differences [unit of each column]
 * @throws InputProblem where the two are not on one grid
 */
export function overlapOf(earlier: LoadRecord, later: LoadRecord): RecordOverlap {
  const { earlierAt, laterAt, disagrees } = align(earlier, later);
  const overlap: RecordOverlap = { added: 0, agreed: 0, disagreed: 0, spanCount: 0, spans: [], largest: {} };
  let open: DisagreedSpan = { beginS: 0, endS: Number.NEGATIVE_INFINITY, intervals: 0 };
  for (let i = 0; i < disagrees.length; i++) {
    if (disagrees[i] === 0) {
      if (earlierAt[i] === -1) overlap.added++;
      else if (laterAt[i] !== -1) overlap.agreed++;
      continue;
    }
    overlap.disagreed++;
    const beginS = earlier.beginS[earlierAt[i]!]!;
    if (open.endS !== beginS) {
      open = { beginS, endS: beginS, intervals: 0 };
      if (overlap.spanCount++ < MOST_SPANS) overlap.spans.push(open);
    }
    open.endS = beginS + earlier.intervalS;
    open.intervals++;
    growLargest(overlap.largest, { earlier, later }, earlierAt[i]!, laterAt[i]!);
  }
  return overlap;
}

/**
 * One record from two: every interval that either has. Where both have one and agree, the earlier stands; where they
 * disagree, the whole interval is taken from the one that is kept. A column that not every record has (voltage, an old
 * bank's kvar, standby) is filled from whichever has it, and stays only where that fills every interval.
 * Repaired intervals are counted at most, because a record does not say which of its intervals they are.
 * @param earlier the record as it stands
 * @param later the record that extends or corrects it
 * @param keep which counts where they disagree
 * @returns the union; the earlier record itself where the later one adds nothing
 * @throws InputProblem where the two are not on one grid
 */
export function mergeRecords(earlier: LoadRecord, later: LoadRecord, keep: KeptRecord): LoadRecord {
  const alignment = align(earlier, later);
  const { earlierAt, laterAt, disagrees } = alignment;
  const intervals = disagrees.length;
  let taken = 0;
  let agreed = 0;
  for (let i = 0; i < intervals; i++) {
    if (earlierAt[i] === -1 || (disagrees[i] === 1 && keep === 'later')) taken++;
    else if (disagrees[i] === 0 && laterAt[i] !== -1) agreed++;
  }
  const columns = mergedColumns({ earlier, later }, alignment, keep);
  const gained = OPTIONAL.some((name) => earlier[name] === null && columns[name] !== null);
  if (taken === 0 && !gained) return earlier;
  const repaired = Math.min(earlier.repaired, intervals - taken) + Math.min(later.repaired, taken);
  return createLoadRecord({
    intervalS: earlier.intervalS,
    ...columns,
    repaired,
    duplicates: earlier.duplicates + later.duplicates + agreed,
    notes: [...earlier.notes, ...later.notes.filter((note) => !earlier.notes.some((said) => saysSame(said, note)))],
  });
}

interface Both {
  earlier: LoadRecord;
  later: LoadRecord;
}

/** The union's intervals in time order: their places in either record, −1 where one does not have it. */
interface Alignment {
  earlierAt: Int32Array;
  laterAt: Int32Array;
  /** 1 where both have the interval with different values */
  disagrees: Uint8Array;
}

function align(earlier: LoadRecord, later: LoadRecord): Alignment {
  refuseOtherGrid(earlier, later);
  const [a, b] = [earlier.beginS, later.beginS];
  const earlierAt = new Int32Array(a.length + b.length);
  const laterAt = new Int32Array(a.length + b.length);
  const disagrees = new Uint8Array(a.length + b.length);
  let i = 0;
  let j = 0;
  let n = 0;
  for (; i < a.length || j < b.length; n++) {
    const fromS = i < a.length ? a[i]! : Number.POSITIVE_INFINITY;
    const toS = j < b.length ? b[j]! : Number.POSITIVE_INFINITY;
    earlierAt[n] = fromS <= toS ? i++ : -1;
    laterAt[n] = toS <= fromS ? j++ : -1;
    if (fromS === toS && differs({ earlier, later }, i - 1, j - 1)) disagrees[n] = 1;
  }
  return { earlierAt: earlierAt.slice(0, n), laterAt: laterAt.slice(0, n), disagrees: disagrees.slice(0, n) };
}

function refuseOtherGrid(earlier: LoadRecord, later: LoadRecord): void {
  const { intervalS, firstS } = earlier;
  if (later.intervalS !== intervalS) {
    throw new InputProblem([
      {
        code: 'mixed-intervals',
        path: 'intervalS',
        expected: `intervals of ${intervalS} s, as the record has`,
        found: `${later.intervalS}`,
        unit: 's',
      },
    ]);
  }
  if (Number.isSafeInteger((later.firstS - firstS) / intervalS)) return;
  const besideS = (((later.firstS - firstS) % intervalS) + intervalS) % intervalS;
  throw new InputProblem([
    {
      code: 'mixed-intervals',
      path: 'beginS',
      expected: `intervals that begin when the record's do, a multiple of ${intervalS} s apart`,
      found: `${besideS} s beside them`,
    },
  ]);
}

function differs({ earlier, later }: Both, i: number, j: number): boolean {
  for (const name of SERIES) {
    const [a, b] = [earlier[name], later[name]];
    if (a !== null && b !== null && !isSame(a[i]!, b[j]!)) return true;
  }
  return false;
}

function isSame(a: number, b: number): boolean {
  return a === b || Math.abs(a - b) <= SAME_SHARE * Math.max(Math.abs(a), Math.abs(b));
}

function growLargest(largest: RecordOverlap['largest'], { earlier, later }: Both, i: number, j: number): void {
  for (const name of SERIES) {
    const [a, b] = [earlier[name], later[name]];
    if (a === null || b === null || isSame(a[i]!, b[j]!)) continue;
    largest[name] = Math.max(largest[name] ?? 0, Math.abs(a[i]! - b[j]!));
  }
}

type Columns = Pick<LoadRecord, 'beginS' | RecordSeries>;

function mergedColumns(both: Both, alignment: Alignment, keep: KeptRecord): Columns {
  const needed = (name: 'beginS' | 'activeKw' | 'laggingKvar' | 'leadingKvar') => {
    const values = new Float64Array(alignment.disagrees.length);
    mergeInto(values, both.earlier[name], both.later[name], { ...alignment, keep });
    return values;
  };
  const optional = <T extends Float64Array | Uint8Array>(values: T, a: T | null, b: T | null): T | null => {
    if (a === null && b === null) return null;
    return mergeInto(values, a, b, { ...alignment, keep }) ? values : null;
  };
  const { earlier, later } = both;
  const n = alignment.disagrees.length;
  return {
    beginS: needed('beginS'),
    activeKw: needed('activeKw'),
    laggingKvar: needed('laggingKvar'),
    leadingKvar: needed('leadingKvar'),
    voltageV: optional(new Float64Array(n), earlier.voltageV, later.voltageV),
    connectedKvar: optional(new Float64Array(n), earlier.connectedKvar, later.connectedKvar),
    standby: optional(new Uint8Array(n), earlier.standby, later.standby),
  };
}

/** @returns false where an interval has a value in neither */
function mergeInto(
  target: Float64Array | Uint8Array,
  earlier: Float64Array | Uint8Array | null,
  later: Float64Array | Uint8Array | null,
  { earlierAt, laterAt, disagrees, keep }: Alignment & { keep: KeptRecord },
): boolean {
  for (let i = 0; i < target.length; i++) {
    const a = earlierAt[i] === -1 ? undefined : earlier?.[earlierAt[i]!];
    const b = laterAt[i] === -1 ? undefined : later?.[laterAt[i]!];
    const value = disagrees[i] === 1 && keep === 'later' ? (b ?? a) : (a ?? b);
    if (value === undefined) return false;
    target[i] = value;
  }
  return true;
}

function saysSame(a: LoadRecord['notes'][number], b: LoadRecord['notes'][number]): boolean {
  return JSON.stringify(a) === JSON.stringify(b);
}
