// Samples of the project's own invention for what stands in cells beside a bare number; every number is worked out by hand
// from the file beside it: Q = P·√(1/λ² − 1) with 3-4-5 triangles, so 0.8 gives 3/4 and 0.6 gives 4/3 of the kW.
import { describe, expect, it } from 'vitest';
import { expectRecord, sample } from '../../support/expect-sample.js';
import { noteCodes, questionOf, readMeterText, refusalOf } from '../../support/meter-text.js';

const quarters = { begin: '2024-05-06T00:00', intervalS: 900 };

describe('a power factor that says its side in words', () => {
  it('lags where the cell says ind. or lag, leads where it says cap. or lead, and has no side at 1', async () => {
    const reading = await expectRecord(
      'power-factor-words',
      {},
      {
        ...quarters,
        kw: [40, 30, 40, 50, 30],
        lagging: [30, 40, 0, 0, 0],
        leading: [0, 0, 30, 0, 40],
        roots: true,
        notes: ['power-factor-by-words'],
      },
    );
    expect(noteCodes(reading)).not.toContain('reactive-unsigned');
  });

  it('is refused at the row that lost its word', async () => {
    const { problems } = await refusalOf(sample('power-factor-words-lost'));
    expect(problems).toMatchObject([{ code: 'bad-number', row: 3, column: 3, found: '0.6' }]);
  });

  it('is refused where a map wants the side from a sign as well', async () => {
    const { problems } = await refusalOf(sample('power-factor-words'), {
      map: { powerFactorSign: 'negativeLags' },
    });
    expect(problems).toMatchObject([{ code: 'out-of-range', path: 'powerFactorSign' }]);
  });
});

describe('units in the cells', () => {
  it('name the unit of a column whose name has none', async () => {
    await expectRecord(
      'units-in-cells',
      {},
      {
        ...quarters,
        kw: [40.5, 41.5, 43.5],
        lagging: [20.25, 21, 22.5],
        missing: 1,
        notes: ['intervals-without-value'],
      },
    );
  });

  it('are refused where one of them is another, which would be a thousand times as much', async () => {
    const { problems } = await refusalOf(sample('units-in-cells-change'));
    expect(problems).toMatchObject([{ code: 'bad-number', row: 3, column: 2, found: '"41.5 MW"' }]);
  });

  it('are refused at the row and column where the name says another', async () => {
    const text = 'Time,kW,kvar\n2024-05-06 00:00,40.5,20\n2024-05-06 00:15,41 MW,21\n2024-05-06 00:30,42,22\n';
    expect((await refusalOf(text)).problems).toMatchObject([
      { code: 'bad-number', row: 3, column: 2, found: '"41 MW"' },
    ]);
  });
});

describe('a date in columns of its own', () => {
  it('is put together from year, month and day, beside hour and minute', async () => {
    await expectRecord(
      'date-in-parts',
      {},
      {
        ...quarters,
        intervalS: 1800,
        kw: [40, 41, 42, 43],
        lagging: [20, 21, 22, 23],
      },
    );
  });

  it('with hours 1 to 24 counts the hours of the day', async () => {
    const kw = [...Array.from({ length: 24 }, (_, h) => 101 + h), 201, 202];
    const lagging = [...Array.from({ length: 24 }, (_, h) => 51 + h), 61, 62];
    await expectRecord(
      'date-in-parts-hours',
      {},
      {
        ...quarters,
        intervalS: 3600,
        kw,
        lagging,
        notes: ['intervals-counted'],
      },
    );
  });

  it('is refused where there is no such day', async () => {
    expect((await refusalOf(sample('date-in-parts-impossible'))).problems).toMatchObject([
      { code: 'bad-time', row: 3 },
    ]);
  });
});

