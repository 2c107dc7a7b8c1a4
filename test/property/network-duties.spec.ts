// Second method: every load alone, the background alone, complex phasors from the nameplates, magnitudes combined last,
// and the duties of every level and corner from them (test/support/slow-flows.ts, slow-duties.ts), against `assessBank`.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  type NetworkLevel,
  type Outcome,
  type Site,
  SPECTRUM_NAMES,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { type SlowRow, slowDuties } from '../support/slow-duties.js';
import { type SlowBasis, type SlowFlow, slowFlows } from '../support/slow-flows.js';
import { runs, SEED } from '../support/soak.js';

function madeLoads(random: Chance): Site['loads'] {
  const distorting = Array.from({ length: random.whole(0, 3) }, (_, k) => ({
    name: `load ${k}`,
    fundamentalA: random.between(20, 300),
    ...(random.next() < 0.6
      ? { spectrum: random.oneOf(SPECTRUM_NAMES) }
      : {
          orders: [2, 2.5, 3, 5, 7, 9.7, 11, 50]
            .filter(() => random.next() < 0.5)
            .concat(13)
            .map((orderH) => ({ orderH, pct: random.between(0, 20) })),
        }),
  }));
  const backgroundPct = [3, 5, 7, 11, 23]
    .filter(() => random.next() < 0.4)
    .map((orderH) => ({ orderH, pct: random.between(0.1, 2.5) }));
  return {
    motorSharePct: random.oneOf([0, 40, 100]),
    distorting,
    backgroundPct,
    dampingKw: random.oneOf([{ max: 300, min: 100 }, { max: 200 }, { max: 0 }, { max: 50, min: 50 }]),
    summation: random.oneOf(['exponent', 'arithmetic']),
  };
}

function madeCase(seed: number): { site: Site; outcome: Outcome } {
  const random = chance(seed);
  const rules = random.oneOf(['iec', 'ieee'] as const);
  const nominalV = random.oneOf([400, 480, 690]);
  const transformer = () => ({
    ratedKva: random.oneOf([630, 1000]),
    impedancePct: random.between(4, 7),
    loadLossKw: random.between(3, 10),
    ...(random.next() < 0.5 ? {} : { impedanceTolerancePct: random.oneOf([0, 7.5]) }),
  });
  const stage = () => ({
    count: random.whole(1, 3),
    ratedKvar: random.oneOf([12.5, 25, 50]),
    ratedV: nominalV * random.oneOf([1, 1.1, 1.31]),
    reactorPct: random.oneOf([0, 5.67, 7, 14]),
    reactorQuality: random.oneOf([20, 30, 60]),
    fixed: random.next() < 0.15,
    ...(random.next() < 0.3 ? { reactorMaxA: random.between(30, 120) } : {}),
  });
  const max = random.between(20, 300);
  const site = madeSite({
    rules,
    frequencyHz: random.oneOf([50, 60]),
    bus: { nominalV, highestV: nominalV * random.between(1, 1.1) },
    supply: {
      faultLevelMva: { max, min: max * random.oneOf([0.4, 1]) },
      rOverX: random.between(0.05, 0.5),
      resistanceExponent: random.oneOf([0, 0.5, 1]),
      arrangement: 'parallel',
      transformers: Array.from({ length: random.whole(0, 2) }, transformer),
    },
    loads: madeLoads(random),
    limits: { emcClass: random.oneOf([1, 2, 3] as const) },
    bank: { stages: Array.from({ length: random.whole(1, 3) }, stage), interStageUh: 1 },
  });
  const record = madeRecord(driftingLoad(random, 20, random.between(100, 900), 0.8));
  return { site, outcome: assessBank(site, record, UTC_TABLE) };
}

function basisOf({ site, bank, series }: Outcome): SlowBasis {
  const kva = Array.from(series.busKw, (kw, i) => Math.hypot(kw, series.busKvar[i]!));
  return { site, groups: bank.groups, loadA: (1000 * Math.max(...kva)) / (Math.sqrt(3) * site.nominalV) };
}

const close = (a: number, b: number): boolean => Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b)) + 1e-12;

function rowDifference(found: SlowRow | undefined, expected: SlowRow): string | null {
  if (found === undefined) return 'missing';
  const same =
    close(found.value, expected.value) &&
    close(found.limit ?? -1, expected.limit ?? -1) &&
    close(found.levelKvar ?? -1, expected.levelKvar ?? -1) &&
    JSON.stringify(found.corner) === JSON.stringify(expected.corner) &&
    found.orderH === expected.orderH &&
    found.verdict === expected.verdict;
  return same ? null : `${JSON.stringify(found)} against ${JSON.stringify(expected)}`;
}

// Nominal is the first flow of a level; worst the greatest distortion, the earlier where they are equal.
function levelDifference(level: NetworkLevel, flows: SlowFlow[], nominalV: number): string | null {
  const ofLevel = flows.filter(({ levelKvar }) => close(levelKvar, level.levelKvar));
  const worst = ofLevel.reduce((kept, flow) =>
    flow.voltageDistortionPct > kept.voltageDistortionPct * (1 + 1e-9) ? flow : kept,
  );
  const expected = level.case === 'worst' ? worst : ofLevel[0]!;
  const pairs = [
    [level.voltageDistortionPct, expected.voltageDistortionPct],
    [level.currentDistortionPct, expected.currentDistortionPct],
    ...level.orders.flatMap((order, k) => {
      const { busV, sourceA, bankA, orderH } = expected.orders[k]!;
      return [
        [order.orderH, orderH],
        [order.voltagePct, (100 * Math.sqrt(3) * busV) / nominalV],
        [order.sourceA, sourceA],
        [order.bankA, bankA],
      ];
    }),
  ];
  const same =
    JSON.stringify(level.corner) === JSON.stringify(expected.corner) &&
    level.orders.length === expected.orders.length &&
    pairs.every(([found, wanted]) => close(found!, wanted!));
  return same ? null : JSON.stringify(expected);
}

const JUDGED_ELSEWHERE = ['discharge', 'inrush current', 'inrush current, exact'];

describe(`duties and network by direct phasors (seed ${SEED})`, () => {
  const cases = Array.from({ length: runs(60, 3000) }, (_, k) => madeCase(SEED + k));

  it('every row has the same value, limit, level, corner, order and verdict', () => {
    for (const { site, outcome } of cases) {
      const expected = slowDuties(basisOf(outcome), outcome.result.network.shortCircuitMinMva);
      const found = outcome.result.duties.filter(({ name }) => !JUDGED_ELSEWHERE.includes(name));
      expect(found.length, JSON.stringify(site)).toBe(expected.length);
      for (const row of expected) {
        const match = found.find(({ name, group }) => name === row.name && group === row.group);
        expect(rowDifference(match, row), JSON.stringify(site)).toBeNull();
      }
    }
  });

  it('every level has the same nominal and worst case', () => {
    for (const { outcome } of cases) {
      const flows = slowFlows(basisOf(outcome));
      for (const level of outcome.result.network.levels) {
        expect(levelDifference(level, flows, outcome.site.nominalV), JSON.stringify(level)).toBeNull();
      }
    }
  });

  it('has cases of every verdict on capacitors and on the network', () => {
    const rows = cases.flatMap(({ outcome }) => outcome.result.duties);
    for (const name of ['capacitor current', 'capacitor voltage, highest', 'voltage distortion', 'harmonic voltage']) {
      const verdicts = new Set(rows.filter((row) => row.name === name).map(({ verdict }) => verdict));
      expect([...verdicts].sort(), name).toEqual(['avoid', 'clear', 'watch']);
    }
  });
});
