// ECMA-376 part 1, 18.8.30 (built-in formats) and 18.8.31 (codes).
import { expect, it } from 'vitest';
import { builtInStyle, formatStyle } from './number-format.js';

it.each([
  ['General', null],
  ['0.00', null],
  ['0.00E+00', null],
  ['#,##0.0 "kWh"', null],
  ['0.0 kWh/d', null],
  ['@', null],
  ['[Red]-0;[Blue]0', null],
  ['"days"', null],
  ['yyyy-mm-dd', { date: true, time: false }],
  ['mmm-yy', { date: true, time: false }],
  ['[$-407]dd.mm.yyyy\\ hh:mm;@', { date: true, time: true }],
  ['m/d/yy h:mm AM/PM', { date: true, time: true }],
  ['hh:mm:ss.000', { date: false, time: true }],
  ['[h]:mm', { date: false, time: true }],
  ['mm:ss', { date: false, time: true }],
  ['"at "h:mm', { date: false, time: true }],
])('%s shows %j', (code, style) => {
  expect(formatStyle(code)).toEqual(style);
});

it('knows the formats that no workbook writes down', () => {
  expect([0, 1, 4, 10, 11, 37, 48, 49, 163].map(builtInStyle)).toEqual(Array.from({ length: 9 }, () => null));
  expect(builtInStyle(14)).toEqual({ date: true, time: false });
  expect(builtInStyle(20)).toEqual({ date: false, time: true });
  expect(builtInStyle(22)).toEqual({ date: true, time: true });
  expect(builtInStyle(46)).toEqual({ date: false, time: true });
});
