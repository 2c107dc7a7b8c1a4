// Second method: the bank with the stages added, judged and priced as a bank of its own.
import { describe, expect, it } from 'vitest';
import { assessBank, type Site, UTC_TABLE, withRobustness } from '#libs/engine/index.js';
import { madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';

const record = madeRecord({ activeKw: [100, 120, 90, 60], reactiveKvar: [80, 95, 70, 40], intervalS: 3600 });

function site(large: number): Site {
  return madeSite({
    bank: {
      stages: [
        { count: 1, ratedKvar: 12.5, ratedV: 440 },
        { count: large, ratedKvar: 25, ratedV: 440 },
      ],
    },
    catalogue: { cabinets: [{ name: 'wall', maxKvar: 90, maxStages: 4 }] },
    tariff: { clauses: [{ name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0.3, pricePerUnit: 0.05 }] },
    prices: { perKvar: 9, perStage: 55, contingencyPct: 5, cabinets: [{ name: 'wall', price: 640 }] },
  });
}

describe('what more stages need', () => {
  it('is what the larger bank needs, a second cabinet among it', () => {
    const now = withRobustness(assessBank(site(3), record, UTC_TABLE)).result;
    expect(now.spareWays.map(({ added }) => added)).toEqual([1, 2, 3]);
    for (const { added, ...needs } of now.spareWays) {
      const { result } = assessBank(site(3 + added), record, UTC_TABLE);
      expect(needs.ratedKvar).toBe(25);
      expect(needs.effectiveKvar).toBeCloseTo(result.bank.effectiveKvar, 9);
      expect(needs.conductorMinA).toBeCloseTo(result.conductorMinA, 9);
      expect(needs.capital).toBeCloseTo(result.money!.capital!.total - now.money!.capital!.total, 6);
      expect(needs.verdict).toBe(result.verdict);
    }
    // 25 · 9 + 55, and 640 for the cabinet that four ways and 90 kvar no longer do for, with 5 % on all
    expect(now.spareWays[0]!.capital).toBeCloseTo((25 * 9 + 55 + 640) * 1.05, 9);
  });

  it('has no price without prices, and says nothing before it is asked', () => {
    const { prices: _, ...without } = site(3);
    const bare = withRobustness(assessBank(without, record, UTC_TABLE)).result.spareWays;
    expect(bare.map(({ capital }) => capital)).toEqual([null, null, null]);
    expect(assessBank(site(3), record, UTC_TABLE).result.spareWays).toEqual([]);
  });
});
