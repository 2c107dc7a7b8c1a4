// Laws of the simulated record: what is delivered and what is left make the load; everything scales; which group a stage
// stands in makes no difference.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  type Control,
  type Outcome,
  type Site,
  type StageGroupInput,
  UTC_TABLE,
} from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

const seeds = (usual: number, soaked: number): number[] =>
  Array.from({ length: runs(usual, soaked) }, (_, k) => SEED + k);

function madeControl(random: Chance): Partial<Control> {
  return {
    setPointPowerFactor: random.oneOf([0.92, 0.95, 0.99, 1]),
    mode: random.oneOf(['nearestLevel', 'oneByOne']),
    stepDelayS: random.oneOf([0, 60, 600]),
    reconnectDelayS: random.oneOf([0, 60, 900, 2000]),
    wear: random.oneOf(['even', 'inOrder']),
  };
}

function madeColumns(random: Chance, intervals: number) {
  const columns = driftingLoad(random, intervals, random.between(200, 800), random.between(0.3, 1));
  // Some export and some leading load.
  if (random.next() < 0.4) columns.activeKw = columns.activeKw.map((kw) => (random.next() < 0.1 ? -kw : kw));
  if (random.next() < 0.4) columns.reactiveKvar = columns.reactiveKvar.map((q) => (random.next() < 0.1 ? -q / 3 : q));
  return {
    ...columns,
    ...(random.next() < 0.3 ? { voltageV: columns.activeKw.map(() => random.between(380, 420)) } : {}),
    ...(random.next() < 0.3 ? { standby: columns.activeKw.map(() => (random.next() < 0.05 ? 1 : 0)) } : {}),
  };
}

function madeCase(seed: number, parts: Partial<Site> = {}): Outcome {
  const random = chance(seed);
  const stage = (): StageGroupInput => ({
    count: random.whole(1, 4),
    ratedKvar: random.oneOf([12.5, 25, 50]),
    ratedV: random.oneOf([400, 440, 525]),
    reactorPct: random.oneOf([0, 7]),
  });
  const site = madeSite({
    target: { powerFactor: random.oneOf([0.9, 0.95]), onExport: random.oneOf(['importOnly', 'absolute']) },
    control: madeControl(random),
    bank: { stages: Array.from({ length: random.whole(1, 2) }, stage) },
    ...parts,
  });
  return assessBank(site, madeRecord(madeColumns(random, 200)), UTC_TABLE);
}

describe(`delivered and residual (seed ${SEED})`, () => {
  it('make the load in every interval, at the bus; what the meter keeps is the residual', () => {
    for (const seed of seeds(60, 3000)) {
      const { series, record, result } = madeCase(seed);
      series.busKvar.forEach((q, i) => {
        const left = series.meterLaggingKvar[i]! - series.meterLeadingKvar[i]!;
        expect(Math.abs(left + series.connectedKvar[i]! - q)).toBeLessThan(1e-9 * (1 + Math.abs(q)));
        expect(series.meterKw[i]).toBe(record.activeKw[i]);
        expect(Math.min(series.meterLaggingKvar[i]!, series.meterLeadingKvar[i]!)).toBeGreaterThanOrEqual(0);
      });
      const residual = series.busKvar.map((q, i) => q - series.connectedKvar[i]!);
      expect(result.operation.maxResidualKvar).toBe(Math.max(...residual));
      expect(result.operation.minResidualKvar).toBe(Math.min(...residual));
    }
  });

  it('keep the energies: lagging less leading falls by what the bank delivered', () => {
    for (const seed of seeds(60, 3000)) {
      const { series, record, result } = madeCase(seed);
      const hours = record.intervalS / 3600;
      const deliveredKvarh = series.connectedKvar.reduce((sum, kvar) => sum + kvar, 0) * hours;
      const before = result.record.laggingKvarh - result.record.leadingKvarh;
      const after = result.operation.laggingKvarh - result.operation.leadingKvarh;
      const scale = result.record.laggingKvarh + result.record.leadingKvarh + deliveredKvarh;
      expect(Math.abs(before - after - deliveredKvarh)).toBeLessThan(1e-12 * scale);
      const atLevels = result.operation.hoursAtLevel.reduce((sum, { hours: at }) => sum + at, 0);
      expect(atLevels).toBeCloseTo(result.record.intervals * hours, 9);
    }
  });

  it('leave months that add up to the whole', () => {
    for (const seed of seeds(20, 500)) {
      const random = chance(seed);
      const columns = driftingLoad(random, 300, 400, 0.7);
      const site = madeSite({ bank: { stages: [{ count: 4, ratedKvar: 25, ratedV: 400 }] } });
      // Six hours an interval: 75 days in three or four months.
      const { result } = assessBank(site, madeRecord({ ...columns, intervalS: 21_600 }), UTC_TABLE);
      expect(result.operation.months.map(({ month }) => month)).toEqual(['2025-01', '2025-02', '2025-03']);
      for (const key of ['laggingKvarh', 'leadingKvarh'] as const) {
        const sum = result.operation.months.reduce((total, month) => total + month[key], 0);
        expect(sum).toBeCloseTo(result.operation[key], 6);
      }
      const active = result.operation.months.reduce((total, { activeKwh }) => total + activeKwh, 0);
      expect(active).toBeCloseTo(result.record.activeKwh, 6);
    }
  });
});

