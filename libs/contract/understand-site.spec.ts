import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputProblem, type Site } from '#libs/engine/index.js';
import { readSite } from './read-site.js';

const SEED = 20_260_131;

function siteWith(supply: Record<string, unknown>, rest: Record<string, unknown> = {}) {
  return {
    name: 'Invented Mill',
    timeZone: 'Europe/Dublin',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400 },
    supply,
    ...rest,
  };
}

const mva = { faultLevelMva: { max: 250 } };
const stage = { count: 1, ratedKvar: 50, ratedV: 480 };
const withStage = (given: Record<string, unknown>) => siteWith(mva, { bank: { stages: [{ ...stage, ...given }] } });
const withCable = (given: Record<string, unknown>) =>
  siteWith(mva, {
    network: {
      buses: [{ name: 'A' }, { name: 'B' }],
      cables: [{ between: ['A', 'B'], lengthM: 50, ...given }],
    },
  });

function problemsOf(json: unknown) {
  try {
    readSite(json);
  } catch (error) {
    if (error instanceof InputProblem) return error.problems;
    throw error;
  }
  return [];
}

const read: [what: string, json: unknown, value: (site: Site) => unknown, expected: number, path: string][] = [
  [
    '12.5 kA at 10 kV: √3 · 10 · 12.5 MVA',
    siteWith({ faultLevel: { maxKa: 12.5, atKv: 10 } }),
    (site) => site.supply.faultLevelMva.max,
    216.506_350_946,
    'supply.faultLevel',
  ],
  [
    '0.4 Ω at 10 kV: 10²/0.4 MVA',
    siteWith({ faultLevel: { minOhm: '400 mohm', atKv: '10 kV' } }),
    (site) => site.supply.faultLevelMva.max,
    250,
    'supply.faultLevel',
  ],
  ['X/R of 8', siteWith({ ...mva, xOverR: 8 }), (site) => site.supply.rOverX, 0.125, 'supply.xOverR'],
  [
    '189 Hz at 50 Hz: (50/189)², the 7 % of the trade',
    withStage({ tunedHz: 189 }),
    (site) => site.bank?.stages[0]?.reactorPct,
    6.998_684_247,
    'bank.stages[0].tunedHz',
  ],
  [
    'order 4.23, a 7 % reactor on a capacitor with 80 % left',
    withStage({ tunedOrderH: 4.23 }),
    (site) => site.bank?.stages[0]?.reactorPct,
    5.588_773_4,
    'bank.stages[0].tunedOrderH',
  ],
  [
    '95 mm² of copper',
    withCable({ crossSectionMm2: 95, reactanceOhmPerKm: 0.08 }),
    (site) => site.network?.cables?.[0]?.resistanceOhmPerKm,
    0.193,
    'network.cables[0].crossSectionMm2',
  ],
  [
    '4/0 AWG of copper: 107.2 mm²',
    withCable({ sizeAwg: '4/0', reactanceOhmPerKm: 0.08 }),
    (site) => site.network?.cables?.[0]?.resistanceOhmPerKm,
    0.160_8,
    'network.cables[0].sizeAwg',
  ],
  [
    'a cable without a reactance',
    withCable({ resistanceOhmPerKm: 0.2 }),
    (site) => site.network?.cables?.[0]?.reactanceOhmPerKm,
    0.08,
    'network.cables[0].reactanceOhmPerKm',
  ],
  [
    '50 hp',
    siteWith(mva, { network: { buses: [{ name: 'A' }], motors: [{ bus: 'A', kw: '50 hp' }] } }),
    (site) => site.network?.motors?.[0]?.kw,
    37.285,
    'network.motors[0].kw',
  ],
];

