import { zoneTable } from '#libs/contract/time-zone.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { readSeries } from '../reading-type/read-series.js';
import { SeriesTable } from '../reading-type/series-table.js';
import { RunColumn } from '../reading-type/run-column.js';
import type { TimedReadings } from '../reading-type/timed-readings.js';
import { localToUtc } from '../time/local-times.js';
import { walkXml } from '../xml/walk-xml.js';
import { XmlText } from '../xml/xml-text.js';
import { CimMessage } from './cim-message.js';

const DAY_S = 86_400;

/**
 * Reads a MeterReadings message. Stamps without an offset are of the zone that is said.
 * A value is stamped when its interval is over, since it tells what went by; a timePeriod decides where there is one.
 * @param source the file
 * @param options of the map `meter`, `stamp`, `multiplier`, `timeZone`, `keepRow` and repairs matter
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, naming row and column
 * @throws Question where it can be read in several ways
 */
export async function readCim(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  const text = new XmlText(source);
  const message = new CimMessage();
  await walkXml(text, message);
  message.problems.refuse();
  const tables = new Map<string, SeriesTable>();
  const zoned = message.local === true ? new LocalStamps(options) : null;
  for (const { meter, type, readings, intervalS } of message.series.values()) {
    zoned?.settle(readings);
    const table = tables.get(meter) ?? new SeriesTable();
    tables.set(meter, table);
    table.add(type, readings, intervalS);
  }
  const meters = [...tables].map(([name, { series }]) => ({ name, series }));
  const notes = [...text.notes, ...(zoned?.notes() ?? [])];
  return readSeries({ format: 'cim-meter-readings', meters, marks: 'end', notes }, options);
}

/** Turns stamps of a local clock into UTC. */
class LocalStamps {
  readonly #zone: string | undefined;
  #doubledRows = 0;
  #onceRows = 0;

  constructor({ timeZone, map, siteTimeZone }: ReadOptions) {
    this.#zone = timeZone ?? map?.timeZone ?? siteTimeZone;
  }

  /** @throws InputProblem where a clock of the zone never showed a time */
  settle(readings: TimedReadings): void {
    const { stampS, spanS, rowNumber } = readings;
    const ends = stampS.toNumbers();
    const begins = ends.map((endS, i) => (spanS.at(i) > 0 ? endS - spanS.at(i) : endS));
    const utcS = this.#toUtc(ends, rowNumber, { ends: true, counted: true });
    const beginS = this.#toUtc(begins, rowNumber, { ends: false, counted: false });
    const [stamps, spans] = [new RunColumn(), new RunColumn()];
    for (let i = 0; i < utcS.length; i++) {
      stamps.add(utcS[i]!);
      spans.add(spanS.at(i) > 0 ? utcS[i]! - beginS[i]! : spanS.at(i));
    }
    readings.stampS = stamps;
    readings.spanS = spans;
  }

  #toUtc(clock: Float64Array, rowNumber: RunColumn, how: { ends: boolean; counted: boolean }): Float64Array {
    let [leastS, mostS] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
    for (const clockS of clock) {
      leastS = Math.min(leastS, clockS);
      mostS = Math.max(mostS, clockS);
    }
    const table = zoneTable(this.#zone ?? 'UTC', leastS - 2 * DAY_S, mostS + 2 * DAY_S);
    const newestFirst = clock[0]! > clock[clock.length - 1]!;
    const { utcS, doubledRows, onceRows } = localToUtc(clock.slice(), newestFirst, table, how.ends);
    const skipped = utcS.findIndex((at) => Number.isNaN(at));
    // an interval that begins as the clock is put forward is let stand by its end
    if (skipped >= 0 && how.ends) {
      const expected = `a time that the clocks of ${table.zone} showed`;
      const found = new Date(clock[skipped]! * 1000).toISOString().slice(0, 16);
      throw new InputProblem([{ code: 'bad-time', row: rowNumber.at(skipped), expected, found }]);
    }
    if (how.counted) {
      this.#doubledRows += doubledRows;
      this.#onceRows += onceRows;
    }
    return utcS;
  }

  notes(): Remark[] {
    return [
      ...(this.#zone === undefined ? [note('zone-assumed-utc', {})] : []),
      ...(this.#doubledRows > 0 ? [note('doubled-hour-by-order', { rows: this.#doubledRows })] : []),
      ...(this.#onceRows > 0 ? [note('doubled-hour-once', { rows: this.#onceRows })] : []),
    ];
  }
}
