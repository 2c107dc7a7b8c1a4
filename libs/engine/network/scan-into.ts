import type { ComplexColumn } from './bus-admittance.js';

/** A circuit without any loss has no admittance at its resonance; with this much in its place results stay numbers [S]. */
export const LEAST_SIEMENS = 1e-12;

/**
 * |Z(h)| at the bus for a bank of equal stages, many levels at once: Z = 1/(Y₀ + n·y), and since
 * |Y₀ + n·y|² = |Y₀|² + 2n·Re(Y₀·ȳ) + n²·|y|² the levels cost two multiply-adds a point.
 * @param bus Y₀ over orders [S], length m
 * @param stage y of one stage over the same orders [S], length m
 * @param counts connected stages per level, length L
 * @param out receives |Z| [Ω], level after level, length L·m
 * @source method-network
 */
export function scanEqualStagesInto(
  bus: ComplexColumn,
  stage: ComplexColumn,
  counts: Float64Array,
  out: Float64Array,
): void {
  const m = bus.re.length;
  const a = new Float64Array(m);
  const b = new Float64Array(m);
  const c = new Float64Array(m);
  quadraticInto(bus, stage, { a, b, c });
  for (let level = 0; level < counts.length; level++) levelInto({ a, b, c }, counts[level]!, out, level * m);
}

interface Quadratic {
  a: Float64Array;
  b: Float64Array;
  c: Float64Array;
}

function quadraticInto(bus: ComplexColumn, stage: ComplexColumn, q: Quadratic): void {
  const { re, im } = bus;
  const { re: g, im: s } = stage;
  for (let i = 0; i < re.length; i++) {
    q.a[i] = re[i]! * re[i]! + im[i]! * im[i]!;
    q.b[i] = 2 * (re[i]! * g[i]! + im[i]! * s[i]!);
    q.c[i] = g[i]! * g[i]! + s[i]! * s[i]!;
  }
}

function levelInto({ a, b, c }: Quadratic, count: number, out: Float64Array, offset: number): void {
  for (let i = 0; i < a.length; i++) out[offset + i] = 1 / Math.sqrt(a[i]! + count * (b[i]! + count * c[i]!));
}

/**
 * |Y(h)|² at the bus with a count of stages of each group connected: Y = Y₀ + Σ n_g·y_g, at least 1e-24 S².
 * @param bus Y₀ over orders [S], length m
 * @param stages y of one stage of each group over the same orders [S]
 * @param vector connected stages per group
 * @param out receives |Y|² [S²], length m
 * @source method-network
 */
export function admittanceSquareInto(
  bus: ComplexColumn,
  stages: readonly ComplexColumn[],
  vector: Int32Array,
  out: Float64Array,
): void {
  const m = bus.re.length;
  for (let i = 0; i < m; i++) {
    let g = bus.re[i]!;
    let b = bus.im[i]!;
    for (let k = 0; k < stages.length; k++) {
      g += vector[k]! * stages[k]!.re[i]!;
      b += vector[k]! * stages[k]!.im[i]!;
    }
    out[i] = Math.max(LEAST_SIEMENS * LEAST_SIEMENS, g * g + b * b);
  }
}
