// Workbooks of the project's own invention, one for each way in which sheets mislead; every number is worked out by hand from
// the rows beside it. How serials stand for dates is ECMA-376 part 1, 18.17.4.1; the built-in formats are 18.8.30.
import { describe, expect, it } from 'vitest';
import type { ReadOptions } from '#libs/meter-files/meter-format.js';
import {
  FIRST_OWN_STYLE,
  type MadeCell,
  type MadeSheet,
  madeWorkbook,
  STYLES,
  serialOf,
} from '../../support/made-workbook.js';
import { noteCodes, questionOf, readMeterText, refusalOf } from '../../support/meter-text.js';

const HEADER = ['interval begin', 'active power [kW]', 'reactive power [kvar]'];
const stampAt = (stamp: string) => ({ serial: serialOf(stamp), style: STYLES.stamp });
const ROWS: MadeCell[][] = [
  [stampAt('2024-05-06 00:00'), 40.5, 20.25],
  [stampAt('2024-05-06 00:15'), 41.5, 20.5],
  [stampAt('2024-05-06 00:30'), 0.75, -3.5],
];
const LOAD = [HEADER, ...ROWS];

function workbook(rows: MadeCell[][], more: { formats?: string[]; since1904?: boolean; after?: string } = {}) {
  return madeWorkbook({ ...more, sheets: [{ name: 'Load', rows, after: more.after ?? '' }] });
}

async function read(bytes: Uint8Array, options: ReadOptions = {}) {
  const reading = await readMeterText(bytes, options);
  const { record } = reading;
  return {
    reading,
    begin: Array.from(record.beginS, (beginS) => new Date(beginS * 1000).toISOString().slice(0, 16)),
    kw: Array.from(record.activeKw),
    q: Array.from(record.laggingKvar, (lagging, i) => lagging - record.leadingKvar[i]!),
  };
}

const PLAIN = {
  begin: ['2024-05-06T00:00', '2024-05-06T00:15', '2024-05-06T00:30'],
  kw: [40.5, 41.5, 0.75],
  q: [20.25, 20.5, -3.5],
};

