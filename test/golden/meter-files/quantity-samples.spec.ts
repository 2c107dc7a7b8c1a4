// Samples of the project's own invention for what columns can hold and how rows can be laid out; every number is worked out
// by hand from the file beside it. Powers follow from S² = P² + Q², P = S·λ and S = √3·U·I, with 3-4-5 triangles.
import { describe, expect, it } from 'vitest';
import type { MeterMap } from '#libs/contract/meter-map.js';
import { type Expected, expectRecord, sample } from '../../support/expect-sample.js';
import { noteCodes, questionOf, readMeterText, refusalOf } from '../../support/meter-text.js';

const quarters = { begin: '2024-05-06T00:00', intervalS: 900 };
const none = (count: number) => Array<number>(count).fill(0);

describe('numbers and letters', () => {
  it.each<[string, string, Expected]>([
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
        notes: ['registers-differenced', 'registers-fall'],
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
