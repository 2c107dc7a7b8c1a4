// Second method: the same bank judged by `assessBank` on a record, price book, tariff or finance that was moved by hand.
// Closed forms: a net present value is linear in tariff and costs; a steady load loses its saving in proportion.
import { describe, expect, it } from 'vitest';
import {
  assessBank,
  controllerView,
  firmOutcome,
  grownStudy,
  type LoadRecord,
  lateView,
  type Money,
  type MoneyQuantity,
  type Outcome,
  outColumn,
  type PriceBook,
  planBank,
  type Site,
  studySite,
  type Tariff,
  UTC_TABLE,
  withRobustness,
} from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { driftingLoad, madeRecord } from '../support/made-record.js';
import { madeSite } from '../support/made-site.js';
import { runs, SEED } from '../support/soak.js';

const KVARH: Tariff = {
  decimals: null,
  clauses: [{ name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0, pricePerUnit: 0.05 }],
};
// dear enough a bank that it stops paying within what is tried
const CHEAP_KVARH: Tariff = {
  decimals: null,
  clauses: [{ name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0, pricePerUnit: 0.003 }],
};
const PRICES: PriceBook = {
  invented: true,
  perKvar: 9,
  perStage: 55,
  fixed: 850,
  contingencyPct: 5,
  switches: [{ kind: 'contactor', perStage: 38, lifeSwitchings: 2000 }],
  maintenancePerYear: 20,
  lossWPerKvar: { plain: 1.8 },
  lossPricePerKwh: 0.11,
  capacitorLifeYears: 4,
};
const BANK: Site['bank'] = { stages: [{ count: 3, ratedKvar: 25, ratedV: 400 }], interStageUh: 500 };
const CONTROL: Site['control'] = { setPointPowerFactor: 1, responseRatio: 0.65, reconnectDelayS: 0, stepDelayS: 0 };

const site = (parts: Partial<Site> = {}): Site =>
  madeSite({ tariff: KVARH, prices: PRICES, bank: BANK, control: CONTROL, ...parts });

function firm(of: Site, record: LoadRecord): Money {
  return withRobustness(assessBank(of, record, UTC_TABLE)).result.money!;
}

const npvOf = (of: Site, record: LoadRecord): number => assessBank(of, record, UTC_TABLE).result.money!.npv!;

const movedOf = ({ robustness }: Money, quantity: MoneyQuantity, value: number) =>
  robustness!.ways[0]!.moved.find((row) => row.quantity === quantity && Math.abs(row.value - value) < 1e-9)!;

function madeYear(seed: number, factor = 1): LoadRecord {
  const load = driftingLoad(chance(seed), 1500, 160, 0.6);
  const times = (list: number[]): number[] => list.map((value) => value * factor);
  return madeRecord({ activeKw: times(load.activeKw), reactiveKvar: times(load.reactiveKvar), intervalS: 3600 });
}

// 40 days of the same load by the hour
const steady = (kvar: (hour: number) => number, hours = 960): LoadRecord =>
  madeRecord({
    activeKw: Array.from({ length: hours }, () => 100),
    reactiveKvar: Array.from({ length: hours }, (_, hour) => kvar(hour)),
    intervalS: 3600,
  });

const ONE_STAGE = site({ bank: { stages: [{ count: 1, ratedKvar: 60, ratedV: 400 }] } });

