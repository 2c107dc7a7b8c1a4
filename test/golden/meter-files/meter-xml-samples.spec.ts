// long: one entry a sample, most of it tables
// Samples of the project's own invention, one for each way in which feeds and messages in XML mislead; every number is worked
// out by hand from the file beside it. Codes by the schema of NAESB REQ.21 version 4.0 and the code lists of IEC 61968-9 as the
// CIM17 class model prints them; what a stamp without a period marks, and the codes of earlier versions, from memory.
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import type { Problem } from '#libs/engine/index.js';
import type { ReadOptions } from '#libs/meter-files/meter-format.js';
import { noteCodes, questionOf, readMeterText, refusalOf } from '../../support/meter-text.js';

const sample = (name: string) => readFileSync(fileURLToPath(new URL(`${name}.xml`, import.meta.url)));
const changed = (name: string, from: string | RegExp, to: string) => {
  const text = sample(name).toString();
  const other = text.replace(from, to);
  if (other === text) throw new Error(`${name} has no ${from}`);
  return other;
};

interface Expected {
  /** first beginning, UTC; 2024-05-06T00:00 where absent */
  begin?: string;
  /** 900 where absent */
  intervalS?: number;
  kw: number[];
  lagging: number[];
  leading?: number[];
  missing?: number;
  duplicates?: number;
  notes?: string[];
}

async function expectRecord(content: string | Uint8Array, options: ReadOptions, expected: Expected): Promise<void> {
  const reading = await readMeterText(content, options);
  const { record } = reading;
  expect({
    begin: new Date(record.firstS * 1000).toISOString().slice(0, 16),
    intervalS: record.intervalS,
    kw: Array.from(record.activeKw),
    lagging: Array.from(record.laggingKvar),
    leading: Array.from(record.leadingKvar),
    missing: record.missing,
    duplicates: record.duplicates,
  }).toEqual({
    begin: expected.begin ?? '2024-05-06T00:00',
    intervalS: expected.intervalS ?? 900,
    kw: expected.kw,
    lagging: expected.lagging,
    leading: expected.leading ?? expected.lagging.map(() => 0),
    missing: expected.missing ?? 0,
    duplicates: expected.duplicates ?? 0,
  });
  expect(noteCodes(reading)).toEqual(expect.arrayContaining(expected.notes ?? []));
}

/** 10.125, 10.375, 9.75 kWh and 5, 6, 4 kvarh in quarters of an hour. */
const PLAIN = { kw: [40.5, 41.5, 39], lagging: [20, 24, 16] };
const TWO = { kw: [40.5, 41.5], lagging: [20, 24] };

