import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { readSite } from './read-site.js';

const base = {
  name: 'Invented Mill',
  timeZone: 'Europe/Dublin',
  rules: 'iec',
  frequencyHz: 50,
  bus: { nominalV: 400 },
  supply: { faultLevelMva: { max: 250 } },
};

const windows = [
  { name: 'day', days: [1, 2, 3, 4, 5], hours: [[7, 22.5]] },
  { name: 'night', days: [1, 2, 3, 4, 5], hours: [[22.5, 7]] },
  { name: 'weekend', days: [6, 7, 8] },
];
const prices = { day: 0.2, night: 0.1, weekend: 0.1 };
const steps = {
  form: 'steps',
  steps: [
    { from: 0, pct: 5 },
    { from: 0.9, pct: 0 },
  ],
};
const points = {
  form: 'points',
  reference: 0.9,
  below: [
    { downTo: 0.8, pctPerPoint: 1 },
    { downTo: 0, pctPerPoint: 2 },
  ],
  above: [{ upTo: 0.95, pctPerPoint: -0.5 }],
};
const energy = { name: 'energy', kind: 'energy' };

function problemsOf(tariff: unknown) {
  try {
    readSite({ ...base, tariff });
  } catch (error) {
    if (error instanceof InputProblem) return error.problems;
    throw error;
  }
  return [];
}

const oneClause = (clause: unknown) => ({ windows, clauses: [clause] });

const refused: [why: string, tariff: unknown, path: string, code: string][] = [
  ['an unknown kind', oneClause({ name: 'x', kind: 'rent' }), 'tariff.clauses[0].kind', 'out-of-range'],
  ['an unknown key', oneClause({ ...energy, pricePerUnit: 1, price: 1 }), 'tariff.clauses[0].price', 'unknown-key'],
  ['no price', oneClause(energy), 'tariff.clauses[0].pricePerUnit', 'missing'],
  ['two prices', oneClause({ ...energy, pricePerUnit: 1, prices }), 'tariff.clauses[0].prices', 'inconsistent'],
  [
    'a window that is not there',
    oneClause({ ...energy, pricePerUnit: 1, windows: ['peak'] }),
    'tariff.clauses[0].windows[0]',
    'inconsistent',
  ],
  [
    'a price for a window that is not there',
    oneClause({ ...energy, prices: { ...prices, peak: 1 } }),
    'tariff.clauses[0].prices.peak',
    'inconsistent',
  ],
  [
    'a month 13',
    oneClause({ ...energy, pricePerUnit: 1, months: [13] }),
    'tariff.clauses[0].months[0]',
    'out-of-range',
  ],
  ['an hour 25', { windows: [{ name: 'w', hours: [[0, 25]] }] }, 'tariff.windows[0].hours[0][1]', 'out-of-range'],
  ['two windows of one name', { windows: [{ name: 'w' }, { name: 'w' }] }, 'tariff.windows[1].name', 'inconsistent'],
  [
    'two clauses of one name',
    {
      clauses: [
        { ...energy, pricePerUnit: 1 },
        { ...energy, pricePerUnit: 1 },
      ],
    },
    'tariff.clauses[1].name',
    'inconsistent',
  ],
  [
    'a percentage of a later clause',
    {
      clauses: [
        { name: 'p', kind: 'percent', scale: steps, applies: ['energy'] },
        { ...energy, pricePerUnit: 1 },
      ],
    },
    'tariff.clauses[0].applies[0]',
    'inconsistent',
  ],
  [
    'blocks that end',
    oneClause({ ...energy, blocks: [{ upTo: 10, pricePerUnit: 1 }] }),
    'tariff.clauses[0].blocks[0].upTo',
    'inconsistent',
  ],
  [
    'an open block before the last',
    oneClause({
      ...energy,
      blocks: [
        { upTo: null, pricePerUnit: 1 },
        { upTo: null, pricePerUnit: 2 },
      ],
    }),
    'tariff.clauses[0].blocks[0].upTo',
    'inconsistent',
  ],
  [
    'blocks that fall',
    oneClause({
      ...energy,
      blocks: [
        { upTo: 10, pricePerUnit: 1 },
        { upTo: 5, pricePerUnit: 1 },
        { upTo: null, pricePerUnit: 2 },
      ],
    }),
    'tariff.clauses[0].blocks[1].upTo',
    'inconsistent',
  ],
  [
    'kvarh without what is free',
    oneClause({ name: 'q', kind: 'kvarhBeyondRatio', pricePerUnit: 1 }),
    'tariff.clauses[0].freeRatio',
    'missing',
  ],
  [
    'tiers and what is free',
    oneClause({ name: 'q', kind: 'kvarhBeyondRatio', freeRatio: 0.3, tiers: [{ aboveRatio: 0.3, pricePerUnit: 1 }] }),
    'tariff.clauses[0].freeRatio',
    'inconsistent',
  ],
  [
    'ratios by windows without windows',
    oneClause({ name: 'q', kind: 'kvarhBeyondRatio', freeRatio: 0.3, pricePerUnit: 1, byWindow: true }),
    'tariff.clauses[0].windows',
    'missing',
  ],
  [
    'a share that is not said',
    oneClause({ name: 'd', kind: 'demand', basis: 'kWOrKvaShare', pricePerUnit: 1 }),
    'tariff.clauses[0].kvaShare',
    'missing',
  ],
  [
    'a contract without a price for its overrun',
    oneClause({ name: 'd', kind: 'contractedDemand', basis: 'kVA', contracted: 250, pricePerUnit: 4.5 }),
    'tariff.clauses[0].overrunPricePerUnit',
    'missing',
  ],
  [
    'bands that rise',
    oneClause({
      name: 'd',
      kind: 'demand',
      basis: 'kW',
      pricePerUnit: 1,
      scale: {
        ...points,
        below: [
          { downTo: 0.5, pctPerPoint: 1 },
          { downTo: 0.8, pctPerPoint: 1 },
        ],
      },
    }),
    'tariff.clauses[0].scale.below[1].downTo',
    'inconsistent',
  ],
  [
    'a band above its reference',
    oneClause({
      name: 'd',
      kind: 'demand',
      basis: 'kW',
      pricePerUnit: 1,
      scale: { ...points, below: [{ downTo: 0.95, pctPerPoint: 1 }] },
    }),
    'tariff.clauses[0].scale.below[0].downTo',
    'inconsistent',
  ],
  [
    'steps that fall',
    oneClause({
      name: 'd',
      kind: 'demand',
      basis: 'kW',
      pricePerUnit: 1,
      scale: {
        form: 'steps',
        steps: [
          { from: 0.9, pct: 0 },
          { from: 0, pct: 5 },
        ],
      },
    }),
    'tariff.clauses[0].scale.steps[1].from',
    'inconsistent',
  ],
  [
    'a least above the greatest',
    oneClause({ name: 'd', kind: 'demand', basis: 'kW', pricePerUnit: 1, scale: { ...steps, minPct: 5, maxPct: 1 } }),
    'tariff.clauses[0].scale.minPct',
    'inconsistent',
  ],
  [
    'a formula longer than 1 000 characters',
    oneClause({ name: 'f', kind: 'formula', expression: '1+'.repeat(501) }),
    'tariff.clauses[0].expression',
    'out-of-range',
  ],
  ['a holiday that does not exist', { holidays: ['2025-02-29'] }, 'tariff.holidays[0]', 'out-of-range'],
  ['a bill of no month', { billed: [{ month: '2024-13', total: 1 }] }, 'tariff.billed[0].month', 'out-of-range'],
];

