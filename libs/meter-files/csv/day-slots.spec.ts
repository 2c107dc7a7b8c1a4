import { describe, expect, it } from 'vitest';
import { daySlots } from './day-slots.js';

const clock = (step: number, from: number, count: number) =>
  Array.from({ length: count }, (_, i) => {
    const minutes = from + i * step;
    return `${String(Math.floor(minutes / 60)).padStart(2, '0')}:${String(minutes % 60).padStart(2, '0')}`;
  });
const counted = (prefix: string, from: number, count: number) =>
  Array.from({ length: count }, (_, i) => `${prefix}${from + i}`);
const shape = (names: string[], stamp?: 'begin' | 'end') => {
  const found = daySlots(['date', ...names], stamp);
  return found === null
    ? null
    : [found.slots.length, found.stepS, found.mark, found.slots[0]!.beginS, found.slots.at(-1)!.beginS];
};

describe('the columns of a day', () => {
  it('mark ends where they run from one step past midnight to midnight', () => {
    expect(shape(clock(15, 15, 96))).toEqual([96, 900, 'end', 0, 85_500]);
    expect(shape([...clock(30, 30, 47), '00:00'])).toEqual([48, 1800, 'end', 0, 84_600]);
    expect(shape(clock(60, 60, 24).map((name) => name.replace(':', '')))).toEqual([24, 3600, 'end', 0, 82_800]);
  });

  it('are taken as beginnings where they run from midnight, unless it is said', () => {
    expect(shape(clock(60, 0, 24))).toEqual([24, 3600, null, 0, 82_800]);
    expect(shape(clock(60, 0, 24), 'end')).toEqual([24, 3600, 'end', -3600, 79_200]);
    expect(shape(clock(60, 0, 24).map((name, i) => `${name}-${clock(60, 60, 24)[i]}`))).toEqual([
      24,
      3600,
      'begin',
      0,
      82_800,
    ]);
  });

  it('may be counted, with an hour more for the day of 25', () => {
    expect(shape(counted('', 1, 24))).toEqual([24, 3600, 'begin', 0, 82_800]);
    expect(shape(counted('', 0, 24))).toEqual([24, 3600, 'begin', 0, 82_800]);
    expect(shape(counted('H', 1, 25))).toEqual([25, 3600, 'begin', 0, 86_400]);
    expect(shape(counted('HE ', 1, 24))).toEqual([24, 3600, 'begin', 0, 82_800]);
    expect(shape(counted('Q', 1, 100))).toEqual([100, 900, 'begin', 0, 89_100]);
  });

  it('may stand there once a quantity', () => {
    const names = ['kWh', 'kvarh'].flatMap((unit) => clock(60, 60, 24).map((name) => `${unit} ${name}`));
    expect(daySlots(names, undefined)!.slots.map(({ rest }) => rest)).toEqual([
      ...Array(24).fill('kWh'),
      ...Array(24).fill('kvarh'),
    ]);
  });

  it('name a doubled hour twice', () => {
    const hours = clock(60, 0, 24);
    const found = daySlots([...hours.slice(0, 3), '02:00 B', ...hours.slice(3)], undefined)!;
    expect(found.slots.map(({ second }) => second).indexOf(true)).toBe(3);
    expect(found.slots[3]!.beginS).toBe(7200);
  });

  it('are no day where one is missing, out of place or too many', () => {
    expect(shape(clock(60, 60, 23))).toBeNull();
    expect(shape(clock(60, 0, 24).toReversed())).toBeNull();
    expect(shape(counted('feeder ', 2, 24))).toBeNull();
    expect(shape(counted('kW ', 1, 26))).toBeNull();
    expect(shape(counted('HE ', 0, 24))).toBeNull();
  });
});
