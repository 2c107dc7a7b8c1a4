import { describe, expect, it } from 'vitest';
import { UTC_TABLE, type ZoneTable } from '#libs/engine/index.js';
import { timeTicks } from './time-ticks.js';

/** Berlin in 2026: an hour ahead of UTC, two from 29 March 01:00 to 25 October 01:00. */
const BERLIN: ZoneTable = {
  zone: 'Europe/Berlin',
  fromS: [0, Date.UTC(2026, 2, 29, 1) / 1000, Date.UTC(2026, 9, 25, 1) / 1000],
  offsetS: [3600, 7200, 3600],
};
const at = (...parts: [number, number, number?, number?, number?]) =>
  Date.UTC(parts[0], ...(parts.slice(1) as [number])) / 1000;
const texts = (zone: ZoneTable, fromS: number, toS: number, most: number) =>
  timeTicks(zone, { fromS, toS }, most).map(({ text }) => text);

describe('ticks of an axis of time', () => {
  it('are months over a year, the year beside January', () => {
    expect(texts(UTC_TABLE, at(2026, 0, 1), at(2027, 0, 1), 12)).toEqual([
      'Jan\u00a02026',
      'Feb',
      'Mar',
      'Apr',
      'May',
      'Jun',
      'Jul',
      'Aug',
      'Sep',
      'Oct',
      'Nov',
      'Dec',
      'Jan\u00a02027',
    ]);
  });

  it('are days over a week and round hours over a day, midnight by its date', () => {
    expect(texts(UTC_TABLE, at(2026, 4, 1), at(2026, 4, 4), 4)).toEqual([
      '1\u00a0May',
      '2\u00a0May',
      '3\u00a0May',
      '4\u00a0May',
    ]);
    expect(texts(UTC_TABLE, at(2026, 4, 1, 20), at(2026, 4, 2, 4), 3)).toEqual(['21:00', '2\u00a0May', '03:00']);
  });

  it('stand at midnight of the site’s clock on both sides of a change of it', () => {
    const [before, after, next] = timeTicks(BERLIN, { fromS: at(2026, 9, 24, 12), toS: at(2026, 9, 27) }, 3);
    expect(before).toEqual({ atS: at(2026, 9, 24, 22), text: '25\u00a0Oct' });
    expect(after).toEqual({ atS: at(2026, 9, 25, 23), text: '26\u00a0Oct' });
    expect(next).toEqual({ atS: at(2026, 9, 26, 23), text: '27\u00a0Oct' });
  });

  it('are never many more than asked for, at any zoom', () => {
    for (let spanS = 600; spanS < 4e8; spanS *= 1.7) {
      const ticks = timeTicks(BERLIN, { fromS: at(2026, 1, 3, 7, 13), toS: at(2026, 1, 3, 7, 13) + spanS }, 8);
      expect(ticks.length).toBeLessThanOrEqual(10);
      expect(ticks.every(({ atS }, k) => k === 0 || atS > ticks[k - 1]!.atS)).toBe(true);
    }
  });
});
