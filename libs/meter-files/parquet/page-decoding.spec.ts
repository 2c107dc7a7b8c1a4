// Second methods: the packages' own writers and readers, which do the same for files that are sound.
import fc from 'fast-check';
import { ByteWriter } from 'hyparquet-writer';
import { deltaBinaryPack, deltaLengthByteArray } from 'hyparquet-writer/src/delta.js';
import { writeRleBitPackedHybrid } from 'hyparquet-writer/src/encoding.js';
import { snappyCompress } from 'hyparquet-writer/src/snappy.js';
import { writeByteStreamSplit } from 'hyparquet-writer/src/splitstream.js';
import { serializeTCompactProtocol } from 'hyparquet-writer/src/thrift.js';
import { describe, expect, it } from 'vitest';
import { SEED } from '../../../test/support/soak.js';
import { deltaPacked } from './delta-packed.js';
import { hybridRuns } from './hybrid-runs.js';
import { PageError } from './page-error.js';
import { pageValues } from './page-values.js';
import { snappyInflated } from './snappy.js';
import { ThriftError, ThriftReader } from './thrift.js';

const seeded = { seed: SEED, numRuns: 300 };

function written(write: (writer: ByteWriter) => void): Uint8Array {
  const writer = new ByteWriter();
  write(writer);
  return Uint8Array.from(writer.getBytes());
}

/** Whatever the bytes are, a decoder gives values or says that they are none, and soon. */
function expectSafe(decode: (bytes: Uint8Array) => unknown, refusal: new () => Error): void {
  fc.assert(
    fc.property(fc.uint8Array({ maxLength: 200 }), (bytes) => {
      try {
        decode(bytes);
      } catch (error) {
        if (!(error instanceof refusal)) throw error;
      }
    }),
    { ...seeded, numRuns: 2000 },
  );
}

describe('Snappy', () => {
  const letters = fc.array(fc.constantFrom(1, 2, 3, 200), { maxLength: 2000 });
  it('gives back what was packed, repeats and all', () => {
    fc.assert(
      fc.property(fc.oneof(letters, fc.array(fc.nat(255), { maxLength: 400 })), (list) => {
        const bytes = Uint8Array.from(list);
        expect(snappyInflated(Uint8Array.from(snappyCompress(bytes)), bytes.length)).toEqual(bytes);
      }),
      seeded,
    );
  });

  it('refuses lengths and copies that its bytes do not bear', () => {
    for (const packed of [
      [4, 0xfc, 0xf0, 0xff, 0xff, 0xff],
      [4, 0, 1, 1, 9],
      [4, 0, 1, 1, 0],
      [9, 0, 1],
      [4, 252],
      [],
    ]) {
      expect(() => snappyInflated(Uint8Array.from(packed), packed[0] ?? 4)).toThrow(PageError);
    }
    expectSafe((bytes) => snappyInflated(bytes, bytes[0] ?? 0), PageError);
  });
});

describe('runs and packed bits', () => {
  it('give back the numbers', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 20 }),
        fc.array(fc.nat(), { minLength: 1, maxLength: 300 }),
        (bits, list) => {
          const values = list.map((value) => value % 2 ** bits);
          const bytes = written((writer) => writeRleBitPackedHybrid(writer, values, bits));
          expect(Array.from(hybridRuns(bytes, bits, values.length))).toEqual(values);
        },
      ),
      seeded,
    );
  });

  it('refuse what is cut off, empty or longer than asked for', () => {
    expect(() => hybridRuns(Uint8Array.of(0, 0, 0), 1, 5)).toThrow(PageError);
    expect(() => hybridRuns(Uint8Array.of(0xff, 0xff, 0xff, 0xff, 0xff, 1), 1, 5)).toThrow(PageError);
    expect(() => hybridRuns(Uint8Array.of(3), 1, 5)).toThrow(PageError);
    // a run of two thousand million ends where the page does
    expect(hybridRuns(Uint8Array.of(0xfe, 0xff, 0xff, 0xff, 0x0f, 1), 1, 5)).toEqual(Uint32Array.of(1, 1, 1, 1, 1));
    expectSafe((bytes) => hybridRuns(bytes, (bytes[0] ?? 0) % 40, 1000), PageError);
  });
});

