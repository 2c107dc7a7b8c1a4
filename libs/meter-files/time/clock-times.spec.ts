import { describe, expect, it } from 'vitest';
import { clockTimes, orderRows } from './clock-times.js';
import { dateOrders } from './date-orders.js';
import { readStamp } from './stamp-text.js';
import { StampedRows } from './stamped-rows.js';

function rowsOf(stamps: string[]): StampedRows {
  const rows = new StampedRows(0);
  stamps.forEach((text, i) => {
    const stamp = readStamp(text)!;
    const index = rows.add(i + 2);
    rows.dateForm = stamp.dateForm;
    rows.dateKey[index] = stamp.dateKey!;
    rows.clockS[index] = stamp.clockS!;
  });
  return rows;
}

function ordered(stamps: string[], movable = true) {
  const rows = rowsOf(stamps);
  const clock = clockTimes(rows, dateOrders(rows, undefined)[0]!);
  const order = orderRows(clock, rows, movable);
  return { ...order, clock: Array.from(clock, (clockS) => new Date(clockS * 1000).toISOString().slice(5, 16)) };
}

const ENDING = ['2024-05-06 12:00', '2024-05-06 18:00', '2024-05-06 00:00', '2024-05-07 06:00', '2024-05-07 12:00'];

describe('the order of a file’s rows', () => {
  it('moves a midnight that stands behind the evening of its date to the day that begins', () => {
    const { movedMidnights, clock } = ordered(ENDING);
    expect(movedMidnights).toBe(1);
    expect(clock).toEqual(['05-06T12:00', '05-06T18:00', '05-07T00:00', '05-07T06:00', '05-07T12:00']);
  });

  it('does so in a file that runs backwards', () => {
    const { newestFirst, movedMidnights, clock } = ordered([...ENDING].reverse());
    expect({ newestFirst, movedMidnights }).toEqual({ newestFirst: true, movedMidnights: 1 });
    expect(clock[2]).toBe('05-07T00:00');
  });

  it('leaves midnights that begin their date, and all where stamps are said to mark beginnings', () => {
    const beginning = ['2024-05-06 12:00', '2024-05-06 18:00', '2024-05-07 00:00', '2024-05-07 06:00'];
    expect(ordered(beginning).movedMidnights).toBe(0);
    expect(ordered([...beginning].reverse()).movedMidnights).toBe(0);
    expect(ordered(ENDING, false).movedMidnights).toBe(0);
  });

  it('takes no evidence from a day that stands twice, or from a row repeated behind its day', () => {
    const day = ['2024-05-06 00:00', '2024-05-06 06:00', '2024-05-06 12:00', '2024-05-06 18:00'];
    expect(ordered([...day, ...day]).movedMidnights).toBe(0);
    expect(ordered([...day, day[0]!]).movedMidnights).toBe(0);
  });

  it('takes none from rows without any order', () => {
    const shuffled = [
      '2024-05-06 18:00',
      '2024-05-06 00:00',
      '2024-05-07 12:00',
      '2024-05-06 06:00',
      '2024-05-07 06:00',
      '2024-05-07 00:00',
      '2024-05-06 12:00',
      '2024-05-07 18:00',
    ];
    expect(ordered(shuffled).movedMidnights).toBe(0);
  });

  it('refuses a file in which some midnights end a day and others begin one', () => {
    const mixed = [...ENDING, '2024-05-08 00:00', '2024-05-08 06:00'];
    expect(() => ordered(mixed)).toThrow('row 7: expected midnight under the ending day');
  });
});

describe('dates', () => {
  it('are settled over the whole column, asked about, or refused', () => {
    const orders = (...dates: string[]) => dateOrders(rowsOf(dates.map((date) => `${date} 00:00`)), undefined);
    expect(orders('01/02/2024', '13/02/2024')).toEqual(['dmy']);
    expect(orders('01/02/2024', '02/13/2024')).toEqual(['mdy']);
    expect(orders('01/02/2024', '02/02/2024')).toEqual(['dmy', 'mdy']);
    expect(orders('05/02/2024')).toEqual(['dmy', 'mdy']);
    expect(orders('24/02/01', '24/02/02')).toEqual(['dmy', 'ymd']);
    expect(orders('01.02.2024')).toEqual(['dmy']);
    expect(orders('2024-02-01')).toEqual(['ymd']);
    expect(() => orders('13/02/2024', '02/13/2024')).toThrow('row 3: expected dates with day and month in one order');
  });

  it('that the calendar has not are refused by their row', () => {
    const rows = rowsOf(['2024-02-29 00:00', '2023-02-29 00:00']);
    expect(() => clockTimes(rows, 'ymd')).toThrow('row 3: expected a date of the calendar');
    expect(() => clockTimes(rowsOf(['1895-01-01 00:00']), 'ymd')).toThrow('between 1950 and 2150');
  });
});
