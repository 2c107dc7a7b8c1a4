import { InputProblem } from '../problem.js';
import { toleranceEnds } from './tolerance-factors.js';
import { MOST_STATES, type NetworkState, type Topology } from './topology.js';

/**
 * Every way the network can stand, the normal one first: couplers and generators marked `either` both ways, switched
 * capacitors at every count, further banks at every level, and where asked each transformer out in turn. A transformer's
 * absence that would leave a bus without supply is left out: that board is then dead.
 * @param topology settled topology
 * @returns states; their number does not depend on the bank
 * @throws InputProblem where a bus has no supply in normal standing, or there are more than 256 states
 * @source method-network
 */
export function networkStates(topology: Topology): NetworkState[] {
  const normal: NetworkState = {
    name: '',
    closedCouplers: topology.couplers.map(({ state }) => state === 'closed'),
    runningGenerators: topology.generators.map(({ state }) => state === 'running'),
    capacitorsIn: topology.capacitors.map(({ group }) => group.count),
    transformerOut: null,
  };
  let states = [normal];
  for (const [i, { name, state }] of topology.couplers.entries()) {
    if (state === 'either') states = states.flatMap((s) => [s, named(s, `${name} closed`, { coupler: i })]);
    refuseTooMany(states.length);
  }
  for (const [i, { name, state }] of topology.generators.entries()) {
    if (state === 'either') states = states.flatMap((s) => [s, named(s, `${name} running`, { generator: i })]);
    refuseTooMany(states.length);
  }
  for (const [i, { name, group, switched }] of topology.capacitors.entries()) {
    if (!switched) continue;
    const fewer = Array.from({ length: group.count }, (_, count) => count);
    states = states.flatMap((s) => [s, ...fewer.map((count) => withCount(s, `${count} of ${name}`, i, count))]);
    refuseTooMany(states.length);
  }
  for (const { name, firstEntry, vectors } of topology.banks) {
    const lesser = vectors.slice(1);
    states = states.flatMap((s) => [s, ...lesser.map((vector) => withVector(s, name, firstEntry, vector))]);
    refuseTooMany(states.length);
  }
  if (topology.transformerOut) {
    const outs = topology.transformerBus.map((_, i) => i);
    states = states.flatMap((s) => [
      s,
      ...outs.map((out) => ({ ...withName(s, `transformer ${out + 1} out`), transformerOut: out })),
    ]);
  }
  refuseTooMany(states.length);
  refuseIslands(topology, normal);
  return states.filter((state) => state === normal || unsupplied(topology, state).length === 0);
}

/**
 * The states in which capacitors of the network are in, at both ends of their tolerance too: all of them together, apart
 * from the bank's. Each state as the nameplates say comes first, then its ends.
 * @param topology settled topology
 * @param states every way the network can stand
 * @returns the states and their ends; those without capacitors once
 * @source method-network
 */
export function withTolerances({ capacitors }: Topology, states: readonly NetworkState[]): NetworkState[] {
  return states.flatMap((state) => {
    const inNow = capacitors.filter((_, i) => state.capacitorsIn[i]! > 0);
    if (inNow.length === 0) return [state];
    const reactors = inNow.some(({ group }) => group.reactorPct > 0);
    return [state, ...toleranceEnds(reactors).map((tolerance) => ({ ...state, tolerance }))];
  });
}

function refuseTooMany(count: number): void {
  if (count <= MOST_STATES) return;
  throw new InputProblem([
    {
      code: 'too-many-levels',
      path: 'network',
      expected: `at most ${MOST_STATES} ways for couplers, generators, capacitors, further banks and transformers to stand`,
      found: `${count}`,
    },
  ]);
}

function withName(state: NetworkState, name: string): NetworkState {
  return { ...state, name: state.name === '' ? name : `${state.name}, ${name}` };
}

function named(state: NetworkState, name: string, change: { coupler?: number; generator?: number }): NetworkState {
  return {
    ...withName(state, name),
    closedCouplers: state.closedCouplers.map((closed, i) => closed || i === change.coupler),
    runningGenerators: state.runningGenerators.map((running, i) => running || i === change.generator),
  };
}

function withCount(state: NetworkState, name: string, entry: number, count: number): NetworkState {
  return { ...withName(state, name), capacitorsIn: state.capacitorsIn.map((now, i) => (i === entry ? count : now)) };
}

function withVector(state: NetworkState, name: string, firstEntry: number, vector: Int32Array): NetworkState {
  const told = vector.every((count) => count === 0) ? `${name} out` : `${name} with ${vector.join(' + ')} stages in`;
  const capacitorsIn = state.capacitorsIn.map((now, i) => vector[i - firstEntry] ?? now);
  return { ...withName(state, told), capacitorsIn };
}

function refuseIslands(topology: Topology, normal: NetworkState): void {
  const dead = unsupplied(topology, normal);
  if (dead.length === 0) return;
  throw new InputProblem(
    dead.map((bus) => ({
      code: 'inconsistent' as const,
      path: `network.buses[${bus}]`,
      expected: 'a way to the supply through a transformer, cable or closed coupler',
      found: `"${topology.buses[bus]}" on an island`,
    })),
  );
}

function unsupplied(topology: Topology, state: NetworkState): number[] {
  const supplied = new Set<number>(topology.transformerBus.filter((_, i) => i !== state.transformerOut));
  if (topology.transformerBus.length === 0) supplied.add(0);
  const links = [
    ...topology.cables.map(({ from, to }) => [from, to] as const),
    ...topology.couplers.filter((_, i) => state.closedCouplers[i]).map(({ from, to }) => [from, to] as const),
  ];
  for (let grew = true; grew; ) {
    grew = false;
    for (const [from, to] of links) {
      if (supplied.has(from) === supplied.has(to)) continue;
      supplied.add(from).add(to);
      grew = true;
    }
  }
  return topology.buses.flatMap((_, bus) => (supplied.has(bus) ? [] : [bus]));
}
