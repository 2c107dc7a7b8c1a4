import type { Bank } from '../layout/bank.js';
import type { CornerCase } from './corners.js';
import type { NetworkModel } from './network-model.js';
import { type NodalCase, nodalCase } from './nodal-case.js';
import { type StageBranch, stageBranch } from './stage-admittance.js';
import { type NetworkState, oneBus } from './topology.js';

/** What a netlist shows: one level in one corner at the orders asked. */
export interface NetlistScene {
  bank: Bank;
  /** connected stages per group */
  vector: Int32Array;
  corner: CornerCase;
  ordersH: ArrayLike<number>;
  frequencyHz: number;
  /** first line */
  title: string;
}

/**
 * The network as a plain SPICE netlist, for a second opinion: one copy of the network an order, node names ending in
 * the order, resistances at their value for that order, and a source of 1 A at the bank's bus, so that the voltage of
 * a node at the frequency named in its comment is the impedance (at the bank's bus) or transfer impedance (elsewhere).
 * @param model the network without the bank
 * @param scene level, corner and orders
 * @returns text, one statement a line
 * @source method-network
 */
export function networkNetlist(model: NetworkModel, scene: NetlistScene): string {
  const nodal = caseOf(model, scene.corner);
  const copies = Array.from(scene.ordersH, (orderH) => copyOf(model, nodal, scene, orderH));
  const orders = Array.from(scene.ordersH);
  const lowest = Math.min(...orders) * scene.frequencyHz;
  const highest = Math.max(...orders) * scene.frequencyHz;
  return [
    netlistComment(scene.title),
    ...model.buses.map((name, k) => netlistComment(`${name}: ${nodeName(model, nodal, nodal.busNode[k]!)}`)),
    '* Above, each bus and its node; a node ends in its order. One copy of the network an order; read each at the',
    '* frequency in its comment: a sweep to another makes no sense, since its resistances belong to its own order.',
    '* Per phase, star-equivalent, referred to the voltage of the buses: r in ohm, l in henry, c in farad. Resistances are',
    `* those at the fundamental times order^${nodal.resistanceExponent}; those of cables and resistive loads stay as they are.`,
    "* 1 A enters at the bus of the bank, so volts are ohms: the magnitude at that bus's node is the impedance there, at any",
    '* other node the transfer impedance between the two. A coupler that is closed makes its buses one node.',
    ...partComments(model, nodal, scene),
    ...copies.flat(),
    ...orders.slice(0, 1).map(() => `.ac lin ${sweepPoints(orders)} ${number(lowest)} ${number(highest)}`),
    '.end',
    '',
  ].join('\n');
}

/**
 * Text of a person's as a comment: nothing in it can end the line or begin a statement.
 * @param text any text
 * @returns one line
 */
export function netlistComment(text: string): string {
  return `* ${text.replaceAll(/[\p{C}\p{Zl}\p{Zp}]+/gu, ' ').trim()}`;
}

// What each part of a copy stands for, and between which nodes.
function partComments(model: NetworkModel, nodal: NodalCase, { bank, vector, corner }: NetlistScene): string[] {
  const node = (k: number): string => (k < 0 ? 'earth' : nodeName(model, nodal, k));
  const between = (from: number, to: number): string => `${node(from)} to ${node(to)}`;
  const { faultLevelMva, capacitanceFactor, inductanceFactor } = corner.corner;
  const tolerance = `capacitance x ${capacitanceFactor}, inductance x ${inductanceFactor}`;
  return [
    `* source: supply of ${faultLevelMva} MVA as an impedance, ${between(nodal.sourceNode, -1)}`,
    ...nodal.branches.map(({ what, from, to }, i) =>
      netlistComment(`part${i + 1}: ${what ?? ''}, ${between(from, to)}`),
    ),
    ...Array.from(nodal.conductance).flatMap((siemens, k) =>
      siemens > 0 ? [`* load${k + 1}: resistive load, ${between(k, -1)}`] : [],
    ),
    ...bank.groups.flatMap(({ ratedKvar, ratedV, reactorPct }, g) => {
      if (vector[g] === 0) return [];
      const reactor = reactorPct > 0 ? `reactor of ${reactorPct} %` : 'no reactor';
      const rated = `${ratedKvar} kvar at ${ratedV} V, ${reactor}`;
      const last = vector[g] === 1 ? '' : ` to stage${g + 1}x${vector[g]}`;
      return [`* stage${g + 1}x1${last}: stages of group ${g + 1}, each ${rated}, ${tolerance}`];
    }),
  ];
}

