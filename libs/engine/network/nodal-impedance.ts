import type { NodalCase } from './nodal-case.js';

/** Impedance matrices of one network over orders, bank left out: [order][row][column][re, im]. */
export interface NodalTable {
  ordersH: Float64Array;
  nodes: number;
  /** length orders × nodes × nodes × 2 [Ω] */
  z: Float64Array;
  /** Z_s(h) of the source path [Ω] */
  sourceRe: Float64Array;
  sourceIm: Float64Array;
}

/**
 * Impedance matrix of a network at every order: nodal admittance Y from its branches, Z = Y⁻¹, one factorisation an
 * order. The source path is a branch to earth at its node.
 * @param network one standing of the network
 * @param ordersH orders h ≥ 1
 * @returns matrices [Ω]
 * @source method-network
 */
export function nodalTable(network: NodalCase, ordersH: Float64Array): NodalTable {
  const n = network.nodes;
  const size = 2 * n * n;
  const table: NodalTable = {
    ordersH,
    nodes: n,
    z: new Float64Array(ordersH.length * size),
    sourceRe: new Float64Array(ordersH.length),
    sourceIm: new Float64Array(ordersH.length),
  };
  const y = new Float64Array(size);
  for (let i = 0; i < ordersH.length; i++) {
    const h = ordersH[i]!;
    const growth = h ** network.resistanceExponent;
    table.sourceRe[i] = network.source.rOhm * growth;
    table.sourceIm[i] = network.source.xOhm * h;
    assembleInto(network, h, growth, y);
    invertInto(y, n, table.z, i * size);
  }
  return table;
}

function assembleInto(network: NodalCase, h: number, growth: number, y: Float64Array): void {
  const n = network.nodes;
  y.fill(0);
  for (let k = 0; k < n; k++) y[2 * (k * n + k)] = network.conductance[k]!;
  for (const { from, to, rOhm, xOhm, capacitiveOhm } of network.branches) {
    addBranch(y, n, { from, to, r: rOhm * growth, x: xOhm * h - capacitiveOhm / h });
  }
  const { rOhm, xOhm } = network.source;
  addBranch(y, n, { from: network.sourceNode, to: -1, r: rOhm * growth, x: xOhm * h });
}

function addBranch(y: Float64Array, n: number, branch: { from: number; to: number; r: number; x: number }): void {
  const { from, to, r, x } = branch;
  const square = r * r + x * x;
  const g = r / square;
  const b = -x / square;
  y[2 * (from * n + from)]! += g;
  y[2 * (from * n + from) + 1]! += b;
  if (to < 0) return;
  y[2 * (to * n + to)]! += g;
  y[2 * (to * n + to) + 1]! += b;
  for (const at of [from * n + to, to * n + from]) {
    y[2 * at]! -= g;
    y[2 * at + 1]! -= b;
  }
}

/**
 * Inverse of a complex symmetric matrix by elimination, rows exchanged for the greatest pivot: near a resonance a bus's
 * own admittance all but vanishes beside those to its neighbours. Symmetry is restored at the end to the last digit.
 * @param y matrix, n × n × 2, destroyed
 * @param n rows
 * @param out receives the inverse
 * @param offset where in `out` it begins
 * @source derived: Gauss and Jordan elimination
 */
export function invertInto(y: Float64Array, n: number, out: Float64Array, offset: number): void {
  for (let k = 0; k < 2 * n * n; k++) out[offset + k] = 0;
  for (let k = 0; k < n; k++) out[offset + 2 * (k * n + k)] = 1;
  for (let pivot = 0; pivot < n; pivot++) {
    const greatest = greatestRow(y, n, pivot);
    if (greatest !== pivot) {
      swapRows(y, 2 * n * pivot, 2 * n * greatest, n);
      swapRows(out, offset + 2 * n * pivot, offset + 2 * n * greatest, n);
    }
    eliminate(y, n, pivot, { out, offset });
  }
  for (let row = 0; row < n; row++) {
    for (let column = row + 1; column < n; column++) {
      const a = offset + 2 * (row * n + column);
      const b = offset + 2 * (column * n + row);
      out[a] = out[b] = (out[a]! + out[b]!) / 2;
      out[a + 1] = out[b + 1] = (out[a + 1]! + out[b + 1]!) / 2;
    }
  }
}

function greatestRow(y: Float64Array, n: number, pivot: number): number {
  let greatest = pivot;
  let most = -1;
  for (let row = pivot; row < n; row++) {
    const at = 2 * (row * n + pivot);
    const square = y[at]! * y[at]! + y[at + 1]! * y[at + 1]!;
    if (square <= most) continue;
    most = square;
    greatest = row;
  }
  return greatest;
}

function swapRows(m: Float64Array, a: number, b: number, n: number): void {
  for (let k = 0; k < 2 * n; k++) {
    const kept = m[a + k]!;
    m[a + k] = m[b + k]!;
    m[b + k] = kept;
  }
}

function eliminate(y: Float64Array, n: number, pivot: number, inverse: { out: Float64Array; offset: number }): void {
  const { out, offset } = inverse;
  const at = 2 * (pivot * n + pivot);
  const square = y[at]! * y[at]! + y[at + 1]! * y[at + 1]!;
  const factor = { n, fRe: y[at]! / square, fIm: -y[at + 1]! / square };
  scaleRow(y, 2 * pivot * n, factor);
  scaleRow(out, offset + 2 * pivot * n, factor);
  for (let row = 0; row < n; row++) {
    if (row === pivot) continue;
    const fRe = y[2 * (row * n + pivot)]!;
    const fIm = y[2 * (row * n + pivot) + 1]!;
    if (fRe === 0 && fIm === 0) continue;
    subtractRow(y, 2 * row * n, 2 * pivot * n, { n, fRe, fIm });
    subtractRow(out, offset + 2 * row * n, offset + 2 * pivot * n, { n, fRe, fIm });
  }
}

interface RowFactor {
  n: number;
  fRe: number;
  fIm: number;
}

function scaleRow(m: Float64Array, from: number, { n, fRe, fIm }: RowFactor): void {
  for (let k = 0; k < n; k++) {
    const a = m[from + 2 * k]!;
    const b = m[from + 2 * k + 1]!;
    m[from + 2 * k] = a * fRe - b * fIm;
    m[from + 2 * k + 1] = a * fIm + b * fRe;
  }
}

function subtractRow(m: Float64Array, to: number, from: number, { n, fRe, fIm }: RowFactor): void {
  for (let k = 0; k < n; k++) {
    const a = m[from + 2 * k]!;
    const b = m[from + 2 * k + 1]!;
    m[to + 2 * k]! -= a * fRe - b * fIm;
    m[to + 2 * k + 1]! -= a * fIm + b * fRe;
  }
}
