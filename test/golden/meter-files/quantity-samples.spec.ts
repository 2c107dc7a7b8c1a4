// long: one entry a sample, most of it tables
// Samples of the project's own invention for what columns can hold and how rows can be laid out; every number is worked out
// by hand from the file beside it. Powers follow from S² = P² + Q², P = S·λ and S = √3·U·I, with 3-4-5 triangles.
import { describe, expect, it } from 'vitest';
import type { MeterMap } from '#libs/contract/meter-map.js';
import { type Expected, expectRecord, sample } from '../../support/expect-sample.js';
import { noteCodes, questionOf, readMeterText, refusalOf } from '../../support/meter-text.js';

const quarters = { begin: '2024-05-06T00:00', intervalS: 900 };
const none = (count: number) => Array<number>(count).fill(0);

const FOUR = {
  begin: '2024-05-06T00:00',
  intervalS: 900,
  kw: [40.5, 41.5, 42.5, 43.5],
  lagging: [20.25, 21, 21.75, 22.5],
};

describe('numbers and letters', () => {
  it.each<[string, string, Expected]>([
    [
      'utf-16-text',
      'a byte order mark says UTF-16, and it is said',
      { ...FOUR, notes: ['encoding-converted', 'decimal-mark-settled'] },
    ],
    ['utf-8-mark', 'a byte order mark before UTF-8 belongs to no name', { ...FOUR, notes: ['decimal-mark-settled'] }],
    [
      'latin1-header',
      'an eight-bit code is converted, and it is said',
      { ...quarters, kw: [40.5, 41.5], lagging: [20, 21], notes: ['encoding-converted'] },
    ],
    [
      'thousands-blanks',
      'apostrophes and narrow, unbreakable and plain blanks divide thousands',
      { ...quarters, kw: [1234.5, 1_234_567, 12_345], lagging: [1020, 2020.5, 3020] },
    ],
    [
      'counter-column',
      'a column without a name that counts rows is of no use',
      { ...quarters, kw: [40, 41, 42], lagging: [20, 21, 22] },
    ],
  ])('%s: %s', async (name, _why, expected) => {
    await expectRecord(name, {}, expected);
  });
});

describe('what a name means beside the others', () => {
  it.each<[string, string, Expected]>([
    [
      'phases-by-number',
      'P1, P2 and P3 are thirds of the whole',
      { ...quarters, kw: [40.5, 41.5], lagging: [20.25, 20.5], notes: ['phases-added'] },
    ],
    [
      'quadrants-by-name',
      'AE is import beside AS; R1 and R2 lag, R3 and R4 lead; a quarter’s kWh are a quarter of its kW',
      {
        begin: '2024-05-13T00:00',
        intervalS: 900,
        kw: [41, 42, -10],
        lagging: [22, 0, 3],
        leading: [0, 5, 2],
        notes: ['quadrants-by-name', 'export-subtracted'],
      },
    ],
    [
      'text-among-rows',
      'lines of words are left out, and a row without a stamp whose numbers are the sums',
      {
        begin: '2024-05-13T00:00',
        intervalS: 900,
        kw: [40, 41, 42],
        lagging: [20, 21, 22],
        notes: ['text-rows-left-out', 'total-rows-left-out'],
      },
    ],
    [
      'extremes-only',
      'greatest values stand for means where nothing else does, and it is said',
      { begin: '2024-05-13T00:00', intervalS: 900, kw: [40, 41], lagging: [20, 21], notes: ['extremes-taken'] },
    ],
    [
      'hours-counted',
      'hour 1 begins at midnight',
      {
        begin: '2024-05-13T00:00',
        intervalS: 3600,
        kw: Array.from({ length: 48 }, (_, i) => (i % 24) + 41.5),
        lagging: Array.from({ length: 48 }, (_, i) => (i % 24) + 1.25),
        notes: ['intervals-counted'],
      },
    ],
  ])('%s: %s', async (name, _why, expected) => {
    await expectRecord(name, {}, expected);
  });
});

