// Every figure is its formula with its inputs put in: read and worked out here by a small evaluator of its own.
import { describe, expect, it } from 'vitest';
import { assessBank, type Figure, type Outcome, planBank, type Site, UTC_TABLE } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { evaluateFormula } from '../support/evaluate-formula.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { SEED } from '../support/soak.js';

const drives = { name: 'drives', fundamentalA: 200, spectrum: 'six-pulse' as const };
const stage = { count: 4, ratedKvar: 50, ratedV: 480, reactorPct: 7 };
const ieee = { rules: 'ieee' as const, frequencyHz: 60, bus: { nominalV: 480, highestV: 508 } };

const PAPERS = {
  currency: 'EUR',
  tariff: { clauses: [{ name: 'kvarh', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.005 }] },
  prices: {
    perKvar: 40,
    perStage: 55,
    maintenancePerYear: 12,
    switches: [{ kind: 'contactor', perStage: 38, lifeSwitchings: 2000 }],
  },
} satisfies Partial<Site>;
const DEAR = { prices: { ...PAPERS.prices, perKvar: 9000 } } satisfies Partial<Site>;

const SITES: [string, Partial<Site>][] = [
  ['one plain group at the bus', { bank: { stages: [{ ...stage, reactorPct: 0 }] } }],
  [
    'tuned groups, lights and drives',
    {
      loads: {
        distorting: [drives, { name: 'lights', fundamentalA: 60, spectrum: 'single-phase-electronic' }],
        backgroundPct: [{ orderH: 5, pct: 1 }],
      },
      bank: { stages: [{ ...stage, count: 2, ratedKvar: 25 }, stage], interStageUh: 1 },
    },
  ],
  [
    'two reactor ratios, resistors, switches and a fixed stage',
    {
      loads: { distorting: [drives], backgroundPct: [] },
      control: { reconnectDelayS: 60 },
      bank: {
        stages: [
          { ...stage, dischargeOhm: 60_000, switchPeakA: 4000, reactorMaxA: 120 },
          { count: 1, ratedKvar: 12.5, ratedV: 440, fixed: true },
        ],
      },
    },
  ],
  [
    'metered at the primary of two transformers',
    {
      meteredAt: 'primary',
      target: { powerFactor: 0.97 },
      supply: {
        faultLevelMva: { max: 300, min: 150 },
        arrangement: 'parallel',
        transformers: [
          { ratedKva: 630, impedancePct: 4, loadLossKw: 6.5, noLoadLossKw: 1.1, noLoadCurrentPct: 1.4 },
          { ratedKva: 1000, impedancePct: 6, loadLossKw: 10.5, noLoadLossKw: 1.7, noLoadCurrentPct: 1.2 },
        ],
      },
      bank: { stages: [stage] },
    },
  ],
  [
    'metered at the primary of one',
    { meteredAt: 'primary', loads: { distorting: [drives], backgroundPct: [] }, bank: { stages: [stage] } },
  ],
  [
    'the other rules at 60 Hz, no transformer',
    {
      ...ieee,
      supply: { faultLevelMva: { max: 20, min: 12 }, rOverX: 0.3 },
      loads: { distorting: [drives], backgroundPct: [] },
      bank: { stages: [{ ...stage, ratedV: 600 }], interStageUh: 3 },
    },
  ],
  ['export held against the target', { target: { onExport: 'absolute' }, bank: { stages: [stage] } }],
  ['no delay before a stage may come back', { control: { reconnectDelayS: 0 }, bank: { stages: [stage] } }],
  ['a priced bank', { ...PAPERS, bank: { stages: [stage] } }],
  ['a priced bank, no discount', { ...PAPERS, finance: { discountPct: 0 }, bank: { stages: [stage] } }],
  ['a bank that is never paid back', { ...PAPERS, ...DEAR, bank: { stages: [stage] } }],
  ['bills without prices', { tariff: PAPERS.tariff, bank: { stages: [stage] } }],
  ['a single stage', { bank: { stages: [{ ...stage, count: 1 }] } }],
];

function assessed(parts: Partial<Site>): Outcome {
  const columns = driftingLoad(chance(SEED), 120, 600, 0.9);
  const activeKw = columns.activeKw.map((kw, i) => (i % 7 === 0 ? -kw / 4 : kw));
  return assessBank(madeSite(parts), madeRecord({ ...columns, activeKw }), UTC_TABLE);
}

