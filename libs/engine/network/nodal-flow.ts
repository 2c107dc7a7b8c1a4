import type { ComplexColumn } from './bus-admittance.js';
import type { Flow } from './bus-flow.js';
import type { NetworkModel, NodalModel } from './network-model.js';
import type { NodeCurrents } from './node-currents.js';
import { combine } from './summation.js';

/**
 * The flows in a network of several buses. Connecting the bank at bus b is a rank-1 change of the impedance matrix,
 * Z_pq = z_pq − z_pb·z_bq·Y/(1 + Y·z_bb). From the loads of one bus j: V_i = |Z_ij|·I_j and source current |Z_sj/Z_s|·I_j,
 * s the node behind the source; from the background V_i = |Z_is|·E/|Z_s|, source current |E·(1 − Z_ss/Z_s)/Z_s|.
 * Contributions combine with the order's exponent, the currents with angles as one: |Σ Z_ij·I_j|.
 *
 * A bank is looked at in thousands of flows, so one object serves all of them and nothing is made on the way.
 */
export class NodalFlows {
  readonly #model: NetworkModel;
  readonly #nodal: NodalModel;
  readonly #withSource: boolean;
  readonly #squares: Float64Array;
  /** Z from the node in hand to each node with a current [Ω] */
  readonly #row: Float64Array;
  // What follows is of the order in hand.
  #z: Float64Array = new Float64Array();
  #offset = 0;
  #n = 0;
  #bankNode = 0;
  #sourceNode = 0;
  #order = 0;
  #alpha = 1;
  #backgroundV = 0;
  #sourceOhm = 0;
  #currents: NodeCurrents;
  /** 1 + Y·z_bb */
  #loopRe = 1;
  #loopIm = 0;
  #loopSquare = 1;
  /** Y/(1 + Y·z_bb) [S] */
  #factorRe = 0;
  #factorIm = 0;
  /** Z from the node in hand to the source's node [Ω] */
  #toSourceRe = 0;
  #toSourceIm = 0;

  /**
   * @param model the network without the bank, with several buses
   * @param withSource false leaves the current of the source out
   */
  constructor(model: NetworkModel, withSource: boolean) {
    this.#model = model;
    this.#nodal = model.nodal!;
    this.#withSource = withSource;
    this.#squares = new Float64Array(model.buses.length);
    this.#currents = this.#nodal.currents[0]!;
    this.#row = new Float64Array(2 * (model.buses.length + 1));
  }

