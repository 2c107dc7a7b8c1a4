import { describe, expect, it } from 'vitest';
import { monthCoverage } from './month-coverage.js';
import { UTC_TABLE, type ZoneTable } from './zone-table.js';

/** Summer time of 2025 by hand: UTC+1 from 30 March 01:00 UTC to 26 October 01:00 UTC. */
const DUBLIN: ZoneTable = {
  zone: 'Europe/Dublin',
  fromS: [0, Date.UTC(2025, 2, 30, 1) / 1000, Date.UTC(2025, 9, 26, 1) / 1000],
  offsetS: [0, 3600, 0],
};

function hours(fromS: number, count: number) {
  return { intervalS: 3600, beginS: Float64Array.from({ length: count }, (_, k) => fromS + k * 3600) };
}

describe('coverage of months', () => {
  it('counts 23 and 25 hours on the days the clock changes', () => {
    const year = monthCoverage(hours(Date.UTC(2025, 0, 1) / 1000, 365 * 24), DUBLIN);
    expect(year.map(({ intervalsExpected }) => intervalsExpected)).toEqual(
      [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31].map(
        (days, k) => days * 24 - (k === 2 ? 1 : 0) + (k === 9 ? 1 : 0),
      ),
    );
    expect(new Set(year.map(({ coveredPct }) => coveredPct))).toEqual(new Set([100]));
  });

  it('sorts an interval into the month of its local beginning', () => {
    // 30 June 23:00 UTC is 1 July by the clock
    const [july] = monthCoverage(hours(Date.UTC(2025, 5, 30, 23) / 1000, 2), DUBLIN);
    expect(july).toMatchObject({ month: '2025-07', intervals: 2 });
    expect(
      monthCoverage(hours(Date.UTC(2025, 5, 30, 23) / 1000, 2), UTC_TABLE).map(({ intervals }) => intervals),
    ).toEqual([1, 1]);
  });

  it('lists a month without any interval between two that have some, and a turn of the year', () => {
    const beginS = Float64Array.of(Date.UTC(2024, 11, 31) / 1000, Date.UTC(2025, 1, 1) / 1000);
    expect(monthCoverage({ intervalS: 86_400, beginS }, UTC_TABLE)).toEqual([
      { month: '2024-12', intervalsExpected: 31, intervals: 1, coveredPct: 100 / 31 },
      { month: '2025-01', intervalsExpected: 31, intervals: 0, coveredPct: 0 },
      { month: '2025-02', intervalsExpected: 28, intervals: 1, coveredPct: 100 / 28 },
    ]);
  });
});
