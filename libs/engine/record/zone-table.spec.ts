import { describe, expect, it } from 'vitest';
import { civilDate, dayNumber, localTime, monthIndex, offsetAtS, UTC_TABLE, type ZoneTable } from './zone-table.js';

const at = (iso: string): number => Date.parse(iso) / 1000;

// One hour, two from the spring change to the autumn change.
const SUMMER: ZoneTable = {
  zone: 'Europe/Somewhere',
  fromS: [at('2024-10-27T01:00:00Z'), at('2025-03-30T01:00:00Z'), at('2025-10-26T01:00:00Z')],
  offsetS: [3600, 7200, 3600],
};

describe('offset at a moment', () => {
  it.each([
    ['2020-01-01T00:00:00Z', 3600, 'before the first entry the first holds'],
    ['2025-03-30T00:59:59Z', 3600, 'the last second of winter'],
    ['2025-03-30T01:00:00Z', 7200, 'the change itself is summer already'],
    ['2025-10-26T00:59:59Z', 7200, 'the last second of summer'],
    ['2030-07-01T00:00:00Z', 3600, 'after the last entry the last holds'],
  ])('%s is %d s: %s', (iso, offsetS) => {
    expect(offsetAtS(SUMMER, at(iso))).toBe(offsetS);
  });
});

describe('calendar dates', () => {
  it('are the run-time’s own, over four centuries and both ways', () => {
    for (let day = -80_000; day < 80_000; day += 37) {
      const date = new Date(day * 86_400_000);
      const found = civilDate(day);
      expect(found).toEqual({ year: date.getUTCFullYear(), month: date.getUTCMonth() + 1, day: date.getUTCDate() });
      expect(dayNumber(found.year, found.month, found.day)).toBe(day);
    }
  });

  it.each([
    [
      '2024-02-29T12:00:00Z',
      { year: 2024, month: 2, day: 29, weekday: 4, secondOfDay: 43_200 },
      'a leap day, Thursday',
    ],
    ['2000-02-29T00:00:00Z', { year: 2000, month: 2, day: 29, weekday: 2, secondOfDay: 0 }, 'a leap century'],
    ['1970-01-01T00:00:00Z', { year: 1970, month: 1, day: 1, weekday: 4, secondOfDay: 0 }, 'the first day, Thursday'],
    ['1969-12-31T23:59:59Z', { year: 1969, month: 12, day: 31, weekday: 3, secondOfDay: 86_399 }, 'the second before'],
  ])('%s in UTC: %s', (iso, local) => {
    expect(localTime(UTC_TABLE, at(iso))).toEqual(local);
  });

  it('follow the zone across midnight', () => {
    expect(localTime(SUMMER, at('2025-06-30T22:00:00Z'))).toEqual({
      year: 2025,
      month: 7,
      day: 1,
      weekday: 2,
      secondOfDay: 0,
    });
  });
});

describe('months of a record', () => {
  it('are those of the zone, not of UTC', () => {
    const beginS = Float64Array.of(
      at('2025-06-30T21:45:00Z'),
      at('2025-06-30T22:00:00Z'),
      at('2025-12-31T22:45:00Z'),
      at('2025-12-31T23:00:00Z'),
    );
    expect(monthIndex(beginS, SUMMER)).toEqual({
      names: ['2025-06', '2025-07', '2025-12', '2026-01'],
      starts: [0, 1, 2, 3, 4],
    });
  });

  it('leave out those without an interval', () => {
    const beginS = Float64Array.of(at('2025-01-31T00:00:00Z'), at('2025-04-01T00:00:00Z'));
    expect(monthIndex(beginS, UTC_TABLE).names).toEqual(['2025-01', '2025-04']);
  });
});
