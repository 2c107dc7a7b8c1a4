// Inputs at the edge of sense: each gives a result that is numbers throughout, or a refusal that names what is wrong.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  createLoadRecord,
  InputProblem,
  type LoadRecord,
  type Outcome,
  planBank,
  type Site,
  scanSite,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';

/** Paths at which a value is no finite number. */
function notFinite(value: unknown, path = ''): string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [`${path} = ${value}`];
  if (value === null || typeof value !== 'object') return [];
  return Object.entries(value).flatMap(([key, part]) => notFinite(part, `${path}.${key}`));
}

const tuned = { count: 3, ratedKvar: 50, ratedV: 480, reactorPct: 7 };
const plain = { count: 1, ratedKvar: 400, ratedV: 400 };
const tone = (orderH: number, pct = 5) => [{ name: 'tone', fundamentalA: 100, orders: [{ orderH, pct }] }];
const ordinary = madeRecord(driftingLoad(chance(7), 40, 300, 0.8));
const steady = (kw: number, kvar: number): LoadRecord =>
  madeRecord({ activeKw: [kw, kw / 2], reactiveKvar: [kvar, kvar / 2] });

const RECORDS: [string, LoadRecord, Partial<Site>?][] = [
  ['a single interval', madeRecord({ activeKw: [100], reactiveKvar: [80] })],
  ['nothing flowing', steady(0, 0)],
  [
    'nothing flowing, the other rules',
    steady(0, 0),
    { rules: 'ieee', loads: { distorting: tone(5), backgroundPct: [] } },
  ],
  ['export all along', steady(-100, 60)],
  ['export held against the target', steady(-100, 60), { target: { onExport: 'absolute' } }],
  ['leading all year', steady(100, -60)],
  ['reactive power alone', steady(0, 60)],
  ['a dead bus', madeRecord({ activeKw: [100, 100], reactiveKvar: [80, 80], voltageV: [0, 400] })],
  ['one second an interval', madeRecord({ activeKw: [100, 90], reactiveKvar: [80, 70], intervalS: 1 })],
  ['a year an interval', madeRecord({ activeKw: [100, 90], reactiveKvar: [80, 70], intervalS: 31_536_000 })],
  ['hardly anything behind a transformer', steady(1, 0.5), { meteredAt: 'primary' }],
  ['leading behind a transformer', steady(100, -60), { meteredAt: 'primary' }],
  ['a fixed old bank larger than the load', steady(100, -300), { recordedBank: { state: 'fixed', kvar: 350 } }],
  ['a gap of a year', madeRecord({ activeKw: [100, 90], reactiveKvar: [80, 70], slots: [0, 35_040] })],
];

const SITES: [string, Partial<Site>][] = [
  ['60 Hz by the European rules', { frequencyHz: 60 }],
  ['no margin above nominal voltage', { bus: { nominalV: 400, highestV: 400 } }],
  ['one fault level only', { supply: { faultLevelMva: { max: 15, min: 15 } } }],
  [
    'a least damping above the record’s mean',
    { loads: { distorting: [], backgroundPct: [], dampingKw: { min: 5000 } } },
  ],
  ['order 2', { loads: { distorting: tone(2), backgroundPct: [] } }],
  ['order 2.5', { loads: { distorting: tone(2.5), backgroundPct: [] } }],
  ['order 50', { loads: { distorting: tone(50), backgroundPct: [] } }],
  ['order 50, the other rules', { rules: 'ieee', loads: { distorting: tone(50), backgroundPct: [] } }],
  ['a background of nothing', { loads: { distorting: tone(5), backgroundPct: [{ orderH: 7, pct: 0 }] } }],
  [
    'a load of no current',
    { loads: { distorting: [{ name: 'off', fundamentalA: 0, spectrum: 'six-pulse' }], backgroundPct: [] } },
  ],
  ['resistances that grow with the square', { supply: { faultLevelMva: { max: 10 }, resistanceExponent: 2 } }],
  ['a source of resistance', { supply: { faultLevelMva: { max: 10 }, rOverX: 100 } }],
  ['unity as the target', { target: { powerFactor: 1 } }],
  ['next to nothing as the target', { target: { powerFactor: 0.001 } }],
  ['delays longer than the record', { control: { stepDelayS: 1e6, reconnectDelayS: 1e7 } }],
  [
    'the network without a transformer at high voltage',
    { bus: { nominalV: 20_000 }, supply: { faultLevelMva: { max: 200 } } },
  ],
];

