import { describe, expect, it } from 'vitest';
import { zoneTable } from '#libs/contract/time-zone.js';
import { localToUtc } from './local-times.js';

const at = (text: string) => Date.parse(`${text}:00Z`) / 1000;
const iso = (momentS: number) =>
  Number.isNaN(momentS) ? 'never' : new Date(momentS * 1000).toISOString().slice(5, 16);

function read(zone: string, stamps: string[], options: { ends?: boolean; newestFirst?: boolean } = {}) {
  const clock = Float64Array.from(stamps, at);
  const table = zoneTable(zone, Math.min(...clock) - 172_800, Math.max(...clock) + 172_800);
  const times = localToUtc(clock, options.newestFirst ?? false, table, options.ends ?? false);
  return { ...times, moments: Array.from(times.utcS, iso) };
}

// Europe/Berlin puts its clock back on 27 October 2024 at 01:00 UTC and forward on 31 March 2024 at 01:00 UTC.
const autumn = (...clock: string[]) => clock.map((time) => `2024-10-27T${time}`);

describe('local times', () => {
  it('take the offset of their date', () => {
    expect(read('Europe/Berlin', ['2024-01-10T12:00', '2024-07-10T12:00']).moments).toEqual([
      '01-10T11:00',
      '07-10T10:00',
    ]);
  });

  it('count a doubled hour by file order: before the step back the first pass, behind it the second', () => {
    const { moments, doubledRows } = read(
      'Europe/Berlin',
      autumn('01:30', '02:00', '02:30', '02:00', '02:30', '03:00'),
    );
    expect(moments).toEqual(['10-26T23:30', '10-27T00:00', '10-27T00:30', '10-27T01:00', '10-27T01:30', '10-27T02:00']);
    expect(doubledRows).toBe(4);
  });

  it('count it the same way in a file that runs backwards', () => {
    const stamps = autumn('03:00', '02:30', '02:00', '02:30', '02:00', '01:30');
    expect(read('Europe/Berlin', stamps, { newestFirst: true }).moments).toEqual([
      '10-27T02:00',
      '10-27T01:30',
      '10-27T01:00',
      '10-27T00:30',
      '10-27T00:00',
      '10-26T23:30',
    ]);
  });

  it('count pairs as first and second pass where the file alternates', () => {
    expect(read('Europe/Berlin', autumn('02:00', '02:00', '02:30', '02:30')).moments).toEqual([
      '10-27T00:00',
      '10-27T01:00',
      '10-27T00:30',
      '10-27T01:30',
    ]);
  });

  it('count a pass that lacks its first row as the second pass all the same', () => {
    expect(read('Europe/Berlin', autumn('02:00', '02:30', '02:15', '02:45')).moments.slice(2)).toEqual([
      '10-27T01:15',
      '10-27T01:45',
    ]);
  });

  it('take a doubled hour that stands once as the first pass, and say so', () => {
    const { moments, onceRows } = read('Europe/Berlin', autumn('01:30', '02:00', '02:30', '03:00'));
    expect(moments).toEqual(['10-26T23:30', '10-27T00:00', '10-27T00:30', '10-27T02:00']);
    expect(onceRows).toBe(2);
  });

  it('let the interval that ends at the change be written by the new clock or by the old one', () => {
    const ends = ['10-26T23:30', '10-27T00:00', '10-27T00:30', '10-27T01:00', '10-27T01:30', '10-27T02:00'];
    const byNew = autumn('01:30', '02:00', '02:30', '02:00', '02:30', '03:00');
    const byOld = autumn('01:30', '02:00', '02:30', '03:00', '02:30', '03:00');
    expect(read('Europe/Berlin', byNew, { ends: true }).moments).toEqual(ends);
    expect(read('Europe/Berlin', byOld, { ends: true }).moments).toEqual(ends);
  });

  it('know no moment for a time the clock skipped, but for an end written in the old time', () => {
    const spring = ['2024-03-31T01:30', '2024-03-31T02:00', '2024-03-31T02:30', '2024-03-31T03:00'];
    expect(read('Europe/Berlin', spring).moments).toEqual(['03-31T00:30', 'never', 'never', '03-31T01:00']);
    expect(read('Europe/Berlin', spring, { ends: true }).moments).toEqual([
      '03-31T00:30',
      '03-31T01:00',
      'never',
      '03-31T01:00',
    ]);
  });

  it('follow a change of half an hour too', () => {
    // Lord Howe Island puts its clock back by 30 minutes on 7 April 2024 at 15:00 UTC the day before
    const stamps = [
      '2024-04-07T01:15',
      '2024-04-07T01:30',
      '2024-04-07T01:45',
      '2024-04-07T01:30',
      '2024-04-07T01:45',
      '2024-04-07T02:00',
    ];
    expect(read('Australia/Lord_Howe', stamps).moments).toEqual([
      '04-06T14:15',
      '04-06T14:30',
      '04-06T14:45',
      '04-06T15:00',
      '04-06T15:15',
      '04-06T15:30',
    ]);
  });
});
