import { PageError } from './page-error.js';

const MOST_BLOCK = 65_536;
const LONGEST_VARINT = 10;

/**
 * Reads whole numbers written as packed differences (Parquet encodings, DELTA_BINARY_PACKED).
 * @param bytes the blocks
 * @param count how many numbers
 * @returns the numbers, 64 bits each, and where the bytes behind them begin
 * @throws PageError where the blocks give others
 */
export function deltaPacked(bytes: Uint8Array, count: number): { values: BigInt64Array; end: number } {
  const reader = new BitReader(bytes);
  const block = Number(reader.varint());
  const parts = Number(reader.varint());
  const total = Number(reader.varint());
  const each = block / parts;
  if (!(block <= MOST_BLOCK && parts >= 1 && each >= 8 && each % 8 === 0)) throw new PageError('blocks of no size');
  if (total !== count) throw new PageError(`${total} numbers instead of ${count}`);
  const values = new BigInt64Array(count);
  let value = reader.zigzag();
  if (count > 0) values[0] = value;
  for (let done = 1; done < count; ) {
    const least = reader.zigzag();
    const widths = reader.take(parts);
    for (const width of widths) {
      if (done >= count) break;
      const packed = reader.take((each * width) / 8);
      const taken = Math.min(each, count - done);
      for (let i = 0; i < taken; i++) {
        value = BigInt.asIntN(64, value + least + bitsAt(packed, i * width, width));
        values[done + i] = value;
      }
      done += taken;
    }
  }
  return { values, end: reader.offset };
}

function bitsAt(packed: Uint8Array, from: number, width: number): bigint {
  if (width === 0) return 0n;
  if (width > 64) throw new PageError(`numbers of ${width} bits`);
  let low = 0;
  let high = 0;
  let have = 0;
  for (let bit = from; have < width; ) {
    const taken = Math.min(8 - (bit & 7), width - have, have < 32 ? 32 - have : 64);
    const bits = (packed[bit >>> 3]! >>> (bit & 7)) & ((1 << taken) - 1);
    if (have < 32) low += bits * 2 ** have;
    else high += bits * 2 ** (have - 32);
    have += taken;
    bit += taken;
  }
  return high === 0 ? BigInt(low) : (BigInt(high) << 32n) | BigInt(low);
}

class BitReader {
  offset = 0;
  readonly #bytes: Uint8Array;

  constructor(bytes: Uint8Array) {
    this.#bytes = bytes;
  }

  take(length: number): Uint8Array {
    if (this.offset + length > this.#bytes.length) throw new PageError('blocks that are cut off');
    this.offset += length;
    return this.#bytes.subarray(this.offset - length, this.offset);
  }

  zigzag(): bigint {
    const value = this.varint();
    return (value >> 1n) ^ -(value & 1n);
  }

  varint(): bigint {
    let value = 0n;
    for (let i = 0; i < LONGEST_VARINT; i++) {
      const [byte] = this.take(1);
      value |= BigInt(byte! & 0x7f) << BigInt(7 * i);
      if (byte! < 0x80) return value;
    }
    throw new PageError('a number longer than 64 bits');
  }
}
