import { listAt, numberAt, partAt, type Readable, type RuleBreach, textAt } from './rule-breach.js';

const DAY_KINDS = [1, 2, 3, 4, 5, 6, 7, 8];
const MONTHS = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12];
const DAY_NAMES = ['Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday', 'Sunday', 'a holiday'];

/**
 * Prices by window share out the whole year: at every moment of every kind of day exactly one window holds.
 * Between the hours that any window names nothing changes, so those are the moments looked at.
 * @param clause a clause, perhaps with `prices`
 * @param windows the tariff's windows
 * @returns the first moment at which none or more than one holds, or nothing
 */
export function partitionBreach(clause: Readable, windows: unknown[]): RuleBreach[] {
  const priced = Object.keys((partAt(clause, 'prices') as object | undefined) ?? {});
  const parts = windows.filter((window) => priced.includes(textAt(window, 'name') ?? ''));
  if (priced.length === 0 || parts.length !== priced.length) return [];
  const months = listAt(clause, 'months');
  for (const month of months.length === 0 ? MONTHS : months) {
    for (const day of DAY_KINDS) {
      for (const hour of changesOf(parts)) {
        const holding = parts.filter((window) => holds(window, Number(month), day, hour));
        if (holding.length !== 1) return [breachAt(Number(month), day, hour, holding)];
      }
    }
  }
  return [];
}

function changesOf(windows: unknown[]): number[] {
  const hours = windows.flatMap((window) => listAt(window, 'hours').flatMap((range) => listAt(range) as number[]));
  return [...new Set([0, ...hours])].filter((hour) => hour < 24).sort((a, b) => a - b);
}

function holds(window: Readable, month: number, day: number, hour: number): boolean {
  const months = listAt(window, 'months');
  const days = listAt(window, 'days');
  const ranges = listAt(window, 'hours');
  if (months.length > 0 && !months.includes(month)) return false;
  if (days.length > 0 && !days.includes(day)) return false;
  return ranges.length === 0 || ranges.some((range) => inRange(numberAt(range, 0), numberAt(range, 1), hour));
}

function inRange(from: number, to: number, hour: number): boolean {
  return from > to ? hour >= from || hour < to : hour >= from && hour < to;
}

function breachAt(month: number, day: number, hour: number, holding: unknown[]): RuleBreach {
  const clock = `${String(Math.floor(hour)).padStart(2, '0')}:${String(Math.floor((hour % 1) * 60)).padStart(2, '0')}`;
  const moment = `month ${month}, ${DAY_NAMES[day - 1]}, ${clock}`;
  const found = holding.length === 0 ? 'none' : holding.map((window) => textAt(window, 'name')).join(' and ');
  return {
    code: 'inconsistent',
    path: ['prices'],
    expected: 'exactly one window at every moment',
    found: `${found} at ${moment}`,
  };
}
