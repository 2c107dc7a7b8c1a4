import { InputProblem } from '#libs/engine/index.js';
import { FORMATS } from './formats.js';
import { isKeptRecord, readKeptRecord } from './kept-record/read-kept-record.js';
import { MeterBytes } from './meter-bytes.js';
import type { MeterFormat, MeterReading, ReadOptions } from './meter-format.js';
import { unknownFormat } from './unknown-format.js';

/**
 * Reads a meter file of any known format.
 * @param source the file in chunks of any size; read once, never held whole
 * @param options what is said about it
 * @returns the record and the quality of the file behind it
 * @throws InputProblem where it can't be read, naming row and column
 * @throws Question where it can be read in several ways that differ
 * @throws Stopped where the watch says so
 */
export async function readMeterFile(
  source: AsyncIterable<Uint8Array>,
  options: ReadOptions = {},
): Promise<MeterReading> {
  const bytes = await MeterBytes.open(source, options);
  try {
    if (isKeptRecord(bytes.head)) return await readKeptRecord(bytes);
    return await formatOf(bytes.head, options).read(bytes, options);
  } finally {
    await bytes.close();
  }
}

function formatOf(head: Uint8Array, options: ReadOptions): MeterFormat {
  const wanted = options.format ?? options.map?.format;
  const names = FORMATS.map(({ name }) => name).join(', ');
  if (isBlank(head)) {
    throw new InputProblem([{ code: 'empty-file', expected: 'a meter file', found: 'nothing in it' }]);
  }
  if (wanted !== undefined) {
    const format = FORMATS.find(({ name }) => name === wanted);
    if (format !== undefined) return format;
    throw new InputProblem([{ code: 'unknown-format', path: 'format', expected: `one of ${names}`, found: wanted }]);
  }
  const format = FORMATS.find(({ recognises }) => recognises(head));
  if (format !== undefined) return format;
  throw unknownFormat(head, names);
}

function isBlank(head: Uint8Array): boolean {
  return head.every((byte) => byte === 0x20 || byte === 0x0a || byte === 0x0d || byte === 0x09);
}