const BANKS: [string, NonNullable<Site['bank']>['stages'], Partial<Site>?][] = [
  ['one stage of 1 kvar', [{ count: 1, ratedKvar: 1, ratedV: 440 }]],
  ['one of next to nothing', [{ count: 1, ratedKvar: 1e-9, ratedV: 440 }]],
  ['a hundred stages', [{ ...tuned, count: 100 }]],
  ['24 groups that are never switched', Array.from({ length: 24 }, () => ({ ...tuned, count: 1, fixed: true }))],
  ['nothing but a fixed stage', [{ ...tuned, fixed: true }]],
  ['a reactor nearly as large as the capacitor', [{ ...tuned, reactorPct: 87.99 }]],
  ['a reactor of next to nothing', [{ ...tuned, reactorPct: 1e-9 }]],
  ['a reactor of resistance', [{ ...tuned, reactorQuality: 1e-9 }]],
  [
    'a reactor without loss tuned to an order that is present',
    [{ ...tuned, reactorPct: 4, reactorQuality: 1e12 }],
    { loads: { distorting: tone(5), backgroundPct: [] } },
  ],
  [
    'a lossless network in resonance with what is present',
    [plain],
    {
      supply: { faultLevelMva: { max: 10 }, rOverX: 0 },
      loads: { distorting: tone(5), backgroundPct: [{ orderH: 7, pct: 1 }], dampingKw: { max: 0 } },
    },
  ],
  ['plain and tuned stages of one size', [{ ...tuned }, { ...plain, ratedKvar: 50 }]],
];

function expectNumbers(outcome: Outcome): void {
  const { result, series, margins } = outcome;
  expect(notFinite({ result, series, margins })).toEqual([]);
  expect(JSON.parse(JSON.stringify(result))).toEqual(result);
}

describe('assessing', () => {
  it.each(RECORDS)('a record of %s gives numbers', (_, record, parts = {}) => {
    expectNumbers(assessBank(madeSite({ bank: { stages: [tuned] }, ...parts }), record, UTC_TABLE));
  });

  it.each(SITES)('%s gives numbers', (_, parts) => {
    const nominalV = parts.bus?.nominalV ?? 400;
    const bank = { stages: [{ ...tuned, ratedV: 1.2 * nominalV }] };
    expectNumbers(assessBank(madeSite({ bank, ...parts }), ordinary, UTC_TABLE));
  });

  it.each(BANKS)('a bank of %s gives numbers', (_, stages, parts = {}) => {
    expectNumbers(assessBank(madeSite({ bank: { stages }, ...parts }), ordinary, UTC_TABLE));
  });
});

describe('planning', () => {
  const catalogue = { stageKvar: [10, 25, 50], reactorPct: [0, 7], maxStages: 4 };

  it.each(RECORDS)('on a record of %s gives numbers', (_, record, parts = {}) => {
    expectNumbers(planBank(madeSite({ catalogue, ...parts }), record, UTC_TABLE));
  });

  it.each(SITES)('with %s gives numbers', (_, parts) => {
    const nominalV = parts.bus?.nominalV ?? 400;
    const ratedV = [1.1 * nominalV, 1.31 * nominalV];
    expectNumbers(planBank(madeSite({ catalogue: { ...catalogue, ratedV }, ...parts }), ordinary, UTC_TABLE));
  });
});

describe('scanning', () => {
  it.each(BANKS)('a bank of %s gives numbers', (_, stages, parts = {}) => {
    const ordersH = Float64Array.from({ length: 99 }, (_value, k) => 1 + k / 2);
    expect(notFinite(scanSite(madeSite({ bank: { stages }, ...parts }), { ordersH }))).toEqual([]);
  });
});

