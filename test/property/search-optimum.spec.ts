// Second method: every candidate of a small catalogue judged and priced in full by `assessBank` and sorted by the written
// order (test/support/slow-search.ts), against the search, which leaves most of them unsimulated.
import { describe, expect, it } from 'vitest';
import { type Outcome, planBank } from '#libs/engine/index.js';
import { madeSearchCase } from '../support/made-search-case.js';
import { slowSearch } from '../support/slow-search.js';
import { runs, SEED } from '../support/soak.js';

const built = ({ bank, result }: Outcome): string =>
  [
    ...bank.groups.map((g) => `${g.count}×${g.ratedKvar}@${g.ratedV}/${g.reactorPct}`),
    result.money?.switchKind,
    result.control.setPointPowerFactor,
  ].join(' ');

describe(`the search, against trying every candidate (seed ${SEED})`, () => {
  it('finds the same optimum and recommends the same', { timeout: runs(240_000, 7_200_000) }, () => {
    const seen = { 'do nothing': 0, "keep today's bank": 0, 'new bank': 0 };
    let unsimulated = 0;
    for (let k = 0; k < runs(15, 300); k++) {
      const made = madeSearchCase(SEED + k, 'few');
      const slow = slowSearch(made);
      const { result, ...outcome } = planBank(made.site, made.record, made.zone);
      const money = result.money!;
      const told = `seed ${SEED + k}: ${built({ result, ...outcome })}; slow ${JSON.stringify(slow.best)}`;
      expect(money.recommended, told).toBe(slow.recommended);
      seen[slow.recommended]++;
      const best = money.alternatives.find(({ name }) => name === 'new bank');
      expect(best === undefined, told).toBe(slow.best === null);
      const { proof } = money;
      expect(proof!.candidates, told).toBe(slow.candidates.length);
      expect(proof!.refused + proof!.boundedAway + proof!.partlySimulated + proof!.simulated).toBe(proof!.candidates);
      unsimulated += proof!.refused + proof!.boundedAway;
      if (slow.best === null) continue;
      expect(Math.abs(best!.npv - slow.best.npv), told).toBeLessThan(1e-6 * (1 + Math.abs(slow.best.npv)));
      if (money.recommended !== 'new bank') continue;
      expect(result.bank.stages.length, told).toBe(slow.best.stages.length);
      for (const [k, { ratedKvar }] of result.bank.stages.entries()) {
        expect(ratedKvar, told).toBeCloseTo(slow.best.stages[k]!, 9);
      }
      expect(result.bank.stages[0], told).toMatchObject({ ratedV: slow.best.ratedV, reactorPct: slow.best.reactorPct });
      expect(result.control.setPointPowerFactor, told).toBe(slow.best.setPoint);
      expect(money.switchKind, told).toBe(made.site.catalogue!.switches![slow.best.kind]!.kind);
      if (proof!.lowerBoundMargin !== null) expect(proof!.lowerBoundMargin, told).toBeGreaterThan(0.005 - 1e-6);
    }
    // the cases meet every answer, and the search does leave candidates alone
    expect(seen['new bank']).toBeGreaterThan(0);
    expect(seen['do nothing']).toBeGreaterThan(0);
    expect(unsimulated).toBeGreaterThan(0);
  });
});
