import { Question } from '#libs/contract/question.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { MeterChannel } from '../channels/meter-channel.js';
import { type ChannelFile, readChannels } from '../channels/read-channels.js';
import { readMeters } from '../channels/read-meters.js';
import { RowBuffer } from '../csv/row-buffer.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { chosenChannels, type ObisChannel, type ObisQuantity } from '../obis/obis-quantity.js';
import { shownReading } from '../record/reading-shown.js';
import { RowProblems } from '../row-problems.js';
import { type SeasonClock, seasonClock, seasonMoment } from '../time/season-moment.js';
import type { ProfileColumn, ProfileHeader } from './profile-header.js';
import { ProfileStretches, type Readout, type Stretch } from './profile-stretches.js';

/**
 * Reads load profiles P.01 and P.02 out of a meter's read-out. A head gives the end of its first interval, the status,
 * the length and the columns; every head that follows a gap or an event begins a new stretch.
 * @param source the file
 * @param options what is said about it; of the map `multiplier`, `meter`, `stamp`, `keepRow` and repairs matter
 * @returns the record and its quality
 * @throws InputProblem where it can't be read
 * @throws Question where it holds several meters, or instrument transformers whose ratio may or may not be in the values
 */
export async function readProfileReadout(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  const problems = new RowProblems();
  const lines = new ProfileStretches(problems);
  await eachLine(source, (line, row) => lines.take(line, row));
  problems.refuse();
  const readouts = lines.readouts.filter(({ stretches }) => stretches.length > 0);
  const ratio = statedRatio(readouts);
  const said = options.map?.multiplier;
  if (ratio !== 1 && said === undefined) askAboutRatio(readouts, options, ratio);
  return readUnder(readouts, options, said ?? 1);
}

async function eachLine(source: MeterBytes, take: (line: string, row: number) => void): Promise<void> {
  const buffer = new RowBuffer(source);
  const decoder = new TextDecoder('latin1');
  do {
    for (;;) {
      const to = buffer.bytes.subarray(0, buffer.end).indexOf(buffer.rowEnd, buffer.start);
      if (to < 0) break;
      buffer.rowsBefore++;
      take(decoder.decode(buffer.bytes.subarray(buffer.start, to)), buffer.rowsBefore);
      buffer.start = to + 1;
    }
    buffer.refuseEndlessRow();
  } while (await buffer.more());
}

function statedRatio(readouts: readonly Readout[]): number {
  const [first] = readouts;
  return (first?.currentRatio ?? 1) * (first?.voltageRatio ?? 1);
}

function askAboutRatio(readouts: readonly Readout[], options: ReadOptions, ratio: number): never {
  const about = `whether the values still have to be multiplied by the transformer ratio of ${ratio} that the meter states`;
  const readings = [1, ratio].map((multiplier) =>
    shownReading({ multiplier }, readUnder(readouts, options, multiplier).record),
  );
  throw new Question([{ id: 'multiplier', about, readings }]);
}

function readUnder(readouts: readonly Readout[], options: ReadOptions, multiplier: number): MeterReading {
  const meters = new Map<string, Stretch[]>();
  for (const { meter, stretches } of readouts) meters.set(meter, [...(meters.get(meter) ?? []), ...stretches]);
  const files = new Map<string, ChannelFile>();
  for (const [meter, stretches] of meters) files.set(meter, fileOf(stretches, options, multiplier));
  return readMeters(files, options, readChannels);
}

