import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { readSeries } from '../reading-type/read-series.js';
import { walkXml } from '../xml/walk-xml.js';
import { XmlText } from '../xml/xml-text.js';
import { EspiFeed } from './espi-feed.js';
import { joinFeed } from './join-feed.js';

/**
 * Reads an ESPI (Green Button) feed. Its times are seconds since 1970 in UTC, whatever zone is said.
 * @param source the file
 * @param options of the map `meter`, `stamp`, `multiplier`, `keepRow` and repairs matter
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, naming row and column
 * @throws Question where it can be read in several ways
 */
export async function readEspi(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  const text = new XmlText(source);
  const feed = new EspiFeed();
  await walkXml(text, feed);
  feed.problems.refuse();
  const { meters, notes } = joinFeed(feed);
  return readSeries({ format: 'espi', meters, marks: 'begin', notes: [...text.notes, ...notes] }, options);
}
