import { describe, expect, it } from 'vitest';
import { createLoadRecord } from '../record/load-record.js';
import { monthIndex, UTC_TABLE } from '../record/zone-table.js';
import { summarizeRequirement } from './requirement.js';

// Two months of a day an interval: 31 days of 40 kvar need, then nothing but a tenth of a kvar on one day.
const days = 59;
const january = (i: number): boolean => i < 31;
const record = createLoadRecord({
  intervalS: 86_400,
  beginS: Float64Array.from({ length: days }, (_, i) => Date.UTC(2025, 0, 1) / 1000 + i * 86_400),
  activeKw: Float64Array.from({ length: days }, (_, i) => (january(i) ? 80 : 10)),
  laggingKvar: Float64Array.from({ length: days }, (_, i) => (january(i) ? 100 : 5)),
  leadingKvar: Float64Array.from({ length: days }, (_, i) => (january(i) ? 0 : 1)),
});
const needKvar = Float64Array.from({ length: days }, (_, i) => (january(i) ? 40 : i === 40 ? 0.1 : 0));
const summary = summarizeRequirement(record, needKvar, monthIndex(record.beginS, UTC_TABLE), 0.8);

describe('the requirement', () => {
  it.each([
    ['maxKvar', 40, 'the greatest'],
    ['p99Kvar', 40, 'position 57.42 of 59: both neighbours are 40'],
    ['p50Kvar', 40, 'the 30th in the ascending list is of January'],
    ['meanKvar', (31 * 40 + 0.1) / 59, 'zeros included'],
    ['intervalsInNeed', 32, 'above 1e-9 kvar'],
  ] as const)('%s is %d: %s', (key, value, _why) => {
    expect(summary[key]).toBeCloseTo(value, 12);
  });

  it('by month: January wants 40 kvar, in every interval and so in energy', () => {
    expect(summary.months[0]).toMatchObject({ month: '2025-01', maxKw: 80, neededKvar: 40 });
    expect(summary.months[0]!.activeKwh).toBeCloseTo(31 * 24 * 80, 9);
    expect(summary.months[0]!.energyNeedKvar).toBeCloseTo(40, 9);
    expect(summary.months[0]!.powerFactorLagging).toBeCloseTo(80 / Math.hypot(80, 100), 12);
  });

  it('by month: February holds its energy factor and needs nothing on the bill, though one interval did', () => {
    expect(summary.months[1]).toMatchObject({ month: '2025-02', neededKvar: 0.1, energyNeedKvar: 0 });
    expect(summary.months[1]!.leadingKvarh).toBeCloseTo(28 * 24, 9);
  });
});
