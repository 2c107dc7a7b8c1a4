// A record written as CSV and read back is the same record to the bit, in any zone and across doubled hours; and the rows
// of a file whose stamps carry their offset may stand in any order.
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { recordBytes } from '#libs/contract/record-hash.js';
import { zoneTable } from '#libs/contract/time-zone.js';
import { createLoadRecord, type LoadRecord, offsetAtS } from '#libs/engine/index.js';
import { writeRecordCsv } from '#libs/meter-files/write-record-csv.js';
import { readMeterText } from '../support/meter-text.js';
import { runs, SEED } from '../support/soak.js';

const ZONES = [
  'UTC',
  'Europe/Berlin',
  'Europe/Dublin',
  'America/Chicago',
  'Australia/Lord_Howe',
  'Asia/Kolkata',
  'Pacific/Apia',
];
const INTERVALS_S = [60, 300, 600, 900, 1800, 3600];

/** Any finite double, and those a meter writes. */
const value = fc.oneof(
  fc.double({ min: 0, max: 1e6, noNaN: true, noDefaultInfinity: true }),
  fc.integer({ min: 0, max: 999_999 }).map((thousandths) => thousandths / 1000),
);

const parts = fc.record({
  intervalS: fc.constantFrom(...INTERVALS_S),
  // around the clocks' changes in autumn 2024 and spring 2025, north and south
  begin: fc.constantFrom(
    '2024-10-26T20:00Z',
    '2024-11-03T02:00Z',
    '2025-03-29T22:00Z',
    '2024-10-05T12:00Z',
    '2025-04-05T12:00Z',
  ),
  slots: fc.uniqueArray(fc.integer({ min: 0, max: 120 }), { minLength: 1, maxLength: 60 }),
  values: fc.array(
    fc.tuple(fc.double({ min: -1e4, max: 1e6, noNaN: true }), value, value, value, value, fc.boolean()),
    {
      minLength: 60,
      maxLength: 60,
    },
  ),
  more: fc.record({ voltage: fc.boolean(), bank: fc.boolean(), standby: fc.boolean() }),
});

function recordOf({
  intervalS,
  begin,
  slots,
  values,
  more,
}: typeof parts extends fc.Arbitrary<infer T> ? T : never): LoadRecord {
  const firstS = Date.parse(begin) / 1000;
  const beginS = Float64Array.from(
    [...slots].sort((a, b) => a - b),
    (slot) => firstS + slot * intervalS,
  );
  // adding 0 makes −0 and 0 one value
  const column = (k: 0 | 1 | 2 | 3 | 4) => Float64Array.from(beginS, (_, i) => values[i]![k] + 0);
  return createLoadRecord({
    intervalS,
    beginS,
    activeKw: column(0),
    laggingKvar: column(1),
    leadingKvar: column(2),
    voltageV: more.voltage ? column(3) : null,
    connectedKvar: more.bank ? column(4) : null,
    standby: more.standby ? Uint8Array.from(beginS, (_, i) => (values[i]![5] ? 1 : 0)) : null,
  });
}

/** What a record holds, without the remarks on the file it came from. */
function contentOf(record: LoadRecord): string {
  const bytes = [...recordBytes({ ...record, notes: [], duplicates: 0, repaired: 0 })];
  return bytes.map((chunk) => Buffer.from(chunk).toString('hex')).join('\n');
}

describe('a record as CSV', () => {
  it('is read back to the bit, whatever zone it is read in', async () => {
    await fc.assert(
      fc.asyncProperty(parts, fc.constantFrom(...ZONES), async (made, siteTimeZone) => {
        const record = recordOf(made);
        const read = await readMeterText(writeRecordCsv(record), { siteTimeZone });
        expect(contentOf(read.record)).toBe(contentOf(record));
        expect(read.record.missing).toBe(record.missing);
      }),
      { seed: SEED, numRuns: runs(200, 2000) },
    );
  });
});

const two = (part: number) => String(part).padStart(2, '0');

/** Clock time in a zone, as local CSV files have it. */
function localStamp(zone: string, momentS: number, withOffset: boolean): string {
  const offsetS = offsetAtS(zoneTable(zone, momentS - 86_400, momentS + 86_400), momentS);
  const clock = new Date((momentS + offsetS) * 1000).toISOString().slice(0, 16);
  const minutes = Math.abs(offsetS) / 60;
  return withOffset ? `${clock}${offsetS < 0 ? '-' : '+'}${two(Math.floor(minutes / 60))}:${two(minutes % 60)}` : clock;
}

function localCsv(record: LoadRecord, stamps: string[], header: string): string[] {
  return [
    header,
    ...stamps.map((stamp, i) => `${stamp},${record.activeKw[i]},${record.laggingKvar[i]},${record.leadingKvar[i]}`),
  ];
}

/** Any number may be a value of such a record, 9999 too; only the program's own form says so by itself. */
const ANY_VALUE = { fillers: 'values' } as const;

describe('a record in local time', () => {
  const whole = parts.map((made) => ({
    ...made,
    more: { voltage: false, bank: false, standby: false },
    slots: Array.from({ length: 60 }, (_, i) => i),
  }));
  // an interval has to divide the hour that is doubled, and Apia and Kolkata double none
  const zones = fc.constantFrom(
    'Europe/Berlin',
    'Europe/Dublin',
    'America/Chicago',
    'Australia/Lord_Howe',
    'Asia/Kolkata',
  );

  it.each([
    ['begin', 0],
    ['end', 1],
  ])('finds its doubled and skipped hours by file order, stamps marking the %s', async (word, shift) => {
    await fc.assert(
      fc.asyncProperty(whole, zones, async (made, siteTimeZone) => {
        fc.pre(made.intervalS <= 1800);
        const record = recordOf(made);
        const stamps = Array.from(record.beginS, (beginS) =>
          localStamp(siteTimeZone, beginS + shift * record.intervalS, false),
        );
        const file = localCsv(record, stamps, `interval ${word},kW,lagging kvar,leading kvar`).join('\n');
        const read = await readMeterText(file, { siteTimeZone, map: ANY_VALUE });
        expect(contentOf(read.record)).toBe(contentOf(record));
      }),
      { seed: SEED, numRuns: runs(150, 1500) },
    );
  });

  it('is the same in any order of rows where stamps carry their offset, notes and all', async () => {
    await fc.assert(
      fc.asyncProperty(whole, zones, fc.infiniteStream(fc.nat()), async (made, siteTimeZone, keys) => {
        const record = recordOf(made);
        const stamps = Array.from(record.beginS, (beginS) => localStamp(siteTimeZone, beginS, true));
        const [header, ...rows] = localCsv(record, stamps, 'interval begin,kW,lagging kvar,leading kvar');
        const shuffled = rows.map((row) => ({ row, key: keys.next().value })).sort((a, b) => a.key - b.key);
        const inOrder = await readMeterText([header, ...rows].join('\n'), { siteTimeZone, map: ANY_VALUE });
        const anyOrder = await readMeterText([header, ...shuffled.map(({ row }) => row)].join('\n'), {
          siteTimeZone,
          map: ANY_VALUE,
        });
        expect(anyOrder.record).toEqual(inOrder.record);
        expect(anyOrder.quality).toEqual(inOrder.quality);
        expect(contentOf(anyOrder.record)).toBe(contentOf(record));
      }),
      { seed: SEED, numRuns: runs(100, 1000) },
    );
  });
});
