import { describe, expect, it } from 'vitest';
import { createLoadRecord } from './load-record.js';
import { summarizeRecord } from './record-summary.js';

const record = createLoadRecord({
  intervalS: 1800,
  beginS: Float64Array.of(0, 1800, 5400),
  activeKw: Float64Array.of(80, -40, 60),
  laggingKvar: Float64Array.of(60, 10, 0),
  leadingKvar: Float64Array.of(0, 30, 80),
  duplicates: 2,
  repaired: 1,
});

describe('statistics of a record', () => {
  const summary = summarizeRecord(record);

  it.each([
    ['activeKwh', 70, 'exported energy apart: half of 80 and 60'],
    ['laggingKvarh', 35, 'half of 60 and 10'],
    ['leadingKvarh', 55, 'half of 30 and 80; never netted off'],
    ['powerFactorLagging', 70 / Math.hypot(70, 35), 'lagging kvarh alone'],
    ['powerFactorNet', 70 / Math.hypot(70, 20), 'lagging less leading'],
    ['maxKw', 80, 'imported'],
    ['maxKva', 100, '80 and 60, or 60 and 80: the interval’s net kvar'],
    ['missing', 1, 'the slot at 3 600 s'],
    ['intervals', 3, 'valid ones'],
    ['beginS', 0, 'of the first slot'],
    ['endS', 7200, 'exclusive'],
    ['duplicates', 2, 'as the reader counted'],
    ['repaired', 1, 'as the reader counted'],
  ] as const)('%s is %d: %s', (key, value, _why) => {
    expect(summary[key]).toBeCloseTo(value, 12);
  });

  it('has no power factor where no energy was imported', () => {
    const exporting = createLoadRecord({
      intervalS: 900,
      beginS: Float64Array.of(0),
      activeKw: Float64Array.of(-5),
      laggingKvar: Float64Array.of(1),
      leadingKvar: Float64Array.of(0),
    });
    const { powerFactorLagging, powerFactorNet, maxKw } = summarizeRecord(exporting);
    expect([powerFactorLagging, powerFactorNet, maxKw]).toEqual([null, null, -5]);
  });
});
