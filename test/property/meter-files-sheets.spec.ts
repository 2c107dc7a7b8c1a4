// A record written as a workbook or as Parquet and read back is the same record to the bit; and damage to any byte of a
// workbook is refused or changes nothing, since every part has its check sum.
import fc from 'fast-check';
import { parquetWriteBuffer } from 'hyparquet-writer';
import { describe, expect, it } from 'vitest';
import { recordBytes } from '#libs/contract/record-hash.js';
import { createLoadRecord, InputProblem, type LoadRecord } from '#libs/engine/index.js';
import { madeParquet } from '../support/made-parquet.js';
import { type MadeCell, madeWorkbook, STYLES } from '../support/made-workbook.js';
import { readMeterText } from '../support/meter-text.js';
import { Chance } from '../support/mutate-file.js';
import { sampleParquet } from '../support/sample-parquet.js';
import { sampleWorkbooks } from '../support/sample-workbooks.js';
import { runs, SEED } from '../support/soak.js';

const value = fc.oneof(
  fc.double({ min: 0, max: 1e6, noNaN: true }),
  fc.integer({ min: 0, max: 999_999 }).map((thousandths) => thousandths / 1000),
);
const parts = fc.record({
  intervalS: fc.constantFrom(60, 300, 600, 900, 1800, 3600),
  begin: fc.constantFrom('2024-10-26T20:00Z', '1999-12-31T12:00Z', '2038-01-18T22:00Z'),
  slots: fc.uniqueArray(fc.integer({ min: 0, max: 120 }), { minLength: 1, maxLength: 50 }),
  values: fc.array(fc.tuple(fc.double({ min: -1e4, max: 1e6, noNaN: true }), value, value, value, fc.boolean()), {
    minLength: 50,
    maxLength: 50,
  }),
  more: fc.boolean(),
});

type Parts = typeof parts extends fc.Arbitrary<infer T> ? T : never;

function recordOf({ intervalS, begin, slots, values, more }: Parts): LoadRecord {
  const firstS = Date.parse(begin) / 1000;
  const beginS = Float64Array.from(
    [...slots].sort((a, b) => a - b),
    (slot) => firstS + slot * intervalS,
  );
  // adding 0 makes −0 and 0 one value
  const column = (k: 0 | 1 | 2 | 3) => Float64Array.from(beginS, (_, i) => values[i]![k] + 0);
  return createLoadRecord({
    intervalS,
    beginS,
    activeKw: column(0),
    laggingKvar: column(1),
    leadingKvar: column(2),
    voltageV: more ? column(3) : null,
    standby: more ? Uint8Array.from(beginS, (_, i) => (values[i]![4] ? 1 : 0)) : null,
  });
}

function contentOf(record: LoadRecord): string {
  const bytes = [...recordBytes({ ...record, notes: [], duplicates: 0, repaired: 0 })];
  return bytes.map((chunk) => Buffer.from(chunk).toString('hex')).join('\n');
}

const NAMES = [
  'interval begin [UTC]',
  'interval end [UTC]',
  'kW',
  'lagging kvar',
  'leading kvar',
  'voltage [V]',
  'standby',
];

function columnsOf(record: LoadRecord): (Float64Array | Uint8Array)[] {
  const { beginS, intervalS, activeKw, laggingKvar, leadingKvar, voltageV, standby } = record;
  const endS = beginS.map((at) => at + intervalS);
  const more = voltageV === null || standby === null ? [] : [voltageV, standby];
  return [beginS, endS, activeKw, laggingKvar, leadingKvar, ...more];
}

/** Any number may be a value of these records, 9999 too. */
const READ_AS = { siteTimeZone: 'Europe/Berlin', map: { fillers: 'values' } } as const;

type StampCell = (momentS: number) => MadeCell;
const STAMPS: Record<string, StampCell> = {
  serials: (momentS) => ({ serial: 25_569 + momentS / 86_400, style: STYLES.stamp }),
  texts: (momentS) => new Date(momentS * 1000).toISOString(),
};

function asWorkbook(record: LoadRecord, stamp: StampCell): Uint8Array {
  const columns = columnsOf(record);
  const rows = Array.from(record.beginS, (_, i) =>
    columns.map((column, k): MadeCell => (k < 2 ? stamp(column[i]!) : k === 6 ? column[i] === 1 : column[i]!)),
  );
  return madeWorkbook({ sheets: [{ name: 'Record', rows: [NAMES.slice(0, columns.length), ...rows] }] });
}

const UTC = { type: 'TIMESTAMP', isAdjustedToUTC: true, unit: 'MILLIS' } as const;

