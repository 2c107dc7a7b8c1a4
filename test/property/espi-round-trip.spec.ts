// A record whose values are whole numbers of a power of ten of W and var, written as a feed in any of its forms and read back, is
// the same record to the bit: such a feed loses nothing, so the reader may not either.
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { recordBytes } from '#libs/contract/record-hash.js';
import type { LoadRecord } from '#libs/engine/index.js';
import { madeRecord } from '../support/made-record.js';
import { readMeterText } from '../support/meter-text.js';
import { runs, SEED } from '../support/soak.js';
import { writeEspi } from '../support/write-espi.js';

const made = fc
  .record({
    power: fc.constantFrom(-3, -2, -1, 0, 1, 2, 3),
    intervalS: fc.constantFrom(60, 300, 600, 900, 1800, 3600),
    slots: fc.uniqueArray(fc.integer({ min: 0, max: 90 }), { minLength: 3, maxLength: 60 }),
    whole: fc.array(
      fc.tuple(fc.integer({ min: -99_999, max: 9_999_999 }), fc.integer({ min: -999_999, max: 999_999 })),
      {
        minLength: 60,
        maxLength: 60,
      },
    ),
    prefix: fc.constantFrom('', 'espi', 'ns0', 'a.b-c'),
    perBlock: fc.integer({ min: 1, max: 40 }),
  })
  .map(({ power, intervalS, slots, whole, prefix, perBlock }) => {
    const tenth = 10 ** (3 - power);
    const sorted = [...slots].sort((a, b) => a - b);
    const record = madeRecord({
      intervalS,
      slots: sorted.map((slot) => slot - sorted[0]!),
      activeKw: sorted.map((_, i) => whole[i]![0] / tenth),
      reactiveKvar: sorted.map((_, i) => whole[i]![1] / tenth + 0),
    });
    return { record, form: { power, prefix, perBlock } };
  });

function contentOf(record: LoadRecord): string {
  const bytes = [...recordBytes({ ...record, notes: [] })];
  return bytes.map((chunk) => Buffer.from(chunk).toString('hex')).join('\n');
}

describe('an ESPI feed', () => {
  const count = runs(60, 1000);
  it(`written from any record reads back to the bit (${count} records, seed ${SEED})`, async () => {
    await fc.assert(
      fc.asyncProperty(made, async ({ record, form }) => {
        const reading = await readMeterText(writeEspi(record, { ...form, timed: true }));
        expect(reading.quality.format).toBe('espi');
        expect(contentOf(reading.record)).toBe(contentOf(record));
      }),
      { numRuns: count, seed: SEED },
    );
  });

  it(`without times of its readings means the same (${count} records, seed ${SEED})`, async () => {
    await fc.assert(
      fc.asyncProperty(made, async ({ record, form }) => {
        const reading = await readMeterText(writeEspi(record, { ...form, timed: false }));
        expect(contentOf(reading.record)).toBe(contentOf(record));
      }),
      { numRuns: count, seed: SEED },
    );
  });

  it('that is off by one in one value is another record', async () => {
    const record = madeRecord({ activeKw: [40.5, 41.5], reactiveKvar: [20, -3] });
    const text = writeEspi(record, { power: 0, prefix: '', perBlock: 10, timed: true });
    const other = await readMeterText(text.replace('>40500<', '>40501<'));
    expect(contentOf(other.record)).not.toBe(contentOf(record));
  });
});
