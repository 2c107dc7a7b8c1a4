import type { ZoneTable } from '#libs/engine/index.js';

/** Local clock times turned into UTC. */
export interface UtcTimes {
  /** one a row [s]; NaN where no clock of the zone ever showed the time */
  utcS: Float64Array;
  /** rows of a doubled hour that were told apart by their order in the file */
  doubledRows: number;
  /** rows of a doubled hour that stand there once only, taken as the first of the two */
  onceRows: number;
}

/** A change of offset and the clock times it makes ambiguous or skips. */
interface Change {
  /** UTC [s] */
  atS: number;
  beforeS: number;
  afterS: number;
  /** clock times from `lowS` up to `highS` happen twice, or never [s] */
  lowS: number;
  highS: number;
  /** rows that fall into a doubled hour, in file order, and their clock times [s] */
  rows: number[];
  localS: number[];
}

/**
 * Turns the clock times of a file into UTC, in place: a second column of times is memory that nobody needs.
 * In a doubled hour the rows count by file order: what stands before the clock's step back is the first pass, what stands
 * behind it the second; where the two passes alternate, the first row of a pair is the first.
 * @param clock times as written [s]; written to
 * @param newestFirst whether the file runs backwards
 * @param table the zone's offsets, over the whole span
 * @param ends whether the stamps mark the ends of intervals: the moment of a change may then be written either way
 * @returns times in UTC, in the array of `clock`
 */
export function localToUtc(clock: Float64Array, newestFirst: boolean, table: ZoneTable, ends: boolean): UtcTimes {
  const changes = changesOf(table);
  if (changes.length === 0) return { utcS: shifted(clock, table.offsetS[0]!), doubledRows: 0, onceRows: 0 };
  const result: UtcTimes = { utcS: clock, doubledRows: 0, onceRows: 0 };
  const n = clock.length;
  let clear = clearTimes(changes, table, Number.NEGATIVE_INFINITY);
  for (let i = 0; i < n; i++) {
    const row = newestFirst ? n - 1 - i : i;
    const localS = clock[row]!;
    if (!(localS > clear.fromS && localS < clear.toS)) clear = clearTimes(changes, table, localS);
    const plainS = localS - clear.offsetS;
    const near = changeAt(clear, localS);
    result.utcS[row] = near === undefined ? plainS : nearChange(near, row, { localS, plainS, ends });
  }
  for (const change of changes) if (change.rows.length > 0) tellApart(change, result);
  return result;
}

function shifted(clock: Float64Array, offsetS: number): Float64Array {
  if (offsetS !== 0) for (let row = 0; row < clock.length; row++) clock[row]! -= offsetS;
  return clock;
}

/** Clock times between two changes, clear of both: they need no thought. */
interface ClearTimes {
  fromS: number;
  toS: number;
  offsetS: number;
  behind: Change | undefined;
  ahead: Change | undefined;
}

/** The change that a clock time beside the clear ones belongs to. */
function changeAt(clear: ClearTimes, localS: number): Change | undefined {
  if (localS >= clear.toS) return clear.ahead;
  return localS <= clear.fromS ? clear.behind : undefined;
}

/** The clear times behind the last change that a clock time lies wholly behind. */
function clearTimes(changes: readonly Change[], table: ZoneTable, localS: number): ClearTimes {
  const next = changes.findIndex(({ highS }) => localS < highS);
  const k = next < 0 ? changes.length : next;
  const behind = changes[k - 1];
  const ahead = changes[k];
  return {
    fromS: behind?.highS ?? Number.NEGATIVE_INFINITY,
    toS: ahead?.lowS ?? Number.POSITIVE_INFINITY,
    offsetS: behind?.afterS ?? table.offsetS[0]!,
    behind,
    ahead,
  };
}

function changesOf(table: ZoneTable): Change[] {
  const changes: Change[] = [];
  for (let k = 1; k < table.fromS.length; k++) {
    const atS = table.fromS[k]!;
    const beforeS = table.offsetS[k - 1]!;
    const afterS = table.offsetS[k]!;
    const lowS = atS + Math.min(beforeS, afterS);
    changes.push({ atS, beforeS, afterS, lowS, highS: atS + Math.max(beforeS, afterS), rows: [], localS: [] });
  }
  return changes;
}

/** A clock time that a change doubles or skips, or the end of a doubled hour. */
function nearChange(
  change: Change,
  row: number,
  { localS, plainS, ends }: { localS: number; plainS: number; ends: boolean },
): number {
  const doubles = change.afterS < change.beforeS;
  if (localS === change.highS && !(ends && doubles)) return plainS;
  if (doubles) {
    change.rows.push(row);
    change.localS.push(localS);
    return Number.NaN;
  }
  // an interval that ends as the clock is put forward may be written in the old time
  return ends && localS === change.lowS ? change.atS : Number.NaN;
}

function tellApart(change: Change, result: UtcTimes): void {
  const { rows, localS } = change;
  const back = localS.flatMap((timeS, i) => (i > 0 && timeS < localS[i - 1]! ? [i] : []));
  const second = back.length === 1 ? rows.map((_, i) => i >= back[0]!) : byOccurrence(change);
  const times = new Set(localS);
  const once = back.length === 0 && times.size === rows.length;
  rows.forEach((row, i) => {
    result.utcS[row] = localS[i]! - (second[i] ? change.afterS : change.beforeS);
  });
  const inside = localS.filter((timeS) => timeS < change.highS).length;
  if (once) result.onceRows += inside;
  else result.doubledRows += inside;
}

/** First, third … row of a time is the first pass; a lone row that ends with the hour is the second, whose clock shows it. */
function byOccurrence(change: Change): boolean[] {
  const total = new Map<number, number>();
  for (const localS of change.localS) total.set(localS, (total.get(localS) ?? 0) + 1);
  const seen = new Map<number, number>();
  return change.localS.map((localS) => {
    const before = seen.get(localS) ?? 0;
    seen.set(localS, before + 1);
    if (total.get(localS) === 1) return localS === change.highS;
    return before % 2 === 1;
  });
}
