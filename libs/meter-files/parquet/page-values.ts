import { deltaPacked } from './delta-packed.js';
import { hybridRuns } from './hybrid-runs.js';
import { PageError } from './page-error.js';

/** Values as their physical type gives them; truths are 0 and 1. */
export type RawValues = Int32Array | BigInt64Array | Float32Array | Float64Array | Uint8Array | readonly Uint8Array[];

/** Physical type of a column. */
export interface Physical {
  type: string;
  /** of FIXED_LEN_BYTE_ARRAY [bytes] */
  length: number;
}

const WIDTHS: Partial<Record<string, number>> = { INT32: 4, INT64: 8, FLOAT: 4, DOUBLE: 8 };

/**
 * Reads the values of a page that has no dictionary.
 * @param bytes the values
 * @param encoding by its name in the format
 * @param count how many
 * @param physical their type
 * @throws PageError where they are cut off, or of an encoding that is not read
 */
export function pageValues(bytes: Uint8Array, encoding: string, count: number, physical: Physical): RawValues {
  switch (encoding) {
    case 'PLAIN':
      return plainValues(bytes, count, physical);
    case 'RLE':
      if (physical.type !== 'BOOLEAN') break;
      return Uint8Array.from(hybridRuns(lengthPrefixed(bytes), 1, count));
    case 'DELTA_BINARY_PACKED':
      if (physical.type === 'INT64') return deltaPacked(bytes, count).values;
      if (physical.type === 'INT32') return Int32Array.from(deltaPacked(bytes, count).values, Number);
      break;
    case 'DELTA_LENGTH_BYTE_ARRAY':
      return deltaLengthTexts(bytes, count);
    case 'BYTE_STREAM_SPLIT':
      return splitStreams(bytes, count, physical);
  }
  throw new PageError(`values in the encoding ${encoding}, which is not read`);
}

/**
 * Reads values in the PLAIN encoding.
 * @param bytes the values
 * @param count how many
 * @param physical their type
 */
export function plainValues(bytes: Uint8Array, count: number, physical: Physical): RawValues {
  const { type, length } = physical;
  if (type === 'BYTE_ARRAY') return plainTexts(bytes, count);
  if (type === 'BOOLEAN') {
    refuseShort(bytes, Math.ceil(count / 8));
    return Uint8Array.from({ length: count }, (_, i) => (bytes[i >>> 3]! >>> (i & 7)) & 1);
  }
  const width = WIDTHS[type] ?? length;
  refuseShort(bytes, count * width);
  if (type === 'FIXED_LEN_BYTE_ARRAY') {
    return Array.from({ length: count }, (_, i) => bytes.subarray(i * width, (i + 1) * width));
  }
  // a copy of its own, so that it begins at the beginning of its buffer
  return typed(new Uint8Array(bytes.subarray(0, count * width)), type);
}

function typed(bytes: Uint8Array, type: string): RawValues {
  const buffer = bytes.buffer as ArrayBuffer;
  if (type === 'INT32') return new Int32Array(buffer);
  if (type === 'INT64') return new BigInt64Array(buffer);
  if (type === 'FLOAT') return new Float32Array(buffer);
  if (type === 'DOUBLE') return new Float64Array(buffer);
  throw new PageError(`values of the type ${type}`);
}

function plainTexts(bytes: Uint8Array, count: number): Uint8Array[] {
  refuseShort(bytes, count * 4);
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const texts: Uint8Array[] = [];
  let at = 0;
  for (let i = 0; i < count; i++) {
    refuseShort(bytes, at + 4);
    const length = view.getUint32(at, true);
    refuseShort(bytes, at + 4 + length);
    texts.push(bytes.subarray(at + 4, at + 4 + length));
    at += 4 + length;
  }
  return texts;
}

function deltaLengthTexts(bytes: Uint8Array, count: number): Uint8Array[] {
  const { values, end } = deltaPacked(bytes, count);
  const texts: Uint8Array[] = [];
  let at = end;
  for (const length of values) {
    if (length < 0n || length > BigInt(bytes.length - at)) throw new PageError('texts that are cut off');
    texts.push(bytes.subarray(at, at + Number(length)));
    at += Number(length);
  }
  return texts;
}

/** First bytes of all values, then all second bytes, and so on. */
function splitStreams(bytes: Uint8Array, count: number, { type }: Physical): RawValues {
  const width = WIDTHS[type];
  if (width === undefined) throw new PageError(`a split stream of ${type}`);
  refuseShort(bytes, count * width);
  const joined = new Uint8Array(count * width);
  for (let stream = 0; stream < width; stream++) {
    for (let i = 0; i < count; i++) joined[i * width + stream] = bytes[stream * count + i]!;
  }
  return typed(joined, type);
}

/**
 * Bytes behind their length in four bytes.
 * @param bytes length and content
 */
export function lengthPrefixed(bytes: Uint8Array): Uint8Array {
  refuseShort(bytes, 4);
  const length = new DataView(bytes.buffer, bytes.byteOffset, 4).getUint32(0, true);
  refuseShort(bytes, 4 + length);
  return bytes.subarray(4, 4 + length);
}

function refuseShort(bytes: Uint8Array, needed: number): void {
  if (bytes.length < needed) throw new PageError('values that are cut off');
}
