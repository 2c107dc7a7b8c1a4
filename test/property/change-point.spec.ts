// Second method: every split tried by solving the normal equations of seven weekdays and a step outright.
import { describe, expect, it } from 'vitest';
import { changePoint, type DayValues } from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { runs, SEED } from '../support/soak.js';

const FIRST = 20_000;
const weekdayOf = (day: number): number => (day + 3) % 7;

function made(random: Chance, n: number, change: (k: number) => number): DayValues {
  const days = Array.from({ length: n + 20 }, (_, k) => FIRST + k)
    .filter(() => random.next() > 0.05)
    .slice(0, n);
  return {
    day: Int32Array.from(days),
    value: Float64Array.from(days, (day, k) => 100 + 10 * weekdayOf(day) + random.between(-5, 5) + change(k)),
  };
}

/** Sum of squares left by weekdays and a column, by Gaussian elimination of the normal equations. */
function leftBy({ day, value }: DayValues, column: (k: number) => number): number {
  const rows = [...day].map((of, k) => [
    ...Array.from({ length: 7 }, (_, w) => (weekdayOf(of) === w ? 1 : 0)),
    column(k),
  ]);
  const normal = Array.from({ length: 8 }, (_, a) => [
    ...Array.from({ length: 8 }, (_, b) => rows.reduce((sum, row) => sum + row[a]! * row[b]!, 0)),
    rows.reduce((sum, row, k) => sum + row[a]! * value[k]!, 0),
  ]);
  for (let p = 0; p < 8; p++) {
    const best = [...normal.keys()]
      .slice(p)
      .reduce((a, b) => (Math.abs(normal[b]![p]!) > Math.abs(normal[a]![p]!) ? b : a), p);
    [normal[p], normal[best]] = [normal[best]!, normal[p]!];
    for (let r = 0; r < 8; r++) {
      if (r === p) continue;
      const factor = normal[r]![p]! / normal[p]![p]!;
      for (let c = p; c <= 8; c++) normal[r]![c]! -= factor * normal[p]![c]!;
    }
  }
  const fitted = normal.map((row, p) => row[8]! / row[p]!);
  return rows.reduce((sum, row, k) => sum + (value[k]! - row.reduce((of, x, c) => of + x * fitted[c]!, 0)) ** 2, 0);
}

describe('the day on which a series of days changed', () => {
  it('is the split that leaves the least sum of squares, whichever way that is found', () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(6, 100); k++) {
      const n = random.whole(40, 90);
      const at = random.whole(14, n - 14);
      const days = made(random, n, (i) => (i >= at ? 40 : 0));
      const found = changePoint(days)!;
      expect(found.kind).toBe('step');
      const splits = Array.from({ length: n - 27 }, (_, i) => i + 14);
      const left = splits.map((split) => leftBy(days, (i) => (i >= split ? 1 : 0)));
      const best = splits[left.indexOf(Math.min(...left))]!;
      expect(found.day).toBe(days.day[best]);
      expect(Math.abs(best - at)).toBeLessThanOrEqual(1);
      expect(found.after - found.before).toBeCloseTo(40, -1);
    }
  });

  it('is none in scatter, in a week’s own rhythm, or in a change too small to tell', () => {
    const random = chance(SEED + 1);
    for (let k = 0; k < runs(20, 400); k++) {
      expect(changePoint(made(random, 90, () => 0))).toBeNull();
      expect(changePoint(made(random, 90, (i) => (i > 45 ? 8 : 0)))).toBeNull();
    }
  });

  it('is a drift where the change is gradual, and has no date', () => {
    const random = chance(SEED + 2);
    const found = changePoint(made(random, 90, (i) => i))!;
    expect(found).toMatchObject({ kind: 'drift', day: null });
    expect(found.after - found.before).toBeCloseTo(89, -1);
  });

  it('needs a fortnight on either side', () => {
    const random = chance(SEED + 3);
    expect(changePoint(made(random, 27, (i) => (i > 13 ? 500 : 0)))).toBeNull();
  });
});