describe('stamps', () => {
  it.each<[string, string, Expected]>([
    [
      'serial-dates',
      'day 45 418 of a spreadsheet is 6 May 2024',
      { ...quarters, kw: [40, 41, 42, 43], lagging: [20, 21, 22, 23], notes: ['serial-dates'] },
    ],
    [
      'serial-date-and-fraction',
      'the time of day stands apart, as the fraction of a day',
      { ...quarters, kw: [40, 41, 42], lagging: [20, 21, 22], notes: ['serial-dates'] },
    ],
  ])('%s: %s', async (name, _why, expected) => {
    await expectRecord(name, {}, expected);
  });

  it('are no serial dates in a column that is not named for them', async () => {
    const file = sample('serial-dates').toString().replace('Zeitstempel', 'Zähler x');
    expect((await refusalOf(file)).code).toBe('no-time-column');
    const { record } = await readMeterText(file, { map: { columns: { time: 1 } } });
    expect(record.firstS).toBe(Date.UTC(2024, 4, 6) / 1000);
  });
});

describe('quantities', () => {
  it.each<[string, string, Expected]>([
    [
      'phases',
      'three phases are added; an interval that lacks one has no value',
      {
        ...quarters,
        kw: [33, 63],
        lagging: [16.5, 0],
        leading: [0, 0.5],
        missing: 1,
        notes: ['phases-added', 'intervals-without-value'],
      },
    ],
    [
      'apparent-and-active',
      '30 kWh and 50 kVAh in a quarter of an hour are 120 kW and 200 kVA: 160 kvar, of which nobody knows the sign',
      {
        ...quarters,
        kw: [120, 160, 200],
        lagging: [160, 120, 0],
        notes: ['powers-worked-out', 'reactive-unsigned'],
      },
    ],
    [
      'power-factor-percent',
      '60 is 0.6: 30 kW at 0.6 have 40 kvar; a standstill has none',
      {
        ...quarters,
        kw: [30, 40, 50, 0],
        lagging: [40, 30, 0, 0],
        notes: ['power-factor-in-percent', 'reactive-unsigned'],
        roots: true,
      },
    ],
    [
      'apparent-and-factor',
      '50 kVA at 0.6 are 30 kW and 40 kvar',
      { ...quarters, kw: [30, 40], lagging: [40, 30], roots: true },
    ],
    [
      'voltage-current-line',
      'S = √3·400 V·100 A = 69.282 kVA',
      {
        ...quarters,
        kw: [41.5692193817, 27.7128129211],
        lagging: [55.4256258422, 20.7846096908],
        notes: ['powers-worked-out'],
        roots: true,
      },
    ],
    [
      'voltage-current-phases',
      '20 + 20 + 10 kVA are 50 kVA beside 30 kW',
      { ...quarters, kw: [30, 40], lagging: [40, 30], notes: ['powers-worked-out'], roots: true },
    ],
    [
      'registers',
      'energies are differences of readings; a fall and a skipped reading leave gaps',
      {
        ...quarters,
        kw: [40, 82, 40, 40],
        lagging: [20, 0, 10, 4],
        missing: 3,
        notes: ['registers-differenced', 'register-fell'],
      },
    ],
  ])('%s: %s', async (name, _why, expected) => {
    await expectRecord(name, {}, expected);
  });

  it('voltage-line-to-neutral: a voltage to neutral is taken to line to line', async () => {
    const { record } = await readMeterText(sample('voltage-line-to-neutral'));
    expect(record.voltageV![0]).toBeCloseTo(230 * Math.sqrt(3), 9);
    expect(noteCodes({ record } as Awaited<ReturnType<typeof readMeterText>>)).toContain('voltage-to-line-to-line');
  });
});

const ramp = (from: number, count: number) => Array.from({ length: count }, (_, i) => from + i);
const same = (value: number, count: number) => Array<number>(count).fill(value);

