// Berlin puts its clocks forward on 31 March 2024 at 01:00 UTC and back on 27 October 2024 at 01:00 UTC.
import { describe, expect, it } from 'vitest';
import { zoneTable } from '#libs/contract/time-zone.js';
import { elapsedMoments } from './elapsed-days.js';

const hour = 3600;
const hoursOf = (month: number, day: number, count: number) => {
  const midnightS = Date.UTC(2024, month, day) / 1000;
  const passedS = Int32Array.from({ length: count }, (_, i) => i * hour);
  const clock = Float64Array.from(passedS, (s) => midnightS + s);
  const zone = zoneTable('Europe/Berlin', midnightS - 86_400, midnightS + 2 * 86_400);
  return Array.from(elapsedMoments(clock, passedS, zone), (utcS) => (utcS - midnightS) / hour);
};

describe('hours counted since midnight', () => {
  it('follow each other through a day of 25 hours and leave none out', () => {
    expect(hoursOf(9, 27, 25)).toEqual(Array.from({ length: 25 }, (_, i) => i - 2));
  });

  it('end with a day of 23 hours', () => {
    expect(hoursOf(2, 31, 24)).toEqual([...Array.from({ length: 23 }, (_, i) => i - 1), Number.NaN]);
  });

  it('are those of the clock on any other day', () => {
    expect(hoursOf(4, 6, 24)).toEqual(Array.from({ length: 24 }, (_, i) => i - 2));
  });
});
