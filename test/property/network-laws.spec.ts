// Laws of any linear network of passive parts, and of limits: what they say holds whatever the numbers are.
import { describe, expect, it } from 'vitest';
import { assessBank, type Result, type Site, scanSite, UTC_TABLE } from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { randomNetwork } from '../support/made-network.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

const seeds = (usual: number, soaked: number): number[] =>
  Array.from({ length: runs(usual, soaked) }, (_, k) => SEED + k);

function siteOf(random: Chance, parts: Partial<Site> = {}): Site {
  const { nominalV, supply, loads, bank } = randomNetwork(random);
  return madeSite({
    bus: { nominalV },
    supply: { ...supply, arrangement: 'parallel' },
    loads: { ...loads, distorting: [], backgroundPct: [] },
    bank: {
      stages: bank.groups.map(({ count, ratedKvar, ratedV, reactorPct, reactorQuality }) => ({
        count,
        ratedKvar,
        ratedV,
        reactorPct,
        reactorQuality,
      })),
    },
    ...parts,
  });
}

/** Twelve of these are the days a record needs to be planned on. */
const INTERVAL_S = 86_400;

function assessed(site: Site, seed: number): Result {
  const record = madeRecord({ ...driftingLoad(chance(seed), 12, 500, 0.8), intervalS: INTERVAL_S });
  return assessBank(site, record, UTC_TABLE).result;
}

describe(`impedance at the bus (seed ${SEED})`, () => {
  const ordersH = Float64Array.from({ length: 197 }, (_, k) => 1 + k * 0.25);

  it('is never raised by resistance added there', () => {
    for (const seed of seeds(60, 3000)) {
      const random = chance(seed);
      const site = siteOf(random);
      const more = { ...site.loads, motorSharePct: 0, dampingKw: { min: 0, max: random.between(1, 800) } };
      const [without] = scanSite({ ...site, loads: { ...more, dampingKw: { min: 0, max: 0 } } }, { ordersH }).levels;
      const [damped] = scanSite({ ...site, loads: more }, { ordersH }).levels;
      damped!.impedanceOhm.forEach((ohm, k) => {
        expect(ohm).toBeLessThanOrEqual(without!.impedanceOhm[k]! * (1 + 1e-12));
      });
    }
  });

  it('is half as much for two like networks side by side', () => {
    for (const seed of seeds(30, 1000)) {
      const random = chance(seed);
      const site = siteOf(random, {});
      const doubled: Site = {
        ...site,
        supply: {
          ...site.supply,
          faultLevelMva: { max: 2 * site.supply.faultLevelMva.max, min: 2 * site.supply.faultLevelMva.min! },
          transformers: site.supply.transformers!.flatMap((transformer) => [transformer, transformer]),
        },
        loads: { ...site.loads, dampingKw: { min: 0, max: 2 * site.loads!.dampingKw!.max! } },
        bank: { stages: site.bank!.stages.map((stage) => ({ ...stage, count: 2 * stage.count })) },
      };
      const [one] = scanSite(site, { ordersH }).levels;
      const [two] = scanSite(doubled, { ordersH }).levels;
      two!.impedanceOhm.forEach((ohm, k) => {
        expect(2 * ohm).toBeCloseTo(one!.impedanceOhm[k]!, 9);
      });
    }
  });
});

describe(`the parallel order (seed ${SEED})`, () => {
  it('moves up with a stiffer supply, plain and tuned; below the tuned order it stays', () => {
    let moved = 0;
    for (const seed of seeds(60, 3000)) {
      const random = chance(seed);
      const reactorPct = random.oneOf([0, 5.67, 7, 14]);
      const stages = [{ count: random.whole(1, 8), ratedKvar: 50, ratedV: 480, reactorPct, reactorQuality: 80 }];
      const orderAt = (faultMva: number): number | null => {
        const site = madeSite({
          supply: { faultLevelMva: { max: faultMva }, rOverX: 0.05 },
          loads: { distorting: [], backgroundPct: [], dampingKw: { max: 0 } },
          bank: { stages },
        });
        return scanSite(site, { ordersH: Float64Array.of(1) }).levels[0]!.parallelOrderH;
      };
      const weakMva = random.between(3, 60);
      const [weak, stiff] = [orderAt(weakMva), orderAt(weakMva * random.between(1.05, 3))];
      if (weak === null || stiff === null) continue;
      moved++;
      expect(stiff).toBeGreaterThan(weak);
      if (reactorPct > 0) expect(stiff).toBeLessThan(1 / Math.sqrt(reactorPct / 100));
    }
    expect(moved).toBeGreaterThan(runs(40, 2000));
  });
});