describe('a row a day', () => {
  const hours = { intervalS: 3600, notes: ['days-in-columns'] };
  it.each<[string, string, Expected]>([
    [
      'days-unit-column',
      'columns from 01:00 to 24:00 mark ends; a column of units says what a row holds',
      {
        ...hours,
        begin: '2024-05-06T00:00',
        kw: [...ramp(10, 24), ...ramp(20, 24)],
        lagging: [5.5, ...same(6, 23), 5.5, ...same(6, 23)],
      },
    ],
    [
      'days-blocks',
      'the line above a block says what it holds; columns from 00:00 are taken as beginnings, aloud',
      {
        ...hours,
        begin: '2024-05-06T00:00',
        kw: ramp(100, 24),
        lagging: ramp(50, 24),
        notes: ['days-in-columns', 'stamps-assumed-beginnings', 'header-repeated'],
      },
    ],
    [
      'days-hour-ending',
      'hour ending 1 begins at midnight; quantities stand side by side',
      { ...hours, begin: '2024-05-06T00:00', kw: ramp(100, 24), lagging: ramp(50, 24) },
    ],
  ])('%s: %s', async (name, _why, expected) => {
    await expectRecord(name, {}, expected);
  });

  it.each<[string, string, Expected]>([
    [
      'days-25-hours',
      'a column for a 25th hour counts the hours as they passed',
      {
        ...hours,
        begin: '2024-10-25T22:00',
        kw: [...ramp(0, 24), ...ramp(30, 25)],
        lagging: [...same(1, 24), ...same(2, 25)],
      },
    ],
    [
      'days-23-hours',
      'a value at the 24th hour and none at the third follow the clock, which skipped the third',
      {
        ...hours,
        begin: '2024-03-30T23:00',
        kw: [40, 41, ...ramp(43, 21)],
        lagging: same(3, 23),
        notes: ['days-in-columns', 'skipped-hour-left-out'],
      },
    ],
    [
      'days-doubled-hour',
      'an hour that is named twice is the doubled one, and empty on other days',
      {
        ...hours,
        begin: '2024-10-25T22:00',
        kw: [...same(1, 24), ...ramp(30, 25)],
        lagging: [...same(1, 24), ...same(2, 25)],
        notes: ['days-in-columns', 'doubled-hour-by-order'],
      },
    ],
  ])('%s, in Berlin: %s', async (name, _why, expected) => {
    await expectRecord(name, { siteTimeZone: 'Europe/Berlin' }, expected);
  });

  it('days-counted-open: 24 counted columns of a day of 25 hours are asked about', async () => {
    const zone = { siteTimeZone: 'Europe/Berlin' };
    const { questions } = await questionOf(sample('days-counted-open'), zone);
    expect(questions.map(({ id, readings }) => [id, readings.map(({ map }) => map)])).toEqual([
      ['dayColumns', [{ dayColumns: 'clock' }, { dayColumns: 'elapsed' }]],
    ]);
    const beginsOf = async (dayColumns: 'clock' | 'elapsed') => {
      const { record } = await readMeterText(sample('days-counted-open'), { ...zone, map: { dayColumns } });
      return Array.from(record.beginS, (beginS) => (beginS - Date.UTC(2024, 9, 26, 22) / 1000) / 3600);
    };
    expect(await beginsOf('clock')).toEqual([0, 1, 2, ...ramp(4, 21)]);
    expect(await beginsOf('elapsed')).toEqual(ramp(0, 24));
    // in a zone without changes there is nothing to ask
    expect((await readMeterText(sample('days-counted-open'))).record.beginS).toHaveLength(24);
  });

  it('names row and column of what is no number, and of a row that is too short', async () => {
    const text = sample('days-unit-column').toString();
    expect((await refusalOf(text.replace('5,5', 'five'))).problems).toMatchObject([
      { code: 'bad-number', row: 3, column: 3, found: '"five"' },
    ]);
    expect((await refusalOf(text.replace(';6\n', '\n'))).problems).toMatchObject([{ code: 'wrong-length', row: 3 }]);
    expect((await refusalOf(text.replaceAll('kvarh', 'm3'))).problems).toMatchObject([{ code: 'no-reactive-column' }]);
  });

  it('drops a day that is there twice, and asks about one that differs', async () => {
    const text = sample('days-unit-column').toString();
    const [, first = '', second = ''] = text.split('\n');
    expect((await readMeterText(`${text}${first}\n${second}\n`)).record.duplicates).toBe(24);
    const { questions } = await questionOf(`${text}${first.replace(';10;', ';99;')}\n${second}\n`);
    expect(questions.map(({ id }) => id)).toEqual(['keepRow']);
  });
});

