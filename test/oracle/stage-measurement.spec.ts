// Hand formulas and circuits: a stage's line currents worked out with complex numbers from three unlike elements and a
// reactor in each line, and read back; capacitances between terminals worked out as series and parallel capacitors.
import { describe, expect, it } from 'vitest';
import { InputProblem, readMeasurement, type StageGroup, type StageMeasurementInput } from '#libs/engine/index.js';
import { chance } from '../support/chance.js';
import { Complex } from '../support/complex.js';
import { runs, SEED } from '../support/soak.js';

const BASIS = { nominalV: 400, frequencyHz: 50 };
const OMEGA = 2 * Math.PI * 50;

function group(parts: Partial<StageGroup> = {}): StageGroup {
  return {
    count: 1,
    ratedKvar: 50,
    ratedV: 480,
    reactorPct: 0,
    reactorQuality: 30,
    dischargeOhm: null,
    reactorMaxA: null,
    switchPeakA: null,
    fixed: false,
    ...parts,
  };
}

function read(
  parts: Partial<StageMeasurementInput>,
  of = group(),
  basis: Parameters<typeof readMeasurement>[2] = BASIS,
) {
  return readMeasurement({ stage: 1, date: '2025-06-01', ...parts }, of, basis, 'm');
}

/** Nameplate capacitance of one delta phase, C = Q/(3·ω·U²) [µF]. */
const NAMEPLATE_UF = (50_000 / (3 * OMEGA * 480 ** 2)) * 1e6;

describe('line currents of a stage', () => {
  it('plain and whole: I = Q·U/(√3·U_N²) reads as the nameplate', () => {
    const amps = (50_000 * 396) / (Math.sqrt(3) * 480 ** 2);
    const found = read({ lineA: [amps, amps, amps], busV: 396 });
    expect(found.capacitanceFactor).toBeCloseTo(1, 12);
    expect(found.ratedKvar).toBeCloseTo(50, 10);
    expect(found.elementUf[0]).toBeCloseTo(NAMEPLATE_UF, 9);
    expect(found.unbalancePct).toBeLessThan(1e-9);
  });

  it('detuned: I = U/(√3·(X_C − X_L)), at 49.8 Hz both reactances of that frequency', () => {
    const left = 0.83;
    const capacitiveOhm = 480 ** 2 / 50_000 / left / (49.8 / 50);
    const inductiveOhm = 0.07 * (480 ** 2 / 50_000) * (49.8 / 50);
    const amps = 404 / (Math.sqrt(3) * (capacitiveOhm - inductiveOhm));
    const found = read({ lineA: [amps, amps, amps], busV: 404, frequencyHz: 49.8 }, group({ reactorPct: 7 }));
    expect(found.capacitanceFactor).toBeCloseTo(left, 12);
    // Control: without the reactor the same reading would be another capacitor.
    expect(read({ lineA: [amps, amps, amps], busV: 404, frequencyHz: 49.8 }).capacitanceFactor).toBeGreaterThan(0.88);
  });

  it('of three unlike elements, with and without reactors, give the three elements back', () => {
    const random = chance(SEED);
    for (let k = 0; k < runs(200, 4000); k++) {
      const deltaUf = [0, 1, 2].map(() => NAMEPLATE_UF * random.between(0.45, 1.1)) as [number, number, number];
      const reactorPct = random.oneOf([0, 5.67, 7, 14]);
      const inductiveOhm = (reactorPct / 100) * (480 ** 2 / 50_000);
      const found = read({ lineA: lineCurrents(deltaUf, inductiveOhm, 400), busV: 400 }, group({ reactorPct }));
      for (const at of [0, 1, 2]) expect(found.elementUf[at]! / deltaUf[at]!).toBeCloseTo(1, 9);
      const sum = deltaUf.reduce((total, uf) => total + uf, 0);
      expect(found.capacitanceFactor).toBeCloseTo(sum / (3 * NAMEPLATE_UF), 9);
    }
  });

  it('with one line dead read what is left between the other two: half of a delta', () => {
    const amps = OMEGA * 1.5 * NAMEPLATE_UF * 1e-6 * 400;
    expect(read({ lineA: [0, amps, amps], busV: 400 }).capacitanceFactor).toBeCloseTo(0.5, 9);
    const capacitiveOhm = 1 / (OMEGA * 1.5 * NAMEPLATE_UF * 1e-6);
    const detuned = 400 / (capacitiveOhm - 2 * 0.07 * (480 ** 2 / 50_000));
    const found = read({ lineA: [0, detuned, detuned], busV: 400 }, group({ reactorPct: 7 }));
    expect(found.capacitanceFactor).toBeCloseTo(0.5, 9);
  });

  it.each([
    ['that don’t add up to nothing', { lineA: [60, 20, 20], busV: 400 }, 'm.lineA', 'inconsistent'],
    ['without a voltage', { lineA: [50, 50, 50] }, 'm.busV', 'missing'],
    ['of no current', { lineA: [0, 0, 0], busV: 400 }, 'm.lineA', 'out-of-range'],
    ['of another unit', { lineA: [170, 170, 170], busV: 400 }, 'm.lineA', 'inconsistent'],
    ['at a phase voltage', { lineA: [50, 50, 50], busV: 231 }, 'm.busV', 'out-of-range'],
    [
      'at another mains frequency',
      { lineA: [50, 50, 50], busV: 400, frequencyHz: 60 },
      'm.frequencyHz',
      'out-of-range',
    ],
    [
      'beside capacitances',
      { lineA: [50, 50, 50], busV: 400, terminalUf: [300, 300, 300], connection: 'delta' },
      'm.terminalUf',
      'inconsistent',
    ],
    ['that are not there', {}, 'm.lineA', 'missing'],
    ['as capacitances without the connection', { terminalUf: [300, 300, 300] }, 'm.connection', 'missing'],
    [
      'as capacitances none can show',
      { terminalUf: [300, 300, 100], connection: 'star' },
      'm.terminalUf',
      'inconsistent',
    ],
  ] satisfies [string, Partial<StageMeasurementInput>, string, string][])(
    '%s are refused, naming the field',
    (_, parts, path, code) => {
      expect(() => read(parts)).toThrow(InputProblem);
      try {
        read(parts);
      } catch (error) {
        expect((error as InputProblem).problems[0]).toMatchObject({ path, code });
      }
    },
  );

  it('of another connection than the bank’s are refused', () => {
    const given = { terminalUf: [300, 300, 300] as [number, number, number], connection: 'star' as const };
    expect(() => read(given, group(), { ...BASIS, connection: 'delta' })).toThrow(/connection/);
  });
});

