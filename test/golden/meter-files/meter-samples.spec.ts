// long: one entry a sample, most of it tables
// Samples of the project's own invention, one for each way in which meter files mislead; every number is worked out by hand
// from the file beside it.
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { NOTE_CODES } from '#libs/meter-files/note-codes.js';
import { type Expected, expectRecord, sample } from '../../support/expect-sample.js';
import { noteCodes, questionOf, readMeterText, refusalOf } from '../../support/meter-text.js';
import { sampleParquet } from '../../support/sample-parquet.js';
import { sampleWorkbooks } from '../../support/sample-workbooks.js';

describe('delimited text', () => {
  it.each<[string, string, Expected]>([
    [
      'comma-iso-power',
      'a signed reactive column is split: positive lags, negative leads',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [40.5, 41.5, 0.75],
        lagging: [20.25, 0, 0],
        leading: [0, 3.5, 0],
        notes: ['zone-assumed-utc', 'reactive-sign-taken'],
      },
    ],
    [
      'semicolon-decimal-comma',
      'one number that can only have a decimal comma settles the file',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [40.5, 41.5, 0.75],
        lagging: [20.25, 0, 0],
        leading: [0, 3.5, 0],
        notes: ['decimal-mark-settled'],
      },
    ],
    [
      'tab-french',
      '13/05 settles the order of day and month; kWh in half an hour are twice as many kW',
      {
        begin: '2024-05-06T00:00',
        intervalS: 1800,
        kw: [21, 22, 19.5],
        lagging: [8.5, 0, 8],
        leading: [0, 3, 0],
        missing: 334,
        notes: ['date-order-settled'],
      },
    ],
    [
      'pipe-spanish',
      'date and time stand apart',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [40.5, 41.5],
        lagging: [20.25, 20.5],
        notes: ['reactive-never-leading'],
      },
    ],
    [
      'quoted-cells',
      'quoted cells hold the delimiter; 1.041,5 divides thousands by a dot',
      { begin: '2024-05-06T00:00', intervalS: 900, kw: [40.5, 1041.5], lagging: [20.25, 20] },
    ],
    [
      'preamble-and-unit-row',
      'rows before the header are passed over, units under the names count',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [40.5, 41.5],
        lagging: [20.25, 20.5],
        notes: ['rows-before-header'],
      },
    ],
    [
      'thousands-settled',
      '1,250.5 shows that the comma divides thousands',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [1234, 1250.5],
        lagging: [2100, 987],
        notes: ['thousands-divided'],
      },
    ],
    [
      'thousands-same',
      'without a mark every reading gives the same values',
      { begin: '2024-05-06T00:00', intervalS: 900, kw: [234, 250], lagging: [100, 987] },
    ],
    [
      'unit-prefixes',
      '0.01 MWh in 15 min are 40 kW, 5 000 varh are 20 kvar',
      { begin: '2024-05-06T00:00', intervalS: 900, kw: [40, 50], lagging: [20, 24] },
    ],
    [
      'reactive-in-kilowatt',
      'reactive power in kilowatt is kvar',
      { begin: '2024-05-06T00:00', intervalS: 900, kw: [40, 41], lagging: [20, 21], notes: ['reactive-in-kilowatt'] },
    ],
    [
      'import-and-export',
      'exported energy is subtracted, reactive export leads',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [40, -10],
        lagging: [20, 0],
        leading: [0, 4],
        notes: ['export-subtracted'],
      },
    ],
    [
      'missing-values',
      'missing is not zero, and a zero is not missing',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [1, 0, 3],
        lagging: [1, 0, 1],
        missing: 5,
        notes: ['intervals-without-value'],
      },
    ],
    [
      'repeated-rows',
      'identical repeats are dropped, wherever they stand',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [1, 2, 3],
        lagging: [1, 1, 1],
        duplicates: 2,
        notes: ['duplicates-dropped'],
      },
    ],
    [
      'totals-and-repeated-header',
      'a second header and a row of totals are no data',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [1, 2, 3],
        lagging: [1, 1, 1],
        notes: ['header-repeated', 'total-rows-left-out'],
      },
    ],
  ])('%s: %s', async (name, _why, expected) => {
    await expectRecord(name, {}, expected);
  });

  it('bank-voltage-standby: keeps voltage, the logged bank and the standby supply', async () => {
    const { record } = await expectRecord(
      'bank-voltage-standby',
      {},
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [40, 41],
        lagging: [20, 21],
        notes: ['voltage-taken-line-to-line'],
      },
    );
    expect(Array.from(record.voltageV ?? [])).toEqual([401.5, 399.5]);
    expect(Array.from(record.connectedKvar ?? [])).toEqual([25, 50]);
    expect(Array.from(record.standby ?? [])).toEqual([0, 1]);
  });
});

