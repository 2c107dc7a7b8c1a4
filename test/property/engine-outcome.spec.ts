// What the outcome lists beside the duties, each worked out again from its series: worst intervals, share inside the
// target, margins over the orders, the rival bank, cautions, remarks on the record's length.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  type Outcome,
  type Site,
  tanFromPowerFactor,
  UTC_TABLE,
  voltageLimits,
} from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { slowFlows } from '../support/slow-flows.js';
import { runs, SEED } from '../support/soak.js';

const drives: Site['loads'] = {
  distorting: [{ name: 'drives', fundamentalA: 180, spectrum: 'six-pulse' }],
  backgroundPct: [{ orderH: 3.5, pct: 0.4 }],
};

function madeCase(seed: number, parts: Partial<Site> = {}): Outcome {
  const random = chance(seed);
  const site = madeSite({
    meteredAt: random.oneOf(['bus', 'primary']),
    loads: drives,
    target: { powerFactor: 0.95, onExport: random.oneOf(['importOnly', 'absolute']) },
    bank: { stages: [{ count: random.whole(1, 3), ratedKvar: 50, ratedV: 525, reactorPct: random.oneOf([0, 7]) }] },
    ...parts,
  });
  const columns = driftingLoad(random, 60, random.between(100, 600), 0.9);
  const activeKw = columns.activeKw.map((kw) => (random.next() < 0.1 ? -kw : kw));
  // five hours each: twelve days and a half, enough to be planned on
  return assessBank(site, madeRecord({ ...columns, activeKw, intervalS: 18_000 }), UTC_TABLE);
}

const seeds = Array.from({ length: runs(12, 400) }, (_, k) => SEED + k);

/** kvar at the meter beyond the target's, interval by interval. */
function shortfalls({ series, site }: Outcome): number[] {
  const tan = tanFromPowerFactor(site.targetPowerFactor);
  return Array.from(series.meterKw, (kw, i) => {
    const counted = site.onExport === 'absolute' ? Math.abs(kw) : Math.max(kw, 0);
    return Math.max(0, series.meterLaggingKvar[i]! - series.meterLeadingKvar[i]! - counted * tan);
  });
}

describe(`the simulated record (seed ${SEED})`, () => {
  it('lists its worst intervals: the ten with the greatest shortfall, the earlier first where they are equal', () => {
    for (const seed of seeds) {
      const outcome = madeCase(seed);
      const short = shortfalls(outcome);
      const expected = short
        .map((kvar, i) => ({ kvar, i }))
        .filter(({ kvar }) => kvar > 1e-6)
        .sort((a, b) => b.kvar - a.kvar || a.i - b.i)
        .slice(0, 10);
      const { worstIntervals } = outcome.result.operation;
      expect(worstIntervals.map(({ beginS }) => beginS)).toEqual(expected.map(({ i }) => outcome.series.beginS[i]));
      worstIntervals.forEach((worst, k) => {
        const { i, kvar } = expected[k]!;
        expect(worst.shortfallKvar).toBeCloseTo(kvar, 9);
        expect(worst.residualKvar).toBe(outcome.series.busKvar[i]! - outcome.series.connectedKvar[i]!);
      });
    }
  });

  it('says in what share of its time the target was held', () => {
    for (const seed of seeds) {
      const outcome = madeCase(seed);
      const inside = shortfalls(outcome).filter((kvar) => kvar <= 1e-6).length;
      expect(outcome.result.operation.shareInTargetPct).toBeCloseTo((100 * inside) / 60, 9);
    }
  });
});

