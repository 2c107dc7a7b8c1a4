import { createHash } from 'node:crypto';
import { constants, deflateRawSync, inflateRawSync } from 'node:zlib';

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
 * First byte of the second form, which is version, planes, seal, deflated planes. The first form was deflated bytes alone,
 * and those never begin with a block of the reserved type 3 (RFC 1951, 3.2.3), whose two bits are set here.
 */
const SECOND_FORM = 0b0000_0110;
const RESERVED_BLOCK = 0b110;
const SEAL_BYTES = 16;
const HEAD_BYTES = 2 + SEAL_BYTES;

/** Neighbours rarely share more than runs of equal bytes: looking for nothing else is three times as fast and no larger. */
const DEFLATE = { level: 1, strategy: constants.Z_RLE };

/**
 * Packs values so that they come back to the bit: as differences of scaled integers where that is exact, else as they are.
 * Bytes of equal weight stand together, those that are 0 throughout are left out, the rest is deflated and sealed with a hash.
 * @param values at least one
 * @param name what they are, in words that must be the same when they are unpacked
 */
export function packColumn(values: Float64Array, name: string): PackedColumn {
  for (const scale of SCALES) {
    const differences = differencesOf(values, scale);
    if (differences === null) continue;
    const facts = { intervals: values.length, scale, firstScaled: Math.round(values[0]! * scale) };
    return { ...facts, bytes: sealed(planesOf(differences), facts, name) };
  }
  const facts = { intervals: values.length, scale: null, firstScaled: 0 };
  return { ...facts, bytes: sealed({ bytes: shuffled(values), planes: 8 }, facts, name) };
}

/**
 * The values that were packed, to the bit; columns of the first form are read too.
 * @param packed what was stored
 * @param name as it was packed under
 * @throws Error where the bytes are not what was packed
 */
export function unpackColumn(packed: PackedColumn, name: string): Float64Array {
  const { bytes, intervals, scale, firstScaled } = packed;
  const count = scale === null ? intervals : intervals - 1;
  if ((bytes[0]! & RESERVED_BLOCK) !== RESERVED_BLOCK) {
    const width = scale === null ? 8 : 4;
    const raw = inflated(bytes, count * width);
    if (scale === null) return floatsFrom(raw, count);
    return summed(numbersFrom(raw, count, width), firstScaled, scale);
  }
  if (bytes[0] !== SECOND_FORM) throw new Error(`a packed column has the unknown form ${bytes[0]}`);
  const deflated = bytes.subarray(HEAD_BYTES);
  if (!sealOf(deflated, packed, name).equals(bytes.subarray(2, HEAD_BYTES))) {
    throw new Error(`the stored column ${name} is damaged: its hash is another one`);
  }
  const planes = bytes[1]!;
  const raw = inflated(deflated, count * planes);
  if (scale === null) return floatsFrom(raw, count);
  const differences = numbersFrom(raw, count, planes);
  for (let i = 0; i < count; i++) differences[i] = (differences[i]! >>> 1) ^ -(differences[i]! & 1);
  return summed(differences, firstScaled, scale);
}

/** Differences of the scaled integers, the sign in the lowest bit; null where a value would not come back to the bit. */
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
    differences[i - 1] = (difference << 1) ^ (difference >> 31);
  }
  return differences;
}

interface Planes {
  bytes: Uint8Array;
  planes: number;
}

/** The lowest bytes of all, then the next higher, as far as any of them is not 0. */
function planesOf(differences: Int32Array): Planes {
  const count = differences.length;
  let any = 0;
  for (let i = 0; i < count; i++) any |= differences[i]!;
  const planes = Math.ceil((32 - Math.clz32(any)) / 8);
  const bytes = new Uint8Array(planes * count);
  for (let plane = 0; plane < planes; plane++) {
    for (let i = 0; i < count; i++) bytes[plane * count + i] = differences[i]! >>> (8 * plane);
  }
  return { bytes, planes };
}

function shuffled(values: Float64Array): Uint8Array {
  const count = values.length;
  const raw = new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
  const bytes = new Uint8Array(raw.length);
  for (let byte = 0; byte < 8; byte++) {
    for (let i = 0; i < count; i++) bytes[byte * count + i] = raw[i * 8 + byte]!;
  }
  return bytes;
}

function sealed({ bytes, planes }: Planes, facts: Omit<PackedColumn, 'bytes'>, name: string): Buffer {
  const deflated = deflateRawSync(bytes, DEFLATE);
  return Buffer.concat([Uint8Array.of(SECOND_FORM, planes), sealOf(deflated, facts, name), deflated]);
}

/** SHA-256 of what is stored and of all that is needed to read it, its first half. */
function sealOf(deflated: Uint8Array, { intervals, scale, firstScaled }: Omit<PackedColumn, 'bytes'>, name: string) {
  const facts = JSON.stringify([name, intervals, scale, firstScaled]);
  return createHash('sha256').update(facts).update(deflated).digest().subarray(0, SEAL_BYTES);
}

function inflated(deflated: Uint8Array, length: number): Uint8Array {
  const raw = inflateRawSync(deflated, { maxOutputLength: Math.max(1, length) });
  if (raw.length !== length) throw new Error(`a packed column holds ${raw.length} bytes, not ${length}`);
  return raw;
}

function numbersFrom(raw: Uint8Array, count: number, planes: number): Int32Array {
  const numbers = new Int32Array(count);
  for (let plane = 0; plane < planes; plane++) {
    for (let i = 0; i < count; i++) numbers[i]! |= raw[plane * count + i]! << (8 * plane);
  }
  return numbers;
}

function floatsFrom(raw: Uint8Array, count: number): Float64Array {
  const bytes = new Uint8Array(raw.length);
  for (let byte = 0; byte < 8; byte++) {
    for (let i = 0; i < count; i++) bytes[i * 8 + byte] = raw[byte * count + i]!;
  }
  return new Float64Array(bytes.buffer);
}

function summed(differences: Int32Array, firstScaled: number, scale: number): Float64Array {
  const values = new Float64Array(differences.length + 1);
  let scaled = firstScaled;
  values[0] = scaled / scale;
  for (let i = 0; i < differences.length; i++) {
    scaled += differences[i]!;
    values[i + 1] = scaled / scale;
  }
  return values;
}
