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

/** So many values tell whether a scale is worth trying on all. */
const FIRST_VALUES = 64;
/** zlib asks for more room where the last byte of the room it has is used. */
const SPARE_BYTES = 64;

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
    const planes = isWhole(values.subarray(0, FIRST_VALUES), scale) ? differencePlanes(values, scale) : null;
    if (planes === null) continue;
    const facts = { intervals: values.length, scale, firstScaled: Math.round(values[0]! * scale) };
    return { ...facts, bytes: sealed(planes, facts, name) };
  }
  const facts = { intervals: values.length, scale: null, firstScaled: 0 };
  return { ...facts, bytes: sealed({ bytes: shuffled(values), planes: 8 }, facts, name) };
}

/**
 * Puts the values that were packed into a column, to the bit; columns of the first form are read too.
 * @param packed what was stored
 * @param name as it was packed under
 * @param column takes the values; as long as they are
 * @throws Error where the bytes are not what was packed
 */
export function unpackColumnInto(packed: PackedColumn, name: string, column: Float64Array): void {
  const { bytes, intervals, scale } = packed;
  if (column.length !== intervals) throw new Error(`${intervals} values do not go into a column of ${column.length}`);
  const count = scale === null ? intervals : intervals - 1;
  const isFirstForm = (bytes[0]! & RESERVED_BLOCK) !== RESERVED_BLOCK;
  const deflated = isFirstForm ? bytes : unsealed(packed, name);
  const planes = isFirstForm ? (scale === null ? 8 : 4) : bytes[1]!;
  const raw = inflated(deflated, count * planes);
  if (scale === null) unshuffleInto(raw, column);
  else sumInto(column, raw, { ...packed, scale, planes, signedLowest: !isFirstForm });
}

function isWhole(values: Float64Array, scale: number): boolean {
  return values.every((value) => Math.round(value * scale) / scale === value);
}

interface Planes {
  bytes: Uint8Array;
  planes: number;
}

/**
 * Differences of the scaled integers, the sign in the lowest bit: first the lowest byte of all, then the next higher, as
 * far as any is not 0. Null where a value would not come back to the bit.
 */
function differencePlanes(values: Float64Array, scale: number): Planes | null {
  const count = values.length - 1;
  const bytes = new Uint8Array(4 * count);
  let previous = 0;
  let any = 0;
  for (let i = 0; i <= count; i++) {
    const value = values[i]!;
    const scaled = Math.round(value * scale);
    if (scaled / scale !== value || (value === 0 && Object.is(value, -0))) return null;
    if (!(Math.abs(scaled) <= Number.MAX_SAFE_INTEGER)) return null;
    const difference = scaled - previous;
    previous = scaled;
    if (i === 0) continue;
    if (!(Math.abs(difference) <= LARGEST_DIFFERENCE)) return null;
    const bits = (difference << 1) ^ (difference >> 31);
    any |= bits;
    bytes[i - 1] = bits;
    bytes[count + i - 1] = bits >>> 8;
    bytes[2 * count + i - 1] = bits >>> 16;
    bytes[3 * count + i - 1] = bits >>> 24;
  }
  const planes = Math.ceil((32 - Math.clz32(any)) / 8);
  return { bytes: bytes.subarray(0, planes * count), planes };
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

type Facts = Omit<PackedColumn, 'bytes'>;

function sealed({ bytes, planes }: Planes, facts: Facts, name: string): Buffer {
  const deflated = deflateRawSync(bytes, { ...DEFLATE, chunkSize: bytes.length + SPARE_BYTES });
  return Buffer.concat([Uint8Array.of(SECOND_FORM, planes), sealOf(deflated, planes, { ...facts, name }), deflated]);
}

function unsealed(packed: PackedColumn, name: string): Uint8Array {
  const { bytes, intervals, scale, firstScaled } = packed;
  if (bytes[0] !== SECOND_FORM) throw new Error(`a packed column has the unknown form ${bytes[0]}`);
  const deflated = bytes.subarray(HEAD_BYTES);
  const seal = sealOf(deflated, bytes[1]!, { intervals, scale, firstScaled, name });
  if (seal.equals(bytes.subarray(2, HEAD_BYTES))) return deflated;
  throw new Error(`the stored column ${name} is damaged: its hash is another one`);
}

/** SHA-256 of what is stored and of all that is needed to read it, its first half. */
function sealOf(deflated: Uint8Array, planes: number, facts: Facts & { name: string }): Buffer {
  const { name, intervals, scale, firstScaled } = facts;
  const head = JSON.stringify([name, intervals, scale, firstScaled, planes]);
  return createHash('sha256').update(head).update(deflated).digest().subarray(0, SEAL_BYTES);
}

function inflated(deflated: Uint8Array, length: number): Uint8Array {
  const raw = inflateRawSync(deflated, { maxOutputLength: Math.max(1, length), chunkSize: length + SPARE_BYTES });
  if (raw.length !== length) throw new Error(`a packed column holds ${raw.length} bytes, not ${length}`);
  return raw;
}

function unshuffleInto(raw: Uint8Array, column: Float64Array): void {
  const count = column.length;
  const bytes = new Uint8Array(column.buffer, column.byteOffset, column.byteLength);
  for (let byte = 0; byte < 8; byte++) {
    for (let i = 0; i < count; i++) bytes[i * 8 + byte] = raw[byte * count + i]!;
  }
}

interface Summands {
  scale: number;
  firstScaled: number;
  planes: number;
  /** whether the sign stands in the lowest bit, or in the highest */
  signedLowest: boolean;
}

function sumInto(column: Float64Array, raw: Uint8Array, { scale, firstScaled, planes, signedLowest }: Summands): void {
  const count = column.length - 1;
  let scaled = firstScaled;
  column[0] = scaled / scale;
  for (let i = 0; i < count; i++) {
    let bits = 0;
    for (let plane = 0; plane < planes; plane++) bits |= raw[plane * count + i]! << (8 * plane);
    scaled += signedLowest ? (bits >>> 1) ^ -(bits & 1) : bits;
    column[i + 1] = scaled / scale;
  }
}