describe(`margins over the orders (seed ${SEED})`, () => {
  it('are the worst share of each order’s own limit, over corners and ways of connecting', () => {
    for (const seed of seeds.slice(0, runs(4, 100))) {
      const outcome = madeCase(seed);
      const { site, bank, margins } = outcome;
      const limits = voltageLimits(site.rules, site.nominalV, site.emcClass);
      const flows = slowFlows({ site, groups: bank.groups, loadA: 1 });
      // Order 3.5 of the background has no row, and so no margin.
      expect(margins.ordersH).toEqual([5, 7, 11, 13, 17, 19, 23, 25]);
      margins.levelsKvar.forEach((levelKvar, k) => {
        const ofLevel = flows.filter((flow) => Math.abs(flow.levelKvar - levelKvar) < 1e-6);
        margins.ordersH.forEach((orderH, n) => {
          const worstV = Math.max(
            ...ofLevel.map(({ orders }) => orders.find((order) => order.orderH === orderH)!.busV),
          );
          const pct = (100 * Math.sqrt(3) * worstV) / site.nominalV;
          expect(margins.sharePct[k]![n]).toBeCloseTo((100 * pct) / limits.orderPct(orderH)!, 6);
        });
      });
    }
  });
});

describe('the rival', () => {
  it('of a tuned bank is the same nameplates without reactors', () => {
    const { rival, bank } = madeCase(SEED, {
      bank: { stages: [{ count: 2, ratedKvar: 50, ratedV: 525, reactorPct: 7 }] },
    });
    expect(rival!.bank.groups).toEqual(bank.groups.map((group) => ({ ...group, reactorPct: 0 })));
    expect(rival!.levelsAll).toBe(2);
    const over = rival!.margins.sharePct.slice(1).filter((row) => row.some((share) => share > 100));
    expect(rival!.levelsOver).toBe(over.length);
  });

  it('of a plain bank that is not clear is the same nameplates behind 7 %', () => {
    const stages = [{ count: 2, ratedKvar: 50, ratedV: 400 }];
    const { rival, result } = madeCase(SEED, { bank: { stages } });
    expect(result.verdict).not.toBe('clear');
    expect(rival!.bank.groups[0]!.reactorPct).toBe(7);
  });

  it('of a plain bank that is clear is none', () => {
    const quiet = { loads: { distorting: [], backgroundPct: [] }, meteredAt: 'bus' as const };
    const stages = [{ count: 1, ratedKvar: 25, ratedV: 525 }];
    const outcome = madeCase(SEED, { ...quiet, bank: { stages, interStageUh: 20 } });
    expect(outcome.result.verdict).toBe('clear');
    expect(outcome.rival).toBeNull();
  });
});

describe('cautions', () => {
  it('are always all of them, and the first names the time and the voltage of the rules', () => {
    for (const [rules, waitS, toV] of [
      ['iec', 180, 75],
      ['ieee', 60, 50],
    ] as const) {
      const { cautions } = madeCase(SEED, { rules }).result;
      expect(cautions).toHaveLength(12);
      expect(cautions[0]).toMatchObject({ code: 'caution.storedCharge', values: { waitS, toV } });
    }
  });

  it('are all of them without a bank too', () => {
    expect(madeCase(SEED, { bank: { stages: [] } }).result.cautions).toHaveLength(12);
  });
});

describe('a record of less than a year', () => {
  const codes = (days: number): string[] => {
    const hours = Array.from({ length: days * 24 }, () => 100);
    const record = madeRecord({ activeKw: hours, reactiveKvar: hours.map(() => 40), intervalS: 3600 });
    const site = madeSite({ bank: { stages: [{ count: 1, ratedKvar: 10, ratedV: 525 }], interStageUh: 20 } });
    return assessBank(site, record, UTC_TABLE).result.reasons.map(({ code }) => code);
  };

  it.each([
    [3, 'record.short'],
    [27, 'record.short'],
    [28, 'record.partYear'],
    [359, 'record.partYear'],
  ])('of %d days says %s', (days, code) => {
    expect(codes(days)).toContain(code);
  });

  it('of 360 days says neither', () => {
    expect(codes(360).some((code) => code.startsWith('record.'))).toBe(false);
  });
});