describe('capacitances between terminals', () => {
  it('of a balanced delta are one and a half phases', () => {
    const uf = 1.5 * NAMEPLATE_UF;
    const found = read({ terminalUf: [uf, uf, uf], connection: 'delta' });
    expect(found.capacitanceFactor).toBeCloseTo(1, 12);
    expect(found.elementUf[1]).toBeCloseTo(NAMEPLATE_UF, 9);
  });

  it('of a delta: an element beside the other two in series; of a star: two in series', () => {
    const random = chance(SEED + 1);
    const series = (a: number, b: number): number => 1 / (1 / a + 1 / b);
    for (let k = 0; k < runs(100, 2000); k++) {
      const [x, y, z] = [0, 1, 2].map(() => NAMEPLATE_UF * random.between(0.4, 1.1)) as [number, number, number];
      const delta = read({
        terminalUf: [x + series(y, z), y + series(z, x), z + series(x, y)],
        connection: 'delta',
      });
      for (const [at, uf] of [x, y, z].entries()) expect(delta.elementUf[at]! / uf).toBeCloseTo(1, 9);
      const [a, b, c] = [3 * x, 3 * y, 3 * z];
      const star = read({ terminalUf: [series(a, b), series(b, c), series(c, a)], connection: 'star' });
      for (const [at, uf] of [a, b, c].entries()) expect(star.elementUf[at]! / uf).toBeCloseTo(1, 9);
    }
  });
});

/** Solves the star point of the elements by nodes: reactors jX_L into three nodes, elements between them. */
function lineCurrents(deltaUf: [number, number, number], inductiveOhm: number, busV: number): [number, number, number] {
  const phaseV = busV / Math.sqrt(3);
  const source = [0, -120, 120].map((degrees) => {
    const angle = (degrees * Math.PI) / 180;
    return new Complex(phaseV * Math.cos(angle), phaseV * Math.sin(angle));
  });
  const [ab, bc, ca] = deltaUf.map((uf) => new Complex(0, OMEGA * uf * 1e-6)) as [Complex, Complex, Complex];
  let node = source;
  if (inductiveOhm > 0) {
    const y = new Complex(0, inductiveOhm).inverse();
    const matrix = [
      [y.plus(ab).plus(ca), ab.times(-1), ca.times(-1)],
      [ab.times(-1), y.plus(ab).plus(bc), bc.times(-1)],
      [ca.times(-1), bc.times(-1), y.plus(bc).plus(ca)],
    ];
    node = solved(
      matrix,
      source.map((v) => v.times(y)),
    );
  }
  const current = (from: Complex, to: Complex, y: Complex): Complex => from.minus(to).times(y);
  const [a, b, c] = node as [Complex, Complex, Complex];
  return [
    current(a, b, ab).plus(current(a, c, ca)).size,
    current(b, a, ab).plus(current(b, c, bc)).size,
    current(c, b, bc).plus(current(c, a, ca)).size,
  ];
}

function solved(matrix: Complex[][], right: Complex[]): Complex[] {
  const rows = matrix.map((row, k) => [...row, right[k]!]);
  for (let k = 0; k < 3; k++) {
    const pivot = rows[k]![k]!.inverse();
    rows[k] = rows[k]!.map((value) => value.times(pivot));
    for (let r = 0; r < 3; r++) {
      if (r === k) continue;
      const factor = rows[r]![k]!;
      rows[r] = rows[r]!.map((value, at) => value.minus(rows[k]![at]!.times(factor)));
    }
  }
  return rows.map((row) => row[3]!);
}
