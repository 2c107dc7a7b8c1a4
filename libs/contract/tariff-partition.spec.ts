import { describe, expect, it } from 'vitest';
import { partitionBreach } from './tariff-partition.js';

const windows = [
  { name: 'day', days: [1, 2, 3, 4, 5], hours: [[7, 22.5]] },
  { name: 'night', days: [1, 2, 3, 4, 5], hours: [[22.5, 7]] },
  { name: 'weekend', days: [6, 7, 8] },
];
const prices = { day: 0.2, night: 0.1, weekend: 0.1 };

describe('the windows a clause has prices for', () => {
  it('share out the week: every moment has one price', () => {
    expect(partitionBreach({ prices }, windows)).toEqual([]);
  });

  it.each([
    ['leave a gap', [{ ...windows[0], hours: [[7, 22]] }, windows[1], windows[2]], 'none at month 1, Monday, 22:00'],
    [
      'overlap',
      [{ ...windows[0], hours: [[6.5, 22.5]] }, windows[1], windows[2]],
      'day and night at month 1, Monday, 06:30',
    ],
    [
      'forget the holidays',
      [windows[0], windows[1], { name: 'weekend', days: [6, 7] }],
      'none at month 1, a holiday, 00:00',
    ],
    [
      'forget a month',
      [...windows.slice(0, 2), { ...windows[2], months: [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 12] }],
      'none at month 11, Saturday, 00:00',
    ],
  ])('are refused with the moment where they %s', (_what, changed, found) => {
    expect(partitionBreach({ prices }, changed)).toEqual([
      expect.objectContaining({ path: ['prices'], code: 'inconsistent', found }),
    ]);
  });

  it('need share out only the months its clause has', () => {
    const summer = [...windows.slice(0, 2), { ...windows[2], months: [6, 7, 8] }];
    expect(partitionBreach({ prices, months: [6, 7, 8] }, summer)).toEqual([]);
  });
});