function fileOf(stretches: readonly Stretch[], options: ReadOptions, multiplier: number): ChannelFile {
  const said = options.timeZone ?? options.map?.timeZone ?? options.siteTimeZone;
  const clocks = stretches.map(({ header }) => header.clockS);
  const clock = seasonClock(said ?? null, clocks);
  const ends = options.map?.stamp !== 'begin';
  const channels = new Map<string, ObisChannel>();
  const counts = { rowsRead: 0, flagged: 0, partial: 0 };
  for (const stretch of stretches) addStretch(stretch, { clock, ends, multiplier, channels, counts });
  const chosen = chosenChannels([...channels.values()]);
  const needsZone = stretches.some(({ header }) => header.season !== 'utc');
  const notes: Remark[] = [
    ...(ends ? [note('interval-ends-by-format', {})] : []),
    ...(said === undefined && needsZone ? [note('zone-assumed-utc', {})] : []),
    ...(multiplier === 1 ? [] : [note('values-multiplied', { multiplier })]),
    ...(counts.flagged > 0 ? [note('status-words', { intervals: counts.flagged })] : []),
    ...(counts.partial > 0 ? [note('partial-intervals-left-out', { intervals: counts.partial })] : []),
    ...chosen.notes,
  ];
  return { format: 'profile-readout', channels: chosen.channels, notes, rowsRead: counts.rowsRead };
}

interface Placing {
  clock: SeasonClock;
  ends: boolean;
  multiplier: number;
  channels: Map<string, ObisChannel>;
  counts: { rowsRead: number; flagged: number; partial: number };
}

function addStretch(stretch: Stretch, placing: Placing): void {
  const { header, values, rows, row } = stretch;
  const { columns, intervalS } = header;
  const { counts } = placing;
  counts.rowsRead += rows.length;
  if (header.flagged) counts.flagged += rows.length;
  const endS = firstEndS(stretch, placing.clock);
  if (endS % intervalS !== 0) {
    // an interval that an event cut short: alone it is left out, a row of them has no place on a grid
    if (rows.length > 1) refuseOffGrid(row, intervalS);
    counts.partial += rows.length;
    return;
  }
  for (const [k, column] of columns.entries()) {
    if (column.found === null || column.unit === null) continue;
    const target = channelOf(placing.channels, column, column.found, placing.multiplier);
    const { cumulative } = target.kind;
    if (!cumulative) target.intervalS = intervalS;
    // a register is read at the stamp, an interval lies before it
    const fromS = cumulative || !placing.ends ? endS : endS - intervalS;
    for (let i = 0; i < rows.length; i++) target.add(fromS + i * intervalS, values[i * columns.length + k]!, rows[i]!);
  }
}

function firstEndS({ header, row }: Stretch, clock: SeasonClock): number {
  const endS = momentOf(header, clock);
  if (endS !== null) return endS;
  const expected = `a time and season that the clocks of ${clock.table.zone} show`;
  const found = header.season === null ? 'a time they skip' : `${header.season} time`;
  throw new InputProblem([{ code: 'bad-time', row, column: 1, expected, found }]);
}

/** Without a season the first pass of a doubled hour is taken. */
function momentOf({ clockS, season }: ProfileHeader, clock: SeasonClock): number | null {
  if (season === 'utc') return clockS;
  if (season !== null) return seasonMoment(clockS, season === 'summer', clock);
  const first = clock.said ? seasonMoment(clockS, true, clock) : null;
  return first ?? seasonMoment(clockS, false, clock);
}

function refuseOffGrid(row: number, intervalS: number): never {
  const expected = `a time on the grid of ${intervalS / 60} minutes`;
  throw new InputProblem([{ code: 'bad-time', row, column: 1, expected, found: 'another' }]);
}

function channelOf(
  channels: Map<string, ObisChannel>,
  { code, unit }: ProfileColumn,
  found: ObisQuantity,
  multiplier: number,
): MeterChannel {
  const { times, over, energy } = unit!;
  const key = `${code} ${times}/${over}`;
  const known = channels.get(key);
  if (known !== undefined) return known.channel;
  const { quantity, cumulative } = found;
  const kind = { name: code, quantity, energy, cumulative, times: times * multiplier, over };
  const channel = new MeterChannel(kind);
  channels.set(key, { code, found, channel });
  return channel;
}
