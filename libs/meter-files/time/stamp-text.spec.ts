import { describe, expect, it } from 'vitest';
import { datePartsOf, readStamp } from './stamp-text.js';

const HOUR = 3600;

describe('a stamp', () => {
  it.each([
    ['2024-03-01 00:15', 20_240_301, 900, null],
    ['2024-03-01T00:15', 20_240_301, 900, null],
    ['2024/3/1 0:15:30', 20_240_301, 930, null],
    ['2024-03-01T00:15:00.000Z', 20_240_301, 900, 0],
    ['2024-03-01T00:15+01:00', 20_240_301, 900, HOUR],
    ['2024-03-01 00:15:00-0530', 20_240_301, 900, -5.5 * HOUR],
    ['20240301 0015', 20_240_301, 900, null],
    ['202403010015', 20_240_301, 900, null],
    ['20240301T001500Z', 20_240_301, 900, 0],
    ['2024-03-01 24:00', 20_240_301, 86_400, null],
    ['1 Mar 2024 00:15', 20_240_301, 900, null],
    ['01-Mar-24 00:15', 20_240_301, 900, null],
    ['March 1, 2024 00:15', 20_240_301, 900, null],
    ['1. März 2024 00:15', 20_240_301, 900, null],
    ['1 juillet 2024 00:15', 20_240_701, 900, null],
    ['15 ago 2024 00:15', 20_240_815, 900, null],
    ['2024-03-01 12:15 AM', 20_240_301, 900, null],
    ['2024-03-01 1:15 pm', 20_240_301, 13.25 * HOUR, null],
  ])('%s', (text, dateKey, clockS, offsetS) => {
    expect(readStamp(text)).toMatchObject({ dateKey, dateForm: 'yearFirst', clockS, offsetS });
  });

  it('leaves the order of day and month open where a slash or dash divides them, and takes dotted dates day first', () => {
    expect(readStamp('03/04/2024 00:00')).toMatchObject({ dateForm: 'slashed' });
    expect(readStamp('3-4-2024 00:00')).toMatchObject({ dateForm: 'slashed' });
    expect(readStamp('03.04.2024 00:00')).toMatchObject({ dateForm: 'dotted' });
    expect(readStamp('03/04/24 00:00')).toMatchObject({ dateForm: 'short' });
  });

  it('gives the parts in the order that is asked for', () => {
    const slashed = readStamp('03/04/2024 00:00')!.dateKey!;
    expect(datePartsOf(slashed, 'slashed', 'dmy')).toEqual({ year: 2024, month: 4, day: 3 });
    expect(datePartsOf(slashed, 'slashed', 'mdy')).toEqual({ year: 2024, month: 3, day: 4 });
    expect(datePartsOf(slashed, 'slashed', 'ymd')).toBeNull();
    const short = readStamp('05/06/07 00:00')!.dateKey!;
    expect(datePartsOf(short, 'short', 'dmy')).toEqual({ year: 2007, month: 6, day: 5 });
    expect(datePartsOf(short, 'short', 'mdy')).toEqual({ year: 2007, month: 5, day: 6 });
    expect(datePartsOf(short, 'short', 'ymd')).toEqual({ year: 2005, month: 6, day: 7 });
  });

  it('reads a date, a clock time and a range of clock times alone', () => {
    expect(readStamp('2024-03-01')).toMatchObject({ dateKey: 20_240_301, clockS: null });
    expect(readStamp('23:45')).toMatchObject({ dateKey: null, clockS: 23.75 * HOUR });
    expect(readStamp('0015')).toMatchObject({ dateKey: null, clockS: 900 });
    expect(readStamp('00:15 - 00:30')).toMatchObject({ dateKey: null, clockS: 900, untilS: 1800 });
    expect(readStamp('01.03.2024 00:15 bis 00:30')).toMatchObject({ dateForm: 'dotted', clockS: 900, untilS: 1800 });
  });

  it.each([
    '',
    'abc',
    '25:00',
    '12:60',
    '24:15',
    '13:00 pm',
    '2024-03-01 ab:15',
    '2024-03-01 00:15 Z+1',
    'kWh',
    '1 Foo 2024 00:15',
  ])('"%s" is none', (text) => {
    expect(readStamp(text)).toBeNull();
  });
});