describe('a workbook', () => {
  it('is read by the rules of delimited text and says its own name', async () => {
    const { reading, ...found } = await read(workbook(LOAD));
    expect(found).toEqual(PLAIN);
    expect(reading.quality.format).toBe('xlsx');
    const [readAs] = reading.record.notes.filter(({ code }) => code === 'file-read-as');
    expect(readAs?.values.format).toBe('xlsx');
    expect(noteCodes(reading)).not.toContain('sheet-read');
  });

  it('is the same with a prefix on every element', async () => {
    const { reading: _, ...found } = await read(madeWorkbook({ sheets: [{ name: 'Load', rows: LOAD }], prefix: 'x' }));
    expect(found).toEqual(PLAIN);
  });

  it.each<[string, MadeCell[][], { formats?: string[]; since1904?: boolean; after?: string }?]>([
    [
      'texts typed into cells',
      [HEADER, ['2024-05-06 00:00', 40.5, 20.25], ['2024-05-06 00:15', 41.5, 20.5], ['2024-05-06 00:30', 0.75, -3.5]],
    ],
    [
      'texts in the cells themselves',
      LOAD.map((row) => row.map((cell) => (typeof cell === 'string' ? { inline: cell } : cell))),
    ],
    [
      'texts of several runs, with hints how they are spoken',
      [[{ rich: ['interval ', 'begin'] }, HEADER[1]!, HEADER[2]!], ...ROWS],
    ],
    [
      'dates of ISO 8601',
      [HEADER, ...ROWS.map((row, i) => [{ iso: `2024-05-06T00:${['00', '15', '30'][i]}:00` }, row[1]!, row[2]!])],
    ],
    [
      'formulas with their values',
      [
        HEADER,
        ...ROWS.map(([stamp, kw, q]) => [
          stamp!,
          { formula: 'B9*4', value: kw as number },
          { formula: 'C9*4', value: q as number },
        ]),
      ],
    ],
    [
      'rows and columns left empty, and merged cells',
      [['Made up'], [], [null, ...HEADER], [], ...ROWS.flatMap((row) => [[null, ...row], []])],
      { after: '<mergeCells><mergeCell ref="A1:C1"/></mergeCells>' },
    ],
    [
      'a format of its own',
      [
        HEADER,
        ...ROWS.map(([stamp, ...rest]) => [{ ...(stamp as { serial: number }), style: FIRST_OWN_STYLE }, ...rest]),
      ],
      { formats: ['[$-407]dddd, dd.mm.yyyy "um" hh:mm;@'] },
    ],
    [
      'days counted from 1904',
      [
        HEADER,
        ...ROWS.map(([stamp, ...rest]) => [
          { serial: (stamp as { serial: number }).serial - 1462, style: STYLES.stamp },
          ...rest,
        ]),
      ],
      { since1904: true },
    ],
    [
      'date and clock apart',
      [
        ['date', 'time', 'kW', 'kvar'],
        ...ROWS.map(([, kw, q], i) => [
          { serial: serialOf('2024-05-06'), style: STYLES.date },
          { serial: i / 96, style: STYLES.clock },
          kw!,
          q!,
        ]),
      ],
    ],
    [
      'serials that were added up, a hair off the minute',
      [HEADER, ...ROWS.map(([, kw, q], i) => [{ serial: 45_418 + i * 0.010416667, style: STYLES.stamp }, kw!, q!])],
    ],
  ])('reads %s', async (_, rows, more) => {
    const { reading: __, ...found } = await read(workbook(rows, more));
    expect(found).toEqual(PLAIN);
  });

  it('takes numbers to the bit, whatever their size', async () => {
    const kw = [1e-7, 0.1 + 0.2, 1234.567, 5e-324, 123_456_789.123_456_78];
    const rows = kw.map((value, i) => [stampAt(`2024-05-06 0${i}:00`), value, 1]);
    expect((await read(workbook([HEADER, ...rows]))).kw).toEqual(kw);
  });

  it('takes an error of #N/A for a missing value and refuses other errors', async () => {
    const with_ = (error: string) => workbook([HEADER, ...ROWS, [stampAt('2024-05-06 00:45'), { error }, 1]]);
    const { reading, kw } = await read(with_('#N/A'));
    expect(kw).toEqual(PLAIN.kw);
    expect(noteCodes(reading)).toContain('intervals-without-value');
    expect((await refusalOf(with_('#DIV/0!'))).problems).toMatchObject([
      { code: 'bad-number', path: 'sheet "Load"', row: 5, column: 2, found: '"#DIV/0!"' },
    ]);
  });

  it('takes an empty cell at the end of a row for a missing value, and a truth for standby', async () => {
    const rows = [
      [...HEADER, 'standby'],
      [...ROWS[0]!, true],
      [...ROWS[1]!, false],
      [stampAt('2024-05-06 00:30'), 0.75],
    ];
    const { reading } = await read(workbook(rows));
    expect(Array.from(reading.record.standby!)).toEqual([1, 0]);
  });

  it('counts rows as the sheet does, blank ones included', async () => {
    const rows = [['Made up'], [], [], HEADER, [], ROWS[0]!, [stampAt('2024-05-06 00:15'), 'forty', 1]];
    const { problems } = await refusalOf(workbook(rows));
    expect(problems).toMatchObject([{ code: 'bad-number', path: 'sheet "Load"', row: 7, column: 2, found: '"forty"' }]);
  });

  it('refuses a date in a column of values, and a number that is no date in the column of stamps', async () => {
    const dated = await refusalOf(
      workbook([HEADER, ...ROWS, [stampAt('2024-05-06 00:45'), stampAt('2024-05-06 00:45'), 1]]),
    );
    expect(dated.problems).toMatchObject([{ code: 'bad-number', row: 5, column: 2, found: '"2024-05-06 00:45:00"' }]);
    const negative = await refusalOf(workbook([HEADER, ...ROWS, [{ serial: -4, style: STYLES.stamp }, 1, 1]]));
    expect(negative.problems).toMatchObject([{ code: 'bad-time', row: 5, column: 1 }]);
  });

  it('refuses a formula that was never calculated, where its value is needed', async () => {
    const needed = await refusalOf(workbook([HEADER, ...ROWS, [stampAt('2024-05-06 00:45'), { formula: 'B4*4' }, 1]]));
    expect(needed.problems).toMatchObject([{ row: 5, column: 2, found: '"a formula without a stored value"' }]);
    const stamps = await refusalOf(workbook([HEADER, [{ formula: 'A1+1' }, 1, 1], [{ formula: 'A2+1' }, 1, 1]]));
    expect(stamps.problems[0]).toMatchObject({ code: 'missing', path: 'sheet "Load"', row: 2, column: 1 });
    const beside = workbook(LOAD.map((row, i) => [...row, i === 0 ? 'remarks' : { formula: 'A1&"x"' }]));
    expect((await read(beside)).kw).toEqual(PLAIN.kw);
  });

  it('asks what the mark in numbers typed as text means; numbers beside them do not answer', async () => {
    const rows = ROWS.map(([stamp, kw]) => [stamp!, kw!, '1,234']);
    const question = await questionOf(workbook([HEADER, ...rows]));
    expect(question.questions.map(({ id }) => id)).toEqual(['decimal']);
    expect((await read(workbook([HEADER, ...rows]), { map: { decimal: ',' } })).q).toEqual([1.234, 1.234, 1.234]);
    const thousands = await read(workbook([HEADER, ...rows]), { map: { decimal: '.' } });
    expect(thousands.q).toEqual([1234, 1234, 1234]);
    expect(thousands.kw).toEqual(PLAIN.kw);
    const settled = ROWS.map(([stamp, kw]) => [stamp!, kw!, '20,25']);
    expect((await read(workbook([HEADER, ...settled]))).q).toEqual([20.25, 20.25, 20.25]);
  });

  it('does not take digits behind a unit for a format of dates', async () => {
    const styled = LOAD.map((row, i) => (i === 0 ? row : [row[0]!, { serial: 40.5, style: FIRST_OWN_STYLE }, row[2]!]));
    expect((await read(workbook(styled, { formats: ['#,##0.0 "kWh"'] }))).kw).toEqual([40.5, 40.5, 40.5]);
    expect((await read(workbook(styled, { formats: ['0.0 kWh/d'] }))).kw).toEqual([40.5, 40.5, 40.5]);
  });
});

