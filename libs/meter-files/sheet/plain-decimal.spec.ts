import fc from 'fast-check';
import { expect, it } from 'vitest';
import { SEED } from '../../../test/support/soak.js';
import { type NumberCell, readNumberInto } from '../csv/number-cell.js';
import { marklessNumber, plainDecimal } from './plain-decimal.js';

const cell: NumberCell = { form: 'wrong', value: 0 };

function readBack(text: string): number {
  const bytes = new TextEncoder().encode(text);
  readNumberInto(bytes, 0, bytes.length, cell);
  return cell.value;
}

it('writes numbers without an exponent', () => {
  expect([1e-7, 1.5e-9, 1e21, 1.25e22, -1e-7, 40.5, 0, -0].map(plainDecimal)).toEqual([
    '0.0000001',
    '0.0000000015',
    '1000000000000000000000',
    '12500000000000000000000',
    '-0.0000001',
    '40.5',
    '0',
    '0',
  ]);
});

it('writes numbers without a decimal mark', () => {
  expect([1.234, -40.5, 7, 1e-7].map(marklessNumber)).toEqual(['1234e-3', '-405e-1', '7', '00000001e-7']);
});

it('is read back to the bit, whatever the number', () => {
  const special = [5e-324, Number.MIN_VALUE, Number.MAX_VALUE, 2 ** 53 + 2, 1 / 3, 0.1 + 0.2, 1e-7, 1e23];
  for (const value of special)
    expect([readBack(plainDecimal(value)), readBack(marklessNumber(value))]).toEqual([value, value]);
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
      // adding 0 makes −0 and 0 one value
      expect(readBack(plainDecimal(value))).toBe(value + 0);
      expect(readBack(marklessNumber(value))).toBe(value + 0);
      expect(cell.form).toBe('plain');
    }),
    { seed: SEED, numRuns: 2000 },
  );
});
