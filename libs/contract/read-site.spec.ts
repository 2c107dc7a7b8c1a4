import { describe, expect, expectTypeOf, it } from 'vitest';
import * as z from 'zod';
import { InputProblem, type Site } from '#libs/engine/index.js';
import { readSite } from './read-site.js';
import { type SiteGiven, siteSchema } from './site-schema.js';

const transformer = { ratedKva: 1000, impedancePct: 6, loadLossKw: 10.5 };

/** An invented site with every part it needs and no more; `changes` replace whole keys. */
function siteWith(changes: Record<string, unknown> = {}): Record<string, unknown> {
  return {
    name: 'Invented Mill',
    timeZone: 'Europe/Dublin',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400 },
    supply: { faultLevelMva: { max: 250, min: 180 } },
    ...changes,
  };
}

function withStage(stage: Record<string, unknown>) {
  return siteWith({ bank: { stages: [{ count: 1, ratedKvar: 50, ratedV: 480, ...stage }] } });
}

function withTransformer(changes: Record<string, unknown>, rest: Record<string, unknown> = { meteredAt: 'bus' }) {
  return siteWith({ supply: { faultLevelMva: { max: 250 }, transformers: [{ ...transformer, ...changes }] }, ...rest });
}

function problemsOf(json: unknown) {
  try {
    readSite(json);
  } catch (error) {
    if (error instanceof InputProblem) return error.problems;
    throw error;
  }
  return [];
}

const twoTransformers = { faultLevelMva: { max: 250 }, transformers: [transformer, transformer] };
const order = (orderH: unknown, pct: unknown = 5) => ({ orderH, pct });
const withOrders = (orders: unknown[]) =>
  siteWith({ loads: { distorting: [{ name: 'd', fundamentalA: 10, orders }] } });

