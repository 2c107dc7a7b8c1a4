// Second method: every layout of a small catalogue at every voltage and set point, each judged in full by `assessBank`
// (test/support/slow-plan.ts), against `planBank`, which narrows its candidates from the left.
import { describe, expect, it } from 'vitest';
import { type Outcome, planBank, type Site, UTC_TABLE } from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import {
  addedLeadingKvar,
  everyMonthMeets,
  type SlowCase,
  type SlowCatalogue,
  slowPlan,
} from '../support/slow-plan.js';
import { runs, SEED } from '../support/soak.js';

const seeds = (usual: number, soaked: number): number[] =>
  Array.from({ length: runs(usual, soaked) }, (_, k) => SEED + k);

function madeCatalogue(random: Chance): SlowCatalogue {
  return {
    stageKvar: random.oneOf([
      [12.5, 25, 50],
      [10, 20],
      [25, 40, 50],
      [50, 100],
    ]),
    ratedV: random.oneOf([[440, 525], [480], [400, 440, 480, 525]]),
    reactorPct: random.oneOf([[0], [0, 7], [7], [0, 5.67, 14]]),
    maxStages: random.whole(2, 4),
    ...(random.next() < 0.3 ? { maxTotalKvar: random.between(30, 200) } : {}),
    ...(random.next() < 0.2 ? { setPoints: [0.96, 0.99] } : {}),
  };
}

function madeCase(seed: number): { made: SlowCase; catalogue: SlowCatalogue } {
  const random = chance(seed);
  const catalogue = madeCatalogue(random);
  const columns = driftingLoad(random, 60, random.between(60, 250), random.between(0.4, 0.9));
  const voltageV = random.next() < 0.3 ? { voltageV: columns.activeKw.map(() => random.between(395, 425)) } : {};
  // Twelve hours an interval make a month; ten minutes let a reconnection delay last over an interval.
  const intervalS = random.oneOf([600, 43_200]);
  const loads: Site['loads'] = {
    distorting:
      random.next() < 0.5 ? [] : [{ name: 'drives', fundamentalA: random.between(10, 150), spectrum: 'six-pulse' }],
    backgroundPct: [],
    dampingKw: { max: 0 },
  };
  const site = madeSite({
    meteredAt: random.oneOf(['bus', 'bus', 'primary']),
    recordedBank: { state: random.oneOf(['none', 'out', 'none', 'unknown']) },
    target: { powerFactor: random.oneOf([0.9, 0.95, 0.98]) },
    loads,
    catalogue,
    control: {
      mode: random.oneOf(['nearestLevel', 'oneByOne']),
      stepDelayS: random.oneOf([0, 10, 600]),
      ...(random.next() < 0.3 ? { setPointPowerFactor: 0.97 } : {}),
      ...(random.next() < 0.5 ? { reconnectDelayS: random.oneOf([60, 1500]) } : {}),
    },
  });
  return { made: { site, record: madeRecord({ ...columns, ...voltageV, intervalS }), zone: UTC_TABLE }, catalogue };
}

const built = (outcome: Outcome): string =>
  outcome.bank.groups.map((g) => `${g.count}×${g.ratedKvar}@${g.ratedV}/${g.reactorPct}`).join('+');

