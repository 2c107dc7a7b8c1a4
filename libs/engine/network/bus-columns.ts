import { type ComplexColumn, LEAST_SIEMENS } from './bus-admittance.js';
import { type NetworkModel, tableAt } from './network-model.js';

/**
 * What a bus and the bank's bus know of each other with the bank out, over orders. Connecting the bank is a rank-1
 * change: Z_ii = z_ii − z_ib²·Y/(1 + Y·z_bb), so a level costs a few multiplications and no factorisation.
 */
export interface BusColumns {
  /** Y₀ at the bank's bus, 1/z_bb [S] */
  bank: ComplexColumn;
  /** null where the bus is the bank's own */
  other: { self: ComplexColumn; toBank: ComplexColumn } | null;
}

/**
 * Columns of one bus in one network.
 * @param model the network without the bank
 * @param network index into the corners' networks
 * @param bus index of the bus
 * @param ordersH orders h ≥ 1, length n
 * @returns columns of length n
 * @source method-network
 */
export function busColumns(model: NetworkModel, network: number, bus: number, ordersH: Float64Array): BusColumns {
  const nodal = model.nodal;
  if (nodal === null) return { bank: tableAt(model, network, ordersH).bus, other: null };
  const { busNode } = nodal.cases[network]!;
  const eliminated = nodal.eliminated[network]!;
  if (busNode[bus] === busNode[model.bankBus]) return { bank: eliminated.bankAdmittance(ordersH), other: null };
  const { bank, nodes } = eliminated.columns(ordersH);
  return { bank, other: nodes[busNode[bus]!]! };
}

/**
 * Columns of every bus in one network, from one factorisation an order.
 * @param model the network without the bank
 * @param network index into the corners' networks
 * @param ordersH orders h ≥ 1, length n
 * @returns columns of length n, in the order of the buses; buses that are one node share theirs
 * @source method-network
 */
export function networkColumns(model: NetworkModel, network: number, ordersH: Float64Array): BusColumns[] {
  const nodal = model.nodal;
  if (nodal === null) return [busColumns(model, network, 0, ordersH)];
  const { busNode } = nodal.cases[network]!;
  const bankNode = busNode[model.bankBus]!;
  const { bank, nodes } = nodal.eliminated[network]!.columns(ordersH);
  return Array.from(busNode, (node) => ({ bank, other: node === bankNode ? null : nodes[node]! }));
}

/**
 * Admittance of the bank at a count vector: Y = Σ n_g·y_g.
 * @param stages y of one stage of each group [S], length n
 * @param vector connected stages per group, or shares of each kind
 * @param length n
 * @returns Y [S]
 */
export function bankColumn(stages: readonly ComplexColumn[], vector: ArrayLike<number>, length: number): ComplexColumn {
  const out: ComplexColumn = { re: new Float64Array(length), im: new Float64Array(length) };
  for (let g = 0; g < stages.length; g++) addInto(out, stages[g]!, vector[g]!);
  return out;
}

// A function of its own, so that a long column is not begun in code that is still slow.
function addInto({ re: sumRe, im: sumIm }: ComplexColumn, { re, im }: ComplexColumn, count: number): void {
  if (count === 0) return;
  for (let i = 0; i < sumRe.length; i++) {
    sumRe[i]! += count * re[i]!;
    sumIm[i]! += count * im[i]!;
  }
}

/**
 * 1/|Z_ii|² of a bus with the bank connected.
 * @param columns the bus and the bank's bus
 * @param bank Y of the bank [S]
 * @param out receives 1/|Z|² [S²]
 * @source method-network
 */
export function seenSquareInto(columns: BusColumns, bank: ComplexColumn, out: Float64Array): void {
  const { re: gRe, im: gIm } = columns.bank;
  if (columns.other === null) {
    for (let i = 0; i < out.length; i++) {
      const re = gRe[i]! + bank.re[i]!;
      const im = gIm[i]! + bank.im[i]!;
      out[i] = Math.max(LEAST_SIEMENS * LEAST_SIEMENS, re * re + im * im);
    }
    return;
  }
  const { self, toBank } = columns.other;
  for (let i = 0; i < out.length; i++) {
    // With Y₀ = 1/z_bb: Z = z_ii − (z_ib·Y₀)·z_ib·Y/(Y₀ + Y).
    const tRe = toBank.re[i]! * toBank.re[i]! - toBank.im[i]! * toBank.im[i]!;
    const tIm = 2 * toBank.re[i]! * toBank.im[i]!;
    const aRe = gRe[i]! * bank.re[i]! - gIm[i]! * bank.im[i]!;
    const aIm = gRe[i]! * bank.im[i]! + gIm[i]! * bank.re[i]!;
    const sRe = gRe[i]! + bank.re[i]!;
    const sIm = gIm[i]! + bank.im[i]!;
    const square = Math.max(LEAST_SIEMENS * LEAST_SIEMENS, sRe * sRe + sIm * sIm);
    const fRe = (aRe * sRe + aIm * sIm) / square;
    const fIm = (aIm * sRe - aRe * sIm) / square;
    const zRe = self.re[i]! - (tRe * fRe - tIm * fIm);
    const zIm = self.im[i]! - (tRe * fIm + tIm * fRe);
    out[i] = 1 / (zRe * zRe + zIm * zIm);
  }
}