describe('refusals', () => {
  const refusal = (act: () => unknown): InputProblem['problems'][number] => {
    try {
      act();
    } catch (problem) {
      if (problem instanceof InputProblem) return problem.problems[0]!;
      throw problem;
    }
    throw new Error('nothing was refused');
  };
  const assess = (parts: Partial<Site>, record = ordinary) =>
    refusal(() => assessBank(madeSite(parts), record, UTC_TABLE));

  it.each([
    ['no bank to judge', {}, 'missing', 'bank'],
    [
      'more than 4 096 ways to connect it',
      { bank: { stages: Array.from({ length: 24 }, () => ({ ...tuned, count: 1 })) } },
      'too-many-levels',
      'bank.stages',
    ],
    [
      'a reactor as large as the capacitor',
      { bank: { stages: [{ ...tuned, reactorPct: 100 }] } },
      'out-of-range',
      'bank.stages[0].reactorPct',
    ],
    [
      'a reactor that would be in a corner, by its nameplate',
      { bank: { stages: [{ count: 1, ratedKvar: 50, ratedV: 400, reactorMh: 9.2 }] } },
      'out-of-range',
      'bank.stages[0].reactorPct',
    ],
    [
      'no inductance between stages',
      { bank: { stages: [tuned], interStageUh: 0 } },
      'out-of-range',
      'bank.interStageUh',
    ],
    [
      'a logged bank without its column',
      { bank: { stages: [tuned] }, recordedBank: { state: 'logged' } },
      'missing',
      'recordedBank.state',
    ],
    [
      'a measurement of a stage the group does not have',
      {
        bank: { stages: [{ ...tuned, measurements: [{ stage: 9, date: '2025-01-01', lineA: [9, 9, 9], busV: 400 }] }] },
      },
      'inconsistent',
      'bank.stages[0].measurements[0].stage',
    ],
    [
      'a measurement before the stage was there',
      {
        bank: {
          stages: [
            {
              ...tuned,
              commissioned: '2020-01-01',
              measurements: [{ stage: 1, date: '2019-01-01', lineA: [9, 9, 9], busV: 400 }],
            },
          ],
        },
      },
      'inconsistent',
      'bank.stages[0].measurements[0].date',
    ],
    [
      'a switching old bank of too many combinations',
      {
        bank: { stages: [tuned] },
        recordedBank: {
          state: 'switching',
          bank: { stages: Array.from({ length: 13 }, (_, k) => ({ count: 1, ratedKvar: 10 + k, ratedV: 400 })) },
        },
      },
      'too-many-levels',
      'recordedBank.bank',
    ],
    ['metering left open', { bank: { stages: [tuned] }, meteredAt: undefined as never }, 'missing', 'meteredAt'],
    [
      'a primary without a transformer',
      { bank: { stages: [tuned] }, meteredAt: 'primary', supply: { faultLevelMva: { max: 9 } } },
      'inconsistent',
      'supply.transformers',
    ],
  ] satisfies [string, Partial<Site>, string, string][])('%s', (_, parts, code, path) => {
    const problem = assess(parts);
    expect(problem.code).toBe(code);
    expect(problem.path).toBe(path);
  });

  it.each([
    [undefined, 'missing'],
    ['separate' as const, 'not-supported-yet'],
  ])('two transformers arranged %s', (arrangement, code) => {
    const transformer = { ratedKva: 630, impedancePct: 4 };
    const supply = {
      faultLevelMva: { max: 100 },
      transformers: [transformer, transformer],
      ...(arrangement === undefined ? {} : { arrangement }),
    };
    const problem = assess({ bank: { stages: [tuned] }, supply });
    expect(problem.code).toBe(code);
    expect(problem.path).toBe('supply.arrangement');
  });

  it('a load no transformer of the site could have carried', () => {
    const problem = assess({ bank: { stages: [tuned] }, meteredAt: 'primary' }, steady(20_000, 10_000));
    expect(problem.code).toBe('load-too-large');
  });

  it('a level the bank does not have, naming those it has', () => {
    const site = madeSite({ bank: { stages: [{ ...plain, ratedKvar: 50 }] } });
    const problem = refusal(() => scanSite(site, { levelKvar: 20, ordersH: Float64Array.of(1) }));
    expect(problem.code).toBe('unknown-level');
    expect(problem.expected).toContain('0, 50');
  });

  it('is none for a level half a kvar away', () => {
    const site = madeSite({ bank: { stages: [{ ...plain, ratedKvar: 50 }] } });
    const { levels } = scanSite(site, { levelKvar: 49.5, ordersH: Float64Array.of(1) });
    expect(levels[0]!.levelKvar).toBeCloseTo(50, 9);
  });

  it.each([
    ['activeKw', Number.NaN],
    ['laggingKvar', Number.POSITIVE_INFINITY],
    ['leadingKvar', -1],
  ] as const)('%s of %d at the record’s door', (column, value) => {
    const columns = { activeKw: [1, 2], laggingKvar: [1, 2], leadingKvar: [0, 0] };
    columns[column] = [0, value];
    const problem = refusal(() =>
      createLoadRecord({
        intervalS: 900,
        beginS: Float64Array.of(0, 900),
        activeKw: Float64Array.from(columns.activeKw),
        laggingKvar: Float64Array.from(columns.laggingKvar),
        leadingKvar: Float64Array.from(columns.leadingKvar),
      }),
    );
    expect(problem.code).toBe('not-finite');
    expect(problem.path).toBe(column);
    expect(problem.row).toBe(2);
  });
});
