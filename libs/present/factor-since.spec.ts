// Months made by hand: what is drawn, said and listed are the same months, and the first one out is the heading's.
import { describe, expect, it } from 'vitest';
import type { Reevaluation, SinceWhen } from '#libs/engine/index.js';
import { factorSince } from './factor-since.js';
import { GAP } from './format-number.js';

const MONTHS: SinceWhen['months'] = [
  { month: '2025-11', record: 'before', powerFactorMetered: 0.8, powerFactorWithBank: 0.97, neededKvar: 100 },
  { month: '2025-12', record: 'before', powerFactorMetered: null, powerFactorWithBank: null, neededKvar: 0 },
  { month: '2026-01', record: 'after', powerFactorMetered: 0.7, powerFactorWithBank: 0.91, neededKvar: 180 },
];

function judged(months: SinceWhen['months'], newRecord = true): Reevaluation {
  const since: SinceWhen = { months, firstMonthOut: '2026-01', monthsBy: 'simulated', changes: [] };
  return {
    verdict: { before: 'clear', after: 'clear' },
    inputs: [],
    newRecord,
    changes: [],
    stages: [],
    tonight: null,
    remedies: [],
    since,
    records: null,
  };
}

describe('months of two records beside the target', () => {
  it('draws a ring and a disc a month, none where there is no energy, and lists every month', () => {
    const chart = factorSince(judged(MONTHS), 0.95)!;
    const at = (kind: 'ring' | 'disc') =>
      chart.marks.flatMap((mark) =>
        (mark.kind === 'ring' || mark.kind === 'disc') && mark.kind === kind ? [[mark.x, mark.y]] : [],
      );
    expect(at('ring')).toEqual([
      [0, 0.8],
      [2, 0.7],
    ]);
    expect(at('disc')).toEqual([
      [0, 0.97],
      [2, 0.91],
    ]);
    expect(chart.table.rows.map(([month]) => month)).toEqual([`Nov${GAP}2025`, `Dec${GAP}2025`, `Jan${GAP}2026`]);
    expect(chart.table.rows[1]).toEqual([`Dec${GAP}2025`, 'earlier', '–', '–', '0']);
  });

  it('names the first month out, and marks it on the axis', () => {
    const chart = factorSince(judged(MONTHS), 0.95)!;
    expect(chart.finding).toBe(`Below the target since Jan${GAP}2026`);
    expect(chart.x.ticks.map(({ strong }) => strong)).toEqual([false, false, true]);
  });

  it('lays a quiet ground under the later record alone, and none where the record is the same', () => {
    const ground = (newRecord: boolean) =>
      factorSince(judged(MONTHS, newRecord), 0.95)!.marks.flatMap((mark) =>
        mark.kind === 'window' ? [[mark.from, mark.to]] : [],
      );
    expect(ground(true)).toEqual([[1.5, 2.5]]);
    expect(ground(false)).toEqual([]);
  });

  it('draws nothing where nothing changed or no month has energy', () => {
    expect(factorSince({ ...judged(MONTHS), since: null }, 0.95)).toBeNull();
    expect(factorSince(judged([MONTHS[1]!]), 0.95)).toBeNull();
  });
});