describe('a quantity in another form', () => {
  it.each(read)('%s is read, and echoed as understood', (...[, json, value, expected, path]) => {
    const site = readSite(json);
    expect(Number(value(site)) / expected).toBeCloseTo(1, 4);
    expect(site.understood).toContainEqual(expect.objectContaining({ path, value: value(site) }));
  });

  it('both ends of a fault level are read: the least impedance is the greatest level', () => {
    const { supply } = readSite(siteWith({ faultLevel: { minOhm: 0.4, maxOhm: 0.5, atKv: 10 } }));
    expect(supply.faultLevelMva).toEqual({ max: 250, min: 200 });
    const plain = readSite(siteWith({ faultLevel: { maxMva: 250, minMva: '0.2 GVA' } }));
    expect(plain.supply.faultLevelMva).toEqual({ max: 250, min: 200 });
  });

  it('nothing is echoed where everything stands in the engine’s own form', () => {
    expect(readSite(siteWith(mva)).understood).toBeUndefined();
  });

  it('a current and an impedance that belong together give one fault level', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.5, max: 60, noNaN: true }),
        fc.double({ min: 1, max: 40, noNaN: true }),
        (ka, kv) => {
          const fromKa = readSite(siteWith({ faultLevel: { maxKa: ka, atKv: kv } })).supply.faultLevelMva.max;
          const ohm = kv / (Math.sqrt(3) * ka);
          const fromOhm = readSite(siteWith({ faultLevel: { minOhm: ohm, atKv: kv } })).supply.faultLevelMva.max;
          expect(Math.abs(fromKa / fromOhm - 1)).toBeLessThan(1e-12); // a few roundings of 1.1e-16
        },
      ),
      { seed: SEED, numRuns: 200 },
    );
  });

  it('a frequency and its order give one reactor', () => {
    fc.assert(
      fc.property(fc.double({ min: 1.1, max: 12, noNaN: true }), (order) => {
        const byOrder = readSite(withStage({ tunedOrderH: order })).bank!.stages[0]!.reactorPct!;
        const byHz = readSite(withStage({ tunedHz: order * 50 })).bank!.stages[0]!.reactorPct!;
        expect(Math.abs(byOrder / byHz - 1)).toBeLessThan(1e-12);
      }),
      { seed: SEED, numRuns: 200 },
    );
  });
});

