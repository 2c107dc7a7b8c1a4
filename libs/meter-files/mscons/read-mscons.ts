import { zoneTable } from '#libs/contract/time-zone.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { type ChannelFile, readChannels } from '../channels/read-channels.js';
import { readMeters } from '../channels/read-meters.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { chosenChannels } from '../obis/obis-quantity.js';
import { RowProblems } from '../row-problems.js';
import { localToUtc } from '../time/local-times.js';
import { readSegments, type Segment } from './edifact-segments.js';
import { type MessageChannel, MessageValues } from './message-values.js';

const DAY_S = 86_400;

/**
 * Reads MSCONS messages: values by metering point and identification code, their times as the messages state them.
 * Rows of a refusal are segments, counted from 1 with the service string advice.
 * @param source the file
 * @param options what is said about it; of the map `meter`, `keepRow` and repairs matter
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, Question where it holds several metering points
 */
export async function readMscons(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  const problems = new RowProblems();
  const values = new MessageValues(problems);
  const envelope = new Envelope(problems);
  await readSegments(source, (segment, number) => {
    envelope.take(segment, number);
    takeSegment(values, segment, number);
  });
  values.close();
  envelope.end();
  problems.refuse();
  const meters = new Map<string, ChannelFile>();
  for (const [point, channels] of values.points) meters.set(point, fileOf(channels, values, options));
  return readMeters(meters, options, readChannels);
}

function takeSegment(values: MessageValues, segment: Segment, number: number): void {
  switch (segment[0]![0]) {
    case 'LOC':
      if (segment[1]?.[0] === '172') values.place(segment[2]?.[0] ?? '');
      break;
    case 'LIN':
      values.item();
      break;
    case 'PIA':
      values.product(segment, number);
      break;
    case 'QTY':
      values.quantity(segment, number);
      break;
    case 'DTM':
      values.time(segment, number);
      break;
    case 'UNH':
    case 'UNT':
    case 'UNS':
      values.close();
      break;
  }
}

function fileOf(points: ReadonlyMap<string, MessageChannel>, values: MessageValues, options: ReadOptions): ChannelFile {
  const notes: Remark[] = [];
  const said = options.timeZone ?? options.map?.timeZone ?? options.siteTimeZone;
  for (const point of points.values()) {
    if (!point.local) continue;
    if (said === undefined && notes.length === 0) notes.push(note('zone-assumed-utc', {}));
    toUtc(point, said ?? 'UTC');
  }
  const chosen = chosenChannels([...points.values()]);
  if (values.leftOut.size > 0) {
    notes.push(note('channels-left-out', { channels: [...values.leftOut].sort().join(', ').slice(0, 300) }));
  }
  if (values.substituted > 0) notes.push(note('values-substituted', { values: values.substituted }));
  if (values.unusable > 0) notes.push(note('values-unusable', { values: values.unusable }));
  return { format: 'mscons', channels: chosen.channels, notes: [...notes, ...chosen.notes], rowsRead: values.values };
}

function toUtc({ channel }: MessageChannel, zone: string): void {
  const clock = channel.beginS.subarray(0, channel.count);
  let low = clock[0]!;
  let high = low;
  for (const timeS of clock) {
    if (timeS < low) low = timeS;
    if (timeS > high) high = timeS;
  }
  localToUtc(clock, false, zoneTable(zone, low - 2 * DAY_S, high + 2 * DAY_S), false);
}

/** Checks the counts that messages carry of themselves: a segment or a message that is missing shows there. */
class Envelope {
  readonly #problems: RowProblems;
  #messageAt = 0;
  #messages = 0;
  #begun = false;
  #ended = false;

  constructor(problems: RowProblems) {
    this.#problems = problems;
  }

  take(segment: Segment, number: number): void {
    const tag = segment[0]![0]!;
    if (tag === 'UNB') this.#begun = true;
    if (tag === 'UNH') {
      if (segment[2]?.[0] !== 'MSCONS') this.#refuse(number, 'a message of type MSCONS', segment[2]?.[0] ?? 'none');
      this.#messageAt = number;
      this.#messages++;
    }
    if (tag === 'UNT') this.#count(number, Number(segment[1]?.[0]), number - this.#messageAt + 1, 'segments');
    if (tag === 'UNT') this.#messageAt = 0;
    if (tag === 'UNZ') this.#count(number, Number(segment[1]?.[0]), this.#messages, 'messages');
    if (tag === 'UNZ') this.#ended = true;
  }

  /** @throws InputProblem where a message or the interchange is not closed */
  end(): void {
    if (this.#messageAt > 0 || (this.#begun && !this.#ended)) {
      const expected = this.#messageAt > 0 ? 'the end of the message (UNT)' : 'the end of the interchange (UNZ)';
      this.#problems.add({ code: 'unreadable', row: this.#messageAt || 1, expected, found: 'the end of the file' });
    }
  }

  #count(row: number, stated: number, found: number, what: string): void {
    if (stated !== found) this.#refuse(row, `${stated} ${what}, as stated here`, `${found}`);
  }

  #refuse(row: number, expected: string, found: string): void {
    throw new InputProblem([{ code: 'unreadable', row, expected, found }]);
  }
}