const WRITERS: Record<string, (record: LoadRecord) => Uint8Array> = {
  'pages of the first kind': (record) =>
    madeParquet({
      codec: 'SNAPPY',
      rowsAPage: 7,
      rowsAGroup: 20,
      columns: columnsOf(record).map((column, k) =>
        k < 2
          ? { name: NAMES[k]!, type: 'INT64', logical: UTC, values: Array.from(column, (at) => at * 1000) }
          : { name: NAMES[k]!, type: k === 6 ? 'INT32' : 'DOUBLE', values: Array.from(column) },
      ),
    }),
  'pages of the second kind': (record) =>
    new Uint8Array(
      parquetWriteBuffer({
        rowGroupSize: 16,
        columnData: columnsOf(record).map((column, k) =>
          k < 2
            ? { name: NAMES[k]!, type: 'TIMESTAMP', data: Array.from(column, (at) => new Date(at * 1000)) }
            : k === 6
              ? { name: NAMES[k]!, type: 'BOOLEAN', data: Array.from(column, (on) => on === 1) }
              : { name: NAMES[k]!, type: 'DOUBLE', data: Array.from(column) },
        ),
      }),
    ),
};

describe('a record', () => {
  it.each(Object.keys(STAMPS))('as a workbook with stamps as %s is read back to the bit', async (kind) => {
    await fc.assert(
      fc.asyncProperty(parts, async (made) => {
        const record = recordOf(made);
        const read = await readMeterText(asWorkbook(record, STAMPS[kind]!), READ_AS);
        expect(contentOf(read.record)).toBe(contentOf(record));
      }),
      { seed: SEED, numRuns: runs(60, 1000) },
    );
  });

  it.each(Object.keys(WRITERS))('as Parquet in %s is read back to the bit', async (kind) => {
    await fc.assert(
      fc.asyncProperty(parts, async (made) => {
        const record = recordOf(made);
        const read = await readMeterText(WRITERS[kind]!(record), READ_AS);
        expect(contentOf(read.record)).toBe(contentOf(record));
      }),
      { seed: SEED, numRuns: runs(60, 1000) },
    );
  });
});

const FILES = runs(300, 6000);
const flipped = (bytes: Uint8Array, chance: Chance) => {
  const changed = bytes.slice();
  for (let n = 1 + chance.below(3); n > 0; n--) changed[chance.below(changed.length)]! ^= 1 << chance.below(8);
  return changed;
};
const cut = (bytes: Uint8Array, chance: Chance) => {
  const from = chance.below(bytes.length);
  return Uint8Array.from([...bytes.subarray(0, from), ...bytes.subarray(from + 1 + chance.below(200))]);
};

/** What comes of a damaged file; a fault of ours comes through. */
async function outcomeOf(bytes: Uint8Array): Promise<LoadRecord | null> {
  try {
    return (await readMeterText(bytes)).record;
  } catch (problem) {
    if (problem instanceof InputProblem) return null;
    throw problem;
  }
}

async function damage(samples: readonly { name: string; bytes: Uint8Array }[]) {
  const sound = await Promise.all(samples.map(async ({ bytes }) => contentOf((await readMeterText(bytes)).record)));
  const found = { accepted: 0, refused: 0, changed: [] as string[], slow: [] as string[] };
  for (let n = 0; n < FILES; n++) {
    const chance = new Chance(SEED + n * 104_729);
    const { name, bytes } = samples[n % samples.length]!;
    const damaged = n % 4 === 3 ? cut(bytes, chance) : flipped(bytes, chance);
    const startMs = performance.now();
    const record = await outcomeOf(damaged);
    if (performance.now() - startMs > 1000) found.slow.push(`${n}: ${name}`);
    if (record === null) found.refused++;
    else found.accepted++;
    if (record !== null && contentOf(record) !== sound[n % samples.length]) found.changed.push(`${n}: ${name}`);
  }
  return found;
}

describe(`${FILES} damaged files (seed ${SEED})`, () => {
  it('of workbooks are refused, or read as if nothing had been done', async () => {
    const { changed, slow, accepted, refused } = await damage(sampleWorkbooks());
    expect({ changed, slow }).toEqual({ changed: [], slow: [] });
    expect(accepted).toBeGreaterThan(0);
    expect(refused).toBeGreaterThan(FILES / 2);
  });

  it('of Parquet are refused or read, none with a fault and none slowly', async () => {
    const { slow, accepted, refused } = await damage(sampleParquet());
    expect(slow).toEqual([]);
    expect(accepted).toBeGreaterThan(0);
    expect(refused).toBeGreaterThan(FILES / 4);
  });
});