describe(`harmonic flow (seed ${SEED})`, () => {
  const drives = [{ name: 'drives', fundamentalA: 150, spectrum: 'six-pulse' as const }];
  const background = [
    { orderH: 5, pct: 1.4 },
    { orderH: 7, pct: 0.9 },
    { orderH: 3, pct: 0.7 },
  ];

  it('is in proportion to what drives it', () => {
    for (const seed of seeds(5, 300)) {
      const site = siteOf(chance(seed));
      const times = (k: number): Result =>
        assessed(
          {
            ...site,
            loads: {
              ...site.loads,
              distorting: drives.map((load) => ({ ...load, fundamentalA: k * load.fundamentalA })),
              backgroundPct: background.map(({ orderH, pct }) => ({ orderH, pct: k * pct })),
            },
          },
          seed,
        );
      const [one, three] = [times(1), times(3)];
      three.network.levels.forEach((level, row) => {
        level.orders.forEach((order, k) => {
          const before = one.network.levels[row]!.orders[k]!;
          for (const key of ['voltagePct', 'sourceA', 'bankA'] as const) {
            expect(Math.abs(order[key] - 3 * before[key])).toBeLessThan(1e-9 * (order[key] + 1e-6));
          }
        });
      });
    }
  });

  it('of load and background together lies between the greater of the two alone and their sum', () => {
    for (const seed of seeds(5, 300)) {
      const site = siteOf(chance(seed));
      // All orders in both, so that the lists line up.
      const orders = [3, 5, 7, 11].map((orderH) => ({ orderH, pct: 1 }));
      const injected = [{ name: 'drives', fundamentalA: 400, orders }];
      const nominal = (distorting: Site['loads'], backgroundPct: typeof orders) =>
        assessed({ ...site, loads: { ...site.loads, ...distorting, backgroundPct } }, seed).network.levels.filter(
          (level) => level.case === 'nominal',
        );
      const both = nominal({ distorting: injected }, orders);
      const load = nominal({ distorting: injected }, []);
      const behind = nominal({ distorting: [] }, orders);
      both.forEach((level, row) => {
        level.orders.forEach((order, k) => {
          for (const key of ['voltagePct', 'sourceA', 'bankA'] as const) {
            const [a, b] = [load[row]!.orders[k]![key], behind[row]!.orders[k]![key]];
            expect(order[key]).toBeGreaterThanOrEqual(Math.max(a, b) * (1 - 1e-9));
            expect(order[key]).toBeLessThanOrEqual((a + b) * (1 + 1e-9));
            if (order.orderH < 5) expect(order[key]).toBeCloseTo(a + b, 9);
          }
        });
      });
    }
  });
});

const GRAVITY = { clear: 0, watch: 1, avoid: 2 } as const;

describe(`the verdict is never milder (seed ${SEED})`, () => {
  // Each of these leaves the network as it is and moves one limit or one duty; the rest follows.
  const worse: [string, (site: Site, random: Chance) => Site][] = [
    [
      'at a higher voltage of the bus',
      (site, random) => ({ ...site, bus: { ...site.bus, highestV: site.bus.highestV! * random.between(1, 1.1) } }),
    ],
    ['in a stricter class of environment', (site) => ({ ...site, limits: { emcClass: 1 } })],
    [
      'with less inductance between stages',
      (site, random) => ({
        ...site,
        bank: { ...site.bank!, interStageUh: site.bank!.interStageUh! * random.between(0.1, 1) },
      }),
    ],
    [
      'with a weaker reactor',
      (site) => ({
        ...site,
        bank: { ...site.bank!, stages: site.bank!.stages.map((s) => ({ ...s, reactorMaxA: s.reactorMaxA! * 0.3 })) },
      }),
    ],
    [
      'with a slower resistor',
      (site) => ({
        ...site,
        bank: { ...site.bank!, stages: site.bank!.stages.map((s) => ({ ...s, dischargeOhm: s.dischargeOhm! * 2 })) },
      }),
    ],
    [
      'with a shorter reconnection delay',
      (site) => ({ ...site, control: { ...site.control, reconnectDelayS: site.control!.reconnectDelayS! / 2 } }),
    ],
    ['where the background is not known', (site) => ({ ...site, loads: withoutBackground(site) })],
    ['where an old bank may have been working', (site) => ({ ...site, recordedBank: { state: 'unknown' } })],
  ];

  function withoutBackground(site: Site): NonNullable<Site['loads']> {
    const { backgroundPct: _, ...rest } = site.loads!;
    return rest;
  }

  function mildSite(random: Chance): Site {
    const site = siteOf(random);
    const { nominalV } = site.bus;
    return {
      ...site,
      bus: { nominalV, highestV: nominalV * random.between(1, 1.06) },
      limits: { emcClass: random.oneOf([2, 3] as const) },
      control: { reconnectDelayS: random.between(60, 600) },
      loads: {
        ...site.loads,
        distorting:
          random.next() < 0.5 ? [] : [{ name: 'drives', fundamentalA: random.between(1, 300), spectrum: 'six-pulse' }],
        backgroundPct: [],
      },
      bank: {
        interStageUh: random.between(0.2, 10),
        stages: site.bank!.stages.map((stage) => ({
          ...stage,
          ratedV: nominalV * random.oneOf([1.2, 1.31, 1.5]),
          reactorMaxA: random.between(50, 400),
          dischargeOhm: random.between(1e4, 3e5),
        })),
      },
    };
  }

  // Rows of `after` beside the same rows of `before`, judged in both.
  function ratios(before: Result, after: Result): { name: string; before: number; after: number }[] {
    return after.duties.flatMap(({ name, group, ratio }) => {
      const same = before.duties.find((row) => row.name === name && row.group === group)!;
      return ratio === null ? [] : [{ name, before: same.ratio!, after: ratio }];
    });
  }

  it.each(worse)('%s', (_, worsened) => {
    let graver = 0;
    for (const seed of seeds(8, 500)) {
      const site = mildSite(chance(seed));
      const before = assessed(site, seed);
      const after = assessed(worsened(site, chance(seed + 1)), seed);
      expect(GRAVITY[after.verdict], `seed ${seed}`).toBeGreaterThanOrEqual(GRAVITY[before.verdict]);
      const rows = ratios(before, after);
      for (const row of rows) expect(row.after, row.name).toBeGreaterThanOrEqual(row.before * (1 - 1e-9));
      const risen = rows.some((row) => row.after > row.before * 1.001);
      if (risen || GRAVITY[after.verdict] > GRAVITY[before.verdict]) graver++;
    }
    // Some verdict or some share of a limit must rise, or the law was not put to the test.
    expect(graver).toBeGreaterThan(0);
  });
});
