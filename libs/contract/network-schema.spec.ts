import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { readSite } from './read-site.js';

const transformer = { ratedKva: 1000, impedancePct: 6 };

/** An invented site of two boards with a coupler, a cable to a third, and a generator. */
function siteWith(network: Record<string, unknown> = {}, rest: Record<string, unknown> = {}) {
  return {
    name: 'Invented Mill',
    timeZone: 'Europe/Dublin',
    rules: 'iec',
    frequencyHz: 50,
    bus: { nominalV: 400 },
    meteredAt: 'bus',
    supply: {
      faultLevelMva: { max: 250 },
      transformers: [
        { ...transformer, bus: 'A' },
        { ...transformer, bus: 'B' },
      ],
    },
    loads: { distorting: [{ name: 'drives', bus: 'B', fundamentalA: 100, spectrum: 'six-pulse' }] },
    network: {
      buses: [{ name: 'A' }, { name: 'B' }, { name: 'C' }],
      couplers: [{ between: ['A', 'B'], state: 'either' }],
      cables: [{ between: ['B', 'C'], lengthM: '0.08 km', resistanceOhmPerKm: 0.2, reactanceOhmPerKm: '80 mohm/km' }],
      generators: [{ bus: 'A', ratedKva: 400, subtransientPct: 12, state: 'either' }],
      motors: [{ bus: 'C', kw: '50 hp' }],
      resistive: [{ bus: 'A', kw: 30 }],
      capacitors: [{ bus: 'C', count: 1, ratedKvar: 20, ratedV: 440, switched: true }],
      bankBus: 'B',
      couplingPoint: 'primary',
      transformerOut: true,
      ...network,
    },
    ...rest,
  };
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

const cable = { between: ['B', 'C'], lengthM: 80 };

const refused: [why: string, network: Record<string, unknown>, path: string, code: string][] = [
  ['no bus', { buses: [] }, 'network.buses', 'out-of-range'],
  ['an unknown key', { busbar: 1 }, 'network.busbar', 'unknown-key'],
  [
    'two buses of one name',
    { buses: [{ name: 'A' }, { name: 'B' }, { name: 'C' }, { name: 'A' }] },
    'network.buses[3].name',
    'inconsistent',
  ],
  ['a bank on a bus that is not there', { bankBus: 'D' }, 'network.bankBus', 'inconsistent'],
  [
    'a generator on a bus that is not there',
    { generators: [{ bus: 'D', ratedKva: 1, subtransientPct: 12, state: 'off' }] },
    'network.generators[0].bus',
    'inconsistent',
  ],
  ['a motor on a bus that is not there', { motors: [{ bus: 'a', kw: 1 }] }, 'network.motors[0].bus', 'inconsistent'],
  [
    'a load on a bus that is not there',
    { resistive: [{ bus: 'D', kw: 1 }] },
    'network.resistive[0].bus',
    'inconsistent',
  ],
  [
    'a capacitor on a bus that is not there',
    { capacitors: [{ bus: 'D', count: 1, ratedKvar: 20, ratedV: 440 }] },
    'network.capacitors[0].bus',
    'inconsistent',
  ],
  [
    'a coupler to a bus that is not there',
    { couplers: [{ between: ['A', 'D'], state: 'open' }] },
    'network.couplers[0].between[1]',
    'inconsistent',
  ],
  [
    'a coupler from a bus to itself',
    { couplers: [{ between: ['A', 'A'], state: 'open' }] },
    'network.couplers[0].between',
    'inconsistent',
  ],
  [
    'a coupler with one end',
    { couplers: [{ between: ['A'], state: 'open' }] },
    'network.couplers[0].between',
    'out-of-range',
  ],
  [
    'a coupler half open',
    { couplers: [{ between: ['A', 'B'], state: 'ajar' }] },
    'network.couplers[0].state',
    'out-of-range',
  ],
  ['a cable without a resistance', { cables: [cable] }, 'network.cables[0].resistanceOhmPerKm', 'missing'],
  [
    'a cable with two',
    { cables: [{ ...cable, crossSectionMm2: 95, sizeAwg: '4/0' }] },
    'network.cables[0].sizeAwg',
    'inconsistent',
  ],
  [
    'a cable of no length',
    { cables: [{ ...cable, lengthM: 0, crossSectionMm2: 95 }] },
    'network.cables[0].lengthM',
    'out-of-range',
  ],
  [
    'a length in ohms',
    { cables: [{ ...cable, lengthM: '80 ohm', crossSectionMm2: 95 }] },
    'network.cables[0].lengthM',
    'wrong-unit',
  ],
  ['a gauge nobody makes', { cables: [{ ...cable, sizeAwg: '5/0' }] }, 'network.cables[0].sizeAwg', 'out-of-range'],
  [
    'a generator without reactance',
    { generators: [{ bus: 'A', ratedKva: 1, subtransientPct: 0, state: 'off' }] },
    'network.generators[0].subtransientPct',
    'out-of-range',
  ],
  ['a point of coupling nowhere', { couplingPoint: 'D' }, 'network.couplingPoint', 'inconsistent'],
];

describe('a network', () => {
  it('is read whole, quantities in the engine’s units', () => {
    const site = readSite(siteWith());
    expect(site.network?.cables?.[0]).toEqual({
      between: ['B', 'C'],
      lengthM: 80,
      resistanceOhmPerKm: 0.2,
      reactanceOhmPerKm: 0.08,
    });
    expect(site.network?.motors?.[0]?.kw).toBeCloseTo(37.285, 3);
    expect(site.supply.transformers?.map(({ bus }) => bus)).toEqual(['A', 'B']);
  });

  it.each(refused)('with %s is refused at its path', (_why, network, path, code) => {
    expect(problemsOf(siteWith(network))).toEqual([expect.objectContaining({ path, code })]);
  });

  it('asks every transformer for its bus where there are several', () => {
    const supply = { faultLevelMva: { max: 250 }, transformers: [transformer, { ...transformer, bus: 'B' }] };
    expect(problemsOf(siteWith({}, { supply }))).toEqual([
      expect.objectContaining({ path: 'supply.transformers[0].bus', code: 'missing' }),
    ]);
  });

  it('that contradicts the arrangement of its transformers is refused', () => {
    const supply = siteWith().supply;
    const parallel = { ...supply, arrangement: 'parallel' };
    expect(problemsOf(siteWith({}, { supply: parallel }))).toEqual([
      expect.objectContaining({ path: 'supply.arrangement', code: 'inconsistent' }),
    ]);
    expect(problemsOf(siteWith({}, { supply: { ...supply, arrangement: 'separate' } }))).toEqual([]);
  });

  it('is needed where a part names a bus', () => {
    const site: Record<string, unknown> = siteWith();
    delete site.network;
    const supply = { faultLevelMva: { max: 250 }, transformers: [{ ...transformer, bus: 'A' }] };
    expect(problemsOf({ ...site, supply })).toEqual([
      expect.objectContaining({ path: 'supply.transformers[0].bus', code: 'inconsistent' }),
      expect.objectContaining({ path: 'loads.distorting[0].bus', code: 'inconsistent' }),
    ]);
  });

  it('whose loads stand on a bus that is not there is refused: they would distort nothing', () => {
    const loads = { distorting: [{ name: 'drives', bus: 'b', fundamentalA: 100, spectrum: 'six-pulse' }] };
    expect(problemsOf(siteWith({}, { loads }))).toEqual([
      expect.objectContaining({ path: 'loads.distorting[0].bus', code: 'inconsistent' }),
    ]);
  });

  it('names every fault at once', () => {
    const network = { bankBus: 'X', couplingPoint: 'Y', cables: [{ ...cable, between: ['B', 'Z'] }] };
    expect(problemsOf(siteWith(network)).map(({ path }) => path)).toEqual(
      expect.arrayContaining(['network.bankBus', 'network.couplingPoint', 'network.cables[0].between[1]']),
    );
  });
});
