// What is packed has to come back to the bit: the oracle is a plain list of the same numbers.
import * as fc from 'fast-check';
import { expect, it } from 'vitest';
import { RunColumn } from './run-column.js';

const stretch = fc.oneof(
  fc
    .record({ first: fc.integer(), step: fc.integer({ min: -1e6, max: 1e6 }), count: fc.nat(40) })
    .map(({ first, step, count }) => Array.from({ length: count }, (_, i) => first + i * step)),
  fc.array(
    fc.oneof(
      fc.double().map((number) => number + 0),
      fc.constant(Number.NaN),
    ),
    { maxLength: 10 },
  ),
  fc.nat(20).map((count) => Array<number>(count).fill(Number.NaN)),
);

it('gives every number back as it was added, in whatever order they are asked for', () => {
  fc.assert(
    fc.property(fc.array(stretch, { maxLength: 8 }), fc.array(fc.nat()), (stretches, asked) => {
      const numbers = stretches.flat();
      const column = new RunColumn();
      for (const number of numbers) column.add(number);
      expect(column.count).toBe(numbers.length);
      expect(Array.from(column.toNumbers())).toEqual(numbers);
      for (const ask of numbers.length === 0 ? [] : asked) {
        expect(column.at(ask % numbers.length)).toBe(numbers[ask % numbers.length]);
      }
    }),
    { seed: 20_261_202 },
  );
});

it('keeps one stretch a day for a million stamps in blocks of a day, and hardly fewer than half the numbers where no step repeats', () => {
  const column = new RunColumn();
  for (let i = 0; i < 1_000_000; i++) column.add(i * 60 + Math.floor(i / 1440) * 7);
  expect(column.runs).toBe(Math.ceil(1_000_000 / 1440));
  expect(column.at(999_999)).toBe(999_999 * 60 + 694 * 7);
  const squares = new RunColumn();
  for (let i = 0; i < 1000; i++) squares.add(i * i);
  expect(squares.runs).toBe(500);
});
