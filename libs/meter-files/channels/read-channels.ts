import { Question } from '#libs/contract/question.js';
import { zoneTable } from '#libs/contract/time-zone.js';
import { InputProblem, type Problem, type Remark } from '#libs/engine/index.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { buildColumns, type Quantity, type QuantitySource } from '../record/build-columns.js';
import { closeReading, type ReadResult } from '../record/close-reading.js';
import { commonestStepS } from '../record/commonest-step.js';
import { gridRows } from '../record/interval-grid.js';
import { mixedIntervals } from '../record/mixed-intervals.js';
import { shownReading } from '../record/reading-shown.js';
import { type ChannelPoints, type Keep, orderedPoints, registerSteps } from './channel-points.js';
import type { MeterChannel, RowNumbers } from './meter-channel.js';

const DAY_S = 86_400;

/** What a reader of channels has found in a file. */
export interface ChannelFile {
  /** row of the table of formats */
  format: string;
  channels: readonly MeterChannel[];
  notes: readonly Remark[];
  /** values that stand in the file, of whatever channel */
  rowsRead: number;
  /** channels of leading kvar that cannot be read with these */
  leadingElsewhere?: readonly string[];
}

/**
 * Joins the channels of a meter on the beginnings of their intervals and closes them into a record. Channels of one
 * quantity are added up (quadrants, parts of a site); a moment that one of them lacks has no value.
 * @param file channels of one meter
 * @param options what is said about it; of the map `keepRow` and repairs matter
 * @returns the record and its quality
 * @throws Question where a moment has two different values
 * @throws InputProblem where active or reactive energy is missing, or interval lengths differ
 */
export function readChannels(file: ChannelFile, options: ReadOptions): MeterReading {
  const map = options.map ?? {};
  const said = map.keepRow;
  refuseMissing(file.channels);
  const { result, conflictRow } = joined(file, options, said ?? 'last');
  if (conflictRow > 0 && said === undefined) {
    const about = 'which of two different values for one moment counts';
    const readings = (['first', 'last'] as const).map((keepRow) =>
      shownReading({ keepRow }, joined(file, options, keepRow).result.columns),
    );
    throw new Question([{ id: 'keepRow', about, readings }], { row: conflictRow });
  }
  return closeReading(result, map);
}

function refuseMissing(channels: readonly MeterChannel[]): void {
  const has = (...quantities: Quantity[]) => channels.some(({ kind }) => quantities.includes(kind.quantity));
  const found = [...new Set(channels.map(({ kind }) => kind.name))].join(', ').slice(0, 300) || 'none';
  const problems: Problem[] = [];
  if (!has('active')) problems.push({ code: 'no-active-column', expected: 'active energy or power', found });
  if (!has('lagging', 'reactive')) {
    problems.push({ code: 'no-reactive-column', expected: 'lagging reactive energy or power', found });
  }
  if (problems.length > 0) throw new InputProblem(problems);
}

interface Series {
  channel: MeterChannel;
  points: ChannelPoints;
}

function joined(file: ChannelFile, options: ReadOptions, keep: Keep): { result: ReadResult; conflictRow: number } {
  const ordered = file.channels
    .filter(({ count }) => count > 0)
    .map((channel) => ({ channel, points: orderedPoints(channel, keep) }));
  const intervalS = oneInterval(ordered);
  const { series, falls, gaps } = asIntervals(ordered, intervalS);
  const rows = allMoments(series);
  const sources = quantitySources(series, rows);
  const grid = gridRows({ ...rows, agree: () => true, spanS: intervalS }, undefined);
  const built = buildColumns({ ...rows, intervalS, kept: grid.kept, shiftS: 0 }, sources);
  const duplicates = ordered.reduce((sum, { points }) => sum + points.duplicates, 0);
  const conflicts = ordered.reduce((sum, { points }) => sum + points.conflicts, 0);
  const conflictRows = ordered.map(({ points }) => points.conflictRow).filter((row) => row > 0);
  const notes = [
    ...file.notes,
    ...addedNotes(series),
    ...(falls > 0 ? [note('register-fell', { readings: falls })] : []),
    ...(gaps > 0 ? [note('register-readings-missing', { readings: gaps })] : []),
    ...(duplicates > 0 ? [note('duplicates-dropped', { rows: duplicates })] : []),
    ...(conflicts > 0 ? [note('conflicting-rows-settled', { rows: conflicts, kept: keep })] : []),
    ...(built.withoutValue > 0 ? [note('intervals-without-value', { intervals: built.withoutValue })] : []),
    ...reactiveNotes(sources, built.negativeReactive, file.leadingElsewhere ?? []),
  ];
  const firstS = rows.utcS[0] ?? 0;
  const lastS = rows.utcS[rows.utcS.length - 1] ?? 0;
  const zone = zoneTable(options.siteTimeZone ?? options.timeZone ?? 'UTC', firstS - 2 * DAY_S, lastS + 2 * DAY_S);
  const counts = { format: file.format, rowsRead: file.rowsRead, rejectedRows: conflicts };
  const result = { columns: built.columns, duplicates, notes, counts, zone };
  return { result, conflictRow: conflictRows.length > 0 ? Math.min(...conflictRows) : 0 };
}