describe(`a bank's worth with its inputs moved (seed ${SEED})`, () => {
  it('is what judging the moved site gives', () => {
    for (let run = 0; run < runs(2, 40); run++) {
      const record = madeYear(SEED + run);
      const money = firm(site(), record);
      const near = (found: number | null | undefined, wanted: number): void => expect(found).toBeCloseTo(wanted, 6);
      expect(money.robustness!.ways[0]!.npv).toBeCloseTo(money.npv!, 6);
      for (const factor of [0.8, 1.2]) {
        near(movedOf(money, 'load', factor).npv, npvOf(site(), madeYear(SEED + run, factor)));
        const dearer: PriceBook = {
          ...PRICES,
          perKvar: 9 * factor,
          perStage: 55 * factor,
          fixed: 850 * factor,
          maintenancePerYear: 20 * factor,
          switches: [{ kind: 'contactor', perStage: 38 * factor, lifeSwitchings: 2000 }],
        };
        near(movedOf(money, 'costs', factor).npv, npvOf(site({ prices: dearer }), record));
        const tariff: Tariff = {
          decimals: null,
          clauses: [{ name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0, pricePerUnit: 0.05 * factor }],
        };
        const prices = { ...PRICES, lossPricePerKwh: 0.11 * factor };
        near(movedOf(money, 'tariff', factor).npv, npvOf(site({ tariff, prices }), record));
      }
      // a stage out is still paid: with the capital of three, the savings and running costs of two
      const two = site({ bank: { ...BANK!, stages: [{ ...BANK!.stages[0]!, count: 2 }] } });
      const whole = money.capital!.total;
      const left = assessBank(two, record, UTC_TABLE).result.money!;
      near(movedOf(money, 'stages', 1).npv, left.npv! + left.capital!.total - whole);
    }
  });

  it('breaks even where costs and savings are equal, and a change of tariff is one of costs the other way round', () => {
    const cheap = site({ tariff: CHEAP_KVARH });
    const money = firm(cheap, madeYear(SEED));
    const gain = (movedOf(money, 'tariff', 1.2).npv! - movedOf(money, 'tariff', 0.8).npv!) / 0.4;
    const cost = gain - money.npv!;
    expect(gain).toBeGreaterThan(cost);
    const { breakEvens } = money.robustness!.ways[0]!;
    const of = (quantity: MoneyQuantity) => breakEvens.find((row) => row.quantity === quantity)!;
    expect(of('tariff').lowFactor).toBeCloseTo(cost / gain, 4);
    expect(of('tariff').highFactor).toBeNull();
    expect(of('costs').highFactor! / (gain / cost)).toBeCloseTo(1, 4);
    expect(of('costs').lowFactor).toBeNull();
    // at the load's own break-even, judged on a record made by hand, the worth has just gone
    const { lowFactor } = of('load');
    expect(npvOf(cheap, madeYear(SEED, lowFactor!))).toBeLessThan(0);
    expect(npvOf(cheap, madeYear(SEED, lowFactor! * 1.02))).toBeGreaterThan(0);
  });

  it('changes the pick where the best bank no longer pays', () => {
    const record = madeYear(SEED);
    const { bank: _, ...without } = site({
      tariff: CHEAP_KVARH,
      catalogue: { stageKvar: [25], ratedV: [440], reactorPct: [0], maxStages: 2, mustMeetTarget: false },
    });
    const outcome: Outcome = withRobustness(planBank(without, record, UTC_TABLE));
    const { money } = outcome.result;
    expect(money!.recommended).toBe('new bank');
    const change = money!.robustness!.pickChanges.find(({ quantity }) => quantity === 'costs')!;
    const even = money!.robustness!.ways[0]!.breakEvens.find(({ quantity }) => quantity === 'costs')!;
    expect(change.nameAbove).toBe('do nothing');
    expect(change.highFactor).toBeCloseTo(even.highFactor!, 3);
    expect(change.nameBelow).toBeNull();
  });

  it('says of each assumption that money rests on how far it moves the worth', () => {
    const record = madeYear(SEED);
    const { assumptions, money } = withRobustness(assessBank(site(), record, UTC_TABLE)).result;
    const effectOf = (code: string) => assumptions.find((line) => line.code === code)!.effect!;
    const ends = [4, 12].map((discountPct) => npvOf(site({ finance: { discountPct } }), record));
    expect(effectOf('default.finance.discountPct')).toMatchObject({ figure: 'money.npv', changesVerdict: false });
    expect(effectOf('default.finance.discountPct').low).toBeCloseTo(ends[1]!, 6);
    expect(effectOf('default.finance.discountPct').high).toBeCloseTo(ends[0]!, 6);
    expect(effectOf('money.sameLoad').low).toBeCloseTo(movedOf(money!, 'load', 0.8).npv!, 6);
    expect(effectOf('money.idealControl').low).toBeCloseTo(money!.savingRange!.leastPerYear, 6);
    expect(effectOf('prices.invented').low).toBeLessThan(money!.npv!);
  });

  it('takes an old bank for what it is: its kvar stay while the load grows', () => {
    const record = madeYear(SEED);
    const old = site({ recordedBank: { state: 'fixed', kvar: 20 } });
    const study = studySite(old, record, UTC_TABLE);
    const grown = grownStudy(study, 1.5);
    for (const [i, before] of record.laggingKvar.entries()) {
      const net = before - record.leadingKvar[i]!;
      const after = grown.record.laggingKvar[i]! - grown.record.leadingKvar[i]!;
      expect(after).toBeCloseTo(1.5 * (net + 20) - 20, 9);
    }
    for (const [i, kvar] of grownStudy(study, 1).record.laggingKvar.entries()) {
      expect(kvar).toBeCloseTo(record.laggingKvar[i]!, 9);
    }
  });

  it('leaves the record as it was, though columns are written over in turn', () => {
    const record = madeYear(SEED);
    const columns = () => [record.activeKw, record.laggingKvar, record.leadingKvar].map((column) => Array.from(column));
    const before = columns();
    const first = firm(site(), record);
    expect(columns()).toEqual(before);
    expect(firm(site(), record)).toEqual(first);
  });

  it('is the same where the site is studied once for both', () => {
    const given = {
      site: site({ catalogue: { stageKvar: [25], maxStages: 2 } }),
      record: madeYear(SEED),
      zone: UTC_TABLE,
    };
    const apart = (judge: typeof planBank) => withRobustness(judge(given.site, given.record, given.zone));
    expect(firmOutcome('plan', given)).toEqual(apart(planBank));
    expect(firmOutcome('assess', given)).toEqual(apart(assessBank));
  });

  it('has nothing to say before it is asked, and nothing of a site without a tariff', () => {
    const record = madeYear(SEED);
    expect(assessBank(site(), record, UTC_TABLE).result.money).toMatchObject({ savingRange: null, robustness: null });
    const { tariff: _, ...without } = site();
    expect(withRobustness(assessBank(without, record, UTC_TABLE)).result.money).toBeNull();
    const { prices: __, ...billsOnly } = site();
    const bare = withRobustness(assessBank(billsOnly, record, UTC_TABLE)).result.money!;
    expect(bare.savingRange!.cases.map(({ npv }) => npv)).toEqual([null, null, null, null]);
    expect(bare.robustness!.ways[0]!.breakEvens).toEqual([]);
  });
});

