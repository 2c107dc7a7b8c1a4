import { zoneTable } from '#libs/contract/time-zone.js';
import { InputProblem, type Problem, type Remark, type ZoneTable } from '#libs/engine/index.js';
import { note } from '../note.js';
import { buildColumns, type Quantity, type QuantitySource, type RecordColumns } from '../record/build-columns.js';
import { kiloValues, type StreamDays } from './stream-days.js';

const DAY_S = 86_400;
/** The market's time, without daylight saving [s]. */
const OFFSET_S = 36_000;

/** The record of a meter's streams. */
export interface StreamRecord {
  columns: RecordColumns;
  duplicates: number;
  notes: Remark[];
  zone: ZoneTable;
}

/**
 * Joins the streams of a meter on their intervals; streams of one quantity are added.
 * @param streams all that are of use
 * @param keep which version of a day counts
 * @param siteTimeZone zone of the site, for the seasons; the market's where nobody says
 * @throws InputProblem where active or reactive energy is missing, or interval lengths differ
 */
export function streamColumns(
  streams: StreamDays[],
  keep: 'first' | 'last',
  siteTimeZone: string | undefined,
): StreamRecord {
  refuseMissing(streams);
  const minutes = oneLength(streams);
  const days = [...new Set(streams.flatMap(({ days: versions }) => [...versions.keys()]))].sort((a, b) => a - b);
  const count = 1440 / minutes;
  const sources = sourcesOf(streams, days, { count, keep });
  const slots = days.length * count;
  const firstRow = (slot: number) => {
    const day = days[Math.floor(slot / count)]!;
    return Math.min(...streams.map((stream) => stream.at(day, keep)?.row ?? Number.POSITIVE_INFINITY));
  };
  const rows = {
    intervalS: minutes * 60,
    kept: Int32Array.from({ length: slots }, (_, slot) => slot),
    utcS: Float64Array.from({ length: slots }, (_, slot) => {
      return days[Math.floor(slot / count)]! * DAY_S - OFFSET_S + (slot % count) * minutes * 60;
    }),
    shiftS: 0,
    rowNumber: Int32Array.from({ length: slots }, (_, slot) => (slot % count === 0 ? firstRow(slot) : 0)),
  };
  const built = buildColumns(rows, sources);
  const duplicates = streams.reduce((sum, stream) => sum + stream.duplicates, 0);
  const firstS = days[0]! * DAY_S;
  const lastS = days[days.length - 1]! * DAY_S;
  return {
    columns: built.columns,
    duplicates,
    notes: [
      ...addedNotes(streams),
      ...(duplicates > 0 ? [note('duplicates-dropped', { rows: duplicates })] : []),
      ...(built.withoutValue > 0 ? [note('intervals-without-value', { intervals: built.withoutValue })] : []),
      ...(streams.some(({ stream }) => stream.quantity === 'leading') ? [] : [note('leading-not-recorded', {})]),
      ...(streams.some(({ stream }) => stream.quantity === 'exported')
        ? [note('export-subtracted', { column: 'B' })]
        : []),
    ],
    zone: zoneTable(siteTimeZone ?? '+10:00', firstS - 2 * DAY_S, lastS + 2 * DAY_S),
  };
}

function refuseMissing(streams: StreamDays[]): void {
  const has = (quantity: Quantity) => streams.some(({ stream }) => stream.quantity === quantity);
  const found = streams.map(({ stream }) => stream.suffix).join(', ') || 'none';
  const problems: Problem[] = [];
  if (!has('active')) problems.push({ code: 'no-active-column', expected: 'a stream of active energy (E)', found });
  if (!has('lagging'))
    problems.push({ code: 'no-reactive-column', expected: 'a stream of reactive energy (Q)', found });
  if (problems.length > 0) throw new InputProblem(problems);
}

function oneLength(streams: StreamDays[]): number {
  const minutes = streams[0]!.stream.minutes;
  for (const { stream } of streams) {
    if (stream.minutes === minutes) continue;
    const expected = `intervals of ${minutes} min, as in row ${streams[0]!.stream.row}`;
    const found = `${stream.minutes} min`;
    throw new InputProblem([{ code: 'mixed-intervals', row: stream.row, column: 9, expected, found, unit: 'min' }]);
  }
  return minutes;
}

/** One column a quantity, in kilo units; a stream without a day leaves the day without a value. */
function sourcesOf(
  streams: StreamDays[],
  days: number[],
  { count, keep }: { count: number; keep: 'first' | 'last' },
): QuantitySource[] {
  const sources = new Map<Quantity, QuantitySource>();
  for (const stream of streams) {
    const { quantity, unit } = stream.stream;
    if (quantity === null) continue;
    const known = sources.get(quantity);
    const energy = known?.energy ?? unit.energy;
    const values = new Float64Array(days.length * count).fill(Number.NaN);
    days.forEach((day, index) => {
      const version = stream.at(day, keep);
      if (version === undefined) return;
      if (version.unit.energy !== energy) refuseMixedUnits(version.row);
      values.set(kiloValues(version), index * count);
    });
    if (known === undefined) sources.set(quantity, { quantity, values, energy, times: 1, over: 1, column: 0 });
    else known.values = known.values.map((value, i) => value + values[i]!);
  }
  return [...sources.values()];
}

function refuseMixedUnits(row: number): never {
  const expected = 'days of one quantity all as energies, or all as powers';
  throw new InputProblem([{ code: 'wrong-unit', row, expected, found: 'both' }]);
}

function addedNotes(streams: StreamDays[]): Remark[] {
  const suffixes = new Map<Quantity, Set<string>>();
  for (const { stream } of streams) {
    if (stream.quantity === null) continue;
    suffixes.set(stream.quantity, (suffixes.get(stream.quantity) ?? new Set()).add(stream.suffix));
  }
  return [...suffixes]
    .filter(([, names]) => names.size > 1)
    .map(([quantity, names]) => note('nem12-streams-added', { streams: [...names].sort().join(', '), quantity }));
}
