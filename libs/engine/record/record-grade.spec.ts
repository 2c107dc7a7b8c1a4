import { describe, expect, it } from 'vitest';
import { gradeRecord } from './record-grade.js';

/** Quarter hours: measured days and how many slots of the grid are missing or repaired. */
const graded = (days: number, { missing = 0, repaired = 0 } = {}) =>
  gradeRecord({ intervalS: 900, beginS: new Float64Array(days * 96 + repaired), missing, repaired });

describe('the grade of a record', () => {
  it.each([
    [361, 'full'],
    [360, 'usable'],
    [85, 'usable'],
    [84, 'limited'],
    [11, 'limited'],
    [10, 'insufficient'],
  ] as const)('of %d days without a gap is %s', (days, grade) => {
    expect(graded(days).grade).toBe(grade);
  });

  it('falls with the share that is missing, and a repair is not a measurement', () => {
    // 1 of 100 and 2 of 101 slots
    expect(graded(396, { missing: 4 * 96 }).grade).toBe('full');
    expect(graded(396, { missing: 8 * 96 }).grade).toBe('usable');
    expect(graded(396, { repaired: 8 * 96 }).grade).toBe('usable');
    expect(graded(400, { missing: 100 * 96 }).grade).toBe('limited');
    expect(graded(400, { missing: 101 * 96 }).grade).toBe('insufficient');
  });

  it('names the rule that kept it from the next better grade', () => {
    expect(graded(361).gradeRule).toMatchObject({ code: 'grade.full', values: { days: 361, missingPct: 0 } });
    expect(graded(10).gradeRule).toMatchObject({
      code: 'grade.days',
      values: { days: 10, grade: 'limited', leastDays: 11 },
    });
    expect(graded(396, { missing: 8 * 96 }).gradeRule).toMatchObject({
      code: 'grade.missing',
      values: { grade: 'full', mostMissingPct: 1 },
    });
    expect(graded(9, { missing: 9 * 96 }).gradeRule).toMatchObject({
      code: 'grade.daysAndMissing',
      values: { missingPct: 50, leastDays: 11, mostMissingPct: 20 },
    });
  });
});
