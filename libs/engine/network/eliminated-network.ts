import type { ComplexColumn } from './bus-admittance.js';
import { BLOCK_ORDERS, EliminationBlock } from './elimination-block.js';
import type { NodalCase } from './nodal-case.js';
import { nodalTable } from './nodal-impedance.js';
import { type Elimination, planElimination } from './node-elimination.js';

/** What a node and the bank's node know of each other, over orders [Ω]. */
export interface NodeColumns {
  self: ComplexColumn;
  toBank: ComplexColumn;
}

/**
 * A network seen from the bank's node. All other nodes are eliminated from its symmetric admittance matrix, L·D·Lᵀ without
 * exchange of rows: the last pivot is Y₀ = 1/z_bb, with nothing left to solve. The impedances of the other nodes follow
 * backwards from the same factors, only where L has an entry, on the diagonal, and towards the bank.
 */
export class EliminatedNetwork {
  readonly #network: NodalCase;
  readonly #bankNode: number;
  readonly #plan: Elimination;
  readonly #block: EliminationBlock;

  /**
   * @param network one standing of the network
   * @param bankNode node of the bank's bus
   */
  constructor(network: NodalCase, bankNode: number) {
    this.#network = network;
    this.#bankNode = bankNode;
    this.#plan = planElimination(network, bankNode);
    this.#block = new EliminationBlock(network, this.#plan);
  }

  /**
   * Admittance at the bank's node.
   * @param ordersH orders h ≥ 1, length n
   * @returns Y₀ [S], length n
   * @source method-network
   */
  bankAdmittance(ordersH: Float64Array): ComplexColumn {
    const out = emptyColumn(ordersH.length);
    for (let from = 0; from < ordersH.length; from += BLOCK_ORDERS) {
      const doubtful = this.#block.factorise(ordersH.subarray(from, from + BLOCK_ORDERS));
      this.#block.copyInto(this.#plan.diagonal[this.#bankNode]!, out, from);
      for (const i of doubtful) this.#exchangedAdmittanceInto(out, from + i, ordersH[from + i]!);
    }
    return out;
  }

  /**
   * Admittance at the bank's node and impedances of every node.
   * @param ordersH orders h ≥ 1, length n
   * @returns Y₀ [S] and one entry a node [Ω], length n
   * @source method-network
   */
  columns(ordersH: Float64Array): { bank: ComplexColumn; nodes: NodeColumns[] } {
    const n = ordersH.length;
    const bank = emptyColumn(n);
    const nodes = this.#plan.diagonal.map(() => ({ self: emptyColumn(n), toBank: emptyColumn(n) }));
    for (let from = 0; from < n; from += BLOCK_ORDERS) {
      const doubtful = this.#block.factorise(ordersH.subarray(from, from + BLOCK_ORDERS));
      this.#block.copyInto(this.#plan.diagonal[this.#bankNode]!, bank, from);
      this.#block.invert();
      for (const [node, { self, toBank }] of nodes.entries()) {
        this.#block.copyInto(this.#plan.diagonal[node]!, self, from);
        this.#block.copyInto(this.#block.toBankEntry(node), toBank, from);
      }
      for (const i of doubtful) {
        this.#exchangedAdmittanceInto(bank, from + i, ordersH[from + i]!);
        this.#exchangedInto(nodes, from + i, ordersH[from + i]!);
      }
    }
    return { bank, nodes };
  }

  #exchangedAdmittanceInto(out: ComplexColumn, at: number, orderH: number): void {
    const { z } = nodalTable(this.#network, Float64Array.of(orderH));
    const own = 2 * this.#bankNode * (this.#network.nodes + 1);
    const square = z[own]! * z[own]! + z[own + 1]! * z[own + 1]!;
    out.re[at] = z[own]! / square;
    out.im[at] = -z[own + 1]! / square;
  }

  #exchangedInto(nodes: readonly NodeColumns[], at: number, orderH: number): void {
    const { z } = nodalTable(this.#network, Float64Array.of(orderH));
    const n = this.#network.nodes;
    for (const [node, { self, toBank }] of nodes.entries()) {
      self.re[at] = z[2 * (node * n + node)]!;
      self.im[at] = z[2 * (node * n + node) + 1]!;
      toBank.re[at] = z[2 * (node * n + this.#bankNode)]!;
      toBank.im[at] = z[2 * (node * n + this.#bankNode) + 1]!;
    }
  }
}

function emptyColumn(length: number): ComplexColumn {
  return { re: new Float64Array(length), im: new Float64Array(length) };
}