// Evenly spaced orders can be swept in one go; others are read one frequency at a time.
function sweepPoints(orders: readonly number[]): number {
  if (orders.length < 2) return 1;
  const step = orders[1]! - orders[0]!;
  const even = orders.every((h, i) => Math.abs(h - (orders[0]! + i * step)) < 1e-9 * h);
  return even ? orders.length : 2;
}

function caseOf(model: NetworkModel, corner: CornerCase): NodalCase {
  if (model.nodal !== null) return model.nodal.cases[corner.network]!;
  const { path, dampingKw } = model.corners.networks[corner.network]!;
  const topology = oneBus(path.transformers.length);
  const state: NetworkState = {
    name: '',
    closedCouplers: [],
    runningGenerators: [],
    capacitorsIn: [],
    transformerOut: null,
  };
  return nodalCase(topology, state, path, { ...model.damping, dampingKw, listedShare: 1 });
}

function copyOf(model: NetworkModel, nodal: NodalCase, scene: NetlistScene, orderH: number): string[] {
  const suffix = `${orderH}`.replace('.', 'p');
  const omega = 2 * Math.PI * scene.frequencyHz;
  const growth = orderH ** nodal.resistanceExponent;
  const node = (k: number): string => (k < 0 ? '0' : `${nodeName(model, nodal, k)}_${suffix}`);
  const lines = [`* order ${orderH}: read at ${number(orderH * scene.frequencyHz)} Hz`];
  const branch = (
    name: string,
    ends: [string, string],
    parts: { rOhm: number; xOhm: number; capacitiveOhm: number },
  ): void => {
    lines.push(...seriesLines(`${name}_${suffix}`, ends, { ...parts, omega }));
  };
  lines.push(`ibank_${suffix} 0 ${node(nodal.busNode[model.bankBus]!)} dc 0 ac 1`);
  const source = { rOhm: nodal.source.rOhm * growth, xOhm: nodal.source.xOhm, capacitiveOhm: 0 };
  branch('source', [node(nodal.sourceNode), '0'], source);
  for (const [i, { from, to, steadyOhm, rOhm, xOhm, capacitiveOhm }] of nodal.branches.entries()) {
    branch(`part${i + 1}`, [node(from), node(to)], { rOhm: steadyOhm + rOhm * growth, xOhm, capacitiveOhm });
  }
  for (const [k, siemens] of nodal.conductance.entries()) {
    if (siemens > 0) lines.push(`rload${k + 1}_${suffix} ${node(k)} 0 ${number(1 / siemens)}`);
  }
  const factors = model.corners.factors[scene.corner.factors]!;
  for (const [g, group] of scene.bank.groups.entries()) {
    const stage = stageBranch(group, factors, nodal.resistanceExponent);
    for (let k = 0; k < scene.vector[g]!; k++) {
      const parts = stageParts(stage, growth);
      branch(`stage${g + 1}x${k + 1}`, [node(nodal.busNode[model.bankBus]!), '0'], parts);
    }
  }
  return lines;
}

function stageParts(stage: StageBranch, growth: number): { rOhm: number; xOhm: number; capacitiveOhm: number } {
  return { rOhm: stage.resistanceOhm * growth, xOhm: stage.inductiveOhm, capacitiveOhm: stage.capacitiveOhm };
}

// A simulator begins with direct current, for which coils side by side without any resistance have no answer: such a
// coil gets a resistance too small to be seen in the figures.
const LEAST_RESISTANCE_SHARE = 1e-8;

// A branch as the parts it has, in series between its ends.
function seriesLines(
  name: string,
  [from, to]: [string, string],
  { rOhm, xOhm, capacitiveOhm, omega }: { rOhm: number; xOhm: number; capacitiveOhm: number; omega: number },
): string[] {
  const parts: [string, number][] = [];
  const leastOhm = capacitiveOhm > 0 ? 0 : LEAST_RESISTANCE_SHARE * xOhm;
  if (rOhm > 0 || leastOhm > 0) parts.push(['r', Math.max(rOhm, leastOhm)]);
  if (xOhm > 0) parts.push(['l', xOhm / omega]);
  if (capacitiveOhm > 0) parts.push(['c', 1 / (omega * capacitiveOhm)]);
  return parts.map(([kind, value], i) => {
    const start = i === 0 ? from : `${name}_n${i}`;
    const end = i === parts.length - 1 ? to : `${name}_n${i + 1}`;
    return `${kind}${name} ${start} ${end} ${number(value)}`;
  });
}

function nodeName(model: NetworkModel, nodal: NodalCase, node: number): string {
  const bus = nodal.busNode.indexOf(node);
  if (bus < 0) return 'primary';
  return model.nodal === null ? 'main' : `bus${bus + 1}`;
}

// Every digit, in a form every circuit simulator reads.
function number(value: number): string {
  return value.toExponential(16);
}