describe('stamps', () => {
  it.each<[string, string, Expected]>([
    [
      'interval-ending',
      'the header says that stamps mark ends',
      { begin: '2024-05-06T00:00', intervalS: 900, kw: [40, 44], lagging: [20, 24] },
    ],
    [
      'midnight-under-ending-day',
      '00:00 under the old date ends the day: the record begins at midnight and has no gap',
      {
        begin: '2024-05-14T00:00',
        intervalS: 21_600,
        kw: [10, 11, 12, 13, 14, 15, 16, 17],
        lagging: Array(8).fill(5),
        leading: [0, 0, 0, 1, 0, 0, 0, 0],
        notes: ['midnight-under-ending-day', 'stamps-mark-ends'],
      },
    ],
    [
      'midnight-24-00',
      '24:00 can only be an end',
      {
        begin: '2024-05-06T06:00',
        intervalS: 21_600,
        kw: [10, 11, 12, 13],
        lagging: Array(4).fill(5),
        notes: ['stamps-mark-ends'],
      },
    ],
    [
      'first-past-midnight',
      'the first one interval past midnight and the last at midnight are ends',
      {
        begin: '2024-05-06T00:00',
        intervalS: 21_600,
        kw: [10, 11, 12, 13],
        lagging: Array(4).fill(5),
        notes: ['stamps-mark-ends'],
      },
    ],
    [
      'beginnings-assumed',
      'nothing shows an end, so beginnings are taken, and it is said',
      {
        begin: '2024-05-06T00:00',
        intervalS: 21_600,
        kw: [10, 11, 12, 13],
        lagging: Array(4).fill(5),
        notes: ['stamps-assumed-beginnings'],
      },
    ],
    [
      'from-and-to',
      'two columns give the interval its length even across a gap',
      { begin: '2024-05-06T00:00', intervalS: 900, kw: [40, 44], lagging: [20, 24], missing: 94 },
    ],
    [
      'after-noon',
      '12:00 PM is noon, and 13 can only be a day',
      { begin: '2024-05-13T11:45', intervalS: 900, kw: [1, 2, 3], lagging: [1, 1, 1], notes: ['date-order-settled'] },
    ],
    [
      'day-month-same',
      '04/04 is the same day in either order',
      { begin: '2024-04-04T00:00', intervalS: 900, kw: [1, 2], lagging: [1, 1] },
    ],
    [
      'day-month-settled',
      'the last row settles the whole column',
      {
        begin: '2024-04-12T00:00',
        intervalS: 43_200,
        kw: [1, 2, 3],
        lagging: [1, 1, 1],
        notes: ['date-order-settled'],
      },
    ],
  ])('%s: %s', async (name, _why, expected) => {
    await expectRecord(name, {}, expected);
  });

  it.each<[string, string, Expected]>([
    [
      'autumn-doubled-hour',
      'rows of a doubled hour count by file order',
      {
        begin: '2024-10-26T23:30',
        intervalS: 1800,
        kw: [1, 2, 3, 4, 5, 6],
        lagging: Array(6).fill(1),
        notes: ['doubled-hour-by-order'],
      },
    ],
    [
      'newest-first',
      'backwards too: the lower of two equal rows is the earlier',
      {
        begin: '2024-10-26T22:00',
        intervalS: 3600,
        kw: [1, 2, 3, 4, 5],
        lagging: Array(5).fill(1),
        notes: ['rows-newest-first', 'doubled-hour-by-order'],
      },
    ],
    [
      'spring-gap',
      'empty rows of an hour that never was are left out',
      {
        begin: '2024-03-31T00:00',
        intervalS: 1800,
        kw: [1, 2, 3],
        lagging: Array(3).fill(1),
        notes: ['skipped-hour-left-out'],
      },
    ],
    [
      'autumn-hour-once',
      'an hour that happened twice and stands once is the first of the two; the other is missing',
      {
        begin: '2024-10-26T23:30',
        intervalS: 1800,
        kw: [1, 2, 3, 4, 5],
        lagging: Array(5).fill(1),
        missing: 2,
        notes: ['doubled-hour-once'],
      },
    ],
    [
      'small-mega-in-utc',
      'the header’s zone wins over the site’s, and mwh is taken for megawatt hours, aloud',
      {
        begin: '2024-05-06T00:00',
        intervalS: 900,
        kw: [40, 50],
        lagging: [20, 24],
        notes: ['zone-from-header', 'unit-read-as-mega'],
      },
    ],
    [
      'own-offsets-any-order',
      'stamps with their offset may stand in any order',
      { begin: '2024-10-26T23:30', intervalS: 1800, kw: [1, 2, 3, 4, 5], lagging: Array(5).fill(1) },
    ],
  ])('%s, in Berlin: %s', async (name, _why, expected) => {
    await expectRecord(name, { siteTimeZone: 'Europe/Berlin' }, expected);
  });

  it('spring-without-gap: a value in an hour that never was is refused, and read where the meter keeps one offset', async () => {
    const problem = await refusalOf(sample('spring-without-gap'), { siteTimeZone: 'Europe/Berlin' });
    expect(problem.problems).toMatchObject([{ code: 'bad-time', row: 3 }]);
    const options = { siteTimeZone: 'Europe/Berlin', timeZone: '+01:00' };
    await expectRecord('spring-without-gap', options, {
      begin: '2024-03-31T00:30',
      intervalS: 1800,
      kw: [1, 2, 3],
      lagging: [1, 1, 1],
    });
  });
});

