// Reference: the complex inverse of mathjs 15.2.0, a general matrix library. Where branches are a million times apart and
// coils meet capacitors, one matrix in two hundred is so near to a resonance that the last places of its own entries move
// the inverse by more than 1e-12, the library's as much as ours: there both may be off by what those places are worth.
import { type Complex, complex, inv, type Matrix, matrix } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { invertInto } from '#libs/engine/index.js';
import { type Chance, chance } from '../support/chance.js';
import { roundingRoom } from '../support/rounding-room.js';
import { runs, SEED } from '../support/soak.js';

/** A symmetric admittance matrix, real and imaginary parts in turn. */
interface Admittance {
  n: number;
  y: Float64Array;
}

// Branches between nodes and to earth, each of its own size.
function madeAdmittance(random: Chance, decades: number): Admittance {
  const n = random.whole(1, 9);
  const y = new Float64Array(2 * n * n);
  const add = (row: number, column: number, re: number, im: number): void => {
    y[2 * (row * n + column)]! += re;
    y[2 * (row * n + column) + 1]! += im;
  };
  const branch = (): { g: number; b: number } => {
    const size = 10 ** random.between(-decades / 2, decades / 2);
    return { g: size * random.between(0.01, 0.3), b: size * random.oneOf([-1, -1, 1]) };
  };
  for (let k = 0; k < n; k++) {
    const earth = branch();
    add(k, k, earth.g, earth.b);
    for (let other = 0; other < k; other++) {
      if (other !== k - 1 && random.next() < 0.5) continue;
      const { g, b } = branch();
      add(k, k, g, b);
      add(other, other, g, b);
      add(k, other, -g, -b);
      add(other, k, -g, -b);
    }
  }
  return { n, y };
}

function inverseOf({ n, y }: Admittance): Float64Array {
  const out = new Float64Array(2 * n * n);
  invertInto(y.slice(), n, out, 0);
  return out;
}

function libraryInverse({ n, y }: Admittance): Float64Array {
  const rows = Array.from({ length: n }, (_, r) =>
    Array.from({ length: n }, (_, c) => complex(y[2 * (r * n + c)]!, y[2 * (r * n + c) + 1]!)),
  );
  const found = inv(matrix(rows)) as Matrix;
  return Float64Array.from((found.toArray() as Complex[][]).flat().flatMap(({ re, im }) => [re, im]));
}

// Furthest entry, against the two diagonal entries it lies between: the same whatever each node is measured in.
function furthest(n: number, a: Float64Array, b: Float64Array): number {
  const size = (k: number): number => Math.hypot(b[2 * k]!, b[2 * k + 1]!);
  let worst = 0;
  for (let r = 0; r < n; r++) {
    for (let c = 0; c < n; c++) {
      const k = r * n + c;
      const off = Math.hypot(a[2 * k]! - b[2 * k]!, a[2 * k + 1]! - b[2 * k + 1]!);
      worst = Math.max(worst, off / Math.sqrt(size(r * n + r) * size(c * n + c)));
    }
  }
  return worst;
}

const sizes = (m: Float64Array): Float64Array =>
  Float64Array.from({ length: m.length / 2 }, (_, k) => Math.hypot(m[2 * k]!, m[2 * k + 1]!));

/** Two methods, each of which may be off by twice what half a last place of every entry is worth. */
const ROOMS = 4;

describe(`the inverse of an admittance matrix against a matrix library (seed ${SEED})`, () => {
  it.each([
    ['alike', 1],
    ['a thousand times apart', 3],
    ['a million times apart', 6],
  ])('agrees to 1e-12 where branches are %s', (_what, decades) => {
    const count = runs(300, 10_000);
    let nearResonance = 0;
    for (let k = 0; k < count; k++) {
      const made = madeAdmittance(chance(SEED + k), decades);
      const library = libraryInverse(made);
      const off = furthest(made.n, inverseOf(made), library);
      if (off < 1e-12) continue;
      nearResonance++;
      const room = ROOMS * roundingRoom(sizes(made.y), sizes(library), made.n);
      expect(off, JSON.stringify({ seed: SEED + k, decades, n: made.n })).toBeLessThan(room);
    }
    expect(nearResonance).toBeLessThanOrEqual(decades < 6 ? 0 : count / 100);
  });

  it('control: an inverse that is off in its twelfth digit is told apart, room or not', () => {
    let told = 0;
    for (let k = 0; k < 300; k++) {
      const made = madeAdmittance(chance(SEED + k), 6);
      const library = libraryInverse(made);
      const off = furthest(
        made.n,
        inverseOf(made).map((v) => v * (1 + 2e-12)),
        library,
      );
      if (off > Math.max(1e-12, ROOMS * roundingRoom(sizes(made.y), sizes(library), made.n))) told++;
    }
    expect(told).toBeGreaterThan(280);
  });

  // Coil and capacitor at a bus cancel: its own entry all but vanishes while the matrix as a whole is sound.
  it('loses nothing where a bus is in resonance with itself', () => {
    for (const g of [1e-3, 1e-9, 1e-15, 0]) {
      const made: Admittance = { n: 2, y: Float64Array.of(g, 0, 0, 1, 0, 1, g, 0) };
      const exact = Float64Array.of(g, 0, 0, -1, 0, -1, g, 0).map((v) => v / (g * g + 1));
      for (const [k, v] of inverseOf(made).entries()) expect(Math.abs(v - exact[k]!)).toBeLessThan(1e-15);
    }
  });

  it('is symmetric to the last digit', () => {
    const made = madeAdmittance(chance(SEED), 6);
    const z = inverseOf({ ...made });
    for (let r = 0; r < made.n; r++) {
      for (let c = 0; c < made.n; c++) {
        expect(z[2 * (r * made.n + c)]).toBe(z[2 * (c * made.n + r)]);
        expect(z[2 * (r * made.n + c) + 1]).toBe(z[2 * (c * made.n + r) + 1]);
      }
    }
  });
});