describe('rows by quadrant with a season flag', () => {
  // Q > 0 in I and II, Q < 0 in III and IV: R1 and R2 lag, R3 and R4 lead
  const berlin = { siteTimeZone: 'Europe/Berlin' };

  it('quadrant-rows: R1 and R2 lag, R3 and R4 lead, exported energy is subtracted; the last midnight shows ends', async () => {
    const { quality } = await expectRecord('quadrant-rows', berlin, {
      begin: '2024-05-05T22:00',
      intervalS: 900,
      kw: [40, 44, -24, -36],
      lagging: [20, 0, 16, 0],
      leading: [0, 8, 2, 16],
      missing: 7 * 96 - 4,
      notes: ['quadrants-added', 'stamps-mark-ends'],
    });
    expect(quality.format).toBe('quadrant-rows');
  });

  it('quadrant-rows-autumn: the flag tells the passes of the doubled hour apart, in any order', async () => {
    const expected = { begin: '2024-10-27T00:00', intervalS: 1800, kw: [2, 4, 6, 8, 10], lagging: same(2, 5) };
    await expectRecord('quadrant-rows-autumn', berlin, expected);
    const [first, ...others] = sample('quadrant-rows-autumn').toString().trim().split('\n');
    const { record } = await readMeterText([...others, first].join('\n'), berlin);
    expect(Array.from(record.activeKw)).toEqual(expected.kw);
    // without a zone standard time is taken for UTC, and nothing is lost or doubled
    expect(Array.from((await readMeterText(sample('quadrant-rows-autumn'))).record.activeKw)).toEqual(expected.kw);
  });

  it('quadrant-rows-flag: a flag that contradicts the zone is refused', async () => {
    expect((await refusalOf(sample('quadrant-rows-flag'), berlin)).problems).toMatchObject([
      { code: 'bad-time', row: 2, column: 2, found: '0' },
    ]);
  });

  it('quadrant-rows-order: quadrant II without export means that the columns stand otherwise', async () => {
    expect((await refusalOf(sample('quadrant-rows-order'), berlin)).problems).toMatchObject([
      { code: 'inconsistent', row: 1, column: 6 },
    ]);
  });

  it('are plain text where a map numbers the columns, and no such rows where a cell is otherwise', async () => {
    const map = { headerRow: 0, columns: { time: 1, active: 3, reactive: 5 }, quantity: 'energy' as const };
    const plain = await questionOf(sample('quadrant-rows-autumn'), { map, timeZone: '+01:00' });
    expect(plain.problems).toMatchObject([{ code: 'question', row: 3 }]);
    const other = sample('quadrant-rows').toString().replace('00:30;1;', '00:30;2;');
    expect((await refusalOf(other)).code).toBe('no-active-column');
  });
});

describe('columns beside the values', () => {
  it.each<[string, string, Expected]>([
    [
      'quality-letters',
      'E and S are estimates, M without a value is a gap, the quality of a temperature is nothing to the record',
      {
        ...quarters,
        kw: [40, 41, 43],
        lagging: [20, 21, 23],
        missing: 1,
        notes: ['values-estimated', 'intervals-without-value'],
      },
    ],
    [
      'quality-status',
      'zeros marked as missing are gaps; X is kept, and it is said that nobody knows it',
      {
        ...quarters,
        kw: [40, 44, 48],
        lagging: [20, 24, 28],
        missing: 1,
        notes: ['values-flagged-missing', 'values-estimated', 'qualities-unknown'],
      },
    ],
    [
      'quality-numbers',
      'numbers of a status are passed over aloud',
      { ...quarters, kw: [40, 50], lagging: [20, 25], notes: ['quality-not-read'] },
    ],
    ['meters-one', 'a column that names one meter is no matter', { ...quarters, kw: [40, 41], lagging: [20, 21] }],
  ])('%s: %s', async (name, _why, expected) => {
    await expectRecord(name, {}, expected);
  });

  it('quality-letters: the count of estimates is that of rows', async () => {
    const { record } = await readMeterText(sample('quality-letters'));
    expect(record.notes).toContainEqual(expect.objectContaining({ code: 'values-estimated', values: { rows: 2 } }));
    const { record: strict } = await readMeterText(sample('quality-letters'), { map: { quality: { e: 'missing' } } });
    expect(Array.from(strict.activeKw)).toEqual([40, 43]);
  });

  it('meters: an absent meter is refused, naming those that are there', async () => {
    expect((await refusalOf(sample('meters'), { map: { meter: 'M-3' } })).problems).toMatchObject([
      { code: 'out-of-range', path: 'meter', expected: 'a meter of the file: M-1, M-2' },
    ]);
    const nameless = sample('meters').toString().replace('M-2,2024-05-06 00:15', ',2024-05-06 00:15');
    expect((await refusalOf(nameless)).problems).toMatchObject([{ code: 'missing', row: 5, column: 1 }]);
  });

  it('meters: what is wrong in the rows of another meter is no matter', async () => {
    const broken = sample('meters').toString().replace('410,210', 'x,y');
    expect((await refusalOf(broken)).problems).toMatchObject([
      { code: 'bad-number', row: 5, column: 3 },
      { code: 'bad-number', row: 5, column: 4 },
    ]);
    const { record } = await readMeterText(broken, { map: { meter: 'M-1' } });
    expect(Array.from(record.activeKw)).toEqual([40, 41]);
  });
});