describe(`the bank that is chosen, against trying every layout (seed ${SEED})`, () => {
  it('is the same, with the same set point and verdict', { timeout: runs(120_000, 3_600_000) }, () => {
    const seen = { clear: 0, watch: 0, none: 0 };
    for (const seed of seeds(8, 600)) {
      const { made, catalogue } = madeCase(seed);
      const planned = planBank(made.site, made.record, made.zone);
      if (planned.bank.groups.length === 0 && everyMonthMeets(planned)) continue;
      const choice = slowPlan(made, catalogue);
      const told = `seed ${seed}: ${built(planned)} against ${choice === null ? 'none' : built(choice.outcome)}`;
      if (choice === null) {
        seen.none++;
        expect(planned.result.verdict, told).not.toBe('clear');
        continue;
      }
      expect(built(planned), told).toBe(built(choice.outcome));
      expect(planned.result.control.setPointPowerFactor, told).toBe(choice.setPointPowerFactor);
      expect(planned.result.verdict, told).toBe(choice.outcome.result.verdict);
      expect(addedLeadingKvar(planned)).toBeLessThanOrEqual(choice.candidate.smallestKvar * (1 + 1e-9));
      seen[choice.outcome.result.verdict as 'clear' | 'watch']++;
    }
    expect(Math.min(seen.clear, seen.watch, seen.none)).toBeGreaterThan(0);
  });
});

