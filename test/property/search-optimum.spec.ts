// Second method: every candidate of a small catalogue judged and priced in full by `assessBank` and sorted by the written
// order (test/support/slow-search.ts), against the search, which leaves most of them unsimulated.
import { describe, expect, it } from 'vitest';
import {
  type CatalogueInput,
  type Outcome,
  type PriceBook,
  planBank,
  type Site,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { madeTariff } from '../support/made-tariff.js';
import { type SearchCase, slowSearch } from '../support/slow-search.js';
import { runs, SEED } from '../support/soak.js';

function madeCatalogue(random: Chance): CatalogueInput {
  const contactor = { kind: 'contactor', maxStageKvar: random.oneOf([25, 50]), stepDelayS: 10, reconnectDelayS: 60 };
  const thyristor = { kind: 'thyristor', maxStageKvar: 100, stepDelayS: 0, reconnectDelayS: 0, limitsInrush: true };
  return {
    stageKvar: random.oneOf([
      [12.5, 25, 50],
      [10, 20],
      [25, 50],
      [20, 50],
    ]),
    ratedV: random.oneOf([[440], [480], [440, 525]]),
    reactorPct: random.oneOf([[0], [0, 7], [7]]),
    maxStages: random.whole(1, 3),
    evenSteps: random.next() < 0.6,
    cabinets: [{ name: 'wall', maxKvar: 80, maxStages: 2 }],
    switches: random.oneOf([[contactor], [contactor, thyristor], [thyristor, contactor]]),
    setPoints: random.oneOf([[0.95, 0.98], [0.92, 0.96, 1], [0.97]]),
    mustMeetTarget: random.next() < 0.6,
    interStageUh: random.oneOf([2, 500]),
    ...(random.next() < 0.3 ? { maxTotalKvar: random.between(30, 150) } : {}),
    ...(random.next() < 0.4 ? { kvarBasis: 'effective' as const } : {}),
  };
}

function madePrices(random: Chance): PriceBook {
  const cheap = random.oneOf([0.02, 0.2, 1]);
  return {
    invented: true,
    perKvar: 9 * cheap,
    perStage: 55 * cheap,
    reactors: [{ reactorPct: 7, perKvar: 11.5 * cheap }],
    installationFixed: 700 * cheap,
    fixed: 850 * cheap,
    contingencyPct: 5,
    switches: [
      {
        kind: 'contactor',
        perStage: 38 * cheap,
        perKvar: 0.9 * cheap,
        lifeSwitchings: random.oneOf([20, 500, 150_000]),
      },
      { kind: 'thyristor', perStage: 190 * cheap, lossWPerKvar: 1.5 },
    ],
    cabinets: [{ name: 'wall', price: 640 * cheap }],
    maintenancePerYear: 20 * cheap,
    maintenancePerStage: 14 * cheap,
    lossWPerKvar: { plain: 1.8, reactor: 6.5 },
    lossPricePerKwh: random.oneOf([0.01, 0.11]),
    capacitorLifeYears: random.oneOf([3, 8.5]),
    replacementFactor: 1.25,
  };
}

function madeCase(seed: number): SearchCase {
  const random = chance(seed);
  const columns = driftingLoad(random, 70, random.between(60, 250), random.between(0.3, 0.9));
  const voltageV = random.next() < 0.2 ? { voltageV: columns.activeKw.map(() => random.between(395, 425)) } : {};
  // Twelve hours an interval make two months; ten minutes let a reconnection delay and the steps' pace count.
  const intervalS = random.oneOf([43_200, 43_200, 600]);
  const loads: Site['loads'] = {
    distorting:
      random.next() < 0.6 ? [] : [{ name: 'drives', fundamentalA: random.between(10, 120), spectrum: 'six-pulse' }],
    backgroundPct: [],
    dampingKw: { max: 0 },
  };
  const ownBank = { stages: [{ count: 2, ratedKvar: 25, ratedV: 480 }], interStageUh: 500, switchKind: 'contactor' };
  const site = madeSite({
    meteredAt: random.oneOf(['bus', 'bus', 'primary']),
    recordedBank: { state: random.oneOf(['none', 'out', 'none', 'unknown']) },
    target: { powerFactor: random.oneOf([0.85, 0.9, 0.95]) },
    loads,
    catalogue: madeCatalogue(random),
    prices: madePrices(random),
    finance: {
      horizonYears: random.whole(1, 12),
      discountPct: random.oneOf([0, 8, 15]),
      costGrowthPct: random.oneOf([0, 3]),
    },
    tariff: { ...madeTariff(random, [intervalS]), billed: [] },
    control: {
      mode: random.oneOf(['nearestLevel', 'nearestLevel', 'oneByOne']),
      ...(random.next() < 0.2 ? { setPointPowerFactor: 0.97 } : {}),
    },
    ...(random.next() < 0.5 ? { bank: ownBank } : {}),
  });
  return {
    site,
    record: madeRecord({ ...columns, ...voltageV, intervalS, firstS: Date.UTC(2024, 10, 10) / 1000 }),
    zone: UTC_TABLE,
  };
}

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
    for (let k = 0; k < runs(12, 300); k++) {
      const made = madeCase(SEED + k);
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