const refused: [why: string, json: unknown, path: string | undefined, code: string][] = [
  ['no object', [], undefined, 'wrong-type'],
  ['nothing', null, undefined, 'wrong-type'],
  ['a missing key', siteWith({ bus: undefined }), 'bus', 'missing'],
  ['a missing quantity', siteWith({ bus: {} }), 'bus.nominalV', 'missing'],
  ['an unknown key', siteWith({ buss: 1 }), 'buss', 'unknown-key'],
  ['an unknown key deep inside', withStage({ ratedKw: 1 }), 'bank.stages[0].ratedKw', 'unknown-key'],
  ['a key of the language', JSON.parse('{"__proto__":{"rules":"iec"}}'), '__proto__', 'unknown-key'],
  ['text where a number belongs', siteWith({ bus: { nominalV: 'high' } }), 'bus.nominalV', 'wrong-type'],
  [
    'text where a plain number belongs',
    siteWith({ target: { powerFactor: '0.95' } }),
    'target.powerFactor',
    'wrong-type',
  ],
  ['a number without a unit in text', siteWith({ bus: { nominalV: '400' } }), 'bus.nominalV', 'wrong-unit'],
  ['a unit of another dimension', siteWith({ bus: { nominalV: '400 A' } }), 'bus.nominalV', 'wrong-unit'],
  ['kW for kVA', withTransformer({ ratedKva: '1000 kW' }), 'supply.transformers[0].ratedKva', 'wrong-unit'],
  ['an unknown unit', siteWith({ bus: { nominalV: '400 volts' } }), 'bus.nominalV', 'wrong-unit'],
  ['a decimal comma', siteWith({ bus: { nominalV: '0,4 kV' } }), 'bus.nominalV', 'wrong-type'],
  ['true for a number', siteWith({ bus: { nominalV: true } }), 'bus.nominalV', 'wrong-type'],
  ['infinity', siteWith({ bus: { nominalV: Number.POSITIVE_INFINITY } }), 'bus.nominalV', 'not-finite'],
  ['no number', siteWith({ target: { powerFactor: Number.NaN } }), 'target.powerFactor', 'not-finite'],
  ['an infinite text', siteWith({ bus: { nominalV: '1e999 V' } }), 'bus.nominalV', 'not-finite'],
  ['a date that does not exist', siteWith({ asOf: '2026-02-30' }), 'asOf', 'out-of-range'],
  ['a zone that does not exist', siteWith({ timeZone: 'Europe/Nowhere' }), 'timeZone', 'out-of-range'],
  ['an unknown rule set', siteWith({ rules: 'vde' }), 'rules', 'out-of-range'],
  ['a currency in words', siteWith({ currency: 'Euro' }), 'currency', 'out-of-range'],
  [
    'highest voltage below nominal',
    siteWith({ bus: { nominalV: 400, highestV: 380 } }),
    'bus.highestV',
    'inconsistent',
  ],
  [
    'least fault level above greatest',
    siteWith({ supply: { faultLevelMva: { max: 100, min: 180 } } }),
    'supply.faultLevelMva.min',
    'inconsistent',
  ],
  ['metering left open', withTransformer({}, {}), 'meteredAt', 'missing'],
  ['metering at a primary that is not there', siteWith({ meteredAt: 'primary' }), 'meteredAt', 'inconsistent'],
  [
    'two transformers, no arrangement',
    siteWith({ meteredAt: 'bus', supply: twoTransformers }),
    'supply.arrangement',
    'missing',
  ],
  [
    'separate boards',
    siteWith({ meteredAt: 'bus', supply: { ...twoTransformers, arrangement: 'separate' } }),
    'supply.arrangement',
    'not-supported-yet',
  ],
  ['a negative rating', withStage({ ratedKvar: -50 }), 'bank.stages[0].ratedKvar', 'out-of-range'],
  ['a rating of nothing', withStage({ ratedKvar: 0 }), 'bank.stages[0].ratedKvar', 'out-of-range'],
  ['a negative rating in text', withStage({ ratedKvar: '-0.05 Mvar' }), 'bank.stages[0].ratedKvar', 'out-of-range'],
  ['p of 100 %', withStage({ reactorPct: 100 }), 'bank.stages[0].reactorPct', 'out-of-range'],
  [
    'p that passes 100 % at the worst corner',
    withStage({ reactorPct: 88.3 }),
    'bank.stages[0].reactorPct',
    'out-of-range',
  ],
  ['negative p', withStage({ reactorPct: -7 }), 'bank.stages[0].reactorPct', 'out-of-range'],
  ['volts of a capacitor that is none', withStage({ ratedV: 50 }), 'bank.stages[0].ratedV', 'out-of-range'],
  ['half a stage', withStage({ count: 1.5 }), 'bank.stages[0].count', 'out-of-range'],
  ['a bank without stages', siteWith({ bank: { stages: [] } }), 'bank.stages', 'out-of-range'],
  ['a negative capacitance', withStage({ capacitanceUf: -1 }), 'bank.stages[0].capacitanceUf', 'out-of-range'],
  ['no impedance', withTransformer({ impedancePct: 0 }), 'supply.transformers[0].impedancePct', 'out-of-range'],
  [
    'a loss as large as the impedance allows at its lower tolerance: 1000 kVA · 6 % · 0.9 = 54 kW',
    withTransformer({ loadLossKw: 54 }),
    'supply.transformers[0].loadLossKw',
    'inconsistent',
  ],
  ['a response ratio of 0', siteWith({ control: { responseRatio: 0 } }), 'control.responseRatio', 'out-of-range'],
  ['a response ratio above 1', siteWith({ control: { responseRatio: 1.1 } }), 'control.responseRatio', 'out-of-range'],
  ['a power factor above 1', siteWith({ target: { powerFactor: 1.01 } }), 'target.powerFactor', 'out-of-range'],
  ['a power factor of 0', siteWith({ target: { powerFactor: 0 } }), 'target.powerFactor', 'out-of-range'],
  ['a negative delay', siteWith({ control: { stepDelayS: -1 } }), 'control.stepDelayS', 'out-of-range'],
  ['a fixed bank without its kvar', siteWith({ recordedBank: { state: 'fixed' } }), 'recordedBank.kvar', 'missing'],
  [
    'kvar of a bank that is not there',
    siteWith({ recordedBank: { state: 'none', kvar: 5 } }),
    'recordedBank.kvar',
    'unknown-key',
  ],
  ['an unknown state', siteWith({ recordedBank: { state: 'on' } }), 'recordedBank.state', 'out-of-range'],
  [
    'an unknown spectrum',
    siteWith({ loads: { distorting: [{ name: 'd', fundamentalA: 1, spectrum: 'six' }] } }),
    'loads.distorting[0].spectrum',
    'out-of-range',
  ],
  [
    'neither orders nor spectrum',
    siteWith({ loads: { distorting: [{ name: 'd', fundamentalA: 1 }] } }),
    'loads.distorting[0].orders',
    'missing',
  ],
  ['the fundamental as a harmonic', withOrders([order(1)]), 'loads.distorting[0].orders[0].orderH', 'out-of-range'],
  ['an order above 50', withOrders([order(51)]), 'loads.distorting[0].orders[0].orderH', 'out-of-range'],
  [
    'an order twice',
    withOrders([order(5), order(7), order(5)]),
    'loads.distorting[0].orders[2].orderH',
    'inconsistent',
  ],
  [
    'a background order twice',
    siteWith({ loads: { backgroundPct: [order(5), order(5)] } }),
    'loads.backgroundPct[1].orderH',
    'inconsistent',
  ],
  ['a negative magnitude', withOrders([order(5, -1)]), 'loads.distorting[0].orders[0].pct', 'out-of-range'],
  [
    'least damping above greatest',
    siteWith({ loads: { dampingKw: { max: 1, min: 2 } } }),
    'loads.dampingKw.min',
    'inconsistent',
  ],
  ['an empty list of bills', siteWith({ estimate: { bills: [] } }), 'estimate.bills', 'out-of-range'],
  ['class 4', siteWith({ limits: { emcClass: 4 } }), 'limits.emcClass', 'out-of-range'],
  ['control characters in a name', siteWith({ name: 'a\u0007b' }), 'name', 'out-of-range'],
  ['half a character in a name', siteWith({ name: 'a\ud800b' }), 'name', 'out-of-range'],
  [
    'prices in another currency',
    siteWith({ currency: 'EUR', prices: { currency: 'USD' } }),
    'prices.currency',
    'inconsistent',
  ],
  [
    'prices that end before they begin',
    siteWith({ prices: { validFrom: '2026-02-01', validTo: '2026-01-01' } }),
    'prices.validTo',
    'inconsistent',
  ],
  ['a negative price', siteWith({ prices: { perKvar: -1 } }), 'prices.perKvar', 'out-of-range'],
  ['an unknown price', siteWith({ prices: { perPound: 1 } }), 'prices.perPound', 'unknown-key'],
  ['an empty catalogue list', siteWith({ catalogue: { stageKvar: [] } }), 'catalogue.stageKvar', 'out-of-range'],
  [
    'a negative stage in the catalogue',
    siteWith({ catalogue: { stageKvar: [25, -25] } }),
    'catalogue.stageKvar[1]',
    'out-of-range',
  ],
  ['a horizon of half a year', siteWith({ finance: { horizonYears: 0.5 } }), 'finance.horizonYears', 'out-of-range'],
];

