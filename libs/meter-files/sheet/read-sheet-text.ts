import type { MeterMap } from '#libs/contract/meter-map.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { readCsv } from '../csv/read-csv.js';
import { isKeptRecord, KEPT_FORMAT, readKeptRecord } from '../kept-record/read-kept-record.js';
import { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';

/**
 * Reads rows of a sheet by the rules of delimited text.
 * @param text the rows as SheetText writes them
 * @param options what is said about the file
 * @param map what is said, with what the format itself settles
 * @returns the record and its quality, the format's name still to be set
 */
export async function readSheetText(
  text: AsyncIterable<Uint8Array>,
  options: ReadOptions,
  map: MeterMap,
): Promise<MeterReading> {
  const source = await MeterBytes.open(text);
  try {
    if (isKeptRecord(source.head)) return await readKeptRecord(source);
    return await readCsv(source, { ...options, map: { ...map, separator: ',' } });
  } finally {
    await source.close();
  }
}

/**
 * A reading under the name of the format it came from.
 * @param reading as read
 * @param format row of the table of formats
 * @param notes that come before those of the rows
 */
export function readingOf(reading: MeterReading, format: string, notes: readonly Remark[]): MeterReading {
  const { record, quality } = reading;
  if (quality.format === KEPT_FORMAT) return reading;
  const own = record.notes.map((entry) =>
    entry.code === 'file-read-as' ? { ...entry, values: { ...entry.values, format } } : entry,
  );
  return { record: { ...record, notes: [...notes, ...own] }, quality: { ...quality, format } };
}

/**
 * A damaged file.
 * @param path part of the file
 * @param expected what should be there
 * @param found what is there instead
 */
export function damaged(path: string, expected: string, found: string): InputProblem {
  return new InputProblem([{ code: 'unreadable', path, expected, found }]);
}
