import { describe, expect, it } from 'vitest';
import type { StageGroup } from '../layout/bank.js';
import { InputProblem } from '../problem.js';
import { networkStates } from './network-states.js';
import { oneBus, type Topology } from './topology.js';

const group = (count: number): StageGroup => ({
  count,
  ratedKvar: 25,
  ratedV: 440,
  reactorPct: 0,
  reactorQuality: 30,
  dischargeOhm: null,
  reactorMaxA: null,
  switchPeakA: null,
  fixed: false,
});

// Buses in a row, each with a transformer of its own and a coupler to the next.
function row(count: number, parts: Partial<Topology> = {}): Topology {
  const names = Array.from({ length: count }, (_, k) => `b${k}`);
  return {
    ...oneBus(count),
    buses: names,
    couplers: names.slice(1).map((_, k) => ({ name: `q${k + 1}`, from: k, to: k + 1, state: 'either' })),
    motorKw: new Float64Array(count),
    resistiveKw: new Float64Array(count),
    transformerBus: names.map((_, k) => k),
    ...parts,
  };
}

const nameOf = (topology: Topology): string[] => networkStates(topology).map(({ name }) => name);

describe('the standings of a network', () => {
  it('begin with the normal one, couplers marked either open in it', () => {
    const [normal] = networkStates(row(2));
    expect(normal).toMatchObject({ name: '', closedCouplers: [false], transformerOut: null });
  });

  it('take every coupler marked either both ways: two make four', () => {
    expect(nameOf(row(3))).toEqual(['', 'q2 closed', 'q1 closed', 'q1 closed, q2 closed']);
  });

  it('take generators both ways and switched capacitors at every count', () => {
    const topology = row(1, {
      generators: [{ name: 'set', bus: 0, rOhm: 0.01, xOhm: 0.1, state: 'either' }],
      capacitors: [
        { name: 'old bank', bus: 0, group: group(2), switched: true },
        { name: 'fixed', bus: 0, group: group(3), switched: false },
      ],
    });
    const states = networkStates(topology);
    expect(states).toHaveLength(2 * 3);
    expect(states.map(({ capacitorsIn }) => capacitorsIn[1])).toEqual(states.map(() => 3));
    expect(new Set(states.map(({ capacitorsIn }) => capacitorsIn[0]))).toEqual(new Set([0, 1, 2]));
  });

  it('take a further bank at every state of its levels, all of it in first', () => {
    const capacitors = [group(2), { ...group(1), ratedKvar: 50 }].map((each, g) => ({
      name: `B, group ${g + 1}`,
      bus: 0,
      group: each,
      switched: false,
    }));
    // 0, 25, 50 twice (two of 25 or one of 50, one admittance), 75, 100
    const vectors = [
      [2, 1],
      [0, 0],
      [1, 0],
      [0, 1],
      [1, 1],
    ].map((counts) => Int32Array.from(counts));
    const topology = row(1, { capacitors, banks: [{ name: 'B', bus: 0, firstEntry: 0, vectors }] });
    expect(nameOf(topology)).toEqual([
      '',
      'B out',
      'B with 1 + 0 stages in',
      'B with 0 + 1 stages in',
      'B with 1 + 1 stages in',
    ]);
    expect(networkStates(topology).map(({ capacitorsIn }) => capacitorsIn)).toEqual(vectors.map((v) => [...v]));
  });

  // A board without its transformer is dead unless the coupler feeds it: such a standing is none to be judged.
  it('leave out a transformer only where no bus is dead without it', () => {
    expect(nameOf(row(2, { transformerOut: true }))).toEqual([
      '',
      'q1 closed',
      'q1 closed, transformer 1 out',
      'q1 closed, transformer 2 out',
    ]);
    expect(nameOf(row(1, { transformerOut: true }))).toEqual(['']);
  });

  // Thirty couplers would make a thousand million standings: they must be refused before they are made.
  it.each([9, 31])('refuse more than 256 of them, %i buses in a row', (count) => {
    expect(() => networkStates(row(count + 1))).toThrow(InputProblem);
    try {
      networkStates(row(count + 1));
    } catch (error) {
      expect((error as InputProblem).problems[0]).toMatchObject({ code: 'too-many-levels', path: 'network' });
    }
  });

  it('take as many as 256', () => {
    expect(networkStates(row(9))).toHaveLength(256);
  });
});
