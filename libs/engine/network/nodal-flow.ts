import type { ComplexColumn } from './bus-admittance.js';
import type { Flow } from './bus-flow.js';
import type { NetworkModel, NodalModel } from './network-model.js';
import { combine } from './summation.js';

/**
 * The flow in a network of several buses. Connecting the bank at bus b is a rank-1 change of the impedance matrix,
 * Z_pq = z_pq − z_pb·z_bq·Y/(1 + Y·z_bb). From the loads of one bus j: V_i = |Z_ij|·I_j and source current |Z_sj/Z_s|·I_j,
 * s the node behind the source; from the background V_i = |Z_is|·E/|Z_s|, source current |E·(1 − Z_ss/Z_s)/Z_s|.
 * Contributions combine with the order's exponent, the currents with angles as one: |Σ Z_ij·I_j|.
 * @param model the network without the bank, with several buses
 * @param stages y of one stage of each group at the orders present
 * @param flow level, corner and vector are read, everything else is filled
 * @source method-network
 */
export function nodalFlowInto(model: NetworkModel, stages: readonly ComplexColumn[], flow: Flow): void {
  const nodal = model.nodal!;
  const nodalCase = nodal.cases[flow.corner.network]!;
  const bankNode = nodalCase.busNode[model.bankBus]!;
  const phaseV = model.nominalV / Math.sqrt(3);
  const squares = new Float64Array(flow.buses.length);
  let currentSquare = 0;
  for (let i = 0; i < flow.ordersH.length; i++) {
    const at = new OrderAt(model, nodal, { network: flow.corner.network, order: i, bankNode });
    at.connect(stages, flow.vector);
    for (let bus = 0; bus < flow.buses.length; bus++) {
      const v = at.voltageV(nodalCase.busNode[bus]!);
      flow.buses[bus]!.voltageV[i] = v;
      squares[bus]! += v * v;
    }
    if (flow.primary !== null) flow.primary.voltageV[i] = at.voltageV(nodalCase.sourceNode);
    const bankV = flow.buses[model.bankBus]!.voltageV[i]!;
    flow.voltageV[i] = bankV;
    flow.sourceA[i] = at.sourceA();
    flow.bankA[i] = bankV * at.bankSiemens();
    for (let g = 0; g < stages.length; g++) {
      flow.stageA[g]![i] = bankV * Math.sqrt(stages[g]!.re[i]! ** 2 + stages[g]!.im[i]! ** 2);
    }
    currentSquare += flow.sourceA[i]! ** 2;
  }
  for (let bus = 0; bus < squares.length; bus++) {
    flow.buses[bus]!.voltageDistortionPct = (100 * Math.sqrt(squares[bus]!)) / phaseV;
  }
  flow.voltageDistortionPct = flow.buses[model.bankBus]!.voltageDistortionPct;
  flow.currentDistortionPct = model.loadA > 0 ? (100 * Math.sqrt(currentSquare)) / model.loadA : 0;
}

/** One order of one network with the bank connected. */
class OrderAt {
  readonly #z: Float64Array;
  readonly #offset: number;
  readonly #n: number;
  readonly #bankNode: number;
  readonly #sourceNode: number;
  readonly #sourceRe: number;
  readonly #sourceIm: number;
  readonly #alpha: number;
  readonly #backgroundV: number;
  /** loads without angles, combined per node [A] */
  readonly #injectedA: Float64Array;
  /** phasor sum of the loads with angles, per node [A] */
  readonly #phasorRe: Float64Array;
  readonly #phasorIm: Float64Array;
  #bankRe = 0;
  #bankIm = 0;
  /** 1 + Y·z_bb */
  #loopRe = 1;
  #loopIm = 0;
  /** Y/(1 + Y·z_bb) [S] */
  #factorRe = 0;
  #factorIm = 0;

  constructor(model: NetworkModel, nodal: NodalModel, place: { network: number; order: number; bankNode: number }) {
    const table = nodal.tables[place.network]!;
    const nodalCase = nodal.cases[place.network]!;
    this.#z = table.z;
    this.#n = table.nodes;
    this.#offset = 2 * place.order * table.nodes * table.nodes;
    this.#bankNode = place.bankNode;
    this.#sourceNode = nodalCase.sourceNode;
    this.#sourceRe = table.sourceRe[place.order]!;
    this.#sourceIm = table.sourceIm[place.order]!;
    this.#alpha = model.excitation.exponent[place.order]!;
    this.#backgroundV = model.excitation.backgroundV[place.order]!;
    this.#injectedA = new Float64Array(table.nodes);
    this.#phasorRe = new Float64Array(table.nodes);
    this.#phasorIm = new Float64Array(table.nodes);
    for (const [bus, { magnitudeA, re, im }] of nodal.injected.entries()) {
      const node = nodalCase.busNode[bus]!;
      this.#injectedA[node] = combine(this.#injectedA[node]!, magnitudeA[place.order]!, this.#alpha);
      this.#phasorRe[node]! += re[place.order]!;
      this.#phasorIm[node]! += im[place.order]!;
    }
    this.#order = place.order;
  }