describe('ESPI feeds', () => {
  it.each<[string, string, Expected]>([
    ['espi-plain', 'are joined by links written with and without host, before and behind each other', PLAIN],
    [
      'espi-lagging-and-leading',
      'with lagging and leading energy in types of their own',
      // 125 tens of varh in a quarter of an hour are 5 kvar
      { kw: [40.5, 41.5, 39], lagging: [20, 24, 0], leading: [0, 0, 5] },
    ],
    [
      'espi-leading-in-var',
      'with lagging energy in varh and leading power in var, each read in its own form',
      { kw: [40.5, 41.5, 39, 38], lagging: [20, 24, 0, 18], leading: [0, 0, 5, 0] },
    ],
    [
      'espi-leading-by-hour',
      'with leading energy of another length of interval, left out by name',
      {
        kw: [40.5, 41.5, 39, 38],
        lagging: [20, 24, 0, 18],
        notes: ['channels-left-out', 'leading-left-out'],
      },
    ],
    ['espi-without-links', 'without links are joined by order', { ...TWO, notes: ['espi-joined-by-order'] }],
    ['espi-without-times', 'without times take them from the place in the block', PLAIN],
    [
      'espi-quadrants',
      'in quadrants: I and II lag, III and IV lead; net power is signed',
      { kw: [40.5, -2, 39], lagging: [20, 0.5, 0], leading: [0, 0, 1.25], notes: ['channels-added'] },
    ],
    [
      'espi-reverse-and-leading',
      'in mWh, export subtracted, reverse reactive energy leading, a maximum and gas left out',
      // 10 125 000 mWh are 10.125 kWh; 2.5 kWh exported are −10 kW; 0.75 kvarh are 3 kvar
      {
        kw: [40.5, -10],
        lagging: [20, 0],
        leading: [0, 3],
        notes: ['export-subtracted', 'channels-left-out', 'secondary-metered'],
      },
    ],
    [
      'espi-quality',
      'with estimated, questionable and missing readings',
      {
        kw: [40.5, 39, 38],
        lagging: [20, 16, 18],
        missing: 1,
        notes: ['values-substituted', 'readings-questionable', 'intervals-without-value'],
      },
    ],
    [
      'espi-months-and-totals',
      'of several blocks of one type, one of them twice, with the hour’s total left out',
      {
        kw: [40.5, 41.5, 39, 38],
        lagging: [20, 24, 16, 18],
        duplicates: 2,
        notes: ['channels-left-out', 'duplicates-dropped'],
      },
    ],
    // 1 + 2 + 3 kWh, 1.25 + 2.25 + 3.25 kWh
    ['espi-phases', 'of three phases are their sum', { kw: [24, 27], lagging: [20, 24], notes: ['channels-added'] }],
    ['espi-latin-1', 'in Latin-1', { ...TWO, notes: ['encoding-converted'] }],
    ['espi-utf-16', 'in UTF-16', { ...TWO, notes: ['encoding-converted'] }],
    ['espi-declared-utf-16', 'that say UTF-16 and are UTF-8', { ...TWO, notes: ['xml-encoding-misdeclared'] }],
  ])('%s: %s', (name, _, expected) => expectRecord(sample(name), {}, expected));

  it('go by the length of each reading where their type has another by default', async () => {
    await expectRecord(changed('espi-plain', /900(?=<\/intervalLength>)/, '1800'), {}, PLAIN);
  });

  it('count each reading without a quality of its own by that of its type', async () => {
    const { record } = await readMeterText(sample('espi-quality'));
    const values = (code: string) => record.notes.find((note) => note.code === code)?.values;
    // one of the four active readings is estimated, all four reactive ones by their type
    expect(values('values-substituted')).toEqual({ values: 5 });
    expect(values('readings-questionable')).toEqual({ readings: 1 });
  });

  it('with a register ask at which end of its interval it was read', async () => {
    // readings of 100 000, 110 125 and 120 500 Wh
    const { questions } = await questionOf(sample('espi-register'));
    expect(questions.map(({ id, readings }) => [id, readings.map(({ firstRows }) => firstRows[0])])).toEqual([
      [
        'stamp',
        [
          ['2024-05-06T00:00:00Z', '40.5', '20', '0'],
          ['2024-05-06T00:15:00Z', '40.5', '20', '0'],
        ],
      ],
    ]);
    await expectRecord(sample('espi-register'), { map: { stamp: 'begin' } }, TWO);
    await expectRecord(sample('espi-register'), { map: { stamp: 'end' } }, { ...TWO, begin: '2024-05-06T00:15' });
  });

  it('with two usage points ask which is meant', async () => {
    const { questions } = await questionOf(sample('espi-two-usage-points'));
    expect(questions[0]!.readings.map(({ map, maxKw, activeKwh }) => [map, maxKw, activeKwh])).toEqual([
      [{ meter: 'Works' }, 44, 21],
      [{ meter: 'Office' }, 4.4, 2.1],
    ]);
    const office = { kw: [4, 4.4], lagging: [2, 2.4] };
    await expectRecord(sample('espi-two-usage-points'), { map: { meter: 'Office' } }, office);
    expect((await refusalOf(sample('espi-two-usage-points'), { map: { meter: 'Shed' } })).problems[0]).toMatchObject({
      path: 'meter',
      found: 'Shed',
    });
  });

  it.each<[string, string, Partial<Problem>]>([
    [
      'espi-apparent-only',
      'apparent energy in place of reactive',
      { code: 'no-reactive-column', found: 'VAh forward, Wh forward' },
    ],
    ['espi-bad-value', 'a decimal comma', { code: 'bad-number', row: 27, column: 147, found: '"10,375"' }],
    ['espi-lengths-differ', 'half hours beside quarters', { code: 'mixed-intervals', row: 46 }],
    ['espi-two-powers', 'kWh beside Wh in one quantity', { code: 'inconsistent', row: 66, found: '3' }],
    ['espi-type-twice', 'one link with two meanings', { code: 'inconsistent', row: 75, found: 'another meaning' }],
  ])('%s: %s is refused where it stands', async (name, _, problem) => {
    expect((await refusalOf(sample(name))).problems[0]).toMatchObject(problem);
  });

  it.each<[string, RegExp | string, string, Partial<Problem>]>([
    [
      'a power of ten twice',
      '<uom>72</uom>',
      '<uom>72</uom><powerOfTenMultiplier>3</powerOfTenMultiplier>',
      { code: 'inconsistent', found: 'another' },
    ],
    ['a power of ten of 50', '>3</powerOf', '>50</powerOf', { code: 'out-of-range', found: '"50"' }],
    ['a number of very many digits', '>10125<', `>${'1'.repeat(60_000)}<`, { code: 'bad-number', row: 46 }],
    ['a number beyond all doubles', '>10125<', '>1e400<', { code: 'bad-number', row: 46, found: '"1e400"' }],
    ['no number', '>10125<', '>NaN<', { code: 'bad-number', row: 46, found: '"NaN"' }],
    [
      'a date for seconds',
      '<start>1714954500</start></timePeriod><value>6',
      '<start>2024-05-06</start></timePeriod><value>6',
      { code: 'bad-number', row: 35 },
    ],
    [
      'milliseconds for seconds',
      '<start>1714954500</start></timePeriod><value>6',
      '<start>1714954500000</start></timePeriod><value>6',
      { code: 'out-of-range', row: 35 },
    ],
    ['a leading register below zero', /(flowDirection>)2(<.*\n.*\n.*)/, '$13$2', { code: 'no-reactive-column' }],
  ])('%s is refused', async (_, from, to, problem) => {
    expect((await refusalOf(changed('espi-plain', from, to))).problems[0]).toMatchObject(problem);
  });
});