describe('what is refused', () => {
  it.each([
    [
      'text-in-number',
      [
        { code: 'bad-number', row: 3, column: 2, found: '"about 2"' },
        { code: 'bad-number', row: 4, column: 3 },
      ],
    ],
    ['no-reactive-column', [{ code: 'no-reactive-column', row: 1, found: 'time, kW, load factor' }]],
    ['header-only', [{ code: 'empty-file' }]],
    ['short-row', [{ code: 'wrong-length', row: 3, expected: '3 cells', found: '2' }]],
    ['mixed-intervals', [{ code: 'mixed-intervals', row: 6 }]],
    ['day-month-mixed', [{ code: 'bad-time', row: 4, found: '04/14/2024' }]],
    ['nem12-lengths-differ', [{ code: 'mixed-intervals', row: 4, column: 9 }]],
    ['nem12-short-day', [{ code: 'wrong-length', row: 3 }]],
  ])('%s', async (name, problems) => {
    expect((await refusalOf(sample(name))).problems).toMatchObject(problems);
  });
});

describe('what is asked', () => {
  it.each([
    [
      'thousands-open',
      {
        id: 'decimal',
        readings: [
          { map: { decimal: '.' }, maxKw: 1250, activeKwh: 621 },
          { map: { decimal: ',' }, maxKw: 1.25, activeKwh: 0.621 },
        ],
      },
    ],
    [
      'day-month-open',
      {
        id: 'dateOrder',
        readings: [
          {
            map: { dateOrder: 'dmy' },
            firstRows: [
              ['2024-04-03T00:00:00Z', '1', '1', '0'],
              ['2024-04-03T00:15:00Z', '2', '1', '0'],
            ],
          },
          {
            map: { dateOrder: 'mdy' },
            firstRows: [
              ['2024-03-04T00:00:00Z', '1', '1', '0'],
              ['2024-03-04T00:15:00Z', '2', '1', '0'],
            ],
          },
        ],
      },
    ],
    [
      'conflicting-rows',
      {
        id: 'keepRow',
        readings: [
          { map: { keepRow: 'first' }, maxKw: 3 },
          { map: { keepRow: 'last' }, maxKw: 8 },
        ],
      },
    ],
    [
      'no-units',
      {
        id: 'columns',
        readings: [
          { map: { quantity: 'power' }, maxKw: 41 },
          { map: { units: { active: 'W', reactive: 'var' } }, maxKw: 0.041 },
          { map: { quantity: 'energy' }, maxKw: 164 },
          { map: { units: { active: 'Wh', reactive: 'varh' } }, maxKw: 0.164 },
        ],
      },
    ],
    [
      'two-active-columns',
      {
        id: 'columns',
        readings: [
          { map: { columns: { active: 2, reactive: 4 } }, maxKw: 41.2 },
          { map: { columns: { active: 3, reactive: 4 } }, maxKw: 41 },
        ],
      },
    ],
    [
      'nem12-day-twice-differently',
      {
        id: 'keepRow',
        readings: [
          { map: { keepRow: 'first' }, maxKw: 67 },
          { map: { keepRow: 'last' }, maxKw: 87 },
        ],
      },
    ],
  ])('%s, and the answers answer it', async (name, asked) => {
    const { questions } = await questionOf(sample(name));
    expect(questions).toMatchObject([asked]);
    for (const { map, maxKw, activeKwh, firstRows } of questions[0]!.readings) {
      const { record } = await readMeterText(sample(name), { map });
      expect(Math.max(...record.activeKw)).toBe(maxKw);
      expect(record.activeKw.reduce((sum, kw) => sum + kw, 0) * (record.intervalS / 3600)).toBeCloseTo(activeKwh, 9);
      expect(firstRows[0]![0]).toBe(new Date(record.firstS * 1000).toISOString().replace('.000', ''));
    }
  });

  it('conflicting-rows: the question names the row that contradicts', async () => {
    expect((await questionOf(sample('conflicting-rows'))).problems).toMatchObject([{ code: 'question', row: 4 }]);
    expect((await questionOf(sample('nem12-day-twice-differently'))).problems).toMatchObject([{ row: 7 }]);
  });
});