const refused: [why: string, json: unknown, path: string, code: string][] = [
  ['no fault level', siteWith({}), 'supply.faultLevelMva', 'missing'],
  ['two fault levels', siteWith({ ...mva, faultLevel: { maxMva: 250 } }), 'supply.faultLevel', 'inconsistent'],
  [
    'a fault level of two forms',
    siteWith({ faultLevel: { maxMva: 250, maxKa: 12, atKv: 10 } }),
    'supply.faultLevel',
    'inconsistent',
  ],
  ['an empty fault level', siteWith({ faultLevel: {} }), 'supply.faultLevel', 'inconsistent'],
  ['a current without its voltage', siteWith({ faultLevel: { maxKa: 12 } }), 'supply.faultLevel.atKv', 'missing'],
  ['the least alone', siteWith({ faultLevel: { minKa: 12, atKv: 10 } }), 'supply.faultLevel.maxKa', 'missing'],
  [
    'the least above the greatest',
    siteWith({ faultLevel: { maxKa: 9, minKa: 12, atKv: 10 } }),
    'supply.faultLevel.minKa',
    'inconsistent',
  ],
  [
    'impedances the wrong way round',
    siteWith({ faultLevel: { minOhm: 0.5, maxOhm: 0.4, atKv: 10 } }),
    'supply.faultLevel.minOhm',
    'inconsistent',
  ],
  [
    'a transformer’s load loss and X/R',
    siteWith(
      { ...mva, transformers: [{ ratedKva: 1000, impedancePct: 6, loadLossKw: 10, xOverR: 6 }] },
      { meteredAt: 'bus' },
    ),
    'supply.transformers[0].xOverR',
    'inconsistent',
  ],
  [
    'a generator’s R/X and X/R',
    siteWith(mva, {
      network: {
        buses: [{ name: 'A' }],
        generators: [{ bus: 'A', ratedKva: 400, subtransientPct: 12, rOverX: 0.1, xOverR: 10, state: 'off' }],
      },
    }),
    'network.generators[0].xOverR',
    'inconsistent',
  ],
  [
    'a length in a unit that is none',
    withCable({ lengthM: '200 cubits', crossSectionMm2: 95 }),
    'network.cables[0].lengthM',
    'wrong-unit',
  ],
  ['R/X and X/R', siteWith({ ...mva, rOverX: 0.1, xOverR: 10 }), 'supply.xOverR', 'inconsistent'],
  ['a reactor in two forms', withStage({ reactorPct: 7, tunedHz: 189 }), 'bank.stages[0].tunedHz', 'inconsistent'],
  ['a reactor tuned to the fundamental', withStage({ tunedHz: 50 }), 'bank.stages[0].tunedHz', 'out-of-range'],
  ['what only the program may say', siteWith(mva, { understood: [] }), 'understood', 'unknown-key'],
  [
    'an edition of the other rule set',
    siteWith(mva, { limits: { edition: 'IEEE 519-2014' } }),
    'limits.edition',
    'inconsistent',
  ],
  ['own limits that are not there', siteWith(mva, { limits: { edition: 'own' } }), 'limits.own', 'missing'],
  [
    'an own limit twice',
    siteWith(mva, {
      limits: {
        own: {
          voltage: [
            { orderH: 5, pct: 3 },
            { orderH: 5, pct: 4 },
          ],
        },
      },
    }),
    'limits.own.voltage[1].orderH',
    'inconsistent',
  ],
  [
    'a degree of protection that is none',
    siteWith(mva, { place: { enclosureIp: '31' } }),
    'place.enclosureIp',
    'out-of-range',
  ],
  [
    'a measurement of an order twice',
    siteWith(mva, {
      loads: {
        measured: {
          bankKvar: 0,
          currentA: [
            { orderH: 5, a: 1 },
            { orderH: 5, a: 2 },
          ],
        },
      },
    }),
    'loads.measured.currentA[1].orderH',
    'inconsistent',
  ],
  ['a ripple signal at the mains frequency', siteWith({ ...mva, rippleHz: 50 }), 'supply.rippleHz', 'out-of-range'],
  [
    'a current transformer without a ratio',
    siteWith(mva, { control: { currentTransformer: { ratioPrimaryA: 1000 } } }),
    'control.currentTransformer.ratioSecondaryA',
    'missing',
  ],
];

describe('a source', () => {
  const current = (more: Record<string, unknown>) => ({
    loads: { distorting: [{ name: 'a', fundamentalA: 100, orders: [{ orderH: 5, pct: 30, ...more }] }] },
  });

  it('may give the angle of an order', () => {
    const { loads } = readSite(siteWith(mva, current({ angleDeg: -120 })));
    expect(loads?.distorting?.[0]?.orders).toEqual([{ orderH: 5, pct: 30, angleDeg: -120 }]);
  });

  it('has no angle beyond a turn, and a background has none', () => {
    const path = 'loads.distorting[0].orders[0].angleDeg';
    expect(problemsOf(siteWith(mva, current({ angleDeg: 361 })))).toEqual([
      expect.objectContaining({ path, code: 'out-of-range' }),
    ]);
    const background = { loads: { backgroundPct: [{ orderH: 5, pct: 1, angleDeg: 0 }] } };
    expect(problemsOf(siteWith(mva, background))).toEqual([
      expect.objectContaining({ path: 'loads.backgroundPct[0].angleDeg', code: 'unknown-key' }),
    ]);
  });
});

describe('a site', () => {
  it.each(refused)('with %s is refused at its path', (_why, json, path, code) => {
    expect(problemsOf(json)).toEqual([expect.objectContaining({ path, code })]);
  });
});
