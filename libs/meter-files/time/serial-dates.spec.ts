// 45 413 is 1 May 2024 in every spreadsheet that counts from 1900; 1/96 of a day is a quarter of an hour.
import { describe, expect, it } from 'vitest';
import { readDayFraction, readSerialStamp } from './serial-dates.js';

describe('a serial date', () => {
  it.each([
    ['45413', 20_240_501, 0],
    ['45413.0104166667', 20_240_501, 900],
    ['45413,0104166667', 20_240_501, 900],
    ['45413.98958333334', 20_240_501, 85_500],
    ['45413.9999999', 20_240_502, 0],
    ['36526.5', 20_000_101, 43_200],
  ])('%s is %i and %i s', (text, dateKey, clockS) => {
    expect(readSerialStamp(text)).toMatchObject({ dateKey, clockS });
  });

  it('is no other number', () => {
    for (const text of ['', '4541', '454130', '19999', '80001', '-45413', '45413.', '45413.1.2', '4e4']) {
      expect(readSerialStamp(text)).toBeNull();
    }
  });

  it('may stand apart from its time of day', () => {
    expect(['0', '0.0104166667', '0,5', '.25', '1'].map(readDayFraction)).toEqual([0, 900, 43_200, 21_600, 86_400]);
    expect(['1.04166666666667E-2', '2', '1.5', '12:00', '-0.5', ''].map(readDayFraction)).toEqual([
      900,
      null,
      null,
      null,
      null,
      null,
    ]);
  });
});