describe('a site file', () => {
  it.each(refused)('with %s is refused at its path', (_why, json, path, code) => {
    const problems = problemsOf(json);
    expect(problems).toContainEqual(expect.objectContaining({ code }));
    expect(problems.find((problem) => problem.code === code && problem.path === path)).toBeDefined();
    // whatever else a case breaks by its nature, nothing else of it is complained about
    if (path !== undefined && path !== '__proto__') expect(problems).toHaveLength(1);
  });

  it('says what was expected and what was found', () => {
    expect(problemsOf(siteWith({ bus: { nominalV: '400 A' } }))).toEqual([
      {
        code: 'wrong-unit',
        path: 'bus.nominalV',
        expected: 'a unit that measures the same as V',
        found: '"400 A"',
        unit: 'V',
      },
    ]);
  });

  it('is told every problem at once, the rules between fields among them', () => {
    const json = withTransformer(
      { ratedKva: 'x', impedancePct: -1 },
      {
        bus: { nominalV: 400, highestV: 100 },
        rules: 4,
        extra: 1,
        recordedBank: { state: 'on' },
        bank: { stages: [{ count: 0.5, ratedKvar: 1, ratedV: 480 }] },
      },
    );
    expect(problemsOf(json).map(({ path }) => path)).toEqual([
      'rules',
      'recordedBank.state',
      'supply.transformers[0].ratedKva',
      'supply.transformers[0].impedancePct',
      'bank.stages[0].count',
      'extra',
      'bus.highestV',
      'meteredAt',
    ]);
  });

  it('may give any quantity as text with a unit, and leaves as plain numbers in the unit of the name', () => {
    const site = readSite(
      withTransformer(
        { ratedKva: '1.25 MVA', loadLossKw: '9500 W', impedancePct: '6 %' },
        {
          meteredAt: 'primary',
          bus: { nominalV: '0.4 kV', highestV: 420 },
          control: { reconnectDelayS: '2 min' },
          catalogue: { stageKvar: ['25000 var', 50] },
        },
      ),
    );
    expect(site.supply.transformers).toEqual([{ ratedKva: 1250, impedancePct: 6, loadLossKw: 9.5 }]);
    expect(site.bus).toEqual({ nominalV: 400, highestV: 420 });
    expect(site.control).toEqual({ reconnectDelayS: 120 });
    expect(site.catalogue).toEqual({ stageKvar: [25, 50] });
  });

  it('keeps apart a list that is empty and one that is not given: the first declares that there is none', () => {
    expect(readSite(siteWith({ loads: { distorting: [] } })).loads).toEqual({ distorting: [] });
    expect(readSite(siteWith()).loads).toBeUndefined();
  });

  it('with values at the edge of what is possible is accepted', () => {
    const json = withTransformer(
      { loadLossKw: 53.9, impedanceTolerancePct: 10 },
      {
        meteredAt: 'bus',
        bus: { nominalV: 400, highestV: 400 },
        target: { powerFactor: 1 },
        control: { responseRatio: 1, stepDelayS: 0, reconnectDelayS: 0 },
        loads: { backgroundPct: [order(1.5), order(50, 0)], dampingKw: { max: 0, min: 0 } },
        bank: { stages: [{ count: 1, ratedKvar: 5, ratedV: 440, reactorPct: 0, capacitanceUf: 82, reactorMh: 1 }] },
      },
    );
    expect(problemsOf(json)).toEqual([]);
  });

  it('that is nested or padded without end is refused, and does no harm', () => {
    const deep = JSON.parse(`${'['.repeat(200_000)}${']'.repeat(200_000)}`);
    expect(problemsOf(siteWith({ bus: deep }))).toEqual([
      { code: 'wrong-type', path: 'bus', expected: 'an object', found: 'a list of 1' },
    ]);
    const wide = siteWith(Object.fromEntries(Array.from({ length: 50_000 }, (_, i) => [`k${i}`, i])));
    const problems = problemsOf(wide);
    expect(problems).toHaveLength(201);
    expect(problems.at(-1)).toMatchObject({ code: 'too-large', found: '49800 more' });
  });

  it('has a schema that says what the engine’s type says', () => {
    type InForms = 'supply' | 'bank' | 'network' | 'estimate'; // these may stand in other forms, which understandSite makes one
    expectTypeOf<Omit<SiteGiven, InForms>>().toExtend<Omit<Site, InForms>>();
    expectTypeOf<Omit<Site, 'understood'>>().toExtend<SiteGiven>();
  });

  it('has a schema the description of the interface can be written from', () => {
    const described = JSON.stringify(z.toJSONSchema(siteSchema, { io: 'input', target: 'openapi-3.0' }));
    expect(described).toContain('"ratedKva":{"anyOf":[{"type":"number"},{"type":"string"}]');
    expect(described).toContain('"count":{"type":"integer"');
  });
});
