import { describe, expect, it } from 'vitest';
import type { ZoneTable } from '#libs/engine/index.js';
import { dayBeginS, formatDay, formatLength, formatMoment, formatMonth, formatWeekday } from './local-stamp.js';

/** Berlin around the autumn change of 2026: clocks go back at 01:00 UTC on 25 October. */
const AUTUMN: ZoneTable = { zone: 'Europe/Berlin', fromS: [0, Date.UTC(2026, 9, 25, 1) / 1000], offsetS: [7200, 3600] };

describe('a moment by the site’s clock', () => {
  it('follows the offset in force, before and after the change', () => {
    expect(formatMoment(AUTUMN, Date.UTC(2026, 9, 24, 22) / 1000)).toBe('25\u00a0Oct\u00a02026 00:00');
    expect(formatMoment(AUTUMN, Date.UTC(2026, 9, 25, 23) / 1000)).toBe('26\u00a0Oct\u00a02026 00:00');
  });

  it('shows seconds only where there are any', () => {
    expect(formatMoment(AUTUMN, Date.UTC(2026, 0, 1) / 1000 + 30)).toContain('02:00:30');
  });

  it('names day, weekday and month', () => {
    const moment = Date.UTC(2018, 10, 22, 9, 30) / 1000;
    expect(formatDay(AUTUMN, moment)).toBe('22\u00a0Nov\u00a02018');
    expect(formatWeekday(AUTUMN, moment)).toContain('Thursday');
    expect(formatMonth('2018-11')).toBe('Nov\u00a02018');
  });
});

describe('the beginning of a local day', () => {
  it('is 25 hours before the next one on the day the clocks go back', () => {
    const noon = Date.UTC(2026, 9, 25, 12) / 1000;
    const begin = dayBeginS(AUTUMN, noon);
    const next = dayBeginS(AUTUMN, begin + 36 * 3600);
    expect(begin).toBe(Date.UTC(2026, 9, 24, 22) / 1000);
    expect(next - begin).toBe(25 * 3600);
  });
});

describe('a length of time', () => {
  it.each([
    [45, '45\u00a0s', 'seconds under two minutes'],
    [900, '15\u00a0min', 'whole minutes'],
    [371.2, '6\u00a0min\u00a012\u00a0s', 'a part of a second is waited out whole'],
    [7500, '2\u00a0h\u00a05\u00a0min', 'hours and minutes'],
    [0, '0\u00a0s', 'nothing'],
  ])('%d s reads %s: %s', (lengthS, text) => {
    expect(formatLength(lengthS)).toBe(text);
  });
});
