import type { SupplyPath } from '../supply/supply-path.js';
import { stageBranch } from './stage-admittance.js';
import { NAMEPLATE } from './tolerance-factors.js';
import type { NetworkState, Topology } from './topology.js';

/** A branch over order: Z(h) = R₀ + R·h^k + jhX − jX_C/h; `to` −1 is earth. */
export interface NodalBranch {
  /** what it stands for, for a reader */
  what?: string;
  from: number;
  to: number;
  /** R₀, a cable's: it does not grow with order */
  steadyOhm: number;
  /** R, which does */
  rOhm: number;
  xOhm: number;
  /** 0 where there is no capacitor */
  capacitiveOhm: number;
}

/** One standing of the network as nodes and branches, the bank left out. */
export interface NodalCase {
  nodes: number;
  /** node of each bus */
  busNode: Int32Array;
  /** node behind which the ideal source stands */
  sourceNode: number;
  /** source path up to that node */
  source: { rOhm: number; xOhm: number };
  branches: NodalBranch[];
  /** conductance per node that does not change with order [S] */
  conductance: Float64Array;
  resistanceExponent: number;
}

/** Motor reactance at the fundamental as a share of U²/P, and its resistance as a share of that reactance. */
const MOTOR_REACTANCE_SHARE = 1 / 6;
const MOTOR_RESISTANCE_SHARE = 0.3;

/** What damps the network. */
export interface NodalDamping {
  nominalV: number;
  motorSharePct: number;
  /** at the bank's bus [kW] */
  dampingKw: number;
  /** share of the listed motors and resistive loads that is in, 0 … 1 */
  listedShare: number;
}

/**
 * Nodes and branches of one standing: buses joined by closed couplers are one node; the primary is a node of its own
 * where there are transformers; capacitors that are in, running generators and damping loads hang from their buses. The
 * resistance of cables stays at its value at the fundamental: their conductors' skin effect is far below h^k, and less
 * damping is the graver side.
 * @param topology settled topology
 * @param state how it stands
 * @param path source and transformers at one end of their range
 * @param damping damping load and voltage
 * @returns the case
 * @source method-network
 */
export function nodalCase(topology: Topology, state: NetworkState, path: SupplyPath, damping: NodalDamping): NodalCase {
  const busNode = joinedNodes(topology, state);
  const busNodes = Math.max(...busNode) + 1;
  const hasPrimary = topology.transformerBus.length > 0;
  const sourceNode = hasPrimary ? busNodes : busNode[0]!;
  const branches = [
    ...seriesBranches(topology, state, { path, busNode, sourceNode }),
    ...shuntBranches(topology, state, { busNode, sourceNode }),
  ];
  const conductance = new Float64Array(hasPrimary ? busNodes + 1 : busNodes);
  for (const load of dampingLoads(topology, damping)) {
    const node = busNode[load.bus]!;
    conductance[node]! += load.siemens;
    if (load.motorOhm > 0) {
      const rOhm = MOTOR_RESISTANCE_SHARE * load.motorOhm;
      const what = `motors at ${topology.buses[load.bus]!}`;
      branches.push({ what, from: node, to: -1, steadyOhm: 0, rOhm, xOhm: load.motorOhm, capacitiveOhm: 0 });
    }
  }
  return {
    nodes: conductance.length,
    busNode,
    sourceNode,
    source: path.source,
    branches,
    conductance,
    resistanceExponent: path.resistanceExponent,
  };
}

function seriesBranches(
  topology: Topology,
  state: NetworkState,
  at: { path: SupplyPath; busNode: Int32Array; sourceNode: number },
): NodalBranch[] {
  const transformers = topology.transformerBus.flatMap((bus, i) =>
    i === state.transformerOut
      ? []
      : [
          {
            what: `transformer ${i + 1}`,
            from: at.sourceNode,
            to: at.busNode[bus]!,
            steadyOhm: 0,
            ...at.path.transformers[i]!,
            capacitiveOhm: 0,
          },
        ],
  );
  const cables = topology.cables
    .map(({ name, from, to, rOhm, xOhm }) => ({
      what: `cable ${name}`,
      from: at.busNode[from]!,
      to: at.busNode[to]!,
      steadyOhm: rOhm,
      rOhm: 0,
      xOhm,
      capacitiveOhm: 0,
    }))
    .filter(({ from, to }) => from !== to);
  return [...transformers, ...cables];
}

function shuntBranches(
  topology: Topology,
  state: NetworkState,
  { busNode, sourceNode }: { busNode: Int32Array; sourceNode: number },
): NodalBranch[] {
  const generators = topology.generators
    .filter((_, i) => state.runningGenerators[i])
    .map(({ name, bus, rOhm, xOhm }) => ({
      what: `generator ${name}, subtransient`,
      from: busNode[bus]!,
      to: -1,
      steadyOhm: 0,
      rOhm,
      xOhm,
      capacitiveOhm: 0,
    }));
  const capacitors = topology.capacitors.flatMap(({ name, bus, group }, i) => {
    const count = state.capacitorsIn[i]!;
    if (count === 0) return [];
    const ohm = stageBranch(group, state.tolerance ?? NAMEPLATE, 0);
    return [
      {
        what: `${count} in parallel of the network's capacitors, ${name}`,
        from: bus === 'primary' ? sourceNode : busNode[bus]!,
        to: -1,
        steadyOhm: 0,
        rOhm: ohm.resistanceOhm / count,
        xOhm: ohm.inductiveOhm / count,
        capacitiveOhm: ohm.capacitiveOhm / count,
      },
    ];
  });
  return [...generators, ...capacitors];
}

function dampingLoads(topology: Topology, damping: NodalDamping): { bus: number; siemens: number; motorOhm: number }[] {
  const baseOhmKw = damping.nominalV ** 2 / 1000;
  return topology.buses.map((_, bus) => {
    const atBank = bus === topology.bankBus ? damping.dampingKw : 0;
    const shareKw = (damping.motorSharePct / 100) * atBank;
    const motorKw = shareKw + damping.listedShare * topology.motorKw[bus]!;
    const restKw = atBank - shareKw + damping.listedShare * topology.resistiveKw[bus]!;
    return {
      bus,
      siemens: restKw / baseOhmKw,
      motorOhm: motorKw > 0 ? (MOTOR_REACTANCE_SHARE * baseOhmKw) / motorKw : 0,
    };
  });
}

/**
 * Node of each bus: buses joined by closed couplers are one.
 * @param topology settled topology
 * @param state how it stands
 * @returns nodes, counted from 0
 * @source method-network
 */
export function joinedNodes(topology: Topology, state: NetworkState): Int32Array {
  const group = topology.buses.map((_, i) => i);
  for (const [i, { from, to }] of topology.couplers.entries()) {
    if (!state.closedCouplers[i]) continue;
    const merged = group[to]!;
    for (let k = 0; k < group.length; k++) if (group[k] === merged) group[k] = group[from]!;
  }
  const distinct = [...new Set(group)];
  return Int32Array.from(group, (g) => distinct.indexOf(g));
}
