import { describe, expect, it } from 'vitest';
import { Question } from '#libs/contract/question.js';
import { createLoadRecord, summarizeRecord } from '#libs/engine/index.js';
import { lines, noteCodes, readMeterText } from '../../../test/support/meter-text.js';
import { MAX_INTERVALS, type MeterReading } from '../meter-format.js';
import { type ExtendOptions, extendRecord } from './extend-record.js';

const QUARTER_S = 900;
const BEGIN_S = Date.UTC(2025, 2, 1) / 1000;

/** A file of quarter hours from one slot to another, kW by slot. */
function file(from: number, to: number, kw: (slot: number) => number): Promise<MeterReading> {
  const rows = Array.from({ length: to - from }, (_, i) => {
    const stamp = new Date((BEGIN_S + (from + i) * QUARTER_S) * 1000).toISOString();
    return `${stamp},${kw(from + i)},10`;
  });
  return readMeterText(lines('begin,active (kW),reactive (kvar)', ...rows), { siteTimeZone: 'Europe/Dublin' });
}

const OPTIONS: ExtendOptions = { timeZone: 'Europe/Dublin' };

async function asked(earlier: MeterReading, later: MeterReading): Promise<Question> {
  try {
    extendRecord(earlier, later, OPTIONS);
  } catch (problem) {
    if (problem instanceof Question) return problem;
    throw problem;
  }
  throw new Error('nothing was asked');
}

describe('a record that a further file extends', () => {
  it('is what one file with all the rows would have given', async () => {
    const kw = (slot: number) => 100 + (slot % 96);
    const whole = await file(0, 2000, kw);
    const extended = extendRecord(await file(0, 1200, kw), await file(1100, 2000, kw), OPTIONS);
    for (const column of ['beginS', 'activeKw', 'laggingKvar', 'leadingKvar'] as const) {
      expect(extended.record[column]).toEqual(whole.record[column]);
    }
    expect(extended.record.duplicates).toBe(100);
    expect(extended.quality).toEqual({ ...whole.quality, rowsRead: 2100, duplicates: 100 });
    expect(extended.record.notes.find(({ code }) => code === 'record-extended')).toMatchObject({
      values: { added: 800, agreed: 100 },
    });
  });

  it('counts the time between two files that do not touch as missing', async () => {
    const extended = extendRecord(await file(0, 100, () => 1), await file(148, 200, () => 1), OPTIONS);
    expect(extended.record.missing).toBe(48);
    expect(extended.quality.missingSpans).toEqual([
      { beginS: BEGIN_S + 100 * QUARTER_S, endS: BEGIN_S + 148 * QUARTER_S, intervals: 48 },
    ]);
  });

  it('is the same reading where the file adds nothing', async () => {
    const earlier = await file(0, 500, () => 5);
    expect(extendRecord(earlier, await file(100, 200, () => 5), OPTIONS)).toBe(earlier);
  });

  it('asks which counts where they disagree, and says what comes of either', async () => {
    const earlier = await file(0, 400, () => 100);
    const later = await file(300, 500, (slot) => (slot < 304 ? 160 : 100));
    const question = (await asked(earlier, later)).questions[0]!;
    expect(question.id).toBe('overlap');
    expect(question.about).toBe(
      'whether the record or the further file counts in 4 intervals where they disagree, ' +
        'from 2025-03-04T03:00:00Z to 2025-03-04T04:00:00Z: active power by up to 60 kW',
    );
    expect(question.overlap).toMatchObject({ added: 100, agreed: 96, disagreed: 4, spanCount: 1 });
    // 500 quarter hours at 100 kW, and one hour at 60 kW more
    expect(question.readings.map(({ map, maxKw, activeKwh }) => [map, maxKw, activeKwh])).toEqual([
      [{ overlap: 'earlier' }, 100, 12_500],
      [{ overlap: 'later' }, 160, 12_560],
    ]);
    expect(question.readings[1]!.firstRows[0]).toEqual(['2025-03-04T03:00:00Z', '160', '10', '0']);
    for (const { map, maxKw, activeKwh } of question.readings) {
      const settled = extendRecord(earlier, later, { ...OPTIONS, map });
      expect(summarizeRecord(settled.record)).toMatchObject({ maxKw, activeKwh });
      expect(noteCodes(settled)).toContain('overlap-settled');
      expect(settled.quality.rejectedRows).toBe(4);
    }
  });

  it('says that a column was lost which the new intervals do not have', async () => {
    const { record, quality } = await file(0, 4, () => 1);
    const earlier = { record: createLoadRecord({ ...record, voltageV: Float64Array.of(1, 2, 3, 4) }), quality };
    const extended = extendRecord(earlier, await file(4, 8, () => 1), OPTIONS);
    expect(extended.record.voltageV).toBeNull();
    expect(extended.record.notes.at(-1)).toMatchObject({ code: 'column-left-out', values: { column: 'voltage' } });
  });

  it('may not grow beyond the longest record', async () => {
    const { quality } = await file(0, 4, () => 1);
    const long = (from: number, n: number) => {
      const zero = new Float64Array(n);
      const beginS = new Float64Array(n);
      for (let i = 0; i < n; i++) beginS[i] = (from + i) * 60;
      const columns = { beginS, activeKw: zero, laggingKvar: zero, leadingKvar: zero };
      return { record: createLoadRecord({ intervalS: 60, ...columns }), quality };
    };
    const earlier = long(0, MAX_INTERVALS - 2);
    const extend = (more: number) => extendRecord(earlier, long(MAX_INTERVALS - 2, more), OPTIONS);
    expect(extend(2).record.beginS).toHaveLength(MAX_INTERVALS);
    expect(() => extend(3)).toThrow(`a record of at most ${MAX_INTERVALS} intervals, found ${MAX_INTERVALS + 1}`);
  }, 120_000);
});

describe('gaps that are to be filled', () => {
  it('may not make a record beyond the longest one', async () => {
    const rows = ['2000-01-01 00:00,1,1', '2000-01-01 00:01,1,1', '2000-01-01 00:02,1,1', '2025-01-01 00:00,1,1'];
    const reading = readMeterText(lines('time,kW,kvar', ...rows), {
      map: { dateOrder: 'ymd', repair: 'hold', upToS: 1e12 },
    });
    await expect(reading).rejects.toMatchObject({
      problems: [{ code: 'too-large', path: 'upToS', expected: `a record of at most ${MAX_INTERVALS} intervals` }],
    });
  });
});
