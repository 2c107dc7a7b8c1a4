import { Question } from '#libs/contract/question.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { readMeters } from '../channels/read-meters.js';
import { RowBuffer } from '../csv/row-buffer.js';
import { RowCells } from '../csv/row-cells.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { closeReading } from '../record/close-reading.js';
import { shownReading } from '../record/reading-shown.js';
import { RowProblems } from '../row-problems.js';
import { qualify, readDay, readStream, type Stream, type StreamDay } from './nem12-records.js';
import { streamColumns } from './stream-columns.js';
import { StreamDays } from './stream-days.js';

const MARKS = { delimiter: 0x2c };

/**
 * Reads NEM12. Its times are UTC+10 whatever is said elsewhere.
 * @param source the file
 * @param options what is said about it; of the map only `keepRow` and repairs matter
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, Question where a day stands there twice with different values
 */
export async function readNem12(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  const reader = new Nem12Reader();
  const buffer = new RowBuffer(source);
  const cells = new RowCells();
  do {
    for (;;) {
      const next = cells.split(buffer.bytes, buffer.start, buffer.end, { ...MARKS, rowEnd: buffer.rowEnd });
      if (next < 0) break;
      buffer.start = next;
      buffer.rowsBefore++;
      if (!cells.isBlankFrom(0)) reader.take(cells, buffer.rowsBefore);
    }
    buffer.refuseEndlessRow();
  } while (await buffer.more());
  reader.end(buffer.end > buffer.start ? buffer.rowsBefore + 1 : 0);
  return closed(reader, options);
}

function closed(reader: Nem12Reader, options: ReadOptions): MeterReading {
  return readMeters(reader.meters(), options, (streams) => readStreams(streams, reader, options));
}

function readStreams(streams: StreamDays[], reader: Nem12Reader, options: ReadOptions): MeterReading {
  const map = options.map ?? {};
  const conflicts = streams.reduce((sum, stream) => sum + stream.conflicts, 0);
  const keep = map.keepRow ?? 'last';
  if (conflicts > 0 && map.keepRow === undefined) refuseConflict(streams);
  const result = streamColumns(streams, keep, options.siteTimeZone);
  const notes = [...reader.notes(streams), ...result.notes];
  if (conflicts > 0) notes.push(note('conflicting-rows-settled', { rows: conflicts, kept: keep }));
  const counts = { format: 'nem12', rowsRead: reader.dayRows, rejectedRows: conflicts };
  return closeReading({ ...result, notes, counts }, map);
}

function refuseConflict(streams: StreamDays[]): never {
  const row = Math.min(...streams.filter(({ conflictRow }) => conflictRow > 0).map(({ conflictRow }) => conflictRow));
  const about = 'which version of a day that the file gives twice, with different values, counts';
  const readings = (['first', 'last'] as const).map((keepRow) =>
    shownReading({ keepRow }, streamColumns(streams, keepRow, undefined).columns),
  );
  throw new Question([{ id: 'keepRow', about, readings }], { row });
}

/** Takes a file's records in order. */
class Nem12Reader {
  readonly streams = new Map<string, StreamDays>();
  readonly leftOut = new Set<string>();
  readonly problems = new RowProblems();
  dayRows = 0;
  #stream: Stream | null = null;
  #day: StreamDay | null = null;
  #begun = false;
  #ended = false;

  take(cells: RowCells, row: number): void {
    const kind = cells.text(0);
    if (cells.badQuote > 0) {
      const expected = 'the end of the cell behind its closing quotation mark';
      this.problems.add({ code: 'unreadable', row, column: cells.badQuote, expected, found: 'more text' });
    }
    if (kind !== '400' && kind !== '500') this.#closeDay();
    switch (kind) {
      case '100':
        this.#header(cells, row);
        break;
      case '200':
        this.#stream = readStream(cells, row);
        break;
      case '300':
        this.#takeDay(cells, row);
        break;
      case '400':
        this.#takeQuality(cells, row);
        break;
      case '500':
        break;
      case '900':
        this.#ended = true;
        break;
      default: {
        const expected = 'a record that begins with 100, 200, 300, 400, 500 or 900';
        this.problems.add({ code: 'unreadable', row, column: 1, expected, found: `"${kind.slice(0, 40)}"` });
      }
    }
  }

  /** @param openRow row of a quotation mark that is never closed, or 0 */
  end(openRow: number): void {
    if (openRow > 0) {
      const expected = 'a closing quotation mark';
      this.problems.add({ code: 'unreadable', row: openRow, expected, found: 'the end of the file' });
    }
    this.#closeDay();
    this.problems.refuse();
  }

  /** Streams by the meter they are of; one meter without any where the file has none. */
  meters(): Map<string, StreamDays[]> {
    const meters = new Map<string, StreamDays[]>();
    for (const days of this.streams.values()) {
      const { meter } = days.stream;
      meters.set(meter, [...(meters.get(meter) ?? []), days]);
    }
    return meters.size === 0 ? meters.set('', []) : meters;
  }

  /** @param streams of the meter that is read */
  notes(streams: readonly StreamDays[]): Remark[] {
    const days = streams.flatMap(({ days: versions }) => [...versions.values()]);
    const substituted = days.reduce((sum, { first }) => sum + first.substituted, 0);
    const unstated = days.reduce((sum, { first }) => sum + first.unstated, 0);
    return [
      note('nem12-time', { zone: '+10:00' }),
      ...(this.#begun ? [] : [note('nem12-header-missing', {})]),
      ...(this.#ended ? [] : [note('nem12-end-missing', {})]),
      ...(this.leftOut.size > 0
        ? [note('nem12-streams-left-out', { streams: [...this.leftOut].sort().join(', ') })]
        : []),
      ...(substituted > 0 ? [note('nem12-substituted', { values: substituted })] : []),
      ...(unstated > 0 ? [note('nem12-quality-unstated', { values: unstated })] : []),
    ];
  }

  #header(cells: RowCells, row: number): void {
    this.#begun = true;
    const version = cells.text(1).toUpperCase();
    if (version === 'NEM12') return;
    const problem = { row, column: 2, expected: 'NEM12', found: `"${version.slice(0, 40)}"` };
    throw new InputProblem([{ code: version === 'NEM13' ? 'not-supported-yet' : 'unreadable', ...problem }]);
  }

  #takeDay(cells: RowCells, row: number): void {
    this.dayRows++;
    const stream = this.#stream;
    if (stream === null) {
      this.problems.add({ code: 'unreadable', row, expected: 'a 200 record before it', found: 'none' });
      return;
    }
    if (stream.quantity === null) {
      this.leftOut.add(stream.suffix);
      return;
    }
    const read = readDay(cells, row, stream, (problem) => this.problems.add(problem));
    this.#day = read?.day ?? null;
  }

  #takeQuality(cells: RowCells, row: number): void {
    if (this.#stream?.quantity === null) return;
    if (this.#day !== null) qualify(cells, row, this.#day, (problem) => this.problems.add(problem));
    else this.problems.add({ code: 'unreadable', row, expected: 'a 300 record before it', found: 'none' });
  }

  #closeDay(): void {
    const day = this.#day;
    const stream = this.#stream;
    this.#day = null;
    if (day === null || stream === null) return;
    // in whatever unit a later 200 record gives it: a stream is one, and its days count once
    const key = `${stream.meter}\n${stream.suffix}\n${stream.minutes}`;
    const known = this.streams.get(key) ?? new StreamDays(stream);
    this.streams.set(key, known);
    known.add(day);
  }
}
