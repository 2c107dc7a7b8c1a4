import { strongestOhm } from '../network/network-check.js';
import type { NetworkModel } from '../network/network-model.js';
import { networkStates } from '../network/network-states.js';
import { type NodalCase, nodalCase } from '../network/nodal-case.js';
import type { NetworkState } from '../network/topology.js';
import type { SeriesOhm } from '../supply/supply-path.js';
import type { ClosingNetwork, NetworkBranch, SeriesBranch } from './closing-parts.js';
import { mergedBranches } from './loop-impedance.js';

/** What a stage is closed onto besides its own bank, supply at its strongest, loads left out. */
export interface ClosingStanding {
  /** how couplers, generators and capacitors stand; "" in the normal standing */
  name: string;
  /** R and X of the supply at the bank's bus, per phase [Ω] */
  supplyOhm: SeriesOhm;
  /** other capacitors at the bank's own bus, in their steady state */
  beside: SeriesBranch[];
  /** the whole network, where capacitors stand behind an impedance; supply and capacitors are then in it */
  network: ClosingNetwork | null;
}

/**
 * Every standing a stage can be closed in: the strongest of those without other capacitors, and each with some.
 * @param model the network without the bank
 * @param frequencyHz f [Hz]
 * @returns standings; one where there is one bus
 * @source method-inrush
 */
export function closingStandings(model: NetworkModel, frequencyHz: number): ClosingStanding[] {
  const topology = model.nodal?.topology;
  if (topology === undefined) return [{ name: '', supplyOhm: strongestOhm(model), beside: [], network: null }];
  const states = networkStates(topology);
  const without = states.filter((state) => state.capacitorsIn.every((count) => count === 0));
  const withSome = states.filter((state) => state.capacitorsIn.some((count) => count > 0));
  const strongest = (): ClosingStanding => ({
    name: '',
    supplyOhm: strongestOhm(model, without),
    beside: [],
    network: null,
  });
  return [
    ...(without.length > 0 ? [strongest()] : []),
    ...withSome.map((state) => standing(model, state, frequencyHz)),
  ];
}

function standing(model: NetworkModel, state: NetworkState, frequencyHz: number): ClosingStanding {
  const { topology } = model.nodal!;
  const none = topology.motorKw.map(() => 0);
  const path = model.corners.networks[1]!.path;
  const undamped = { ...model.damping, dampingKw: 0, listedShare: 0 };
  const nodal = nodalCase({ ...topology, motorKw: none, resistiveKw: none }, state, path, undamped);
  const bankNode = nodal.busNode[topology.bankBus]!;
  const branches = networkBranches(nodal, 2 * Math.PI * frequencyHz);
  const capacitors = branches.filter(({ capacitanceF }) => capacitanceF > 0);
  const allBeside = capacitors.every(({ from }) => from === bankNode);
  return {
    name: state.name,
    supplyOhm: strongestOhm(model, [state]),
    beside: allBeside ? mergedBranches(capacitors) : [],
    network: allBeside ? null : withoutIdleNodes({ nodes: nodal.nodes, bankNode, branches }),
  };
}

function networkBranches({ branches, source, sourceNode }: NodalCase, omega: number): NetworkBranch[] {
  const all = [{ from: sourceNode, to: -1, steadyOhm: 0, ...source, capacitiveOhm: 0 }, ...branches];
  return all.map(({ from, to, steadyOhm, rOhm, xOhm, capacitiveOhm }) => ({
    from,
    to,
    // Source and generators: whatever goes to earth without a capacitor.
    driven: to < 0 && capacitiveOhm === 0,
    rOhm: steadyOhm + rOhm,
    inductanceH: xOhm / omega,
    capacitanceF: capacitiveOhm > 0 ? 1 / (omega * capacitiveOhm) : 0,
  }));
}

// A dead end without a capacitor carries nothing, and two branches in a row without one are one: fewer nodes to solve.
function withoutIdleNodes(network: ClosingNetwork): ClosingNetwork {
  for (let node = 0; node < network.nodes; node++) {
    if (node === network.bankNode) continue;
    const here = network.branches.filter(({ from, to }) => from === node || to === node);
    if (here.length > 2 || here.some(({ capacitanceF }) => capacitanceF > 0)) continue;
    const rest = network.branches.filter((branch) => !here.includes(branch));
    return withoutIdleNodes(withoutNode({ ...network, branches: [...rest, ...inARow(node, here)] }, node));
  }
  return network;
}

function inARow(node: number, [first, second]: readonly NetworkBranch[]): NetworkBranch[] {
  if (first === undefined || second === undefined || (first.driven && second.driven)) return [];
  const [plain, other] = first.driven ? [second, first] : [first, second];
  const farOf = ({ from, to }: NetworkBranch): number => (from === node ? to : from);
  if (farOf(plain) === farOf(other)) return [];
  return [
    {
      from: farOf(plain),
      to: farOf(other),
      driven: other.driven,
      rOhm: plain.rOhm + other.rOhm,
      inductanceH: plain.inductanceH + other.inductanceH,
      capacitanceF: 0,
    },
  ];
}

// The last node takes the place of the one that is gone.
function withoutNode({ nodes, bankNode, branches }: ClosingNetwork, gone: number): ClosingNetwork {
  const placed = (node: number): number => (node === nodes - 1 ? gone : node);
  return {
    nodes: nodes - 1,
    bankNode: placed(bankNode),
    branches: branches.map((branch) => ({ ...branch, from: placed(branch.from), to: placed(branch.to) })),
  };
}
