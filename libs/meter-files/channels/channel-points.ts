import type { MeterChannel, RowNumbers } from './meter-channel.js';

/** Which of two values for one moment counts. */
export type Keep = 'first' | 'last';

/** The points of a channel in time order, one a moment. */
export interface ChannelPoints {
  beginS: Float64Array;
  values: Float64Array;
  rowNumber: RowNumbers;
  /** points dropped because another of the same moment says the same */
  duplicates: number;
  /** points of a moment that has another value already */
  conflicts: number;
  /** row of the first of them, 0 where there is none */
  conflictRow: number;
}

/**
 * Puts the points of a channel in time order; the channel's own columns where they are already.
 * @param channel as read
 * @param keep which of two different values for one moment counts
 */
export function orderedPoints(channel: MeterChannel, keep: Keep): ChannelPoints {
  const { count, beginS, values, rowNumber } = channel;
  let sorted = true;
  for (let i = 1; i < count && sorted; i++) sorted = beginS[i]! > beginS[i - 1]!;
  if (sorted) {
    const [moments, numbers] = [beginS.subarray(0, count), values.subarray(0, count)];
    return { beginS: moments, values: numbers, rowNumber, duplicates: 0, conflicts: 0, conflictRow: 0 };
  }
  // points of one moment stay in the order of the file
  const order = new Int32Array(count);
  for (let i = 0; i < count; i++) order[i] = i;
  order.sort((a, b) => beginS[a]! - beginS[b]! || a - b);
  const rows = new Int32Array(count);
  const points: ChannelPoints = {
    beginS: new Float64Array(count),
    values: new Float64Array(count),
    rowNumber: rows,
    duplicates: 0,
    conflicts: 0,
    conflictRow: 0,
  };
  let kept = 0;
  for (const index of order) {
    if (kept > 0 && points.beginS[kept - 1] === beginS[index]) {
      if (!settleRepeat(points, kept - 1, { value: values[index]!, row: rowNumber.at(index)! })) continue;
      if (keep === 'first') continue;
      kept--;
    }
    points.beginS[kept] = beginS[index]!;
    points.values[kept] = values[index]!;
    rows[kept] = rowNumber.at(index)!;
    kept++;
  }
  points.beginS = points.beginS.subarray(0, kept);
  points.values = points.values.subarray(0, kept);
  return points;
}

/** Counts a second value for a moment; true where it is another one. */
function settleRepeat(points: ChannelPoints, at: number, { value, row }: { value: number; row: number }): boolean {
  if (Object.is(points.values[at], value) || points.values[at] === value) {
    points.duplicates++;
    return false;
  }
  points.conflicts++;
  if (points.conflictRow === 0 || row < points.conflictRow) points.conflictRow = row;
  return true;
}

/** What register readings come to. */
export interface RegisterSteps {
  points: ChannelPoints;
  /** steps in which the register fell: it was reset, exchanged, or ran over */
  falls: number;
  /** steps across missing readings, whose energy belongs to no one interval */
  gaps: number;
}

/**
 * Turns the readings of a register that counts up into the energy of each interval: the reading at its end less the one
 * at its beginning. A step that falls, or spans more than one interval, gives no value.
 * @param points readings in time order
 * @param intervalS length of an interval [s]
 */
export function registerSteps(points: ChannelPoints, intervalS: number): RegisterSteps {
  const n = Math.max(points.beginS.length - 1, 0);
  const values = new Float64Array(n);
  const scale = 10 ** decimalsOf(points.values);
  let falls = 0;
  let gaps = 0;
  for (let i = 0; i < n; i++) {
    const step = points.values[i + 1]! - points.values[i]!;
    const spans = points.beginS[i + 1]! - points.beginS[i]! !== intervalS;
    if (step < 0) falls++;
    else if (spans) gaps++;
    // readings are decimal numbers, so is what lies between them
    values[i] = step < 0 || spans ? Number.NaN : Math.round(step * scale) / scale;
  }
  const beginS = points.beginS.subarray(0, n);
  const rowNumber = Int32Array.from({ length: n }, (_, i) => points.rowNumber.at(i + 1)!);
  return { points: { ...points, beginS, values, rowNumber }, falls, gaps };
}

const MOST_DECIMALS = 9;

/** The least number of decimals that writes every reading. */
function decimalsOf(values: Float64Array): number {
  let decimals = 0;
  for (const value of values) {
    while (decimals < MOST_DECIMALS && !Number.isNaN(value) && !hasDecimals(value, decimals)) decimals++;
  }
  return decimals;
}

function hasDecimals(value: number, decimals: number): boolean {
  const scale = 10 ** decimals;
  return Math.round(value * scale) / scale === value;
}