describe('packed differences', () => {
  const whole = fc.bigInt({ min: -(2n ** 63n), max: 2n ** 63n - 1n });
  it('give back the numbers', () => {
    const lists = fc.oneof(
      fc.array(whole, { minLength: 1, maxLength: 400 }),
      fc.array(fc.bigInt(0n, 900n), { minLength: 1, maxLength: 400 }),
    );
    fc.assert(
      fc.property(lists, (values) => {
        const bytes = written((writer) => deltaBinaryPack(writer, BigInt64Array.from(values), 'INT64'));
        expect(Array.from(deltaPacked(bytes, values.length).values)).toEqual(values);
      }),
      seeded,
    );
  });

  it('refuse blocks of no size, and what is cut off', () => {
    for (const bytes of [
      [0, 0, 5, 0],
      [128, 1, 0, 5, 0],
      [128, 1, 4, 5, 0, 0, 9],
      [128, 1, 4, 6, 0],
    ]) {
      expect(() => deltaPacked(Uint8Array.from(bytes), 5)).toThrow(PageError);
    }
    expectSafe((bytes) => deltaPacked(Uint8Array.from([128, 1, 4, 99, ...bytes]), 99), PageError);
  });
});

describe('pages', () => {
  it('of texts by their lengths and of split bytes give back the values', () => {
    const texts = ['', 'a', '2024-05-06 00:15', 'é'].map((text) => new TextEncoder().encode(text));
    const joined = written((writer) => deltaLengthByteArray(writer, texts));
    expect(pageValues(joined, 'DELTA_LENGTH_BYTE_ARRAY', 4, { type: 'BYTE_ARRAY', length: 0 })).toEqual(texts);
    const numbers = Float64Array.of(1.5, -1e300, 0.1, 5e-324);
    const split = written((writer) => writeByteStreamSplit(writer, numbers, 'DOUBLE', undefined));
    expect(pageValues(split, 'BYTE_STREAM_SPLIT', 4, { type: 'DOUBLE', length: 0 })).toEqual(numbers);
  });

  it('of any bytes are read or refused', () => {
    for (const encoding of ['PLAIN', 'RLE', 'DELTA_BINARY_PACKED', 'DELTA_LENGTH_BYTE_ARRAY', 'BYTE_STREAM_SPLIT']) {
      for (const type of ['INT32', 'INT64', 'DOUBLE', 'FLOAT', 'BOOLEAN', 'BYTE_ARRAY', 'FIXED_LEN_BYTE_ARRAY']) {
        expectSafe((bytes) => pageValues(bytes, encoding, 20, { type, length: 3 }), PageError);
      }
    }
  });
});

describe('Thrift', () => {
  it('gives back the fields of a struct', () => {
    const fields = { field_1: 7, field_3: true, field_4: 2n ** 40n, field_20: [1, -2], field_21: { field_1: false } };
    const bytes = written((writer) => serializeTCompactProtocol(writer, fields));
    const reader = new ThriftReader(bytes, 100);
    const struct = reader.struct();
    expect(reader.offset).toBe(bytes.length);
    expect([struct.get(1), struct.get(3), struct.get(4), struct.get(20)]).toEqual([7, true, 2n ** 40n, [1, -2]]);
    expect((struct.get(21) as Map<number, unknown>).get(1)).toBe(false);
  });

  it('refuses lists longer than the bytes, too many values and too deep structs', () => {
    expect(() => new ThriftReader(Uint8Array.of(0x19, 0xf5, 0xff, 0xff, 0x03), 100).struct()).toThrow(ThriftError);
    expect(() => new ThriftReader(new Uint8Array(200).fill(0x1c), 1000).struct()).toThrow(ThriftError);
    expect(() => new ThriftReader(new Uint8Array(200).fill(0x11), 100).struct()).toThrow(ThriftError);
    expectSafe((bytes) => new ThriftReader(bytes, 100).struct(), ThriftError);
  });
});