  readonly #order: number;

  connect(stages: readonly ComplexColumn[], vector: Int32Array): void {
    for (let g = 0; g < stages.length; g++) {
      this.#bankRe += vector[g]! * stages[g]!.re[this.#order]!;
      this.#bankIm += vector[g]! * stages[g]!.im[this.#order]!;
    }
    const at = this.#at(this.#bankNode, this.#bankNode);
    const re = 1 + this.#bankRe * this.#z[at]! - this.#bankIm * this.#z[at + 1]!;
    const im = this.#bankRe * this.#z[at + 1]! + this.#bankIm * this.#z[at]!;
    this.#loopRe = re;
    this.#loopIm = im;
    const square = re * re + im * im;
    this.#factorRe = (this.#bankRe * re + this.#bankIm * im) / square;
    this.#factorIm = (this.#bankIm * re - this.#bankRe * im) / square;
  }

  bankSiemens(): number {
    return Math.sqrt(this.#bankRe ** 2 + this.#bankIm ** 2);
  }

  voltageV(node: number): number {
    let v = this.#ofPhasors(node);
    for (let j = 0; j < this.#n; j++) {
      const injected = this.#injectedA[j]!;
      if (injected > 0) v = combine(v, magnitude(this.#transfer(node, j)) * injected, this.#alpha);
    }
    if (this.#backgroundV === 0) return v;
    const share = magnitude(this.#transfer(node, this.#sourceNode)) / this.#sourceOhm();
    return combine(v, share * this.#backgroundV, this.#alpha);
  }

  sourceA(): number {
    let a = this.#ofPhasors(this.#sourceNode) / this.#sourceOhm();
    for (let j = 0; j < this.#n; j++) {
      const injected = this.#injectedA[j]!;
      if (injected === 0) continue;
      a = combine(a, (magnitude(this.#transfer(this.#sourceNode, j)) * injected) / this.#sourceOhm(), this.#alpha);
    }
    if (this.#backgroundV === 0) return a;
    // E·(1 − Z_ss/Z_s)/Z_s = E·(Z_s − Z_ss)/Z_s²
    const [re, im] = this.#transfer(this.#sourceNode, this.#sourceNode);
    const rest = magnitude([this.#sourceRe - re, this.#sourceIm - im]);
    return combine(a, (this.#backgroundV * rest) / this.#sourceOhm() ** 2, this.#alpha);
  }

  // |Σ Z_ij·I_j| over the loads with angles: they add before their magnitude is taken.
  #ofPhasors(node: number): number {
    let sumRe = 0;
    let sumIm = 0;
    for (let j = 0; j < this.#n; j++) {
      const aRe = this.#phasorRe[j]!;
      const aIm = this.#phasorIm[j]!;
      if (aRe === 0 && aIm === 0) continue;
      const [re, im] = this.#transfer(node, j);
      sumRe += re * aRe - im * aIm;
      sumIm += re * aIm + im * aRe;
    }
    return magnitude([sumRe, sumIm]);
  }

  #sourceOhm(): number {
    return Math.sqrt(this.#sourceRe ** 2 + this.#sourceIm ** 2);
  }

  #at(row: number, column: number): number {
    return this.#offset + 2 * (row * this.#n + column);
  }

  #transfer(row: number, column: number): [number, number] {
    const at = this.#at(row, column);
    if (row === this.#bankNode || column === this.#bankNode) return this.#divided(at);
    const toBank = this.#at(row, this.#bankNode);
    const fromBank = this.#at(this.#bankNode, column);
    const z = this.#z;
    const pRe = z[toBank]! * z[fromBank]! - z[toBank + 1]! * z[fromBank + 1]!;
    const pIm = z[toBank]! * z[fromBank + 1]! + z[toBank + 1]! * z[fromBank]!;
    return [
      z[at]! - (pRe * this.#factorRe - pIm * this.#factorIm),
      z[at + 1]! - (pRe * this.#factorIm + pIm * this.#factorRe),
    ];
  }

  // Z_pb = z_pb/(1 + Y·z_bb): beside the bank's tuned order the difference would be all rounding.
  #divided(at: number): [number, number] {
    const square = this.#loopRe * this.#loopRe + this.#loopIm * this.#loopIm;
    const re = this.#z[at]!;
    const im = this.#z[at + 1]!;
    return [(re * this.#loopRe + im * this.#loopIm) / square, (im * this.#loopRe - re * this.#loopIm) / square];
  }
}

function magnitude([re, im]: [number, number]): number {
  return Math.sqrt(re * re + im * im);
}