const ramp = (from: number, step: number, count = 48) => Array.from({ length: count }, (_, i) => from + step * i);

describe('NEM12', () => {
  it.each<[string, string, Expected]>([
    [
      'nem12-plain',
      'kWh of half an hour are twice as many kW; midnight is UTC+10’s',
      {
        begin: '2024-05-05T14:00',
        intervalS: 1800,
        kw: ramp(20, 1),
        lagging: Array(48).fill(10),
        notes: ['nem12-time', 'leading-not-recorded'],
      },
    ],
    [
      'nem12-quality',
      'null intervals are missing, substitutes are kept and counted',
      {
        begin: '2024-05-05T15:00',
        intervalS: 1800,
        kw: ramp(22, 1, 46),
        lagging: Array(46).fill(10),
        notes: ['nem12-substituted', 'intervals-without-value'],
      },
    ],
    [
      'nem12-null-day',
      'a null day is a gap, not a day of zeros',
      {
        begin: '2024-05-05T14:00',
        intervalS: 1800,
        kw: [...ramp(20, 1), ...ramp(24, 1)],
        lagging: Array(96).fill(10),
        missing: 48,
      },
    ],
    [
      'nem12-unit-changes',
      'a stream that goes on in Wh is the same stream: its day twice counts once',
      {
        begin: '2024-05-05T14:00',
        intervalS: 1800,
        kw: [...ramp(20, 1), ...ramp(20, 1)],
        lagging: Array(96).fill(10),
        duplicates: 1,
        notes: ['duplicates-dropped'],
      },
    ],
    [
      'nem12-day-twice',
      'a day twice with the same values counts once',
      {
        begin: '2024-05-05T14:00',
        intervalS: 1800,
        kw: ramp(20, 1),
        lagging: Array(48).fill(10),
        duplicates: 1,
        notes: ['duplicates-dropped'],
      },
    ],
    [
      'nem12-without-header',
      'neither header, end record nor padding matter, and it is said',
      {
        begin: '2024-05-05T14:00',
        intervalS: 1800,
        kw: ramp(20, 1),
        lagging: Array(48).fill(10),
        notes: ['nem12-header-missing', 'nem12-end-missing'],
      },
    ],
    [
      'nem12-export-and-leading',
      'E adds up, B is subtracted, Q lags, K leads, others are left out',
      {
        begin: '2024-05-05T14:00',
        intervalS: 1800,
        kw: Array(48).fill(14),
        lagging: Array(48).fill(10),
        leading: Array(48).fill(4),
        notes: ['nem12-streams-added', 'nem12-streams-left-out', 'export-subtracted'],
      },
    ],
  ])('%s: %s', async (name, _why, expected) => {
    // the site's zone must not move a format that has its own
    await expectRecord(name, { siteTimeZone: 'Europe/Berlin', timeZone: 'America/Chicago' }, expected);
  });

  it('nem12-quality-unstated: values whose quality is stated nowhere are kept and counted', async () => {
    const { record } = await readMeterText(sample('nem12-quality-unstated'));
    // the flag says that 400 records follow, and they leave the last eight out; the reactive day has no flag
    expect(record.notes).toContainEqual(
      expect.objectContaining({ code: 'nem12-quality-unstated', values: { values: 56 } }),
    );
    expect(record.beginS).toHaveLength(48);
  });

  it('nem12-two-meters: which is meant is asked, and the map answers', async () => {
    const { questions } = await questionOf(sample('nem12-two-meters'));
    // 10 and 20 kWh in every half hour: 20 and 40 kW, 480 and 960 kWh in the day
    expect(questions[0]!.readings.map(({ map, maxKw, activeKwh }) => [map.meter, maxKw, activeKwh])).toEqual([
      ['6100000042', 20, 480],
      ['6100000043', 40, 960],
    ]);
    const { record } = await readMeterText(sample('nem12-two-meters'), { map: { meter: '6100000043' } });
    expect(new Set(record.laggingKvar)).toEqual(new Set([16]));
  });

  it('nem12-mega-15-min: MWh and varh become kW and kvar', async () => {
    const { record } = await readMeterText(sample('nem12-mega-15-min'));
    expect(record.intervalS).toBe(900);
    // 0.010 MWh … 0.105 MWh in a quarter of an hour
    record.activeKw.forEach((kw, i) => {
      expect(kw).toBeCloseTo(4000 * (0.01 + 0.001 * i), 9);
    });
    expect(new Set(record.laggingKvar)).toEqual(new Set([20]));
  });
});