describe('a saving as a range', () => {
  const cases = ({ savingRange }: Money): Record<string, number> =>
    Object.fromEntries(savingRange!.cases.map(({ name, savingPerYear }) => [name, savingPerYear]));

  it('of a steady load: one hour late, two days of forty out, nothing left without its only stage', () => {
    const money = firm(
      ONE_STAGE,
      steady(() => 60),
    );
    const found = cases(money);
    // January whole and nine days of February, each taken to the whole month; the other names have their mean
    const perDay = 24 * 60 * 0.05;
    expect(found.ideal).toBeCloseTo(6 * perDay * (31 + 28), 6);
    expect(found['95 % available']).toBeCloseTo(6 * perDay * (30 + (28 * 8) / 9), 6);
    expect(found['one interval late']).toBeCloseTo(6 * perDay * (31 + 28 - 1 / 24), 6);
    expect(found['one stage out']).toBe(0);
    expect(money.savingRange!.headlinePerYear).toBe(found['one interval late']);
    expect(money.savingPerYear).toBeCloseTo(found.ideal!, 9);
  });

  it('of a load that comes and goes by the hour: a late controller saves nothing at all', () => {
    const money = firm(
      ONE_STAGE,
      steady((hour) => 60 * (hour % 2)),
    );
    expect(cases(money).ideal).toBeGreaterThan(0);
    expect(money.savingRange!.headlinePerYear).toBeCloseTo(0, 9);
  });

  it('of a demand charge: one day out in a month is the whole month’s saving gone', () => {
    const tariff: Tariff = {
      decimals: null,
      clauses: [{ name: 'demand', kind: 'demand', basis: 'kVA', pricePerUnit: 10 }],
    };
    const found = cases(
      firm(
        { ...ONE_STAGE, tariff },
        steady(() => 60),
      ),
    );
    expect(found.ideal).toBeGreaterThan(0);
    expect(found['95 % available']).toBeCloseTo(0, 9);
  });

  it('is out on one day in twenty, each weekday alike, and of a short record on its last twentieth', () => {
    const share = (record: LoadRecord): number =>
      outColumn({ record }).reduce((sum, out) => sum + out, 0) / record.beginS.length;
    expect(share(steady(() => 1, 20 * 7 * 24))).toBeCloseTo(0.05, 12);
    const out = outColumn({ record: steady(() => 1, 20 * 7 * 24) });
    const weekdays = new Set([...out.keys()].filter((i) => out[i] === 1).map((i) => Math.floor(i / 24) % 7));
    expect(weekdays.size).toBe(7);
    expect(share(steady(() => 1, 40))).toBeCloseTo(0.05, 12);
  });

  it('decides late on the last averages there are, and on none at first', () => {
    const study = studySite(site(), madeYear(SEED), UTC_TABLE);
    const view = controllerView(study, 1);
    const late = lateView(view);
    expect(late.wantedKvar[0]).toBe(0);
    expect(late.wantedKvar.subarray(1)).toEqual(view.wantedKvar.subarray(0, view.wantedKvar.length - 1));
  });
});
