import { describe, expect, it } from 'vitest';
import { createLoadRecord } from '../record/load-record.js';
import { meterAfter } from './meter-after.js';

type Row = [lagging: number, leading: number, oldKvar: number, bankKvar: number, after: [number, number], why: string];

const rows: Row[] = [
  [80, 0, 0, 30, [50, 0], 'less lagging'],
  [80, 0, 0, 80, [0, 0], 'none'],
  [80, 0, 0, 100, [0, 20], 'the rest leads'],
  [0, 10, 0, 20, [0, 30], 'leading already, and more so'],
  [30, 10, 0, 20, [10, 10], 'both in one interval: lagging falls, leading stays'],
  [30, 10, 0, 50, [0, 30], 'both in one interval: the rest leads'],
  [80, 0, 0, 0, [80, 0], 'no bank changes nothing'],
  [50, 0, 30, 30, [50, 0], 'the old bank’s kvar in a new one change nothing'],
  [50, 0, 30, 50, [30, 0], 'a larger one takes the difference'],
  [50, 0, 30, 0, [80, 0], 'the old bank taken away gives its kvar back'],
  [0, 50, 30, 0, [0, 20], 'to leading first, where the old bank made it lead'],
  [0, 50, 80, 0, [30, 0], 'and the rest lags'],
];

describe('the meter after a bank', () => {
  it.each(rows)(
    '%d lagging, %d leading, old bank %d, new bank %d: %j, %s',
    (lagging, leading, oldKvar, bankKvar, after, _why) => {
      const record = createLoadRecord({
        intervalS: 900,
        beginS: Float64Array.of(0),
        activeKw: Float64Array.of(100),
        laggingKvar: Float64Array.of(lagging),
        leadingKvar: Float64Array.of(leading),
      });
      const load = {
        metering: { at: 'bus' as const },
        activeKw: record.activeKw,
        reactiveKvar: Float64Array.of(lagging - leading + oldKvar),
      };
      const meter = meterAfter(record, load, Float64Array.of(bankKvar));
      expect([meter.laggingKvar[0], meter.leadingKvar[0]]).toEqual(after);
      expect(meter.activeKw[0]).toBe(100);
    },
  );
});
