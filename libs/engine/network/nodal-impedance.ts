import { resistanceGrowth } from '../quantity/resistance-growth.js';
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
  const branches = branchColumns(network);
  const exchanged = new Int32Array(n);
  for (let i = 0; i < ordersH.length; i++) {
    const h = ordersH[i]!;
    const growth = resistanceGrowth(h, network.resistanceExponent);
    table.sourceRe[i] = network.source.rOhm * growth;
    table.sourceIm[i] = network.source.xOhm * h;
    for (let k = 0; k < n; k++) table.z[i * size + 2 * (k * n + k)] = network.conductance[k]!;
    assembleInto(branches, { h, growth, n }, table.z, i * size);
    invertInPlace(table.z, i * size, n, exchanged);
  }
  return table;
}

/** Branches as columns, the source path the last of them. */
interface BranchColumns {
  from: Int32Array;
  /** −1 is earth */
  to: Int32Array;
  steadyOhm: Float64Array;
  rOhm: Float64Array;
  xOhm: Float64Array;
  capacitiveOhm: Float64Array;
}

function branchColumns({ branches, source, sourceNode }: NodalCase): BranchColumns {
  const all = [...branches, { from: sourceNode, to: -1, steadyOhm: 0, ...source, capacitiveOhm: 0 }];
  return {
    from: Int32Array.from(all, ({ from }) => from),
    to: Int32Array.from(all, ({ to }) => to),
    steadyOhm: Float64Array.from(all, ({ steadyOhm }) => steadyOhm),
    rOhm: Float64Array.from(all, ({ rOhm }) => rOhm),
    xOhm: Float64Array.from(all, ({ xOhm }) => xOhm),
    capacitiveOhm: Float64Array.from(all, ({ capacitiveOhm }) => capacitiveOhm),
  };
}

function assembleInto(
  { from, to, steadyOhm, rOhm, xOhm, capacitiveOhm }: BranchColumns,
  { h, growth, n }: { h: number; growth: number; n: number },
  y: Float64Array,
  offset: number,
): void {
  const inverseH = 1 / h;
  for (let k = 0; k < from.length; k++) {
    const r = steadyOhm[k]! + rOhm[k]! * growth;
    const x = xOhm[k]! * h - capacitiveOhm[k]! * inverseH;
    const inverse = 1 / (r * r + x * x);
    const g = r * inverse;
    const b = -x * inverse;
    const i = from[k]!;
    const j = to[k]!;
    y[offset + 2 * (i * n + i)]! += g;
    y[offset + 2 * (i * n + i) + 1]! += b;
    if (j < 0) continue;
    y[offset + 2 * (j * n + j)]! += g;
    y[offset + 2 * (j * n + j) + 1]! += b;
    y[offset + 2 * (i * n + j)]! -= g;
    y[offset + 2 * (i * n + j) + 1]! -= b;
    y[offset + 2 * (j * n + i)]! -= g;
    y[offset + 2 * (j * n + i) + 1]! -= b;
  }
}

/**
 * Inverse of a complex symmetric matrix.
 * @param y matrix, n × n × 2
 * @param n rows
 * @param out receives the inverse
 * @param offset where in `out` it begins
 * @source derived: Gauss and Jordan elimination
 */
export function invertInto(y: Float64Array, n: number, out: Float64Array, offset: number): void {
  out.set(y, offset);
  invertInPlace(out, offset, n, new Int32Array(n));
}

// Gauss and Jordan's elimination in the matrix itself, rows exchanged for the greatest pivot: near a resonance a bus's
// own admittance all but vanishes beside those to its neighbours. Symmetry is restored at the end to the last digit.
function invertInPlace(m: Float64Array, offset: number, n: number, exchanged: Int32Array): void {
  for (let pivot = 0; pivot < n; pivot++) {
    const greatest = greatestRow(m, offset, n, pivot);
    exchanged[pivot] = greatest;
    if (greatest !== pivot) swapRows(m, offset + 2 * n * pivot, offset + 2 * n * greatest, n);
    scalePivotRow(m, offset + 2 * n * pivot, n, pivot);
    eliminate(m, offset, n, pivot);
  }
  for (let pivot = n - 1; pivot >= 0; pivot--) {
    if (exchanged[pivot] !== pivot) swapColumns(m, offset, n, { a: pivot, b: exchanged[pivot]! });
  }
  for (let row = 0; row < n; row++) {
    for (let column = row + 1; column < n; column++) {
      const a = offset + 2 * (row * n + column);
      const b = offset + 2 * (column * n + row);
      m[a] = m[b] = (m[a]! + m[b]!) / 2;
      m[a + 1] = m[b + 1] = (m[a + 1]! + m[b + 1]!) / 2;
    }
  }
}

function greatestRow(m: Float64Array, offset: number, n: number, pivot: number): number {
  let greatest = pivot;
  let most = -1;
  for (let row = pivot; row < n; row++) {
    const at = offset + 2 * (row * n + pivot);
    const square = m[at]! * m[at]! + m[at + 1]! * m[at + 1]!;
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

function swapColumns(m: Float64Array, offset: number, n: number, { a, b }: { a: number; b: number }): void {
  for (let row = 0; row < n; row++) {
    const at = offset + 2 * row * n;
    for (const part of [0, 1]) {
      const kept = m[at + 2 * a + part]!;
      m[at + 2 * a + part] = m[at + 2 * b + part]!;
      m[at + 2 * b + part] = kept;
    }
  }
}

// The pivot's place takes a 1 first, so that it ends as its inverse.
function scalePivotRow(m: Float64Array, start: number, n: number, pivot: number): void {
  const at = start + 2 * pivot;
  const square = m[at]! * m[at]! + m[at + 1]! * m[at + 1]!;
  const re = m[at]! / square;
  const im = -m[at + 1]! / square;
  m[at] = 1;
  m[at + 1] = 0;
  for (let k = start; k < start + 2 * n; k += 2) {
    const a = m[k]!;
    const b = m[k + 1]!;
    m[k] = a * re - b * im;
    m[k + 1] = a * im + b * re;
  }
}

function eliminate(m: Float64Array, offset: number, n: number, pivot: number): void {
  const from = offset + 2 * n * pivot;
  for (let row = 0; row < n; row++) {
    if (row === pivot) continue;
    const to = offset + 2 * n * row;
    const re = m[to + 2 * pivot]!;
    const im = m[to + 2 * pivot + 1]!;
    if (re === 0 && im === 0) continue;
    m[to + 2 * pivot] = 0;
    m[to + 2 * pivot + 1] = 0;
    for (let k = 0; k < 2 * n; k += 2) {
      const a = m[from + k]!;
      const b = m[from + k + 1]!;
      m[to + k] = m[to + k]! - (a * re - b * im);
      m[to + k + 1] = m[to + k + 1]! - (a * im + b * re);
    }
  }
}
