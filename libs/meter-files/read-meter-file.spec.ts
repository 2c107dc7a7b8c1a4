import { describe, expect, it } from 'vitest';
import { InputProblem, Stopped } from '#libs/engine/index.js';
import { lines, readMeterText, refusalOf, streamOf } from '../../test/support/meter-text.js';
import { sampleParquet } from '../../test/support/sample-parquet.js';
import { sampleWorkbooks } from '../../test/support/sample-workbooks.js';
import { FORMATS } from './formats.js';
import { MAX_INTERVALS } from './meter-format.js';
import { readMeterFile } from './read-meter-file.js';

const rows = (count: number) =>
  Array.from({ length: count }, (_, i) => `${new Date(Date.UTC(2024, 4, 6) + i * 60_000).toISOString()},1,1`);
const content = lines('time,kW,kvar', ...rows(2000));

describe('a meter file', () => {
  it('is recognised by its first bytes, or read as what the caller says it is', async () => {
    expect((await readMeterText(content)).quality.format).toBe('csv');
    expect((await readMeterText(content, { format: 'csv' })).quality.format).toBe('csv');
    expect((await refusalOf(content, { format: 'nem12' })).code).toBe('unreadable');
    expect((await refusalOf(content, { format: 'tea leaves' })).problems).toMatchObject([
      { code: 'unknown-format', path: 'format' },
    ]);
    expect((await refusalOf(content, { map: { format: 'nem12' } })).code).toBe('unreadable');
  });

  it('is refused where it holds nothing, or nothing that is text', async () => {
    expect((await refusalOf('')).code).toBe('empty-file');
    expect((await refusalOf('\ufeff \r\n')).code).toBe('empty-file');
    expect((await refusalOf(Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x14, 0, 0, 0))).code).toBe('unknown-format');
    expect((await refusalOf(Uint8Array.of(0x50, 0x4b, 3, 4, 0x14, 0, 0, 0))).problems).toMatchObject([
      { code: 'unreadable', path: 'archive' },
    ]);
  });

  it('is read alike in chunks of any size', async () => {
    const whole = await readMeterText(content);
    for (const chunkBytes of [1, 7, 4096]) expect(await readMeterFile(streamOf(content, chunkBytes))).toEqual(whole);
  });

  it('tells how far it is, and stops when it is told to', async () => {
    const fractions: number[] = [];
    const watch = { report: (fraction: number) => void fractions.push(fraction), stopped: () => fractions.length >= 3 };
    const long = lines('time,kW,kvar', ...rows(6000));
    const reading = readMeterFile(streamOf(long, 8192), { watch, sizeBytes: long.length });
    await expect(reading).rejects.toBeInstanceOf(Stopped);
    expect(fractions).toEqual([...fractions].sort((a, b) => a - b));
    expect(fractions.every((fraction) => fraction > 0 && fraction < 1)).toBe(true);
  });

  it('of a format that is spooled tells how far it is to the end, and stops in the middle', async () => {
    for (const { bytes } of [sampleWorkbooks()[0]!, sampleParquet()[0]!]) {
      const fractions: number[] = [];
      const report = (fraction: number) => void fractions.push(fraction);
      await readMeterFile(streamOf(bytes, 512), {
        watch: { report, stopped: () => false },
        sizeBytes: bytes.length,
      });
      expect(fractions).toEqual([...fractions].sort((a, b) => a - b));
      expect(fractions.some((fraction) => fraction > 0 && fraction <= 0.2)).toBe(true);
      expect(fractions.at(-1)).toBe(1);
      const watch = { report, stopped: () => fractions.at(-1)! >= 0.05 };
      fractions.length = 0;
      await expect(readMeterFile(streamOf(bytes), { watch, sizeBytes: bytes.length })).rejects.toBeInstanceOf(Stopped);
    }
  });

  it('lets its source close when it is refused', async () => {
    let closed = false;
    async function* source() {
      try {
        for (;;) yield new TextEncoder().encode('time,kW\n2024-05-06 00:00,1\n'.repeat(20_000));
      } finally {
        closed = true;
      }
    }
    await expect(readMeterFile(source())).rejects.toBeInstanceOf(InputProblem);
    expect(closed).toBe(true);
  });

  it('is refused beyond the longest record, naming the limit', async () => {
    async function* endless() {
      yield new TextEncoder().encode('time,kW,kvar\n');
      const clock = (i: number) => new Date(i * 60_000).toISOString().slice(11, 16);
      const minutes = Array.from({ length: 1440 }, (_, i) => `DATE ${clock(i)},1,1\n`).join('');
      for (let day = 0; ; day++) {
        const date = new Date(Date.UTC(2010, 0, 1) + day * 86_400_000).toISOString().slice(0, 10);
        yield new TextEncoder().encode(minutes.replaceAll('DATE', date));
      }
    }
    const problem = await readMeterFile(endless()).catch((error: unknown) => error);
    expect(problem).toBeInstanceOf(InputProblem);
    expect((problem as InputProblem).problems).toMatchObject([
      { code: 'too-large', expected: `a record of at most ${MAX_INTERVALS} intervals` },
    ]);
    // five million rows, on a machine that may be busy
  }, 60_000);

  it('has formats that each name their public description', () => {
    const names = FORMATS.map(({ name }) => name);
    expect(new Set(names).size).toBe(names.length);
    // what nothing else recognises
    expect(names.at(-1)).toBe('csv');
    for (const { title, described } of FORMATS) {
      expect(title).not.toBe('');
      expect(described.length).toBeGreaterThan(0);
    }
  });
});
