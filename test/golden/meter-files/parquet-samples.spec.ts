// Parquet files of the project's own invention, one for each kind of column and page; the values are those that were written.
import { describe, expect, it } from 'vitest';
import { type MadeColumn, type MadeParquet, madeParquet } from '../../support/made-parquet.js';
import { noteCodes, readMeterText, refusalOf } from '../../support/meter-text.js';

const ROWS = 7;
const KW = [40.5, 41.5, 0.75, 1e-7, 0.1 + 0.2, 1234.567, 99];
const Q = [20.25, -3.5, 1, 2, 3, 4, 5];
const FIRST_MS = Date.UTC(2024, 4, 6);
const ms = Array.from({ length: ROWS }, (_, row) => FIRST_MS + row * 900_000);

const kw: MadeColumn = { name: 'kW', type: 'DOUBLE', values: KW };
const q: MadeColumn = { name: 'kvar', type: 'DOUBLE', values: Q };
const stamp = (values: MadeColumn['values'], more: Partial<MadeColumn>): MadeColumn => ({
  name: 'time',
  type: 'INT64',
  values,
  ...more,
});
const timestamp = (unit: 'MILLIS' | 'MICROS' | 'NANOS', isAdjustedToUTC: boolean) => ({
  logical: { type: 'TIMESTAMP' as const, isAdjustedToUTC, unit },
});
const plain = stamp(ms, timestamp('MILLIS', true));

async function read(columns: MadeColumn[], more: Partial<MadeParquet> = {}, siteTimeZone = 'Europe/Berlin') {
  const reading = await readMeterText(madeParquet({ columns, rowsAPage: 3, rowsAGroup: 4, ...more }), { siteTimeZone });
  const { record } = reading;
  return {
    reading,
    firstMs: record.firstS * 1000,
    intervalS: record.intervalS,
    kw: Array.from(record.activeKw),
    q: Array.from(record.laggingKvar, (lagging, i) => lagging - record.leadingKvar[i]!),
  };
}

