// ECMA-376 part 1, 18.17.4.1: day 1 is 1 January 1900, or day 0 is 1 January 1904; the 1900 system has a 29 February 1900
// that never was. The pairs of serial and date below are worked out by counting days.
import { describe, expect, it } from 'vitest';
import { serialText } from './serial-text.js';

const DATE = { date: true, time: false };
const TIME = { date: false, time: true };
const BOTH = { date: true, time: true };

describe('a serial', () => {
  it.each([
    [1, '1900-01-01'],
    [59, '1900-02-28'],
    [60, '1900-02-29'],
    [61, '1900-03-01'],
    [25_569, '1970-01-01'],
    [45_418, '2024-05-06'],
    [2_958_465, '9999-12-31'],
  ])('%s is the date %s since 1900', (serial, date) => {
    expect(serialText(serial, DATE, false)).toBe(date);
  });

  it.each([
    [0, '1904-01-01'],
    [24_107, '1970-01-01'],
    [43_956, '2024-05-06'],
  ])('%s is the date %s since 1904', (serial, date) => {
    expect(serialText(serial, DATE, true)).toBe(date);
  });

  it('shows what its format shows, and a clock time that the format hides', () => {
    expect(serialText(45_418, BOTH, false)).toBe('2024-05-06 00:00:00');
    expect(serialText(45_418.5, DATE, false)).toBe('2024-05-06 12:00:00');
    expect(serialText(45_418.5, TIME, false)).toBe('2024-05-06 12:00:00');
    expect(serialText(0.75, TIME, false)).toBe('18:00:00');
    expect(serialText(0, TIME, false)).toBe('00:00:00');
    expect(serialText(1, TIME, false)).toBe('24:00:00');
  });

  it('is the second it was computed from, and keeps what is a fraction of one', () => {
    for (let quarter = 0; quarter < 96 * 400; quarter++) {
      const minutes = (quarter % 4) * 15;
      const stamp = serialText(45_418 + quarter / 96, BOTH, false);
      expect(stamp.slice(13)).toBe(`:${String(minutes).padStart(2, '0')}:00`);
    }
    let sum = 45_418;
    for (let i = 0; i < 35_040; i++) sum += 1 / 96;
    expect(serialText(sum, BOTH, false)).toBe('2025-05-06 00:00:00');
    expect(serialText(45_418.5 + 0.25 / 86_400, BOTH, false)).toBe('2024-05-06 12:00:00.250');
  });

  it('that is no date stays a number', () => {
    expect(serialText(-1, BOTH, false)).toBe('-1');
    expect(serialText(2_958_466, BOTH, false)).toBe('2958466');
  });
});
