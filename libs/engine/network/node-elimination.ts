import type { NodalCase } from './nodal-case.js';

/** What happens when a node is eliminated; entries are places of the upper triangle, fill-in counted. */
export interface EliminationStep {
  node: number;
  /** entry of its diagonal */
  pivot: number;
  /** positions of the neighbours it still has then */
  neighbours: number[];
  /** entries between it and those neighbours */
  links: number[];
  /** entries among those neighbours, row after row of the lower triangle, diagonal counted */
  among: number[];
}

/** In which order the nodes of a network are eliminated, and what that touches. */
export interface Elimination {
  /** one a node, the last for the node that is left */
  steps: EliminationStep[];
  entries: number;
  /** entry of each node's diagonal */
  diagonal: number[];
  /** per branch, the entry between its ends; −1 where it goes to earth */
  branchEntry: number[];
}

/**
 * Plans the elimination of all nodes of a network but one: the node with the fewest neighbours first, so that a radial
 * network fills nothing in and a ring costs one link a node. Numbers play no part: one plan serves every order.
 * @param network nodes and branches
 * @param last the node that is left
 * @returns the plan
 * @source derived: least degree first
 */
export function planElimination(network: NodalCase, last: number): Elimination {
  const pairs = new Map<number, number>();
  const entry = (a: number, b: number): number => {
    const key = Math.min(a, b) * network.nodes + Math.max(a, b);
    const known = pairs.get(key);
    if (known !== undefined) return known;
    pairs.set(key, pairs.size);
    return pairs.size - 1;
  };
  const diagonal = Array.from({ length: network.nodes }, (_, node) => entry(node, node));
  const around = Array.from({ length: network.nodes }, () => new Set<number>());
  const branchEntry = network.branches.map(({ from, to }) => {
    if (to < 0) return -1;
    around[from]!.add(to);
    around[to]!.add(from);
    return entry(from, to);
  });
  const steps: EliminationStep[] = [];
  const left = new Set(around.keys());
  const nodeSteps: { node: number; neighbours: number[] }[] = [];
  while (left.size > 0) {
    const node = nextNode(left, around, last);
    const neighbours = [...around[node]!];
    nodeSteps.push({ node, neighbours });
    left.delete(node);
    for (const a of neighbours) {
      around[a]!.delete(node);
      for (const b of neighbours) if (a !== b) around[a]!.add(b);
    }
  }
  const position = new Map(nodeSteps.map(({ node }, k) => [node, k]));
  for (const { node, neighbours } of nodeSteps) {
    steps.push({
      node,
      pivot: diagonal[node]!,
      neighbours: neighbours.map((other) => position.get(other)!),
      links: neighbours.map((other) => entry(node, other)),
      among: neighbours.flatMap((a, i) => neighbours.slice(0, i + 1).map((b) => entry(a, b))),
    });
  }
  return { steps, entries: pairs.size, diagonal, branchEntry };
}

function nextNode(left: ReadonlySet<number>, around: readonly ReadonlySet<number>[], last: number): number {
  let best = last;
  for (const node of left) {
    if (node === last) continue;
    if (best === last || around[node]!.size < around[best]!.size) best = node;
  }
  return best;
}
