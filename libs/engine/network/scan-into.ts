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
  const below = emptyQuadratic(bus.re.length);
  quadraticInto(bus, stage, below);
  levelsInto(below, counts, out);
}

/** |Y₀ + n·y|², or the square of another such sum, as a + n·(b + n·c). */
interface Quadratic {
  a: Float64Array;
  b: Float64Array;
  c: Float64Array;
  /** the two terms all but cancel somewhere, and rounding could take the square below nothing */
  delicate: boolean;
}

/** 4ac − b² against 4ac, the square of the sine of the angle between Y₀ and y: below this it is mostly rounding. */
const LEAST_SINE_SQUARE = 1e-12;

function quadraticInto(bus: ComplexColumn, stage: ComplexColumn, q: Quadratic): void {
  const { re, im } = bus;
  const { re: g, im: s } = stage;
  for (let i = 0; i < re.length; i++) {
    const own = re[i]! * re[i]! + im[i]! * im[i]!;
    const cross = 2 * (re[i]! * g[i]! + im[i]! * s[i]!);
    q.a[i] = own;
    q.b[i] = cross;
    q.c[i] = g[i]! * g[i]! + s[i]! * s[i]!;
  }
  q.delicate = isDelicate(q);
}

function isDelicate({ a, b, c }: Quadratic): boolean {
  for (let i = 0; i < a.length; i++) {
    if (b[i]! * b[i]! > (1 - LEAST_SINE_SQUARE) * 4 * a[i]! * c[i]!) return true;
  }
  return false;
}

/** Levels worked on at once: they share the reading of the tables and one division. */
const LEVELS_AT_ONCE = 4;
const LEAST_SQUARE = LEAST_SIEMENS * LEAST_SIEMENS;

function levelsInto(q: Quadratic, counts: Float64Array, out: Float64Array): void {
  const m = q.a.length;
  let level = 0;
  for (; !q.delicate && level + LEVELS_AT_ONCE <= counts.length; level += LEVELS_AT_ONCE) {
    fourLevelsInto(q, counts.subarray(level, level + LEVELS_AT_ONCE), out, level * m);
  }
  for (; level < counts.length; level++) oneLevelInto(q, counts[level]!, out, level * m);
}

// 1/√q of four levels: one division gives 1/(q₀·q₁·q₂·q₃), and each 1/q is that times the other three.
function fourLevelsInto({ a, b, c }: Quadratic, counts: Float64Array, out: Float64Array, offset: number): void {
  const m = a.length;
  const [n0, n1, n2, n3] = [counts[0]!, counts[1]!, counts[2]!, counts[3]!];
  const [second, third, fourth] = [offset + m, offset + 2 * m, offset + 3 * m];
  for (let i = 0; i < m; i++) {
    const ai = a[i]!;
    const bi = b[i]!;
    const ci = c[i]!;
    const q0 = ai + n0 * (bi + n0 * ci);
    const q1 = ai + n1 * (bi + n1 * ci);
    const q2 = ai + n2 * (bi + n2 * ci);
    const q3 = ai + n3 * (bi + n3 * ci);
    const inverse = 1 / (q0 * q1 * (q2 * q3));
    const first2 = inverse * (q2 * q3);
    const last2 = inverse * (q0 * q1);
    out[offset + i] = Math.sqrt(q1 * first2);
    out[second + i] = Math.sqrt(q0 * first2);
    out[third + i] = Math.sqrt(q3 * last2);
    out[fourth + i] = Math.sqrt(q2 * last2);
  }
}

function oneLevelInto({ a, b, c }: Quadratic, count: number, out: Float64Array, offset: number): void {
  for (let i = 0; i < a.length; i++) {
    out[offset + i] = 1 / Math.sqrt(Math.max(LEAST_SQUARE, a[i]! + count * (b[i]! + count * c[i]!)));
  }
}

/**
 * 1/|Z(h)|² at every bus for a bank of equal stages, many levels at once: what resonances are looked for on, and a root
 * away from what is shown. With the bank's bus at Y₀ and w = z_ii − z_ib²·Y₀ the rank-1 change is
 * Z_ii = (Y₀·z_ii + n·y·w)/(Y₀ + n·y): numerator and denominator are quadratics in n over tables, and the denominator is
 * every bus's own.
 * @param buses columns of every bus over orders, length m each
 * @param stage y of one stage over the same orders [S]
 * @param counts connected stages per level, length L
 * @param out receives 1/|Z|² [S²], bus after bus, level after level, length buses·L·m
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
  const atBus = (bus: number): Float64Array => out.subarray(bus * counts.length * m, (bus + 1) * counts.length * m);
  const bankBus = above.indexOf(null);
  const own = bankBus < 0 ? new Float64Array(counts.length * m) : atBus(bankBus);
  squaresInto(below, counts, own);
  for (let bus = 0; bus < buses.length; bus++) {
    const q = above[bus]!;
    if (q !== null) quotientsInto(q, counts, own, atBus(bus));
    else if (bus !== bankBus) atBus(bus).set(own);
  }
}

/** Squares have no division to share and are worked on as many at once as a processor has registers for. */
const SQUARES_AT_ONCE = 8;

