import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { firstForm } from '../../test/support/first-form.js';
import { runs, SEED } from '../../test/support/soak.js';
import { type PackedColumn, packColumn, unpackColumnInto } from './packed-column.js';

const NAME = 'activeKw 2025-01';

/** Bits, so that 0 and −0 are told apart, and one NaN from another. */
const bits = (values: Float64Array) => Array.from(new BigUint64Array(values.slice().buffer));
function unpackColumn(packed: PackedColumn, name: string): Float64Array {
  const column = new Float64Array(packed.intervals);
  unpackColumnInto(packed, name, column);
  return column;
}

const backFrom = (values: Float64Array) => unpackColumn(packColumn(values, NAME), NAME);

/** Any 64 bits are a double: every NaN, both infinities, both zeros, the subnormal ones. */
const anyDoubles = fc
  .array(fc.bigInt({ min: 0n, max: 2n ** 64n - 1n }), { minLength: 1, maxLength: 200 })
  .map((list) => new Float64Array(BigUint64Array.from(list).buffer));
/** What meters print: whole numbers of a power of ten, in steps of any size. */
const printed = fc
  .tuple(
    fc.integer({ min: 0, max: 7 }),
    fc.integer({ min: 0, max: 53 }),
    fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 1, maxLength: 200 }),
  )
  .map(([digits, power, list]) =>
    Float64Array.from(list, (share) => Number(`${Math.trunc(share * 2 ** power)}e-${digits}`)),
  );
/** Printed values with one double among them that is anything. */
const mixed = fc.tuple(printed, anyDoubles, fc.nat()).map(([column, other, at]) => {
  column[at % column.length] = other[0]!;
  return column;
});

describe('a packed column', () => {
  it(`gives any doubles back to the bit (seed ${SEED})`, () => {
    let integers = 0;
    fc.assert(
      fc.property(fc.oneof(anyDoubles, printed, mixed), (column) => {
        const packed = packColumn(column, NAME);
        if (packed.scale !== null) integers++;
        expect(bits(unpackColumn(packed, NAME))).toEqual(bits(column));
      }),
      { seed: SEED, numRuns: runs(1000, 20_000) },
    );
    // both ways of storing are met
    expect(integers).toBeGreaterThan(200);
  });

  it('would be found out if it rounded, which shows that the test above can fail', () => {
    const column = Float64Array.of(0.1, 0.2, 0.30000000000000004);
    const rounded = unpackColumn(firstForm(column, 10), NAME);
    expect(rounded[2]).toBeCloseTo(column[2]!, 12);
    expect(bits(rounded)).not.toEqual(bits(column));
  });

  it(`of the first form is still read, to the bit (seed ${SEED})`, () => {
    const whole = fc.array(fc.integer({ min: -1_000_000, max: 1_000_000 }), { minLength: 1, maxLength: 200 });
    fc.assert(
      fc.property(whole, anyDoubles, (list, floats) => {
        const column = Float64Array.from(list, (value) => value / 1000);
        expect(bits(unpackColumn(firstForm(column, 1000), NAME))).toEqual(bits(column));
        expect(bits(unpackColumn(firstForm(floats, null), NAME))).toEqual(bits(floats));
      }),
      { seed: SEED, numRuns: runs(300, 5000) },
    );
  });

  const cases: [number[], number | null, string][] = [
    [[412.5], 10, 'one value has no difference'],
    [[0.1, 0.2, 0.30000000000000004], null, 'the third is not the double nearest to 0.3'],
    [[0, -0], null, 'an integer has no negative zero'],
    [[-2_147_483_648, 2_147_483_648], null, 'their difference does not fit 32 bits'],
    [[-1_073_741_824, 1_073_741_823], 1, 'their difference just does'],
    [[9_007_199_254_740_992], null, 'beyond the integers a double holds all of'],
    [[1.5e300, 2], null, 'no integer of 53 bits'],
    [[12.345678, 0.000001], 1_000_000, 'six decimals'],
    [[1 / 3], null, 'no decimal fraction'],
    [[4_102_444_800, 4_102_445_700], 1, 'times after 2038 begin beyond 32 bits, but their differences fit'],
  ];

  it.each(cases)('stores %j at scale %s, because %s', (values, scale) => {
    const column = Float64Array.from(values);
    expect(packColumn(column, NAME).scale).toBe(scale);
    expect(bits(backFrom(column))).toEqual(bits(column));
  });

  it('takes a month of a quarter-hourly meter in a few kilobytes', () => {
    const column = Float64Array.from({ length: 2976 }, (_, i) => Math.round(3000 + 1200 * Math.sin(i / 15)) / 10);
    expect(packColumn(column, NAME).bytes.length).toBeLessThan(5000);
  });
});

describe('a packed column that was damaged', () => {
  const column = Float64Array.from({ length: 40 }, (_, i) => Math.round(5000 * Math.sin(i)) / 10);
  const packed = packColumn(column, NAME);
  const withBit = (from: PackedColumn, bit: number) => {
    const bytes = Buffer.from(from.bytes);
    bytes[bit >> 3]! ^= 1 << (bit & 7);
    return { ...from, bytes };
  };

  it('is refused whichever of its bits is turned', () => {
    for (let bit = 0; bit < packed.bytes.length * 8; bit++) {
      expect(() => unpackColumn(withBit(packed, bit), NAME), `bit ${bit}`).toThrow(Error);
    }
  });

  it('would be read as other values without its hash, which shows that the test above can fail', () => {
    const first = firstForm(column, 10);
    const read = Array.from({ length: first.bytes.length * 8 }, (_, bit) => {
      try {
        return bits(unpackColumn(withBit(first, bit), NAME));
      } catch {
        return bits(column);
      }
    });
    expect(read.some((found) => found.join() !== bits(column).join())).toBe(true);
  });

  it.each([
    [{ ...packed, intervals: 41 }, NAME, 'another count'],
    [{ ...packed, scale: 100 }, NAME, 'another scale'],
    [{ ...packed, firstScaled: 1 }, NAME, 'another first value'],
    [packed, 'activeKw 2025-02', 'the name of another month'],
    [{ ...packed, bytes: packed.bytes.subarray(0, 12) }, NAME, 'half its head'],
  ])('is refused by its hash: %#', (stored, name, _what) => {
    expect(() => unpackColumn(stored, name)).toThrow(/is damaged: its hash is another one/);
  });

  it('is refused in a form of the future', () => {
    const bytes = Buffer.from(packed.bytes);
    bytes[0] = 0b1110;
    expect(() => unpackColumn({ ...packed, bytes }, NAME)).toThrow(/unknown form 14/);
  });

  it('of the first form is refused where it has another length', () => {
    expect(() => unpackColumn({ ...firstForm(column, 10), intervals: 41 }, NAME)).toThrow(/holds 156 bytes, not 160/);
  });

  it('is refused where nothing is left of it', () => {
    expect(() => unpackColumn({ ...packed, bytes: Buffer.alloc(0) }, NAME)).toThrow(Error);
  });
});
