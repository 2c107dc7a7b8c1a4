import { type ComplexColumn, LEAST_SIEMENS } from './bus-admittance.js';
import type { BusColumns } from './bus-columns.js';

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
 * |Z(h)| at every bus for a bank of equal stages, many levels at once. With the bank's bus at Y₀ and w = z_ii − z_ib²·Y₀
 * the rank-1 change is Z_ii = (Y₀·z_ii + n·y·w)/(Y₀ + n·y): numerator and denominator are quadratics in n over tables, and
 * the denominator is every bus's own.
 * @param buses columns of every bus over orders, length m each
 * @param stage y of one stage over the same orders [S]
 * @param counts connected stages per level, length L
 * @param out receives |Z| [Ω], bus after bus, level after level, length buses·L·m
 * @source method-network
 */
export function scanBusesInto(
  buses: readonly BusColumns[],
  stage: ComplexColumn,
  counts: Float64Array,
  out: Float64Array,
): void {
  const m = stage.re.length;
  const below = emptyQuadratic(m);
  quadraticInto(buses[0]!.bank, stage, below);
  const above = buses.map(({ bank, other }) => {
    if (other === null) return null;
    const q = emptyQuadratic(m);
    numeratorInto(bank, other, stage, q);
    return q;
  });
  const inverse = new Float64Array(m);
  for (let level = 0; level < counts.length; level++) {
    inverseInto(below, counts[level]!, inverse);
    for (let bus = 0; bus < buses.length; bus++) {
      const offset = (bus * counts.length + level) * m;
      const q = above[bus]!;
      if (q === null) rootInto(inverse, out, offset);
      else quotientInto(q, counts[level]!, inverse, out, offset);
    }
  }
}

function emptyQuadratic(m: number): Quadratic {
  return { a: new Float64Array(m), b: new Float64Array(m), c: new Float64Array(m) };
}

// |Y₀·z_ii + n·y·w|² as a quadratic in n.
function numeratorInto(
  bank: ComplexColumn,
  { self, toBank }: { self: ComplexColumn; toBank: ComplexColumn },
  stage: ComplexColumn,
  q: Quadratic,
): void {
  for (let i = 0; i < q.a.length; i++) {
    const gRe = bank.re[i]!;
    const gIm = bank.im[i]!;
    const zRe = self.re[i]!;
    const zIm = self.im[i]!;
    const tRe = toBank.re[i]! * toBank.re[i]! - toBank.im[i]! * toBank.im[i]!;
    const tIm = 2 * toBank.re[i]! * toBank.im[i]!;
    const wRe = zRe - (tRe * gRe - tIm * gIm);
    const wIm = zIm - (tRe * gIm + tIm * gRe);
    const aRe = gRe * zRe - gIm * zIm;
    const aIm = gRe * zIm + gIm * zRe;
    const bRe = stage.re[i]! * wRe - stage.im[i]! * wIm;
    const bIm = stage.re[i]! * wIm + stage.im[i]! * wRe;
    q.a[i] = aRe * aRe + aIm * aIm;
    q.b[i] = 2 * (aRe * bRe + aIm * bIm);
    q.c[i] = bRe * bRe + bIm * bIm;
  }
}

function inverseInto({ a, b, c }: Quadratic, count: number, inverse: Float64Array): void {
  for (let i = 0; i < a.length; i++) inverse[i] = 1 / (a[i]! + count * (b[i]! + count * c[i]!));
}

function rootInto(inverse: Float64Array, out: Float64Array, offset: number): void {
  for (let i = 0; i < inverse.length; i++) out[offset + i] = Math.sqrt(inverse[i]!);
}

// Five parameters: an innermost kernel, no object a level and bus.
// biome-ignore lint/complexity/useMaxParams: see above
function quotientInto(
  { a, b, c }: Quadratic,
  count: number,
  inverse: Float64Array,
  out: Float64Array,
  offset: number,
): void {
  for (let i = 0; i < a.length; i++) {
    out[offset + i] = Math.sqrt((a[i]! + count * (b[i]! + count * c[i]!)) * inverse[i]!);
  }
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
