import { describe, expect, it } from 'vitest';
import { UTC_TABLE, type ZoneTable } from '#libs/engine/index.js';
import { BEYOND_CELL, GAP_CELL, type YearMapParts, yearMap } from './year-map.js';

const FIRST_S = Date.UTC(2025, 0, 30) / 1000;

/** Quarter hours of three days; the fifth hour of the second day is missing. */
function parts(changes: Partial<YearMapParts> = {}): YearMapParts {
  const all = Array.from({ length: 3 * 96 }, (_, i) => FIRST_S + i * 900);
  const beginS = Float64Array.from(
    all.filter((s) => !(s >= FIRST_S + 86_400 + 4 * 3600 && s < FIRST_S + 86_400 + 5 * 3600)),
  );
  const hour = (s: number) => Math.floor(((s - FIRST_S) % 86_400) / 3600);
  return {
    id: 'map',
    measure: 'kvar',
    unit: 'kvar',
    caption: '',
    beginS,
    intervalS: 900,
    values: beginS.map((s) => 10 * hour(s) + (s % 3600 === 900 ? 5 : 0)),
    zone: UTC_TABLE,
    beyond: null,
    finding: ({ gapPct }) => `${gapPct}`,
    table: { columns: [], rows: [] },
    ...changes,
  };
}

describe('the year by day and hour', () => {
  const map = yearMap(parts());

  it('has a cell an hour, and says where there is no reading', () => {
    expect(map.days).toBe(3);
    expect(map.cells).toHaveLength(72);
    expect([...map.cells].flatMap((cell, at) => (cell === GAP_CELL ? [at] : []))).toEqual([24 + 4]);
  });

  it('counts no hour that the clock leaves out, nor one outside the record, as without a reading', () => {
    // At 02:00 of the second day the clock is put on by an hour; the record begins and ends at noon.
    const zone: ZoneTable = { zone: 'x', fromS: [0, FIRST_S + 86_400 + 2 * 3600], offsetS: [0, 3600] };
    const beginS = Float64Array.from({ length: 2 * 96 }, (_, i) => FIRST_S + 43_200 + i * 900);
    const put = yearMap(parts({ zone, beginS, values: beginS.map(() => 5) }));
    expect(put.finding).toBe('0');
    expect(put.cells[24 + 2]).toBe(put.cells[24 + 1]);
    const without = yearMap(parts({ beginS: beginS.filter((_, i) => i < 4 || i > 7), values: beginS.slice(4) }));
    expect(Number(without.finding)).toBeCloseTo(100 / 48, 9);
  });

  it('shows the greatest value of each hour: 235 in the last, since one quarter hour of each has 5 more', () => {
    expect(map.bounds.at(-1)).toBe(235);
    expect(map.cells[23]).toBe(map.bounds.length - 2);
  });

  it('steps evenly from nothing, in at most seven inks', () => {
    const steps = map.bounds.slice(1, -1).map((bound, at) => bound - map.bounds[at]!);
    expect(new Set(steps.map((step) => step.toFixed(9))).size).toBe(1);
    expect(map.bounds.length - 1).toBeLessThanOrEqual(7);
    for (let hour = 1; hour < 24; hour++) expect(map.cells[hour]).toBeGreaterThanOrEqual(map.cells[hour - 1]!);
  });

  it('draws what lies beyond the bank apart, and only that', () => {
    const beyond = yearMap(parts({ beyond: 200 }));
    const hours = [...beyond.cells.subarray(0, 24)].flatMap((cell, hour) => (cell === BEYOND_CELL ? [hour] : []));
    expect(hours).toEqual([20, 21, 22, 23]);
  });

  it('names the months over their own days', () => {
    expect(map.months).toEqual([
      { name: 'Jan', from: 0, to: 2 },
      { name: 'Feb', from: 2, to: 3 },
    ]);
  });
});
