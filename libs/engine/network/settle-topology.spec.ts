import { describe, expect, it } from 'vitest';
import type { StageGroup } from '../layout/bank.js';
import { InputProblem, type Problem } from '../problem.js';
import { networkStates } from './network-states.js';
import { settleTopology } from './settle-topology.js';
import type { CouplerInput, NetworkInput, Topology } from './topology.js';

const group: StageGroup = {
  count: 2,
  ratedKvar: 25,
  ratedV: 440,
  reactorPct: 0,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
};

function settled(input: NetworkInput, transformerBuses: (string | undefined)[] = ['a']): Topology {
  return settleTopology(input, { nominalV: 400, frequencyHz: 50, transformerBuses, group: () => group });
}

function problemsOf(input: NetworkInput, transformerBuses?: (string | undefined)[]): readonly Problem[] {
  try {
    networkStates(settled(input, transformerBuses));
  } catch (error) {
    if (error instanceof InputProblem) return error.problems;
    throw error;
  }
  return [];
}

const buses = ['a', 'b', 'c'].map((name) => ({ name }));
const cable = (from: string, to: string) => ({
  between: [from, to] as [string, string],
  lengthM: 100,
  resistanceOhmPerKm: 0.2,
  reactanceOhmPerKm: 0.08,
});
const coupler = (from: string, to: string, state: CouplerInput['state']): CouplerInput => ({
  between: [from, to],
  state,
});
const radial: NetworkInput = { buses, cables: [cable('a', 'b'), cable('b', 'c')] };

describe('a sound network', () => {
  it('is settled without complaint', () => {
    expect(problemsOf(radial)).toEqual([]);
  });

  it('has the impedance of its cables: 100 m of two side by side are 50 m', () => {
    const [first] = settled({ buses, cables: [{ ...cable('a', 'b'), parallel: 2 }, cable('b', 'c')] }).cables;
    expect(first!.rOhm).toBeCloseTo(0.2 * 0.05, 15);
    expect(first!.xOhm).toBeCloseTo(0.08 * 0.05, 15);
  });

  it('sets a further bank at every level its stages can make, what the network cannot tell apart once', () => {
    const stage = { count: 2, ratedKvar: 25, ratedV: 440 };
    const { banks, capacitors } = settled({ ...radial, banks: [{ name: 'west', bus: 'c', stages: [stage, stage] }] });
    expect(capacitors.map(({ name, bus }) => [name, bus])).toEqual([
      ['west, group 1', 2],
      ['west, group 2', 2],
    ]);
    // four equal stages: 4, 0, 1, 2, 3 of them, whichever they are
    expect(banks[0]!.vectors.map((vector) => vector.reduce((sum, count) => sum + count, 0))).toEqual([4, 0, 1, 2, 3]);
    expect(problemsOf({ ...radial, banks: [{ bus: 'nowhere', stages: [stage] }] })).toMatchObject([
      { path: 'network.banks[0].bus', found: '"nowhere"' },
    ]);
  });

  it('has x″·U²/S in a generator and 0.15 of that as its resistance: 400 kVA of 10 % at 400 V are 40 mΩ', () => {
    const generators = [{ bus: 'b', ratedKva: 400, subtransientPct: 10, state: 'running' as const }];
    const [generator] = settled({ ...radial, generators }).generators;
    expect(generator!.xOhm).toBeCloseTo(0.04, 15);
    expect(generator!.rOhm).toBeCloseTo(0.006, 15);
  });

  it('puts the bank and the point that is judged at the first bus where nothing is said', () => {
    expect(settled(radial)).toMatchObject({ bankBus: 0, couplingPoint: 0 });
    expect(settled({ ...radial, bankBus: 'c' })).toMatchObject({ bankBus: 2, couplingPoint: 2 });
    expect(settled({ ...radial, bankBus: 'c', couplingPoint: 'primary' }).couplingPoint).toBe('primary');
  });
});

