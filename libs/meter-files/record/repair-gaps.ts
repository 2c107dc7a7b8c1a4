import type { MeterRepair } from '#libs/contract/meter-map.js';
import { InputProblem, localTime, type ZoneTable } from '#libs/engine/index.js';
import { MAX_INTERVALS } from '../meter-format.js';
import type { RecordColumns } from './build-columns.js';

/** Repaired columns and how many intervals were filled. */
export interface Repaired {
  columns: RecordColumns;
  intervals: number;
}

type Series = 'activeKw' | 'laggingKvar' | 'leadingKvar' | 'voltageV' | 'connectedKvar' | 'standby';

const SERIES: readonly Series[] = ['activeKw', 'laggingKvar', 'leadingKvar', 'voltageV', 'connectedKvar', 'standby'];
/** These are states, and a state half-way between two is none. */
const STATES: readonly Series[] = ['connectedKvar', 'standby'];

/**
 * Fills gaps between valid intervals, where this was asked for and the gap is no longer than said.
 * `hold` repeats the interval before, `interpolate` draws a line between the neighbours, `typicalDay` takes the mean of
 * the record's intervals at the same local time, working days and weekends apart. States are always held.
 * @param columns the record's columns
 * @param method what was asked for
 * @param upToS longest gap that is filled [s]
 * @param zone the site's zone
 * @returns columns with the gaps filled
 * @throws InputProblem where no longest gap is given, or the filled record would be too long
 */
export function repairGaps(
  columns: RecordColumns,
  method: Exclude<MeterRepair, 'none'>,
  upToS: number | undefined,
  zone: ZoneTable,
): Repaired {
  if (upToS === undefined || !(upToS > 0)) {
    const found = upToS === undefined ? 'none' : `${upToS}`;
    throw new InputProblem([
      { code: 'missing', path: 'upToS', expected: 'the longest gap to repair', found, unit: 's' },
    ]);
  }
  const slots = filledSlots(columns, upToS);
  if (slots.gaps.length === 0) return { columns, intervals: 0 };
  const typical = method === 'typicalDay' ? typicalDay(columns, zone) : null;
  const filled = { ...columns, beginS: slots.beginS };
  for (const series of SERIES) {
    const values = columns[series];
    if (values === null) continue;
    const target =
      values instanceof Uint8Array ? new Uint8Array(slots.beginS.length) : new Float64Array(slots.beginS.length);
    const how = STATES.includes(series) ? 'hold' : method;
    const mean = typical?.(values) ?? null;
    fillInto(target, { values, slots, how, mean });
    Object.assign(filled, { [series]: target });
  }
  const intervals = slots.beginS.length - columns.beginS.length;
  return { columns: filled, intervals };
}

interface Slots {
  beginS: Float64Array;
  /** index of the valid interval at or before each slot */
  source: Int32Array;
  gaps: { from: number; to: number }[];
}

function filledSlots({ beginS, intervalS }: RecordColumns, upToS: number): Slots {
  const times: number[] = [];
  const source: number[] = [];
  const gaps: { from: number; to: number }[] = [];
  for (let i = 0; i < beginS.length; i++) {
    times.push(beginS[i]!);
    source.push(i);
    const missing = i + 1 < beginS.length ? Math.round((beginS[i + 1]! - beginS[i]!) / intervalS) - 1 : 0;
    if (missing === 0 || missing * intervalS > upToS) continue;
    refuseTooLong(times.length + missing);
    gaps.push({ from: times.length, to: times.length + missing });
    for (let k = 1; k <= missing; k++) {
      times.push(beginS[i]! + k * intervalS);
      source.push(i);
    }
  }
  return { beginS: Float64Array.from(times), source: Int32Array.from(source), gaps };
}

function refuseTooLong(intervals: number): void {
  if (intervals <= MAX_INTERVALS) return;
  const expected = `a record of at most ${MAX_INTERVALS} intervals`;
  throw new InputProblem([{ code: 'too-large', path: 'upToS', expected, found: `${intervals} with the gaps filled` }]);
}

interface Filling {
  values: Float64Array | Uint8Array;
  slots: Slots;
  how: Exclude<MeterRepair, 'none'>;
  mean: ((beginS: number) => number | null) | null;
}

function fillInto(target: Float64Array | Uint8Array, { values, slots, how, mean }: Filling): void {
  for (let i = 0; i < target.length; i++) target[i] = values[slots.source[i]!]!;
  if (how === 'hold') return;
  for (const { from, to } of slots.gaps) {
    const before = values[slots.source[from]!]!;
    const after = values[slots.source[from]! + 1]!;
    for (let i = from; i < to; i++) {
      const line = before + ((after - before) * (i - from + 1)) / (to - from + 1);
      target[i] = how === 'typicalDay' ? (mean?.(slots.beginS[i]!) ?? line) : line;
    }
  }
}

/** Means of the record by local time of day, working days and weekends apart. */
function typicalDay({ beginS }: RecordColumns, zone: ZoneTable) {
  const key = (momentS: number) => {
    const { weekday, secondOfDay } = localTime(zone, momentS);
    return secondOfDay + (weekday > 5 ? 100_000 : 0);
  };
  return (values: Float64Array | Uint8Array) => {
    const sums = new Map<number, { sum: number; count: number }>();
    for (let i = 0; i < beginS.length; i++) {
      const at = key(beginS[i]!);
      const sum = sums.get(at) ?? { sum: 0, count: 0 };
      sum.sum += values[i]!;
      sum.count++;
      sums.set(at, sum);
    }
    return (momentS: number) => {
      const found = sums.get(key(momentS));
      return found === undefined ? null : found.sum / found.count;
    };
  };
}
