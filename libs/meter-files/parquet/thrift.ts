/** A value of Thrift's compact protocol. */
export type ThriftValue = number | bigint | boolean | Uint8Array | ThriftValue[] | ThriftStruct;

/** Fields of a struct by their number. */
export type ThriftStruct = Map<number, ThriftValue>;

/** Thrown where bytes are no such struct. */
export class ThriftError extends Error {}

const MOST_DEPTH = 16;
const LONGEST_VARINT = 10;

/**
 * Reads Thrift's compact protocol (thrift-compact-protocol.md of Apache Thrift) from bytes that may say anything: lists are
 * no longer than the bytes that are left, and structs no deeper and no more than a limit.
 */
export class ThriftReader {
  /** where the next byte stands */
  offset = 0;
  readonly #bytes: Uint8Array;
  readonly #view: DataView;
  #left: number;

  /**
   * @param bytes that begin with a struct
   * @param mostValues more than this many values are refused
   */
  constructor(bytes: Uint8Array, mostValues: number) {
    this.#bytes = bytes;
    this.#view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
    this.#left = mostValues;
  }

  /**
   * Reads a struct.
   * @throws ThriftError where there is none, or more than the limits allow
   */
  struct(depth = 0): ThriftStruct {
    if (depth > MOST_DEPTH) throw new ThriftError('too deep');
    const fields: ThriftStruct = new Map();
    let id = 0;
    for (;;) {
      const byte = this.#byte();
      const type = byte & 0x0f;
      if (type === 0) return fields;
      id = byte >> 4 === 0 ? Number(this.#zigzag()) : id + (byte >> 4);
      fields.set(id, this.#value(type, depth));
    }
  }

  #value(type: number, depth: number): ThriftValue {
    if (--this.#left < 0) throw new ThriftError('too many values');
    switch (type) {
      case 1:
      case 2:
        return type === 1;
      case 3:
        return (this.#byte() << 24) >> 24;
      case 4:
      case 5:
        return Number(this.#zigzag());
      case 6:
        return this.#zigzag();
      case 7:
        return this.#double();
      case 8:
        return this.#binary();
      case 9:
        return this.#list(depth);
      case 12:
        return this.struct(depth + 1);
      default:
        throw new ThriftError(`type ${type}`);
    }
  }

  #list(depth: number): ThriftValue[] {
    const byte = this.#byte();
    const type = byte & 0x0f;
    const size = byte >> 4 === 15 ? Number(this.#varint()) : byte >> 4;
    if (size > this.#bytes.length - this.offset) throw new ThriftError('a list longer than the bytes');
    const values: ThriftValue[] = [];
    // a truth in a list takes a byte, in a struct none
    for (let i = 0; i < size; i++) values.push(this.#value(type === 1 || type === 2 ? 3 : type, depth + 1));
    return values;
  }

  #binary(): Uint8Array {
    const length = Number(this.#varint());
    if (length > this.#bytes.length - this.offset) throw new ThriftError('a text longer than the bytes');
    this.offset += length;
    return this.#bytes.subarray(this.offset - length, this.offset);
  }

  #double(): number {
    if (this.offset + 8 > this.#bytes.length) throw new ThriftError('cut off');
    this.offset += 8;
    return this.#view.getFloat64(this.offset - 8, true);
  }

  #zigzag(): bigint {
    const value = this.#varint();
    return (value >> 1n) ^ -(value & 1n);
  }

  #varint(): bigint {
    let value = 0n;
    for (let i = 0; i < LONGEST_VARINT; i++) {
      const byte = this.#byte();
      value |= BigInt(byte & 0x7f) << BigInt(7 * i);
      if (byte < 0x80) return value;
    }
    throw new ThriftError('a number longer than 64 bits');
  }

  #byte(): number {
    const byte = this.#bytes[this.offset++];
    if (byte === undefined) throw new ThriftError('cut off');
    return byte;
  }
}