/** What is wrong, the network, the buses of the transformers, and the path that must be named. */
const refused: [what: string, input: NetworkInput, transformers: (string | undefined)[], path: string][] = [
  ['no bus', { buses: [] }, [], 'network.buses'],
  [
    'two buses of one name',
    { buses: [...buses, { name: 'b' }], cables: radial.cables! },
    ['a'],
    'network.buses[3].name',
  ],
  ['an island', { buses, cables: [cable('a', 'b')] }, ['a'], 'network.buses[2]'],
  [
    'an island behind an open coupler',
    { buses, cables: [cable('a', 'b')], couplers: [coupler('b', 'c', 'open')] },
    ['a'],
    'network.buses[2]',
  ],
  [
    'an island behind a coupler that is open in normal standing',
    { buses, cables: [cable('a', 'b')], couplers: [coupler('b', 'c', 'either')] },
    ['a'],
    'network.buses[2]',
  ],
  [
    'an island fed by a generator alone',
    {
      buses,
      cables: [cable('a', 'b')],
      generators: [{ bus: 'c', ratedKva: 100, subtransientPct: 10, state: 'running' }],
    },
    ['a'],
    'network.buses[2]',
  ],
  ['a bank on a missing bus', { ...radial, bankBus: 'd' }, ['a'], 'network.bankBus'],
  ['a coupling point that is not there', { ...radial, couplingPoint: 'd' }, ['a'], 'network.couplingPoint'],
  ['a primary without a transformer', { ...radial, couplingPoint: 'primary' }, [], 'network.couplingPoint'],
  ['a transformer on no bus', radial, [undefined], 'supply.transformers[0].bus'],
  ['a transformer on a missing bus', radial, ['a', 'd'], 'supply.transformers[1].bus'],
  [
    'a cable to a missing bus',
    { buses, cables: [...radial.cables!, cable('a', 'd')] },
    ['a'],
    'network.cables[2].between[1]',
  ],
  [
    'a cable from a bus to itself',
    { buses, cables: [...radial.cables!, cable('a', 'a')] },
    ['a'],
    'network.cables[2].between',
  ],
  [
    'a cable without length',
    { buses, cables: [{ ...cable('a', 'b'), lengthM: 0 }, cable('b', 'c')] },
    ['a'],
    'network.cables[0]',
  ],
  [
    'a cable without impedance',
    { buses, cables: [{ ...cable('a', 'b'), resistanceOhmPerKm: 0, reactanceOhmPerKm: 0 }, cable('b', 'c')] },
    ['a'],
    'network.cables[0]',
  ],
  [
    'a cable of no number',
    { buses, cables: [{ ...cable('a', 'b'), lengthM: Number.NaN }, cable('b', 'c')] },
    ['a'],
    'network.cables[0]',
  ],
  [
    'a loop of closed couplers',
    { buses, couplers: [coupler('a', 'b', 'closed'), coupler('b', 'c', 'closed'), coupler('c', 'a', 'closed')] },
    ['a'],
    'network.couplers[2]',
  ],
  [
    'a loop that closing one of them makes',
    { buses, couplers: [coupler('a', 'b', 'closed'), coupler('b', 'c', 'closed'), coupler('c', 'a', 'either')] },
    ['a'],
    'network.couplers[2]',
  ],
  [
    'two couplers that contradict each other',
    { ...radial, couplers: [coupler('a', 'b', 'open'), coupler('b', 'a', 'closed')] },
    ['a'],
    'network.couplers[1]',
  ],
  [
    'a coupler from a bus to itself',
    { ...radial, couplers: [coupler('b', 'b', 'open')] },
    ['a'],
    'network.couplers[0].between',
  ],
  ['a motor on a missing bus', { ...radial, motors: [{ bus: 'd', kw: 5 }] }, ['a'], 'network.motors[0].bus'],
  [
    'a resistive load on a missing bus',
    { ...radial, resistive: [{ bus: 'd', kw: 5 }] },
    ['a'],
    'network.resistive[0].bus',
  ],
  [
    'a generator on a missing bus',
    { ...radial, generators: [{ bus: 'd', ratedKva: 1, subtransientPct: 10, state: 'off' }] },
    ['a'],
    'network.generators[0].bus',
  ],
  [
    'capacitors on a missing bus',
    { ...radial, capacitors: [{ bus: 'd', count: 1, ratedKvar: 5, ratedV: 440 }] },
    ['a'],
    'network.capacitors[0].bus',
  ],
];

describe('a network is refused by the part that is wrong', () => {
  it.each(refused)('%s', (_what, input, transformers, path) => {
    const problems = problemsOf(input, transformers);
    expect(problems.map((problem) => problem.path)).toContain(path);
    for (const { expected, found } of problems) {
      expect(expected.length).toBeGreaterThan(0);
      expect(found.length).toBeGreaterThan(0);
    }
  });

  it('with everything that is wrong, not the first of it', () => {
    const input: NetworkInput = { ...radial, bankBus: 'x', couplingPoint: 'y', motors: [{ bus: 'z', kw: 1 }] };
    expect(problemsOf(input).map(({ path }) => path)).toEqual(
      expect.arrayContaining(['network.bankBus', 'network.couplingPoint', 'network.motors[0].bus']),
    );
  });

  it('control: a ring of cables, and couplers that stay open in a ring, are sound', () => {
    expect(problemsOf({ buses, cables: [...radial.cables!, cable('c', 'a')] })).toEqual([]);
    expect(
      problemsOf({
        ...radial,
        couplers: [coupler('a', 'b', 'open'), coupler('b', 'c', 'open'), coupler('c', 'a', 'open')],
      }),
    ).toEqual([]);
  });
});