describe('what is refused', () => {
  it.each([
    ['phase-missing', [{ code: 'inconsistent', column: 2, found: 'kW L1, kW L3' }]],
    ['apparent-below-active', [{ code: 'out-of-range', row: 3, column: 3, found: '50 kVA' }]],
    ['power-factor-beyond', [{ code: 'out-of-range', row: 3, column: 3, found: '1.8' }]],
  ])('%s', async (name, problems) => {
    expect((await refusalOf(sample(name))).problems).toMatchObject(problems);
  });
});

describe('what is asked', () => {
  it.each<[string, string, [MeterMap, kw: number[], lagging: number[], leading: number[]][]]>([
    [
      'power-factor-signed',
      'powerFactorSign',
      [
        [{ powerFactorSign: 'negativeLeads' }, [30, 40, 50], [40, 0, 0], [0, 30, 0]],
        [{ powerFactorSign: 'negativeLags' }, [30, 40, 50], [0, 30, 0], [40, 0, 0]],
        [{ powerFactorSign: 'negativeExports' }, [30, -40, 50], [40, 30, 0], none(3)],
      ],
    ],
    [
      'voltage-current-open',
      'columns',
      [
        [{ voltageBetween: 'lineToLine' }, [23.9023, 15.9349], [31.8697, 11.9512], none(2)],
        [{ voltageBetween: 'lineToNeutral' }, [41.4, 27.6], [55.2, 20.7], none(2)],
      ],
    ],
    [
      'quality-open',
      'quality',
      [
        [{ quality: { M: 'measured' } }, [40, 50, 42], [20, 25, 21], none(3)],
        [{ quality: { M: 'missing' } }, [40, 42], [20, 21], none(2)],
      ],
    ],
    [
      'meters',
      'meter',
      [
        [{ meter: 'M-1' }, [40, 41], [20, 21], none(2)],
        [{ meter: 'M-2' }, [400, 410], [200, 210], none(2)],
      ],
    ],
    [
      'ratio-stated',
      'multiplier',
      [
        [{ multiplier: 1 }, [0.5, 1], [0.25, 0.5], none(2)],
        [{ multiplier: 80 }, [40, 80], [20, 40], none(2)],
      ],
    ],
  ])('%s, and the answers answer it', async (name, id, answers) => {
    const { questions } = await questionOf(sample(name));
    expect(questions.map((question) => question.id)).toEqual([id]);
    expect(questions[0]!.readings.map(({ map }) => map)).toEqual(answers.map(([map]) => map));
    for (const [map, kw, lagging, leading] of answers) {
      const { record } = await readMeterText(sample(name), { map });
      const near = (column: Float64Array) => Array.from(column, (value) => Number(value.toFixed(4)));
      expect([near(record.activeKw), near(record.laggingKvar), near(record.leadingKvar)]).toEqual([
        kw,
        lagging,
        leading,
      ]);
      const reading = questions[0]!.readings.find((other) => JSON.stringify(other.map) === JSON.stringify(map))!;
      expect(reading.maxKw).toBe(Math.max(...record.activeKw));
    }
  });
});
