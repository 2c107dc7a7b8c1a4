import { PageError } from './page-error.js';

const LONGEST_HEADER = 5;

/**
 * Reads small whole numbers written as runs and packed bits (Parquet encodings, RLE/bit-packing hybrid).
 * @param bytes the runs
 * @param width bits of a number, 0 … 32
 * @param count how many numbers
 * @throws PageError where the runs give fewer
 */
export function hybridRuns(bytes: Uint8Array, width: number, count: number): Uint32Array {
  if (width > 32) throw new PageError(`numbers of ${width} bits`);
  const values = new Uint32Array(count);
  if (width === 0) return values;
  let at = 0;
  for (let done = 0; done < count; ) {
    const run = runAt(bytes, at);
    const taken = values.subarray(done, done + run.length);
    if (taken.length === 0) throw new PageError('an empty run');
    at = run.end;
    if (run.packed) unpackInto(taken, bytes, at, width);
    else taken.fill(wholeAt(bytes, at, Math.ceil(width / 8)));
    at += run.packed ? (run.length / 8) * width : Math.ceil(width / 8);
    done += taken.length;
  }
  return values;
}

/** The header of a run: how many numbers, packed or one repeated, and where they begin. */
function runAt(bytes: Uint8Array, from: number): { packed: boolean; length: number; end: number } {
  let header = 0;
  for (let i = 0; i < LONGEST_HEADER; i++) {
    const byte = bytes[from + i];
    if (byte === undefined) break;
    header += (byte & 0x7f) * 2 ** (7 * i);
    if (byte >= 0x80) continue;
    const packed = header % 2 === 1;
    return { packed, length: Math.floor(header / 2) * (packed ? 8 : 1), end: from + i + 1 };
  }
  throw new PageError('runs that are cut off');
}

function wholeAt(bytes: Uint8Array, at: number, width: number): number {
  if (at + width > bytes.length) throw new PageError('runs that are cut off');
  let value = 0;
  for (let i = 0; i < width; i++) value += bytes[at + i]! * 2 ** (8 * i);
  return value;
}

/** Bits from the least of each byte on. */
function unpackInto(values: Uint32Array, bytes: Uint8Array, from: number, width: number): void {
  if (from + Math.ceil((values.length * width) / 8) > bytes.length) throw new PageError('runs that are cut off');
  let bit = from * 8;
  for (let i = 0; i < values.length; i++) {
    let value = 0;
    let have = 0;
    while (have < width) {
      const free = 8 - (bit & 7);
      const taken = Math.min(free, width - have);
      value += ((bytes[bit >>> 3]! >>> (bit & 7)) & ((1 << taken) - 1)) * 2 ** have;
      have += taken;
      bit += taken;
    }
    values[i] = value;
  }
}