describe('several sheets', () => {
  const sheet = (name: string, rows: MadeCell[][], state?: MadeSheet['state']): MadeSheet =>
    state === undefined ? { name, rows } : { name, rows, state };
  const doubled = [HEADER, ...ROWS.map(([stamp, kw, q]) => [stamp!, (kw as number) * 2, q!])];
  const notes = sheet('Notes', [
    ['made up', 'by hand'],
    ['on', 3],
  ]);

  it('the one that holds a record is read, and said', async () => {
    const { reading, ...found } = await read(madeWorkbook({ sheets: [notes, sheet('Load', LOAD)] }));
    expect(found).toEqual(PLAIN);
    expect(reading.record.notes[0]).toMatchObject({ code: 'sheet-read', values: { sheet: 'Load', sheets: 2 } });
  });

  it('two of the same values need no answer', async () => {
    const bytes = madeWorkbook({ sheets: [sheet('Load', LOAD), sheet('Copy', LOAD)] });
    expect((await read(bytes)).kw).toEqual(PLAIN.kw);
  });

  it('two of different values are asked about, and the map answers by name or number', async () => {
    const bytes = madeWorkbook({ sheets: [sheet('Load', LOAD), notes, sheet('Twice', doubled)] });
    const { questions } = await questionOf(bytes);
    expect(questions).toMatchObject([
      {
        id: 'sheet',
        readings: [
          { map: { sheet: 'Load' }, maxKw: 41.5 },
          { map: { sheet: 'Twice' }, maxKw: 83 },
        ],
      },
    ]);
    expect((await read(bytes, { map: { sheet: 'Twice' } })).kw).toEqual([81, 83, 1.5]);
    expect((await read(bytes, { map: { sheet: 1 } })).kw).toEqual(PLAIN.kw);
    expect((await refusalOf(bytes, { map: { sheet: 'Third' } })).problems).toMatchObject([
      { code: 'out-of-range', path: 'sheet', expected: 'a sheet of the workbook: Load, Notes, Twice' },
    ]);
  });

  it('one that cannot be read is not passed over in favour of another', async () => {
    const broken = [HEADER, ...ROWS, [stampAt('2024-05-06 00:45'), 'forty', 1]];
    const bytes = madeWorkbook({ sheets: [sheet('Load', broken), sheet('Trial', LOAD)] });
    expect((await refusalOf(bytes)).problems).toMatchObject([{ path: 'sheet "Load"', row: 5, column: 2 }]);
    expect((await read(bytes, { map: { sheet: 'Trial' } })).kw).toEqual(PLAIN.kw);
  });

  it('hidden ones are read like the others, and said', async () => {
    const { reading, kw } = await read(madeWorkbook({ sheets: [notes, sheet('Load', LOAD, 'veryHidden')] }));
    expect(kw).toEqual(PLAIN.kw);
    expect(reading.record.notes).toMatchObject([
      { code: 'sheet-read' },
      { code: 'sheets-hidden', values: { sheets: 'Load' } },
      {},
      {},
      {},
    ]);
  });

  it('none that holds a record is refused with what the nearest lacks', async () => {
    const activeOnly = LOAD.map((row) => row.slice(0, 2));
    const refusal = await refusalOf(madeWorkbook({ sheets: [notes, sheet('Load', activeOnly)] }));
    expect(refusal.problems).toMatchObject([{ code: 'no-reactive-column', path: 'sheet "Load"', row: 1 }]);
  });
});