  /**
   * @param stages y of one stage of each group at the orders present
   * @param flow level, corner and vector are read, everything else is filled
   * @source method-network
   */
  into(stages: readonly ComplexColumn[], flow: Flow): void {
    const { network } = flow.corner;
    const { busNode, sourceNode } = this.#nodal.cases[network]!;
    const table = this.#nodal.tables[network]!;
    this.#z = table.z;
    this.#n = table.nodes;
    this.#bankNode = busNode[this.#model.bankBus]!;
    this.#sourceNode = sourceNode;
    this.#currents = this.#nodal.currents[network]!;
    const squares = this.#squares.fill(0);
    let currentSquare = 0;
    for (let i = 0; i < flow.ordersH.length; i++) {
      this.#begin(i, network);
      const bankSiemens = this.#connect(stages, flow.vector);
      this.#voltagesInto(flow, busNode);
      for (let bus = 0; bus < squares.length; bus++) {
        const v = flow.buses[bus]!.voltageV[i]!;
        squares[bus]! += v * v;
      }
      const bankV = flow.buses[this.#model.bankBus]!.voltageV[i]!;
      flow.voltageV[i] = bankV;
      flow.bankA[i] = bankV * bankSiemens;
      for (let g = 0; g < stages.length; g++) {
        flow.stageA[g]![i] = bankV * magnitude(stages[g]!.re[i]!, stages[g]!.im[i]!);
      }
      if (flow.primary === null && !this.#withSource) continue;
      this.#rowInto(sourceNode);
      if (flow.primary !== null) flow.primary.voltageV[i] = this.#voltageV();
      if (!this.#withSource) continue;
      const sourceA = this.#sourceA(table.sourceRe[i]!, table.sourceIm[i]!);
      flow.sourceA[i] = sourceA;
      currentSquare += sourceA * sourceA;
    }
    const phaseV = this.#model.nominalV / Math.sqrt(3);
    for (let bus = 0; bus < squares.length; bus++) {
      flow.buses[bus]!.voltageDistortionPct = (100 * Math.sqrt(squares[bus]!)) / phaseV;
    }
    flow.voltageDistortionPct = flow.buses[this.#model.bankBus]!.voltageDistortionPct;
    flow.currentDistortionPct = this.#model.loadA > 0 ? (100 * Math.sqrt(currentSquare)) / this.#model.loadA : 0;
  }

  #begin(order: number, network: number): void {
    const { exponent, backgroundV } = this.#model.excitation;
    const { sourceRe, sourceIm } = this.#nodal.tables[network]!;
    this.#order = order;
    this.#offset = 2 * order * this.#n * this.#n;
    this.#alpha = exponent[order]!;
    this.#backgroundV = backgroundV[order]!;
    this.#sourceOhm = magnitude(sourceRe[order]!, sourceIm[order]!);
  }

  // Returns |Y| of the bank [S].
  #connect(stages: readonly ComplexColumn[], vector: Int32Array): number {
    let bankRe = 0;
    let bankIm = 0;
    for (let g = 0; g < stages.length; g++) {
      bankRe += vector[g]! * stages[g]!.re[this.#order]!;
      bankIm += vector[g]! * stages[g]!.im[this.#order]!;
    }
    const at = this.#offset + 2 * this.#bankNode * (this.#n + 1);
    const zRe = this.#z[at]!;
    const zIm = this.#z[at + 1]!;
    const re = 1 + bankRe * zRe - bankIm * zIm;
    const im = bankRe * zIm + bankIm * zRe;
    const square = re * re + im * im;
    this.#loopRe = re;
    this.#loopIm = im;
    this.#loopSquare = square;
    this.#factorRe = (bankRe * re + bankIm * im) / square;
    this.#factorIm = (bankIm * re - bankRe * im) / square;
    return magnitude(bankRe, bankIm);
  }

  // Buses that are one node have one voltage.
  #voltagesInto({ buses }: Flow, busNode: Int32Array): void {
    const { firstBus } = this.#currents;
    for (let bus = 0; bus < buses.length; bus++) {
      const first = firstBus[bus]!;
      if (first === bus) this.#rowInto(busNode[bus]!);
      buses[bus]!.voltageV[this.#order] = first === bus ? this.#voltageV() : buses[first]!.voltageV[this.#order]!;
    }
  }

  #rowInto(node: number): void {
    const { nodes } = this.#currents;
    for (let k = 0; k < nodes.length; k++) this.#transferInto(node, nodes[k]!, 2 * k);
    const last = 2 * nodes.length;
    if (this.#backgroundV === 0) return;
    this.#transferInto(node, this.#sourceNode, last);
    this.#toSourceRe = this.#row[last]!;
    this.#toSourceIm = this.#row[last + 1]!;
  }

  #transferInto(row: number, column: number, to: number): void {
    const z = this.#z;
    const out = this.#row;
    const at = this.#offset + 2 * (row * this.#n + column);
    const re = z[at]!;
    const im = z[at + 1]!;
    if (row === this.#bankNode || column === this.#bankNode) {
      // Z_pb = z_pb/(1 + Y·z_bb): beside the bank's tuned order the difference would be all rounding.
      out[to] = (re * this.#loopRe + im * this.#loopIm) / this.#loopSquare;
      out[to + 1] = (im * this.#loopRe - re * this.#loopIm) / this.#loopSquare;
      return;
    }
    const a = this.#offset + 2 * (row * this.#n + this.#bankNode);
    const b = this.#offset + 2 * (this.#bankNode * this.#n + column);
    const pRe = z[a]! * z[b]! - z[a + 1]! * z[b + 1]!;
    const pIm = z[a]! * z[b + 1]! + z[a + 1]! * z[b]!;
    out[to] = re - (pRe * this.#factorRe - pIm * this.#factorIm);
    out[to + 1] = im - (pRe * this.#factorIm + pIm * this.#factorRe);
  }

  // At the node of the row.
  #voltageV(): number {
    const { nodes, magnitudeA } = this.#currents;
    const from = this.#order * nodes.length;
    let v = this.#ofPhasors();
    for (let k = 0; k < nodes.length; k++) {
      const injected = magnitudeA[from + k]!;
      if (injected > 0) v = combine(v, magnitude(this.#row[2 * k]!, this.#row[2 * k + 1]!) * injected, this.#alpha);
    }
    if (this.#backgroundV === 0) return v;
    const share = magnitude(this.#toSourceRe, this.#toSourceIm) / this.#sourceOhm;
    return combine(v, share * this.#backgroundV, this.#alpha);
  }

  // With the row of the source's node.
  #sourceA(sourceRe: number, sourceIm: number): number {
    const { nodes, magnitudeA } = this.#currents;
    const from = this.#order * nodes.length;
    let a = this.#ofPhasors() / this.#sourceOhm;
    for (let k = 0; k < nodes.length; k++) {
      const injected = magnitudeA[from + k]!;
      if (injected === 0) continue;
      const ohm = magnitude(this.#row[2 * k]!, this.#row[2 * k + 1]!);
      a = combine(a, (ohm * injected) / this.#sourceOhm, this.#alpha);
    }
    if (this.#backgroundV === 0) return a;
    // E·(1 − Z_ss/Z_s)/Z_s = E·(Z_s − Z_ss)/Z_s²
    const rest = magnitude(sourceRe - this.#toSourceRe, sourceIm - this.#toSourceIm);
    return combine(a, (this.#backgroundV * rest) / (this.#sourceOhm * this.#sourceOhm), this.#alpha);
  }

  // |Σ Z_ij·I_j| over the loads with angles: they add before their magnitude is taken.
  #ofPhasors(): number {
    const { nodes, re, im } = this.#currents;
    const from = this.#order * nodes.length;
    let sumRe = 0;
    let sumIm = 0;
    for (let k = 0; k < nodes.length; k++) {
      const aRe = re[from + k]!;
      const aIm = im[from + k]!;
      if (aRe === 0 && aIm === 0) continue;
      const zRe = this.#row[2 * k]!;
      const zIm = this.#row[2 * k + 1]!;
      sumRe += zRe * aRe - zIm * aIm;
      sumIm += zRe * aIm + zIm * aRe;
    }
    return magnitude(sumRe, sumIm);
  }
}

function magnitude(re: number, im: number): number {
  return Math.sqrt(re * re + im * im);
}
