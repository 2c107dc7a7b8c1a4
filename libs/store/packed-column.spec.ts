import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { packColumn, unpackColumn } from './packed-column.js';

const SEED = 20_260_131;

/** Bits, so that 0 and −0 are told apart. */
const bits = (values: Float64Array) => Array.from(new BigUint64Array(values.slice().buffer));

describe('a packed column', () => {
  it(`gives any finite values back to the bit (seed ${SEED})`, () => {
    const values = fc.float64Array({ noDefaultInfinity: true, noNaN: true, minLength: 1, maxLength: 200 });
    fc.assert(
      fc.property(values, (column) => {
        expect(bits(unpackColumn(packColumn(column)))).toEqual(bits(column));
      }),
      { seed: SEED, numRuns: 300 },
    );
  });

  it(`gives what meters print back to the bit, whatever the digits (seed ${SEED})`, () => {
    const printed = fc.tuple(
      fc.integer({ min: 0, max: 7 }),
      fc.array(fc.integer({ min: -4_000_000, max: 4_000_000 }), { minLength: 1 }),
    );
    fc.assert(
      fc.property(printed, ([digits, whole]) => {
        const column = Float64Array.from(whole, (value) => Number(`${value}e-${digits}`));
        expect(bits(unpackColumn(packColumn(column)))).toEqual(bits(column));
      }),
      { seed: SEED, numRuns: 300 },
    );
  });

  const cases: [number[], number | null, string][] = [
    [[412.5], 10, 'one value has no difference'],
    [[0.1, 0.2, 0.30000000000000004], null, 'the third is not the double nearest to 0.3'],
    [[0, -0], null, 'an integer has no negative zero'],
    [[-2_147_483_648, 2_147_483_648], null, 'their difference does not fit 32 bits'],
    [[9_007_199_254_740_992], null, 'beyond the integers a double holds all of'],
    [[1.5e300, 2], null, 'no integer of 53 bits'],
    [[12.345678, 0.000001], 1_000_000, 'six decimals'],
    [[1 / 3], null, 'no decimal fraction'],
    [[4_102_444_800, 4_102_445_700], 1, 'times after 2038 begin beyond 32 bits, but their differences fit'],
  ];

  it.each(cases)('stores %j at scale %s, because %s', (values, scale) => {
    const column = Float64Array.from(values);
    const packed = packColumn(column);
    expect(packed.scale).toBe(scale);
    expect(bits(unpackColumn(packed))).toEqual(bits(column));
  });

  it('takes a month of a quarter-hourly meter in a few kilobytes', () => {
    const column = Float64Array.from({ length: 2976 }, (_, i) => Math.round(3000 + 1200 * Math.sin(i / 15)) / 10);
    expect(packColumn(column).bytes.length).toBeLessThan(5000);
  });

  it('refuses bytes of another length', () => {
    const packed = packColumn(Float64Array.from([1, 2, 3]));
    expect(() => unpackColumn({ ...packed, intervals: 4 })).toThrow(/holds 8 bytes, not 12/);
  });
});