describe('numbers that stand for missing values', () => {
  it('are left out where they are below zero and beyond anything else of their column, and it is said', async () => {
    await expectRecord(
      'fillers',
      {},
      {
        ...quarters,
        kw: [40, 42, 44],
        lagging: [20, 22, 24],
        missing: 2,
        notes: ['fillers-left-out'],
      },
    );
  });

  it('are values where the map says so', async () => {
    await expectRecord(
      'fillers',
      { map: { fillers: 'values' } },
      {
        ...quarters,
        kw: [40, -9999, 42, 43, 44],
        lagging: [20, 0, 22, 0, 24],
        leading: [0, 9999, 0, 32_768, 0],
      },
    );
  });

  it('are asked about where they may be values as well, with the peak under each', async () => {
    const [asked] = (await questionOf(sample('fillers-open'))).questions;
    expect(asked!.id).toBe('fillers');
    expect(asked!.readings.map(({ map, maxKw }) => ({ map, maxKw }))).toEqual([
      { map: { fillers: 'missing' }, maxKw: 430 },
      { map: { fillers: 'values' }, maxKw: 999 },
    ]);
    const answered = await readMeterText(sample('fillers-open'), {
      map: { fillers: 'missing' },
    });
    expect(Array.from(answered.record.activeKw)).toEqual([400, 420, 430]);
  });

  it('are asked about where nothing but their size speaks against them: a peak may be one', async () => {
    const far = sample('fillers-open').toString().replace('999', '9999999');
    expect((await questionOf(far)).questions.map(({ id }) => id)).toEqual(['fillers']);
  });

  it('are values without a question where their column goes on through them', async () => {
    const reading = await expectRecord(
      'fillers-among-like',
      {},
      { ...quarters, kw: [980, 999, 1010, 1020], lagging: [20, 21, 22, 23] },
    );
    expect(noteCodes(reading)).not.toContain('fillers-left-out');
  });

  it('are left out where they leave no record as values, and it is said with those taken for certain', async () => {
    const lagging = (...kvar: number[]) =>
      `Time,kW,lagging kvar,leading kvar\n${kvar.map((one, i) => `2024-05-06 0${i}:00,40,${one},0\n`).join('')}`;
    const { record } = await readMeterText(lagging(340, 345, -999, 350, -9999, 360));
    expect(Array.from(record.laggingKvar)).toEqual([340, 345, 350, 360]);
    expect(record.notes.find(({ code }) => code === 'fillers-left-out')?.values).toEqual({
      ...{ values: 2, value: -9999, columns: 'lagging kvar' },
    });
    // another number below zero is no such number, and is refused
    expect((await refusalOf(lagging(340, 345, -90, 350))).code).toBe('out-of-range');
  });

  it('are values where a column stands still at one on its way, and asked about where it comes back', async () => {
    const through = (...kw: number[]) =>
      `Time,kW,kvar\n${kw.map((one, i) => `2024-05-06 0${i}:00,${one},20\n`).join('')}`;
    const read = async (...kw: number[]) => Array.from((await readMeterText(through(...kw))).record.activeKw);
    expect(await read(998, 999, 999, 999, 1000)).toEqual([998, 999, 999, 999, 1000]);
    expect(await read(1000, 999, 999, 999, 998)).toEqual([1000, 999, 999, 999, 998]);
    for (const kw of [
      [950, 999, 999, 999, 960],
      [998, 999, 999, 999],
      [998, 999, 999, 999, 3000],
    ]) {
      expect((await questionOf(through(...kw))).questions.map(({ id }) => id)).toEqual(['fillers']);
    }
  });
});

describe('a broken quotation mark', () => {
  const rows = (third: string) =>
    `time,kW,kvar\n"2024-05-06 00:00",40,20\n"2024-05-06 00:15",41,21\n${third}\n"2024-05-06 00:45",43,23\n`;

  it('before a stamp is refused, and its row not taken for one of totals', async () => {
    const { problems } = await refusalOf(rows('""2024-05-06 00:30",43,23'));
    expect(problems).toMatchObject([{ code: 'unreadable', row: 4, column: 1 }]);
  });

  it('is needed for that: without it the row counts', async () => {
    expect((await readMeterText(rows('"2024-05-06 00:30",43,23'))).record.beginS.length).toBe(4);
  });
});