const OUTCOMES: [string, () => Outcome][] = [
  ...SITES.map(([name, parts]): [string, () => Outcome] => [name, () => assessed(parts)]),
  ['a plan', () => planBank(madeSite(), madeRecord(driftingLoad(chance(SEED), 120, 300, 0.9)), UTC_TABLE)],
  ['no bank at all', () => planBank(madeSite(), madeRecord({ activeKw: [100], reactiveKvar: [0] }), UTC_TABLE)],
  ['no energy', () => planBank(madeSite(), madeRecord({ activeKw: [0, 0], reactiveKvar: [0, 0] }), UTC_TABLE)],
];

function worked(figure: Figure): { value: number; used: ReadonlySet<string> } {
  return evaluateFormula(figure.formula, new Map(figure.inputs.map(({ symbol, value }) => [symbol, value])));
}

describe.each(OUTCOMES)('figures of %s', (_, outcome) => {
  const { result } = outcome();

  it('are their formulas with the inputs put in, to 1e-9', () => {
    for (const figure of result.figures) {
      const { value } = worked(figure);
      const told = `${figure.id}: ${value} against ${figure.value}`;
      expect(Math.abs(value - figure.value), told).toBeLessThanOrEqual(1e-9 * Math.abs(figure.value));
    }
  });

  it('name every symbol of the formula once and no other', () => {
    for (const figure of result.figures) {
      const symbols = figure.inputs.map(({ symbol }) => symbol);
      expect([...worked(figure).used].sort(), figure.id).toEqual([...symbols].sort());
      expect(new Set(symbols).size).toBe(symbols.length);
    }
  });

  it('have an identity, a source and a finite value each', () => {
    expect(new Set(result.figures.map(({ id }) => id)).size).toBe(result.figures.length);
    for (const figure of result.figures) {
      expect(figure.source.length, figure.id).toBeGreaterThan(0);
      expect(Number.isFinite(figure.value), figure.id).toBe(true);
    }
  });

  it('equal the result’s own entries where their name is a path into it', () => {
    let met = 0;
    for (const { id, value } of result.figures) {
      const entry = id
        .replaceAll(/\[(\d+)\]/g, '.$1')
        .split('.')
        .reduce<unknown>((part, key) => (part as Record<string, unknown> | undefined)?.[key], result);
      if (typeof entry !== 'number') continue;
      met++;
      expect(value, id).toBe(entry);
    }
    expect(met).toBeGreaterThan(3);
  });
});

describe('the figures of money', () => {
  const ids = (parts: Partial<Site>) =>
    assessed({ bank: { stages: [stage] }, ...parts }).result.figures.flatMap(({ id }) =>
      id.startsWith('money.') ? [id] : [],
    );

  it('stand with tariff and prices, and none of a payback or a rate that there is not', () => {
    const worth = ['money.savingPerYear', 'money.npv', 'money.paybackYears', 'money.discountedPaybackYears'];
    expect(ids(PAPERS)).toEqual([...worth, 'money.irrPct', 'money.annuityPerYear']);
    expect(ids({ ...PAPERS, ...DEAR })).not.toContain('money.paybackYears');
    expect(ids({ tariff: PAPERS.tariff })).toEqual(['money.savingPerYear']);
    expect(ids({})).toEqual([]);
  });
});

describe('the evaluator that reads them', () => {
  it.each([
    ['1 + 2 · 3^2', 19],
    ['−2^2 + 8 / 2 / 2', -2],
    ['√(3^2 + 4^2)', 5],
    ['max(0, a − b) · ln(c)', 0],
    ['2 · π', 2 * Math.PI],
    ['a / √(a^2 + b^2)', 0.6],
  ])('%s is %d', (formula, value) => {
    const values = new Map([
      ['a', 3],
      ['b', 4],
      ['c', 2],
    ]);
    expect(evaluateFormula(formula, values).value).toBeCloseTo(value, 12);
  });

  it.each([['a +'], ['(a'], ['a b'], ['d'], ['a ? b']])('refuses %s', (formula) => {
    expect(() => evaluateFormula(formula, new Map([['a', 1]]))).toThrow();
  });
});