describe('NEM12 in small units', () => {
  it('nem12-small-units-5-min: Wh, varh and Mvarh become kW and kvar', async () => {
    const { record } = await readMeterText(sample('nem12-small-units-5-min'));
    expect([record.intervalS, record.beginS.length]).toEqual([300, 288]);
    // 1 kWh in five minutes are 12 kW; each interval has a Wh more
    record.activeKw.forEach((kw, i) => {
      expect(kw).toBeCloseTo(12 + 0.012 * i, 9);
    });
    // 500 varh lag in the first half of the day, 0.00025 Mvarh lead in the second
    const half = (first: number, second: number) => [...Array(144).fill(first), ...Array(144).fill(second)];
    expect(Array.from(record.laggingKvar)).toEqual(half(6, 0));
    record.leadingKvar.forEach((kvar, i) => {
      expect(kvar).toBeCloseTo(half(0, 3)[i]!, 12);
    });
  });
});

describe('the notes of the table', () => {
  it('are each raised by a sample, so that none is a note no file can have', async () => {
    const folder = fileURLToPath(new URL('.', import.meta.url));
    const names = readdirSync(folder).filter((name) => name.includes('.') && !name.endsWith('.ts'));
    const utf16 = Buffer.from(sample('comma-iso-power').toString(), 'utf16le');
    const options = [
      {},
      { siteTimeZone: 'Europe/Berlin' },
      { map: { keepRow: 'last', repair: 'hold', upToS: 1800 } },
      { map: { meter: 'M-1' } },
      { map: { multiplier: 80, powerFactorSign: 'negativeLeads', voltageBetween: 'lineToNeutral' } },
    ] as const;
    const made = [...sampleWorkbooks(), ...sampleParquet()].map(({ bytes }) => bytes);
    const files = [...names.map((name) => readFileSync(`${folder}${name}`)), utf16, ...made];
    const codes = await Promise.all(files.flatMap((file) => options.map((option) => raisedCodes(file, option))));
    // the sample beside those of Parquet raises it; what the values themselves ask is no reader's note
    const raised = [...codes.flat().filter((code) => code in NOTE_CODES), 'parquet-columns-left-out'];
    expect([...new Set(raised)].sort()).toEqual(Object.keys(NOTE_CODES).sort());
  });
});

// A file that is refused or asked about raises none.
async function raisedCodes(...[file, options]: Parameters<typeof readMeterText>): Promise<string[]> {
  const reading = await readMeterText(file, options).catch(() => null);
  return reading === null ? [] : noteCodes(reading);
}