describe('what a plan may not get wrong', () => {
  const steady = (kw: number, kvar: number, more: object = {}) =>
    madeRecord({ activeKw: Array(40).fill(kw), reactiveKvar: Array(40).fill(kvar), intervalS: 86_400, ...more });
  const catalogue = { stageKvar: [10, 20], ratedV: [440, 525], reactorPct: [0], maxStages: 6, interStageUh: 20 };

  it('a layout too large at its least clear voltage is not slipped in at a higher one', () => {
    // 100 kW at 0.8 need 42 kvar; three stages of 20 are 49.6 kvar at 440 V and would be 34.8 at 525 V.
    const planned = planBank(
      madeSite({ catalogue: { ...catalogue, stageKvar: [20], maxTotalKvar: 49 } }),
      steady(100, 75),
      UTC_TABLE,
    );
    for (const group of planned.bank.groups) expect(group.ratedV).toBe(440);
    expect(planned.result.verdict).toBe('watch');
    expect(planned.result.reasons[0]!.code).toBe('layout.targetOutOfReach');
  });

  it('a bus that runs above nominal makes more of each stage, and the plan uses it', () => {
    // (440/400)² · 33 kvar of two stages at 440 V are 40 kvar: enough for 38, which 33 alone would not be.
    const at = (volts: number) =>
      planBank(
        madeSite({ bus: { nominalV: 400, highestV: 440 }, catalogue: { ...catalogue, ratedV: [440], maxStages: 2 } }),
        steady(100, 32.9 + 38, { voltageV: Array(40).fill(volts) }),
        UTC_TABLE,
      );
    expect(at(440).result.verdict).toBe('clear');
    const codes = (volts: number) => at(volts).result.reasons.map(({ code }) => code);
    expect(codes(440)).toContain('target.met');
    expect(codes(440)).not.toContain('layout.targetOutOfReach');
    expect(codes(400)).toContain('layout.targetOutOfReach');
  });

  it('a bus that runs below nominal makes less of each stage, and the plan takes more of them', () => {
    // 60 kvar wanted of stages that give 81 %: 74 kvar of nominal, more than the load's own.
    const planned = planBank(
      madeSite({ target: { powerFactor: 1 }, catalogue: { ...catalogue, ratedV: [440] } }),
      steady(100, 60, { voltageV: Array(40).fill(360) }),
      UTC_TABLE,
    );
    expect(planned.result.bank.effectiveKvar * 0.81).toBeGreaterThan(55);
  });

  it('a target out of reach is never clear, whatever the limits say', () => {
    const planned = planBank(madeSite({ catalogue: { ...catalogue, maxStages: 1 } }), steady(400, 400), UTC_TABLE);
    expect(planned.result.duties.every(({ verdict }) => verdict === 'clear')).toBe(true);
    expect(planned.result.verdict).toBe('watch');
  });

  it('a catalogue that makes no bank is never clear', () => {
    const planned = planBank(madeSite({ catalogue: { ...catalogue, ratedV: [230] } }), steady(100, 75), UTC_TABLE);
    expect(planned.bank.groups).toEqual([]);
    expect(planned.result.verdict).toBe('watch');
    expect(planned.result.reasons[0]!.code).toBe('layout.noCandidate');
  });

  it('a smaller bank that is only watched gives way to a larger one that is clear', () => {
    // 230 A on 1 000 kVA are 16 %: plain stages are watched for it, tuned ones are not.
    const loads = {
      distorting: [{ name: 'drives', fundamentalA: 230, orders: [{ orderH: 23, pct: 0.1 }] }],
      backgroundPct: [],
    };
    const among = (reactorPct: number[]) =>
      planBank(
        madeSite({ loads, catalogue: { ...catalogue, ratedV: [440, 525], reactorPct } }),
        steady(100, 75),
        UTC_TABLE,
      );
    const tuned = among([0, 7]);
    expect(tuned.result.verdict).toBe('clear');
    expect(tuned.bank.groups.every(({ reactorPct }) => reactorPct === 7)).toBe(true);
    const plain = among([0]);
    expect(plain.result.verdict).toBe('watch');
    expect(plain.result.reasons[0]!.code).toBe('layout.onlyWatch');
  });

  it('one that would over-correct by more than its smallest stage gives way to one that does not', () => {
    // 60 kvar come and go, and one stage an interval may be switched: three stages of 20 would leave two behind.
    const kvar = Array.from({ length: 60 }, (_, i) => (i % 20 < 10 ? 60 : 0));
    const record = madeRecord({ activeKw: kvar.map(() => 60), reactiveKvar: kvar, intervalS: 600 });
    const made: SlowCase = {
      site: madeSite({
        target: { powerFactor: 0.98 },
        control: { stepDelayS: 600, setPointPowerFactor: 1 },
        catalogue: { ...catalogue, stageKvar: [20, 80], ratedV: [440], maxStages: 4 },
      }),
      record,
      zone: UTC_TABLE,
    };
    const planned = planBank(made.site, made.record, made.zone);
    expect(built(planned)).toBe('1×80@440/0');
    expect(addedLeadingKvar(planned)).toBeLessThanOrEqual(planned.result.bank.effectiveKvar);
  });

  it('no need makes an empty bank, clear, with one reason', () => {
    const planned = planBank(madeSite(), steady(100, 20, { intervalS: 864_000 }), UTC_TABLE);
    expect(planned.bank.groups).toEqual([]);
    expect(planned.result.verdict).toBe('clear');
    expect(planned.result.reasons.map(({ code }) => code)).toEqual(['need.none']);
  });

  it('needs in single intervals and none in any month make an empty bank too', () => {
    const activeKw = Array.from({ length: 40 }, () => 100);
    const reactiveKvar = activeKw.map((_, i) => (i % 10 === 0 ? 80 : 0));
    const record = madeRecord({ activeKw, reactiveKvar, intervalS: 864_000 });
    const planned = planBank(madeSite(), record, UTC_TABLE);
    expect(planned.result.requirement.maxKvar).toBeGreaterThan(40);
    expect(planned.bank.groups).toEqual([]);
    expect(planned.result.reasons.map(({ code }) => code)).toEqual(['need.metEveryMonth']);
  });

  it('a bank in the site file lends nothing and is said to be ignored', () => {
    const bank = { stages: [{ count: 1, ratedKvar: 999, ratedV: 400 }] };
    const [with_, without] = [bank, undefined].map((given) =>
      planBank(madeSite(given === undefined ? {} : { bank: given }), steady(100, 75), UTC_TABLE),
    );
    expect(built(with_!)).toBe(built(without!));
    expect(with_!.result.assumptions.some(({ code }) => code === 'bank.ignored')).toBe(true);
  });

  it('no inductance at all between stages is refused, as for a bank of the site’s own', () => {
    const site = madeSite({ catalogue: { ...catalogue, interStageUh: 0 } });
    expect(() => planBank(site, steady(100, 75), UTC_TABLE)).toThrow(/interStageUh/);
  });
});
