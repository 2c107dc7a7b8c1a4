import { describe, expect, it } from 'vitest';
import { type NumberCell, readNumberInto, readNumberText } from './number-cell.js';

function read(text: string): NumberCell {
  const fromText: NumberCell = { form: 'wrong', value: 0 };
  const fromBytes: NumberCell = { form: 'wrong', value: 0 };
  const bytes = new TextEncoder().encode(text);
  readNumberText(text, fromText);
  readNumberInto(bytes, 0, bytes.length, fromBytes);
  // two ways into the same reading: neither may know better
  expect(fromBytes).toEqual(fromText);
  return fromText;
}

describe('a number in a cell', () => {
  it.each([
    ['12', 'plain', 12],
    ['-12', 'plain', -12],
    ['+7', 'plain', 7],
    [' 3.5 ', 'dot', 3.5],
    ['3,5', 'comma', 3.5],
    ['.5', 'dot', 0.5],
    ['5.', 'dot', 5],
    ['-0,25', 'comma', -0.25],
    ['−4,5', 'comma', -4.5],
    ['1e-7', 'plain', 1e-7],
    ['2.5E3', 'dot', 2500],
    ['2,5e3', 'comma', 2500],
  ])('%s is %s', (text, form, value) => {
    expect(read(text)).toEqual({ form, value });
  });

  it.each([
    ['1.234', 'openDot', 1.234],
    ['12,345', 'openComma', 12.345],
    ['-123.456', 'openDot', -123.456],
  ])('%s stays open: the mark may be the decimal mark or divide thousands', (text, form, value) => {
    expect(read(text)).toEqual({ form, value });
  });

  it.each([
    ['0.123', 'dot', 0.123, 'thousands have no leading zero'],
    ['00,123', 'comma', 0.123, 'thousands have no leading zero'],
    ['1234.567', 'dot', 1234.567, 'four digits before the mark'],
    ['12.3456', 'dot', 12.3456, 'four digits behind the mark'],
    ['1,234.5', 'dot', 1234.5, 'the last mark is the decimal mark'],
    ['1.234,5', 'comma', 1234.5, 'the last mark is the decimal mark'],
    ['1.234.567', 'comma', 1_234_567, 'a decimal mark stands once'],
    ['1,234,567', 'dot', 1_234_567, 'a decimal mark stands once'],
    ['1 234,5', 'comma', 1234.5, 'blanks divide thousands'],
    ['1\u00a0234\u00a0567', 'plain', 1_234_567, 'so do no-break spaces'],
    ["12'345.5", 'dot', 12_345.5, 'and apostrophes'],
  ])('%s settles the decimal mark as %s: %d, since %s', (text, form, value) => {
    expect(read(text)).toEqual({ form, value });
  });

  it.each(['', ' ', '-', '?', 'NA', 'n/a', 'NaN', 'null', '#N/A', 'fehlt'])(
    '"%s" is a missing value, never 0',
    (text) => {
      expect(read(text)).toEqual({ form: 'missing', value: Number.NaN });
    },
  );

  it.each([
    'abc',
    '1.2.3',
    '1,23,4',
    '12 34',
    '1..2',
    'Inf',
    '-Infinity',
    '1e999',
    '12kW',
    '0x10',
    '--1',
    '1-2',
    '5%',
    '١٢',
  ])('"%s" is no number', (text) => {
    expect(read(text).form).toBe('wrong');
  });

  it('is the double nearest to the decimal, as the language reads it', () => {
    for (const text of [
      '0.1',
      '123456.789',
      '2.675',
      '9007199254740993',
      '0.000123456789012345',
      '179.9999999999999999',
    ]) {
      expect(read(text).value).toBe(Number(text));
    }
  });

  it('makes a negative zero a zero, so that no −0 reaches a record', () => {
    expect(Object.is(read('-0.000').value, 0)).toBe(true);
  });
});
