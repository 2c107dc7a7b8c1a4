import { describe, expect, it } from 'vitest';
import { type DeviceRow, deviceRow, shortDevices, shortVerdict, yesOrNo } from './device-row.js';

const rated = (parts: Partial<DeviceRow>): DeviceRow =>
  deviceRow({ device: 'mainDevice.rating', basis: 'standard', source: 'x', unit: 'A', least: 100, ...parts });

const states: [parts: Partial<DeviceRow>, state: DeviceRow['state'], why: string][] = [
  [{}, 'open', 'nothing was entered'],
  [{ fitted: 100 }, 'fits', 'just the rating it needs'],
  [{ fitted: 100 * (1 - 1e-12) }, 'fits', 'a rounding below it is no shortfall'],
  [{ fitted: 99.9 }, 'short', 'less than it needs'],
  [{ fitted: 500 }, 'fits', 'nothing limits it above'],
  [{ fitted: 500, most: 400 }, 'short', 'more than the most'],
  [{ fitted: 'yes', least: null }, 'fits', 'a protection that is fitted'],
  [{ fitted: 'no', least: null }, 'short', 'one that is not'],
  [{ fitted: 50, state: 'noted' }, 'noted', 'a state that was worked out elsewhere stands'],
];

describe('a device', () => {
  it.each(states)('%j is %s: %s', (parts, state, _why) => {
    expect(rated(parts).state).toBe(state);
  });

  it('short by a standard rules the bank out, by custom asks for a second look', () => {
    expect(shortVerdict(rated({ fitted: 1 }))).toBe('avoid');
    expect(shortVerdict(rated({ fitted: 1, basis: 'derived' }))).toBe('avoid');
    expect(shortVerdict(rated({ fitted: 1, basis: 'practice' }))).toBe('watch');
    expect(shortVerdict(rated({ fitted: 1, basis: 'site' }))).toBe('watch');
  });

  it('that is open, or judged as a duty already, counts nowhere a second time', () => {
    const rows = [
      rated({}),
      rated({ fitted: 1 }),
      deviceRow({ device: 'reactor.current', basis: 'derived', source: 'derived', least: 10, fitted: 5 }),
    ];
    expect(rows[2]!.state).toBe('short');
    expect(shortDevices(rows)).toEqual([rows[1]]);
  });

  it('that was not entered is neither fitted nor missing', () => {
    expect([yesOrNo(true), yesOrNo(false), yesOrNo(undefined)]).toEqual(['yes', 'no', null]);
  });
});