describe('a tariff', () => {
  it.each(refused)('with %s is refused at its path', (_why, tariff, path, code) => {
    expect(problemsOf(tariff)).toEqual([expect.objectContaining({ path, code })]);
  });

  it('of every kind of clause is accepted', () => {
    const clauses = [
      { name: 'standing', kind: 'fixed', amountPerMonth: 30, taxed: false },
      { ...energy, prices },
      {
        name: 'blocks',
        kind: 'energy',
        of: 'kVAh',
        blocks: [
          { upTo: 1000, pricePerUnit: 0.2 },
          { upTo: null, pricePerUnit: 0.1 },
        ],
      },
      {
        name: 'by factor',
        kind: 'energyByFactor',
        per: 'hour',
        pricePerUnit: 0.2,
        scale: { form: 'ratio', reference: 0.92, belowPct: 100, abovePct: 0 },
      },
      {
        name: 'kvarh',
        kind: 'kvarhBeyondRatio',
        freeRatio: 0.33,
        pricePerUnit: 0.02,
        windows: ['day', 'night'],
        byWindow: true,
        reactive: 'net',
      },
      {
        name: 'tiers',
        kind: 'kvarhBeyondRatio',
        tiers: [
          { aboveRatio: 0.33, pricePerUnit: 0.04 },
          { aboveRatio: 0.75, pricePerUnit: 0.06 },
        ],
        cumulative: false,
      },
      { name: 'kvar', kind: 'kvarBeyondRatio', ratio: 0.6197, at: 'maxKw', pricePerUnit: 1.5 },
      {
        name: 'demand',
        kind: 'demand',
        basis: 'kWOrKvaShare',
        kvaShare: 0.9,
        pricePerUnit: 9,
        wholeUnits: 'up',
        minimum: 50,
        ratchet: { pct: 80, months: 11, of: [6, 7, 8] },
        scale: points,
      },
      { name: 'surcharge', kind: 'percent', applies: ['energy', 'demand'], scale: steps },
      { name: 'levy', kind: 'percent', applies: 'all', scale: { form: 'steps', steps: [{ from: 0, pct: 1 }] } },
      { name: 'formula', kind: 'formula', expression: 'max(maxKva - 100, 0) * 1.5' },
    ];
    const tariff = {
      name: 'Invented tariff',
      decimals: null,
      taxPct: '20 %',
      demandS: '30 min',
      factor: { basis: 'maxima', decimals: 4 },
      holidays: ['2024-12-25'],
      windows,
      clauses,
      billed: [{ month: '2024-01', total: 1234.56 }],
    };
    expect(problemsOf(tariff)).toEqual([]);
    expect(readSite({ ...base, tariff }).tariff).toMatchObject({ taxPct: 20, demandS: 1800 });
  });

  it('that is empty is accepted: it has no clauses yet', () => {
    expect(problemsOf({})).toEqual([]);
  });
});