function squaresInto(q: Quadratic, counts: Float64Array, out: Float64Array): void {
  const m = q.a.length;
  let level = 0;
  for (; !q.delicate && level + SQUARES_AT_ONCE <= counts.length; level += SQUARES_AT_ONCE) {
    eightSquaresInto(q, counts.subarray(level, level + SQUARES_AT_ONCE), out.subarray(level * m));
  }
  for (; level < counts.length; level++) oneSquareInto(q, counts[level]!, out.subarray(level * m, (level + 1) * m));
}

function eightSquaresInto({ a, b, c }: Quadratic, counts: Float64Array, out: Float64Array): void {
  const m = a.length;
  const [n0, n1, n2, n3] = [counts[0]!, counts[1]!, counts[2]!, counts[3]!];
  const [n4, n5, n6, n7] = [counts[4]!, counts[5]!, counts[6]!, counts[7]!];
  for (let i = 0; i < m; i++) {
    const ai = a[i]!;
    const bi = b[i]!;
    const ci = c[i]!;
    out[i] = ai + n0 * (bi + n0 * ci);
    out[m + i] = ai + n1 * (bi + n1 * ci);
    out[2 * m + i] = ai + n2 * (bi + n2 * ci);
    out[3 * m + i] = ai + n3 * (bi + n3 * ci);
    out[4 * m + i] = ai + n4 * (bi + n4 * ci);
    out[5 * m + i] = ai + n5 * (bi + n5 * ci);
    out[6 * m + i] = ai + n6 * (bi + n6 * ci);
    out[7 * m + i] = ai + n7 * (bi + n7 * ci);
  }
}

function oneSquareInto({ a, b, c }: Quadratic, count: number, out: Float64Array): void {
  for (let i = 0; i < a.length; i++) out[i] = Math.max(LEAST_SQUARE, a[i]! + count * (b[i]! + count * c[i]!));
}

function emptyQuadratic(m: number): Quadratic {
  return { a: new Float64Array(m), b: new Float64Array(m), c: new Float64Array(m), delicate: false };
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
  q.delicate = isDelicate(q);
}

/** Quotients worked on at once: they share one division. */
const QUOTIENTS_AT_ONCE = 4;

// 1/|Z_ii|² = |Y₀ + n·y|²/|Y₀·z_ii + n·y·w|², the former being there already.
function quotientsInto(q: Quadratic, counts: Float64Array, own: Float64Array, out: Float64Array): void {
  const m = q.a.length;
  let level = 0;
  for (; !q.delicate && level + QUOTIENTS_AT_ONCE <= counts.length; level += QUOTIENTS_AT_ONCE) {
    fourQuotientsInto(
      q,
      counts.subarray(level, level + QUOTIENTS_AT_ONCE),
      own.subarray(level * m),
      out.subarray(level * m),
    );
  }
  for (; level < counts.length; level++) {
    oneQuotientInto(q, counts[level]!, own.subarray(level * m), out.subarray(level * m));
  }
}

function fourQuotientsInto({ a, b, c }: Quadratic, counts: Float64Array, own: Float64Array, out: Float64Array): void {
  const m = a.length;
  const [n0, n1, n2, n3] = [counts[0]!, counts[1]!, counts[2]!, counts[3]!];
  for (let i = 0; i < m; i++) {
    const ai = a[i]!;
    const bi = b[i]!;
    const ci = c[i]!;
    const q0 = ai + n0 * (bi + n0 * ci);
    const q1 = ai + n1 * (bi + n1 * ci);
    const q2 = ai + n2 * (bi + n2 * ci);
    const q3 = ai + n3 * (bi + n3 * ci);
    const first = q0 * q1;
    const last = q2 * q3;
    const inverse = 1 / (first * last);
    const first2 = inverse * last;
    const last2 = inverse * first;
    out[i] = own[i]! * (q1 * first2);
    out[m + i] = own[m + i]! * (q0 * first2);
    out[2 * m + i] = own[2 * m + i]! * (q3 * last2);
    out[3 * m + i] = own[3 * m + i]! * (q2 * last2);
  }
}

function oneQuotientInto({ a, b, c }: Quadratic, count: number, own: Float64Array, out: Float64Array): void {
  for (let i = 0; i < a.length; i++) out[i] = own[i]! / (a[i]! + count * (b[i]! + count * c[i]!));
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
