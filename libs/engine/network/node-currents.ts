import type { NodalCase } from './nodal-case.js';
import { type BusInjection, combine } from './summation.js';

/** What the loads inject at the nodes of one network, order after order [A]. */
export interface NodeCurrents {
  /** nodes with a current at any order, ascending */
  nodes: Int32Array;
  /** loads without angles, combined per node; length orders × nodes listed */
  magnitudeA: Float64Array;
  /** phasor sum of the loads with angles */
  re: Float64Array;
  im: Float64Array;
  /** per bus, the first bus of the same node */
  firstBus: Int32Array;
}

/**
 * Gathers the currents of the buses at the nodes of a network, where closed couplers make several buses one node.
 * @param network one standing of the network
 * @param injected per bus, currents at the orders present
 * @param exponent α of each order
 * @returns currents per node
 * @source iec-tr-61000-3-6
 */
export function nodeCurrents(
  { busNode }: NodalCase,
  injected: readonly BusInjection[],
  exponent: Float64Array,
): NodeCurrents {
  const flowing = injected.flatMap(({ magnitudeA, re, im }, bus) =>
    [magnitudeA, re, im].some((column) => column.some((a) => a !== 0)) ? [busNode[bus]!] : [],
  );
  const nodes = Int32Array.from(new Set(flowing)).sort();
  const size = exponent.length * nodes.length;
  const found = { magnitudeA: new Float64Array(size), re: new Float64Array(size), im: new Float64Array(size) };
  for (const [bus, { magnitudeA, re, im }] of injected.entries()) {
    const place = nodes.indexOf(busNode[bus]!);
    if (place < 0) continue;
    for (let i = 0; i < exponent.length; i++) {
      const at = i * nodes.length + place;
      found.magnitudeA[at] = combine(found.magnitudeA[at]!, magnitudeA[i]!, exponent[i]!);
      found.re[at]! += re[i]!;
      found.im[at]! += im[i]!;
    }
  }
  return { nodes, ...found, firstBus: busNode.map((node) => busNode.indexOf(node)) };
}
