import { describe, expect, it } from 'vitest';
import { createLoadRecord, UTC_TABLE } from '#libs/engine/index.js';
import { qualityOf } from './quality.js';

const DAY_S = 86_400;

/** Hourly record from the first of January 2023, without the hours that are left out. */
function quality(days: number, isLeftOut: (hour: number) => boolean = () => false) {
  const hours = Array.from({ length: days * 24 }, (_, hour) => hour).filter((hour) => !isLeftOut(hour));
  const zeros = new Float64Array(hours.length);
  const beginS = Float64Array.from(hours, (hour) => Date.UTC(2023, 0, 1) / 1000 + hour * 3600);
  const record = createLoadRecord({ intervalS: 3600, beginS, activeKw: zeros, laggingKvar: zeros, leadingKvar: zeros });
  const counts = { format: 'csv', rowsRead: hours.length, rejectedRows: 0 };
  const repair = { method: 'none', upToS: null } as const;
  return qualityOf(record, counts, UTC_TABLE, { measured: record, repair, suspectZeros: [] });
}

describe('the quality of a record', () => {
  it('is graded by its length and what is missing', () => {
    expect(quality(365).grade).toBe('full');
    expect(quality(365, (hour) => hour % 50 === 1).grade).toBe('usable');
    expect(quality(90).grade).toBe('usable');
    expect(quality(90, (hour) => hour % 10 === 1).grade).toBe('limited');
    expect(quality(14).grade).toBe('limited');
    expect(quality(3).grade).toBe('insufficient');
    expect(quality(365, (hour) => hour % 3 === 1).grade).toBe('insufficient');
  });

  it('states how much of every month is there, the first and the last counted whole', () => {
    const { months } = quality(31 + 14, (hour) => hour < 24 || (hour >= 100 && hour < 106));
    expect(months).toEqual([
      { month: '2023-01', intervalsExpected: 744, intervals: 714, coveredPct: (100 * 714) / 744, repaired: 0 },
      { month: '2023-02', intervalsExpected: 672, intervals: 336, coveredPct: 50, repaired: 0 },
    ]);
  });

  it('names the quarters of the year that it knows nothing of', () => {
    expect(quality(365).seasonsMissing).toEqual([]);
    expect(quality(120).seasonsMissing).toEqual(['Jun-Aug', 'Sep-Nov']);
    // nine days of March are too few to know a spring by
    expect(quality(31 + 28 + 9).seasonsMissing).toEqual(['Mar-May', 'Jun-Aug', 'Sep-Nov']);
  });

  it('lists the first hundred gaps and counts them all', () => {
    const gaps = quality(300, (hour) => hour % 48 === 5);
    expect(gaps.missingSpanCount).toBe(150);
    expect(gaps.missingSpans).toHaveLength(100);
    const beginS = Date.UTC(2023, 0, 1) / 1000 + 5 * 3600;
    expect(gaps.missingSpans[0]).toEqual({ beginS, endS: beginS + 3600, intervals: 1 });
    expect(gaps.intervalsExpected).toBe(300 * 24);
    expect(gaps.missingSpans[1]!.beginS - beginS).toBe(2 * DAY_S);
  });
});