describe(`behind a transformer (seed ${SEED})`, () => {
  it('the bus keeps its load whatever is connected, and the meter sees the transformer besides', () => {
    for (const seed of seeds(30, 1000)) {
      const random = chance(seed);
      const site = madeSite({
        meteredAt: 'primary',
        control: madeControl(random),
        bank: { stages: [{ count: 5, ratedKvar: 50, ratedV: 400 }] },
      });
      const outcome = assessBank(site, madeRecord(driftingLoad(random, 100, 700, 0.8)), UTC_TABLE);
      const { series, record } = outcome;
      const { ratedKva, impedancePct, loadLossKw } = outcome.site.supply.transformers[0]!;
      const r = loadLossKw / ratedKva;
      const x = Math.sqrt((impedancePct / 100) ** 2 - r ** 2);
      const noLoadKvar = Math.sqrt(12 ** 2 - 1.7 ** 2);
      series.busKw.forEach((kw, i) => {
        const atMeter = { kw: series.meterKw[i]!, kvar: series.meterLaggingKvar[i]! - series.meterLeadingKvar[i]! };
        // V₁ = 1: the current is the power behind the shunt, and the series loss its square.
        const square = ((atMeter.kw - 1.7) ** 2 + (atMeter.kvar - noLoadKvar) ** 2) / ratedKva ** 2;
        expect(atMeter.kw - 1.7 - r * square * ratedKva).toBeCloseTo(kw, 6);
        const bus = atMeter.kvar - noLoadKvar - x * square * ratedKva;
        expect(bus + series.connectedKvar[i]!).toBeCloseTo(series.busKvar[i]!, 6);
        if (series.connectedKvar[i] === 0) expect(atMeter.kw).toBeCloseTo(record.activeKw[i]!, 9);
      });
    }
  });
});

