import { deflateRawSync, inflateRawSync } from 'node:zlib';

/** Values of one quantity over a stretch of time, as stored. */
export interface PackedColumn {
  intervals: number;
  /** value = integer ÷ scale; null where the values stand as 64-bit floats */
  scale: number | null;
  /** the first value's integer; the bytes hold the differences that follow */
  firstScaled: number;
  bytes: Buffer;
}

/** Meters print few digits: most columns are whole numbers of one of these parts. */
const SCALES = [1, 10, 100, 1000, 10_000, 100_000, 1_000_000];
const LARGEST_DIFFERENCE = 2 ** 31 - 1;

/**
 * Packs values so that they come back to the bit: as 32-bit differences of scaled integers where that is exact, else as
 * they are. Bytes of equal weight stand together, which makes them compress.
 * @param values at least one, finite
 */
export function packColumn(values: Float64Array): PackedColumn {
  for (const scale of SCALES) {
    const differences = differencesOf(values, scale);
    if (differences === null) continue;
    const firstScaled = Math.round(values[0]! * scale);
    return { intervals: values.length, scale, firstScaled, bytes: compress(new Uint8Array(differences.buffer), 4) };
  }
  const copy = values.slice();
  return { intervals: values.length, scale: null, firstScaled: 0, bytes: compress(new Uint8Array(copy.buffer), 8) };
}

/**
 * The values that were packed, to the bit.
 * @throws Error where the bytes are not what was packed
 */
export function unpackColumn(packed: PackedColumn): Float64Array {
  const { intervals, scale, firstScaled } = packed;
  const width = scale === null ? 8 : 4;
  const count = scale === null ? intervals : intervals - 1;
  const raw = unshuffle(inflateRawSync(packed.bytes, { maxOutputLength: Math.max(1, count * width) }), width);
  if (raw.length !== count * width) throw new Error(`a packed column holds ${raw.length} bytes, not ${count * width}`);
  if (scale === null) return new Float64Array(raw.buffer);
  const differences = new Int32Array(raw.buffer);
  const values = new Float64Array(intervals);
  let scaled = firstScaled;
  for (let i = 0; i < intervals; i++) {
    if (i > 0) scaled += differences[i - 1]!;
    values[i] = scaled / scale;
  }
  return values;
}

/** Differences of the scaled integers, or null where a value would not come back to the bit. */
function differencesOf(values: Float64Array, scale: number): Int32Array | null {
  const differences = new Int32Array(values.length - 1);
  let previous = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    const scaled = Math.round(value * scale);
    if (scaled / scale !== value || !Number.isSafeInteger(scaled) || Object.is(value, -0)) return null;
    const difference = scaled - previous;
    previous = scaled;
    if (i === 0) continue;
    if (Math.abs(difference) > LARGEST_DIFFERENCE) return null;
    differences[i - 1] = difference;
  }
  return differences;
}

function compress(raw: Uint8Array, width: number): Buffer {
  const count = raw.length / width;
  const shuffled = new Uint8Array(raw.length);
  for (let byte = 0; byte < width; byte++) {
    for (let i = 0; i < count; i++) shuffled[byte * count + i] = raw[i * width + byte]!;
  }
  return deflateRawSync(shuffled, { level: 1 });
}

function unshuffle(shuffled: Uint8Array, width: number): Uint8Array {
  const count = Math.floor(shuffled.length / width);
  const raw = new Uint8Array(shuffled.length);
  for (let byte = 0; byte < width; byte++) {
    for (let i = 0; i < count; i++) raw[i * width + byte] = shuffled[byte * count + i]!;
  }
  return raw;
}