describe('MeterReadings messages', () => {
  it.each<[string, string, ReadOptions, Expected]>([
    ['cim-plain', 'stamp the end of an interval', {}, { ...PLAIN, notes: ['interval-ends-by-format'] }],
    [
      'cim-plain',
      'unless it is said that they don’t',
      { map: { stamp: 'begin' } },
      { ...PLAIN, begin: '2024-05-06T00:15' },
    ],
    [
      'cim-plain',
      'are multiplied by the ratio of instrument transformers, where it is said',
      { map: { multiplier: 40 } },
      { kw: [1620, 1660, 1560], lagging: [800, 960, 640], notes: ['values-multiplied', 'secondary-metered'] },
    ],
    ['cim-time-periods', 'with a period go by it and not by the stamp', {}, TWO],
    [
      'cim-registers',
      'of registers are differences; where one falls there is a gap',
      // 1010.225 − 1000.1 = 10.125 kWh, 1020.6 − 1010.225 = 10.375 kWh, a new meter, 10.15 − 0.4 = 9.75 kWh
      { timeZone: 'Europe/Berlin' },
      { ...PLAIN, missing: 1, notes: ['register-fell'] },
    ],
    [
      'cim-register-gap',
      'of registers give nothing across a missing reading',
      {},
      { begin: '2024-05-06T00:45', kw: [39], lagging: [16], notes: ['register-readings-missing'] },
    ],
    [
      'cim-power-in-watts',
      'of mean power, net var signed, a maximum left out',
      {},
      {
        intervalS: 1800,
        kw: [40.5, 41.5],
        lagging: [20, 0],
        leading: [0, 3.5],
        notes: ['channels-left-out', 'reactive-sign-taken'],
      },
    ],
    [
      'cim-total-of-samples',
      'of samples, both directions of active power in one',
      {},
      {
        intervalS: 1800,
        kw: [40.5, 41.5],
        lagging: [20, 0],
        leading: [0, 3.5],
        notes: ['samples-taken-as-means', 'total-flow-taken'],
      },
    ],
    [
      'cim-quality',
      'with a reading known to be missing, one estimated, one that failed validation',
      {},
      { kw: [40.5, 39, 38], lagging: [20, 16, 18], missing: 1, notes: ['values-substituted', 'readings-questionable'] },
    ],
    [
      'cim-local-doubled-hour',
      'in local time tell the doubled hour by order',
      { timeZone: 'Europe/Berlin' },
      // ends from 01:30 summer time, 23:30 UTC, to 03:00 winter time, 02:00 UTC
      {
        begin: '2024-10-26T23:00',
        intervalS: 1800,
        kw: [40, 42, 44, 46, 48, 50],
        lagging: [20, 22, 24, 26, 28, 30],
        notes: ['doubled-hour-by-order'],
      },
    ],
    [
      'cim-one-meter-of-two',
      'take the only meter with both quantities',
      {},
      { kw: [40, 44], lagging: [20, 24], notes: ['meters-left-out'] },
    ],
    [
      'cim-two-meters',
      'of two meters take the one named',
      { map: { meter: 'OFFICE-1' } },
      { kw: [4, 8], lagging: [2, 2.4] },
    ],
  ])('%s: %s', (name, _, options, expected) => expectRecord(sample(name), options, expected));

  it('with two meters ask which is meant', async () => {
    const { questions } = await questionOf(sample('cim-two-meters'));
    expect(questions[0]!.readings.map(({ map }) => map)).toEqual([{ meter: 'WORKS-1' }, { meter: 'OFFICE-1' }]);
  });

  it.each<[string, string, ReadOptions, Partial<Problem>]>([
    [
      'cim-measured-shorter',
      'quarters of an hour that come once an hour',
      {},
      { code: 'mixed-intervals', row: 8, found: '3600 s' },
    ],
    ['cim-old-reading-type', 'a reading type of eleven codes', {}, { code: 'unreadable', row: 10, column: 57 }],
    ['cim-type-missing', 'readings without a type', {}, { code: 'missing', row: 7 }],
    [
      'cim-skipped-hour',
      'a time no clock showed',
      { timeZone: 'Europe/Berlin' },
      { code: 'bad-time', row: 9, found: '2024-03-31T02:30' },
    ],
  ])('%s: %s is refused where it stands', async (name, _, options, problem) => {
    expect((await refusalOf(sample(name), options)).problems[0]).toMatchObject(problem);
  });

  it.each<[string, RegExp | string, string, Partial<Problem>]>([
    ['a stamp that is none', '2024-05-06T00:15:00Z', '6 May 2024', { code: 'bad-time', row: 8, found: '"6 May 2024"' }],
    ['a day that is none', '2024-05-06T00:15:00Z', '2024-02-30T00:15:00Z', { code: 'bad-time', row: 8 }],
    [
      'a stamp without an offset among others',
      '2024-05-06T00:30:00Z',
      '2024-05-06T00:30:00',
      { code: 'bad-time', row: 9 },
    ],
    ['a value that is no number', '>10.375<', '>full<', { code: 'bad-number', row: 9, found: '"full"' }],
    [
      'a reading without a stamp',
      /<m:timeStamp>2024-05-06T00:15:00Z<\/m:timeStamp>/,
      '',
      { code: 'bad-time', row: 8, found: 'none' },
    ],
  ])('%s is refused with its row', async (_, from, to, problem) => {
    expect((await refusalOf(changed('cim-plain', from, to))).problems[0]).toMatchObject(problem);
  });
});

describe('other XML', () => {
  it('is refused by the row and the name of its outermost element', async () => {
    expect((await refusalOf('<?xml version="1.0"?>\n <rss><channel/></rss>')).problems[0]).toMatchObject({
      ...{ code: 'unknown-format', row: 2, column: 2, found: 'XML of another kind, <rss>' },
    });
  });

  it('is refused by the row of a document type', async () => {
    const bomb = '<?xml version="1.0"?>\n<!DOCTYPE a [<!ENTITY b "bb">]>\n<a>&b;</a>';
    expect((await refusalOf(bomb)).problems[0]).toMatchObject({
      ...{ code: 'unreadable', row: 2, column: 1, found: '"<!DOCTYPE"' },
    });
  });

  it('read as a feed has nothing in it', async () => {
    const refused = await refusalOf('<?xml version="1.0"?><feed><entry/></feed>', { format: 'espi' });
    expect(refused.problems[0]).toMatchObject({ code: 'empty-file' });
  });
});