describe(`scaling (seed ${SEED})`, () => {
  it('load, supply and bank times k: the same decisions and ratios, energies and currents times k', () => {
    for (const seed of seeds(15, 800)) {
      const random = chance(seed);
      // Powers of two scale without rounding, so that not even a tie is decided differently.
      const k = random.oneOf([0.5, 2, 8]);
      const columns = madeColumns(random, 150);
      const control = madeControl(random);
      const scaled = (by: number): Outcome['result'] => {
        const site = madeSite({
          control,
          supply: {
            faultLevelMva: { max: 200 * by, min: 100 * by },
            transformers: [{ ratedKva: 1000 * by, impedancePct: 6, loadLossKw: 10 * by }],
          },
          loads: {
            distorting: [{ name: 'drives', fundamentalA: 150 * by, spectrum: 'six-pulse' }],
            backgroundPct: [{ orderH: 5, pct: 1 }],
            dampingKw: { max: 300 * by },
          },
          bank: { stages: [{ count: 6, ratedKvar: 50 * by, ratedV: 480, reactorPct: 7 }], interStageUh: 2 / by },
        });
        const times = (list: number[]): number[] => list.map((value) => value * by);
        const record = madeRecord({
          ...columns,
          activeKw: times(columns.activeKw),
          reactiveKvar: times(columns.reactiveKvar),
        });
        return assessBank(site, record, UTC_TABLE).result;
      };
      const [one, other] = [scaled(1), scaled(k)];
      expect(other.verdict).toBe(one.verdict);
      expect(other.operation.switchings).toEqual(one.operation.switchings);
      expect(other.operation.laggingKvarh).toBeCloseTo(k * one.operation.laggingKvarh, 6);
      expect(other.requirement.p99Kvar).toBeCloseTo(k * one.requirement.p99Kvar, 9);
      expect(other.operation.months[0]!.powerFactorLagging).toBeCloseTo(
        one.operation.months[0]!.powerFactorLagging!,
        12,
      );
      other.duties.forEach((duty, row) => {
        expect(duty.ratio ?? 0).toBeCloseTo(one.duties[row]!.ratio ?? 0, 9);
        if (duty.unit === 'A') expect(duty.value / k).toBeCloseTo(one.duties[row]!.value, 6);
      });
      other.network.levels.forEach((level, row) => {
        const before = one.network.levels[row]!;
        expect((level.peakOhm ?? 0) * k).toBeCloseTo(before.peakOhm ?? 0, 9);
        expect(level.parallelOrderH ?? 0).toBeCloseTo(before.parallelOrderH ?? 0, 6);
        expect(level.voltageDistortionPct).toBeCloseTo(before.voltageDistortionPct, 9);
      });
    }
  });
});

describe(`groups are only a way of writing the bank down (seed ${SEED})`, () => {
  const loads: Site['loads'] = {
    distorting: [{ name: 'drives', fundamentalA: 120, spectrum: 'six-pulse' }],
    backgroundPct: [{ orderH: 5, pct: 1.2 }],
  };
  const stage = { ratedKvar: 25, ratedV: 480, reactorPct: 7 };
  const other = { count: 2, ratedKvar: 50, ratedV: 480, reactorPct: 7 };

  function resultOf(seed: number, stages: StageGroupInput[]): Outcome['result'] {
    return madeCase(seed, { loads, bank: { stages } }).result;
  }

  it.each([
    [
      'splitting a group in two of equal stages',
      [{ count: 5, ...stage }, other],
      [{ count: 2, ...stage }, { count: 3, ...stage }, other],
    ],
    ['naming the groups in another order', [{ count: 5, ...stage }, other], [other, { count: 5, ...stage }]],
    [
      'exchanging equal groups',
      [{ count: 2, ...stage }, other, { count: 2, ...stage }],
      [{ count: 2, ...stage }, other, { count: 2, ...stage }].reverse(),
    ],
  ])('%s changes nothing', (_, before, after) => {
    for (const seed of seeds(4, 300)) {
      const [one, two] = [resultOf(seed, before), resultOf(seed, after)];
      expect(two.verdict).toBe(one.verdict);
      expect(two.bank.levelsKvar.length).toBe(one.bank.levelsKvar.length);
      expect(two.operation.totalSwitchings).toBe(one.operation.totalSwitchings);
      expect(two.operation.laggingKvarh).toBeCloseTo(one.operation.laggingKvarh, 6);
      expect(two.operation.hoursAtLevel.map(({ hours }) => hours)).toEqual(
        one.operation.hoursAtLevel.map(({ hours }) => hours),
      );
      expect(two.network.levels.length).toBe(one.network.levels.length);
      two.network.levels.forEach((level, k) => {
        const same = one.network.levels[k]!;
        expect(level.corner).toEqual(same.corner);
        expect(level.voltageDistortionPct).toBeCloseTo(same.voltageDistortionPct, 9);
        expect(level.parallelOrderH!).toBeCloseTo(same.parallelOrderH!, 5);
        expect(level.peakOhm).toBeCloseTo(same.peakOhm!, 9);
      });
      const worstRatio = (result: Outcome['result'], name: string): number =>
        Math.max(...result.duties.filter((duty) => duty.name === name).map(({ ratio }) => ratio ?? 0));
      for (const name of new Set(one.duties.map((duty) => duty.name))) {
        expect(worstRatio(two, name), name).toBeCloseTo(worstRatio(one, name), 9);
      }
    }
  });
});