/** The one length that the channels state or show. */
function oneInterval(ordered: readonly Series[]): number {
  let first = Number.NaN;
  for (const { channel, points } of ordered) {
    const stated = channel.intervalS;
    const intervalS = Number.isNaN(stated) ? shownStepS(points, channel.kind.name) : stated;
    if (Number.isNaN(first)) first = intervalS;
    if (intervalS !== first) throw new InputProblem([mixedIntervals(points.rowNumber.at(0)!, first, intervalS)]);
  }
  return first;
}

function shownStepS({ beginS, rowNumber }: ChannelPoints, name: string): number {
  const stepS = commonestStepS(beginS);
  if (!Number.isNaN(stepS)) return stepS;
  const expected = `at least two intervals of ${name}, so that their length shows`;
  throw new InputProblem([{ code: 'wrong-length', row: rowNumber.at(0) ?? 1, expected, found: `${beginS.length}` }]);
}

function asIntervals(ordered: readonly Series[], intervalS: number) {
  let falls = 0;
  let gaps = 0;
  const series = ordered.map(({ channel, points }) => {
    if (!channel.kind.cumulative) return { channel, points };
    const steps = registerSteps(points, intervalS);
    falls += steps.falls;
    gaps += steps.gaps;
    return { channel, points: steps.points };
  });
  return { series, falls, gaps };
}

interface Moments {
  utcS: Float64Array;
  rowNumber: Int32Array;
}

/** Every moment that any channel has, in order, with the first row that has it. */
function allMoments(series: readonly Series[]): Moments {
  const [first] = series;
  if (first === undefined) return { utcS: new Float64Array(0), rowNumber: new Int32Array(0) };
  const { beginS: utcS, rowNumber } = first.points;
  const rows = rowNumber instanceof Int32Array ? rowNumber : listed(rowNumber);
  let moments: Moments = { utcS, rowNumber: rows.subarray(0, utcS.length) };
  for (const { points } of series.slice(1)) moments = union(moments, points);
  return moments;
}

function listed(rowNumber: Exclude<RowNumbers, Int32Array>): Int32Array {
  const rows = new Int32Array(rowNumber.count);
  for (let i = 0; i < rows.length; i++) rows[i] = rowNumber.at(i)!;
  return rows;
}

function union(a: Moments, { beginS, rowNumber }: ChannelPoints): Moments {
  if (a.utcS.length === beginS.length && a.utcS.every((momentS, i) => momentS === beginS[i])) return a;
  const utcS = new Float64Array(a.utcS.length + beginS.length);
  const rows = new Int32Array(utcS.length);
  let count = 0;
  let i = 0;
  let j = 0;
  while (i < a.utcS.length || j < beginS.length) {
    const left = i < a.utcS.length ? a.utcS[i]! : Number.POSITIVE_INFINITY;
    const right = j < beginS.length ? beginS[j]! : Number.POSITIVE_INFINITY;
    utcS[count] = Math.min(left, right);
    rows[count++] = left <= right ? a.rowNumber[i]! : rowNumber.at(j)!;
    if (left <= right) i++;
    if (right <= left) j++;
  }
  return { utcS: utcS.subarray(0, count), rowNumber: rows.subarray(0, count) };
}

/** One column a quantity in kilo units, a value for each moment that every channel of the quantity has. */
function quantitySources(series: readonly Series[], { utcS }: Moments): QuantitySource[] {
  const sources = new Map<Quantity, QuantitySource>();
  for (const { channel, points } of series) {
    const { quantity, energy, times, over } = channel.kind;
    const values = new Float64Array(utcS.length).fill(Number.NaN);
    let at = 0;
    for (let i = 0; i < points.beginS.length; i++) {
      while (utcS[at] !== points.beginS[i]) at++;
      values[at] = (points.values[i]! * times) / over;
    }
    const known = sources.get(quantity);
    if (known === undefined)
      sources.set(quantity, { quantity, values, energy, times: 1, over: 1, column: 0, spare: true });
    else if (known.energy !== energy) refuseMixedUnits(channel.kind.name, points.rowNumber.at(0)!);
    else for (let i = 0; i < values.length; i++) known.values[i]! += values[i]!;
  }
  return [...sources.values()];
}

function refuseMixedUnits(name: string, row: number): never {
  const expected = 'channels of one quantity all as energies, or all as powers';
  throw new InputProblem([{ code: 'wrong-unit', row, expected, found: `both, with ${name}` }]);
}

function addedNotes(series: readonly Series[]): Remark[] {
  const names = new Map<Quantity, string[]>();
  for (const { channel } of series) {
    const { quantity, name } = channel.kind;
    names.set(quantity, [...(names.get(quantity) ?? []), name]);
  }
  return [...names]
    .filter(([, list]) => list.length > 1)
    .map(([quantity, list]) => note('channels-added', { channels: list.sort().join(', ').slice(0, 300), quantity }));
}

function reactiveNotes(
  sources: readonly QuantitySource[],
  negative: number,
  leadingElsewhere: readonly string[],
): Remark[] {
  const has = (quantity: Quantity) => sources.some((source) => source.quantity === quantity);
  const exported = has('exported') ? [note('export-subtracted', { column: 'exported' })] : [];
  if (has('reactive') && negative > 0)
    return [note('reactive-sign-taken', { lagging: 'positive', negative }), ...exported];
  if (has('leading')) return exported;
  if (leadingElsewhere.length > 0) {
    return [note('leading-left-out', { channels: leadingElsewhere.join(', ').slice(0, 300) }), ...exported];
  }
  return [note(has('reactive') ? 'reactive-never-leading' : 'leading-not-recorded', {}), ...exported];
}
