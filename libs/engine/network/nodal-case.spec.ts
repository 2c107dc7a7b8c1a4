import { describe, expect, it } from 'vitest';
import type { StageGroup } from '../layout/bank.js';
import { nodalCase } from './nodal-case.js';
import { nodalTable } from './nodal-impedance.js';
import type { NetworkState, Topology } from './topology.js';

const group: StageGroup = {
  count: 2,
  ratedKvar: 50,
  ratedV: 400,
  reactorPct: 7,
  reactorQuality: 35,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
};

const path = {
  source: { rOhm: 0.0001, xOhm: 0.001 },
  transformers: [
    { rOhm: 0.002, xOhm: 0.01 },
    { rOhm: 0.003, xOhm: 0.02 },
  ],
  resistanceExponent: 0.5,
};
const damping = { nominalV: 400, motorSharePct: 60, dampingKw: 0, listedShare: 0 };

const topology: Topology = {
  buses: ['a', 'b', 'c'],
  couplers: [{ name: 'q', from: 0, to: 1, state: 'either' }],
  cables: [
    { name: 'w1', from: 1, to: 2, rOhm: 0.01, xOhm: 0.008 },
    { name: 'w2', from: 0, to: 1, rOhm: 0.02, xOhm: 0.01 },
  ],
  generators: [{ name: 'g', bus: 2, rOhm: 0.006, xOhm: 0.04, state: 'either' }],
  motorKw: Float64Array.of(0, 0, 100),
  resistiveKw: Float64Array.of(0, 40, 0),
  capacitors: [{ name: 'old', bus: 2, group, switched: true, turns: 1 }],
  banks: [],
  transformerBus: [0, 1],
  bankBus: 0,
  couplingPoint: 0,
  transformerOut: true,
};
const normal: NetworkState = {
  name: '',
  closedCouplers: [false],
  runningGenerators: [false],
  capacitorsIn: [0],
  transformerOut: null,
};
const branchesOf = (state: Partial<NetworkState>, more: Partial<typeof damping> = {}) =>
  nodalCase(topology, { ...normal, ...state }, path, { ...damping, ...more });

describe('one standing of a network', () => {
  it('has a node a bus and one for the primary, where the source stands', () => {
    const nodal = branchesOf({});
    expect([...nodal.busNode]).toEqual([0, 1, 2]);
    expect([nodal.nodes, nodal.sourceNode]).toEqual([4, 3]);
    expect(nodal.branches).toHaveLength(2 + 2);
  });

  it('joins buses of a closed coupler, and the cable beside it is no more', () => {
    const nodal = branchesOf({ closedCouplers: [true] });
    expect([...nodal.busNode]).toEqual([0, 0, 1]);
    expect(nodal.branches.map(({ from, to }) => [from, to])).toEqual([
      [2, 0],
      [2, 0],
      [0, 1],
    ]);
  });

  it('leaves out the transformer that is out, and keeps the other at its own bus', () => {
    const transformers = branchesOf({ transformerOut: 0 }).branches.filter(({ from }) => from === 3);
    expect(transformers).toEqual([
      { what: 'transformer 2', from: 3, to: 1, steadyOhm: 0, rOhm: 0.003, xOhm: 0.02, capacitiveOhm: 0 },
    ]);
  });

  it('hangs running generators and the capacitors that are in from their bus: two of 3.2 Ω are 1.6 Ω', () => {
    const shunts = branchesOf({ runningGenerators: [true], capacitorsIn: [2] }).branches.filter(({ to }) => to === -1);
    expect(shunts[0]).toMatchObject({ from: 2, to: -1, steadyOhm: 0, rOhm: 0.006, xOhm: 0.04, capacitiveOhm: 0 });
    expect(shunts[1]!.capacitiveOhm).toBeCloseTo(1.6, 12);
    expect(shunts[1]!.xOhm).toBeCloseTo(0.07 * 1.6, 12);
    expect(shunts[1]!.rOhm).toBeCloseTo((0.07 * 1.6) / 35, 12);
  });

  it('moves the capacitors by their tolerance, never the reactor’s resistance', () => {
    const tolerance = { capacitanceFactor: 1.1, inductanceFactor: 0.97 };
    const [shunt] = branchesOf({ capacitorsIn: [2], tolerance }).branches.filter(({ to }) => to === -1);
    expect(shunt!.capacitiveOhm).toBeCloseTo(1.6 / 1.1, 12);
    expect(shunt!.xOhm).toBeCloseTo(0.97 * 0.07 * 1.6, 12);
    expect(shunt!.rOhm).toBeCloseTo((0.07 * 1.6) / 35, 12);
  });

  // A motor of 100 kW at 400 V: U²/P = 1.6 Ω, a sixth of it reactance and 0.3 of that resistance.
  it('damps with the listed loads as far as they are in, and the damping load at the bus of the bank', () => {
    const nodal = branchesOf({}, { dampingKw: 200, listedShare: 0.5 });
    const motors = nodal.branches.filter(({ to }) => to === -1);
    expect(motors.map(({ from }) => from)).toEqual([0, 2]);
    expect(motors[0]!.xOhm).toBeCloseTo(1.6 / 1.2 / 6, 12);
    expect(motors[1]!.xOhm).toBeCloseTo(3.2 / 6, 12);
    expect(motors[1]!.rOhm).toBeCloseTo((0.3 * 3.2) / 6, 12);
    expect([...nodal.conductance]).toEqual([80 / 160, 20 / 160, 0, 0]);
  });

  it('is undamped where none of them is in', () => {
    expect([...branchesOf({}).conductance]).toEqual([0, 0, 0, 0]);
  });
});

describe('the impedance matrix of one standing', () => {
  // One bus behind source and one transformer: 0.0021 Ω·√4 and 0.011 Ω·4.
  it('is the series of what lies before a bus, resistances grown with the root of the order', () => {
    const one: Topology = {
      ...topology,
      buses: ['a'],
      couplers: [],
      cables: [],
      generators: [],
      capacitors: [],
      transformerBus: [0],
    };
    const state: NetworkState = { ...normal, closedCouplers: [], runningGenerators: [], capacitorsIn: [] };
    const { z, sourceRe, sourceIm } = nodalTable(nodalCase(one, state, path, damping), Float64Array.of(4));
    expect(z[0]).toBeCloseTo(0.0021 * 2, 15);
    expect(z[1]).toBeCloseTo(0.011 * 4, 15);
    expect([sourceRe[0], sourceIm[0]]).toEqual([0.0002, 0.004]);
  });

  // At the end of an unloaded cable Z_cc − Z_bb is the cable's own impedance: 10 mΩ at every order, 8 mΩ·h beside it.
  it('leaves a cable its resistance at every order', () => {
    const bare = { ...topology, capacitors: [], generators: [] };
    const state: NetworkState = { ...normal, runningGenerators: [], capacitorsIn: [] };
    const { z, nodes } = nodalTable(nodalCase(bare, state, path, damping), Float64Array.of(1, 25));
    for (const [i, h] of [1, 25].entries()) {
      const own = (node: number, part: number): number => z[2 * (i * nodes * nodes + node * (nodes + 1)) + part]!;
      expect(own(2, 0) - own(1, 0)).toBeCloseTo(0.01, 12);
      expect(own(2, 1) - own(1, 1)).toBeCloseTo(0.008 * h, 12);
    }
  });
});