describe('Parquet', () => {
  it('is read by the rules of delimited text and says its own name', async () => {
    const { reading, ...found } = await read([plain, kw, q]);
    expect(found).toEqual({ firstMs: FIRST_MS, intervalS: 900, kw: KW, q: Q });
    expect(reading.quality.format).toBe('parquet');
  });

  it.each<[string, MadeColumn, number]>([
    ['milliseconds in UTC', plain, 0],
    [
      'microseconds in UTC',
      stamp(
        ms.map((at) => BigInt(at) * 1000n),
        timestamp('MICROS', true),
      ),
      0,
    ],
    [
      'nanoseconds in UTC',
      stamp(
        ms.map((at) => BigInt(at) * 1_000_000n),
        timestamp('NANOS', true),
      ),
      0,
    ],
    ['milliseconds by their older name, which is in UTC', stamp(ms, { converted: 'TIMESTAMP_MILLIS' }), 0],
    // a wall clock of the site: two hours before UTC in summer
    ['milliseconds of the wall clock', stamp(ms, timestamp('MILLIS', false)), -2],
    [
      'texts',
      stamp(
        ms.map((at) => new Date(at).toISOString()),
        { type: 'BYTE_ARRAY', converted: 'UTF8' },
      ),
      0,
    ],
  ])('reads stamps in %s', async (_, column, hours) => {
    expect((await read([column, kw, q])).firstMs).toBe(FIRST_MS + hours * 3_600_000);
  });

  it('reads days and clock times apart', async () => {
    const day: MadeColumn = {
      name: 'date',
      type: 'INT32',
      values: ms.map((at) => Math.floor(at / 86_400_000)),
      converted: 'DATE',
    };
    const clock: MadeColumn = {
      name: 'clock',
      type: 'INT32',
      values: ms.map((at) => at % 86_400_000),
      converted: 'TIME_MILLIS',
    };
    const { reading: _, ...found } = await read([day, clock, kw, q], {}, 'UTC');
    expect(found).toEqual({ firstMs: FIRST_MS, intervalS: 900, kw: KW, q: Q });
  });

  it('reads whole and decimal numbers by their digits, and single precision as it stands', async () => {
    const decimal = (
      type: MadeColumn['type'],
      values: MadeColumn['values'],
      more: Partial<MadeColumn> = {},
    ): MadeColumn => ({
      name: 'kW',
      type,
      values,
      converted: 'DECIMAL',
      scale: 2,
      ...more,
    });
    const cents = [1, -250, 12345, 0, 99, 100, 7];
    const expected = [0.01, -2.5, 123.45, 0, 0.99, 1, 0.07];
    const bytes = cents.map((value) => Uint8Array.of((value >> 16) & 255, (value >> 8) & 255, value & 255));
    expect((await read([plain, decimal('INT32', cents), q])).kw).toEqual(expected);
    expect((await read([plain, decimal('INT64', cents), q])).kw).toEqual(expected);
    expect((await read([plain, decimal('FIXED_LEN_BYTE_ARRAY', bytes, { length: 3 }), q])).kw).toEqual(expected);
    expect((await read([plain, { name: 'kW', type: 'INT32', values: cents }, q])).kw).toEqual(cents);
    const single = [40.1, 0, 1, 2, 3, 4, 5];
    expect((await read([plain, { name: 'kW', type: 'FLOAT', values: single }, q])).kw).toEqual(single.map(Math.fround));
  });

  it.each(['UNCOMPRESSED', 'SNAPPY', 'GZIP', 'BROTLI'] as const)('reads pages packed with %s', async (codec) => {
    expect((await read([plain, kw, q], { codec })).kw).toEqual(KW);
    expect((await read([plain, kw, q], { codec, dictionary: true })).kw).toEqual(KW);
  });

  it('leaves out missing values and those that are not a number', async () => {
    const gaps = { ...kw, values: KW.map((value, i) => (i === 2 ? null : i === 4 ? Number.NaN : value)) };
    const { reading, kw: found } = await read([plain, gaps, q]);
    expect(found).toEqual(KW.filter((_, i) => i !== 2 && i !== 4));
    expect(noteCodes(reading)).toContain('intervals-without-value');
  });

  it('refuses an infinite value with its row and column, the names being row 1', async () => {
    const endless = { ...kw, values: KW.with(3, Number.POSITIVE_INFINITY) };
    expect((await refusalOf(madeParquet({ columns: [plain, endless, q] }))).problems).toMatchObject([
      { code: 'bad-number', row: 5, column: 2, found: '"Infinity"' },
    ]);
  });

  it('leaves out columns that hold no reading, and says so; columns keep their numbers', async () => {
    const mark: MadeColumn = {
      name: 'mark',
      type: 'FIXED_LEN_BYTE_ARRAY',
      length: 2,
      values: KW.map(() => Uint8Array.of(1, 2)),
    };
    const { reading, kw: found } = await read([mark, plain, kw, q]);
    expect(found).toEqual(KW);
    expect(reading.record.notes[0]).toMatchObject({ code: 'parquet-columns-left-out', values: { columns: 'mark' } });
    const wrong = { ...kw, values: KW.with(0, Number.NEGATIVE_INFINITY) };
    expect((await refusalOf(madeParquet({ columns: [mark, plain, wrong, q] }))).problems).toMatchObject([
      { row: 2, column: 3 },
    ]);
    const old: MadeColumn = { name: 'time', type: 'INT96', values: KW.map(() => new Uint8Array(12)) };
    expect((await refusalOf(madeParquet({ columns: [old, kw, q] }))).problems).toMatchObject([
      { code: 'no-time-column' },
      { code: 'not-supported-yet', path: 'column "time"', found: 'INT96' },
    ]);
  });
});
