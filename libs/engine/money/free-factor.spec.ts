// Values by hand: a ratio r of kvarh that is free is a power factor of 1/√(1 + r²); a scale's is where it turns to 0.
import { describe, expect, it } from 'vitest';
import { freeFactor } from './free-factor.js';
import type { Clause } from './papers.js';

const of = (...clauses: Clause[]): number | null => freeFactor({ clauses })?.powerFactor ?? null;
const energy: Clause = { name: 'energy', kind: 'energy', pricePerUnit: 0.1 };
const kvarh = (more: object): Clause => ({ name: 'kvarh', kind: 'kvarhBeyondRatio', ...more });
const percent = (scale: Extract<Clause, { kind: 'percent' }>['scale']): Clause => ({
  ...{ name: 'factor', kind: 'percent', applies: 'all', scale },
});

describe('the power factor a tariff charges below', () => {
  it.each<[string, Clause, number | null]>([
    ['3/4 kvarh a kWh free', kvarh({ freeRatio: 0.75, pricePerUnit: 0.01 }), 0.8],
    [
      'tiers, the first of them without a price',
      kvarh({
        tiers: [
          { aboveRatio: 0.3, pricePerUnit: 0 },
          { aboveRatio: 0.75, pricePerUnit: 0.01 },
        ],
      }),
      0.8,
    ],
    ['nothing free', kvarh({ pricePerUnit: 0.01 }), 1],
    ['leading kvarh', kvarh({ freeRatio: 0, pricePerUnit: 0.01, reactive: 'leading' }), null],
    ['kvar beyond 4/3 of the kW', { name: 'kvar', kind: 'kvarBeyondRatio', ratio: 4 / 3, pricePerUnit: 2 }, 0.6],
    ['points', percent({ form: 'points', reference: 0.9, below: [{ downTo: 0, pctPerPoint: 1 }] }), 0.9],
    [
      'points with a band that is free',
      percent({
        form: 'points',
        reference: 0.95,
        below: [
          { downTo: 0.85, pctPerPoint: 0 },
          { downTo: 0, pctPerPoint: 2 },
        ],
      }),
      0.85,
    ],
    [
      'whole points',
      percent({ form: 'points', reference: 0.92, count: 'whole', below: [{ downTo: 0, pctPerPoint: 1 }] }),
      0.92,
    ],
    [
      'a bonus above, no charge',
      percent({ form: 'points', reference: 0.9, above: [{ upTo: 1, pctPerPoint: -1 }] }),
      null,
    ],
    [
      'steps',
      percent({
        form: 'steps',
        steps: [
          { from: 0, pct: 8 },
          { from: 0.8, pct: 3 },
          { from: 0.93, pct: 0 },
          { from: 0.97, pct: -1 },
        ],
      }),
      0.93,
    ],
    ['reference over factor', percent({ form: 'ratio', reference: 0.98, belowPct: 100, abovePct: 0 }), 0.98],
    [
      'demand lifted to a reference',
      {
        name: 'demand',
        kind: 'demand',
        basis: 'kW',
        pricePerUnit: 5,
        scale: { form: 'ratio', reference: 0.9, belowPct: 100, abovePct: 50 },
      },
      0.9,
    ],
    ['demand in kVA without a scale', { name: 'demand', kind: 'demand', basis: 'kVA', pricePerUnit: 5 }, null],
  ])('%s', (_, clause, expected) => {
    const found = of(energy, clause);
    if (expected === null) expect(found).toBeNull();
    else expect(found).toBeCloseTo(expected, 12);
  });

  it('is that of the strictest line, by its name', () => {
    const strict = percent({ form: 'ratio', reference: 0.95, belowPct: 50, abovePct: 0 });
    expect(freeFactor({ clauses: [kvarh({ freeRatio: 0.75, pricePerUnit: 1 }), strict] })).toEqual({
      name: 'factor',
      powerFactor: 0.95,
    });
    expect(freeFactor({})).toBeNull();
  });
});
