import { type ComplexNumber, cAbs, cAdd, cDivide, cMultiply, cScale, cSubtract } from '../quantity/complex-number.js';

/** A series branch at the fundamental's resistance: R + sL + 1/(sC); inductance 0 for a plain stage. */
export interface SeriesBranch {
  rOhm: number;
  /** [H] */
  inductanceH: number;
  /** [F], > 0 */
  capacitanceF: number;
}

/** The circuit into which one uncharged branch is closed, per phase. */
export interface ClosingCircuit {
  /** source and transformer [Ω] and [H], inductance > 0 */
  sourceOhm: number;
  sourceH: number;
  /** what is connected already, in its steady state */
  connected: SeriesBranch[];
  closing: SeriesBranch;
  /** crest of the source's phase voltage [V] */
  crestV: number;
  frequencyHz: number;
}

/** The greatest current of the closing branch over every closing instant. */
export interface ClosingPeak {
  peakA: number;
  /** when after closing [s] */
  afterS: number;
  /** phase of the source at closing, e(t) = Ê·cos(ωt + φ) [rad] */
  phaseRad: number;
}

const ONE: ComplexNumber = { re: 1, im: 0 };
const MOST_ITERATIONS = 200;
const ROOT_SHARE = 1e-13;
/** Samples in a period of the fastest mode that still counts. */
const SAMPLES = 48;
/** A mode weaker than this share of the peak no longer sets the step. */
const FAINT_SHARE = 1e-5;
/** Longest time looked at, in periods of the supply; modes without resistance never die away. */
const MOST_PERIODS = 10;

/**
 * Peak current of closing an uncharged branch onto a linear circuit in its steady state, at the worst closing instant.
 *
 * Closing a switch on v(t) is the same as putting −v(t) in series with the branch in the dead circuit, so with the bus
 * voltage before closing as V̂·e^{j(ωt+φ)} the current is i(t) = Re(e^{jφ}·z(t)),
 * z(t) = V̂·[e^{jωt}/Z(jω) + Σ_k e^{s_k t}/((s_k − jω)·Z'(s_k))], Z = Z_closing + 1/Y_rest, s_k the zeros of Z.
 * The worst φ at a time t makes i = |z(t)|, so the peak is the greatest |z(t)|: the instant is found, not sampled.
 * @param circuit source, connected branches, closing branch
 * @returns peak [A] and its time
 * @source method-inrush
 */
export function closingPeak(circuit: ClosingCircuit): ClosingPeak {
  const loop = new LoopImpedance(circuit);
  const omega = 2 * Math.PI * circuit.frequencyHz;
  const atOmega: ComplexNumber = { re: 0, im: omega };
  const busV = loop.busVoltage(atOmega, circuit.crestV);
  const terms = [
    { s: atOmega, c: cDivide(busV, loop.value(atOmega)) },
    ...loop.zeros().map((s) => ({ s, c: cDivide(busV, cMultiply(cSubtract(s, atOmega), loop.slope(s))) })),
  ];
  const found = greatest(terms, MOST_PERIODS / circuit.frequencyHz);
  const z = sumAt(terms, found.afterS);
  return { ...found, phaseRad: -Math.atan2(z.im, z.re) };
}

/** The peak before its phase is known. */
type Found = Omit<ClosingPeak, 'phaseRad'>;

function sumAt(terms: readonly Term[], t: number): ComplexNumber {
  return terms.reduce((sum, { s, c }) => cAdd(sum, cMultiply(c, cExp(s, t))), { re: 0, im: 0 });
}

interface Term {
  s: ComplexNumber;
  c: ComplexNumber;
}

// Marches at a step set by the fastest term that still counts and stops when no later sum of magnitudes can be greater.
function greatest(terms: readonly Term[], untilS: number): Found {
  let best: Found = { peakA: 0, afterS: 0 };
  let t = 0;
  while (t < untilS) {
    const sizes = terms.map(({ s, c }) => cAbs(c) * Math.exp(s.re * t));
    const most = sizes.reduce((sum, size) => sum + size, 0);
    if (most <= best.peakA) break;
    const fastest = terms.reduce(
      (w, { s }, k) => (sizes[k]! > FAINT_SHARE * most ? Math.max(w, Math.abs(s.im)) : w),
      0,
    );
    const stepS = (2 * Math.PI) / fastest / SAMPLES;
    best = marched(terms, { fromS: t, stepS }, best);
    t += stepS * BLOCK;
  }
  return refined(terms, best);
}

/** Samples between two looks at which terms still count. */
const BLOCK = 512;

function marched(terms: readonly Term[], { fromS, stepS }: { fromS: number; stepS: number }, best: Found): Found {
  const now = terms.map(({ s, c }) => cMultiply(c, cExp(s, fromS)));
  const turn = terms.map(({ s }) => cExp(s, stepS));
  let square = best.peakA * best.peakA;
  let afterS = best.afterS;
  for (let k = 0; k < BLOCK; k++) {
    let re = 0;
    let im = 0;
    for (let i = 0; i < now.length; i++) {
      const a = now[i]!;
      const b = turn[i]!;
      re += a.re;
      im += a.im;
      const next = a.re * b.re - a.im * b.im;
      a.im = a.re * b.im + a.im * b.re;
      a.re = next;
    }
    const here = re * re + im * im;
    if (here <= square) continue;
    square = here;
    afterS = fromS + k * stepS;
  }
  return { peakA: Math.sqrt(square), afterS };
}

// The samples bracket the peak; three rounds of finer steps bring it to well within 1e-6.
function refined(terms: readonly Term[], found: Found): Found {
  const fastest = terms.reduce((w, { s }) => Math.max(w, Math.abs(s.im)), 0);
  let width = (2 * Math.PI) / fastest / SAMPLES;
  let best = found;
  for (let round = 0; round < 3; round++) {
    const middle = best.afterS;
    for (let k = -20; k <= 20; k++) {
      const t = Math.max(0, middle + (k * width) / 20);
      const size = cAbs(sumAt(terms, t));
      if (size > best.peakA) best = { peakA: size, afterS: t };
    }
    width /= 20;
  }
  return best;
}

function cExp(s: ComplexNumber, t: number): ComplexNumber {
  const size = Math.exp(s.re * t);
  return { re: size * Math.cos(s.im * t), im: size * Math.sin(s.im * t) };
}

/** Z(s) = Z_closing(s) + 1/Y_rest(s) with its slope and its zeros. */
class LoopImpedance {
  readonly #circuit: ClosingCircuit;
  readonly #reactors: SeriesBranch[];
  readonly #plainF: number;

  constructor(circuit: ClosingCircuit) {
    this.#circuit = circuit;
    this.#reactors = mergedBranches(circuit.connected.filter((branch) => branch.inductanceH > 0));
    this.#plainF = circuit.connected
      .filter((branch) => branch.inductanceH === 0)
      .reduce((sum, branch) => sum + branch.capacitanceF, 0);
  }

  value(s: ComplexNumber): ComplexNumber {
    return cAdd(branchZ(this.#circuit.closing, s).value, cDivide(ONE, this.#rest(s).value));
  }

  slope(s: ComplexNumber): ComplexNumber {
    const rest = this.#rest(s);
    const turned = cDivide(rest.slope, cMultiply(rest.value, rest.value));
    return cSubtract(branchZ(this.#circuit.closing, s).slope, turned);
  }

  // The source drives the rest of the circuit: V_bus = E/(Z_source·Y_rest).
  busVoltage(s: ComplexNumber, crestV: number): ComplexNumber {
    return cDivide({ re: crestV, im: 0 }, cMultiply(this.#sourceZ(s), this.#rest(s).value));
  }

  #sourceZ(s: ComplexNumber): ComplexNumber {
    return cAdd({ re: this.#circuit.sourceOhm, im: 0 }, cScale(s, this.#circuit.sourceH));
  }

  #rest(s: ComplexNumber): { value: ComplexNumber; slope: ComplexNumber } {
    const source = this.#sourceZ(s);
    let value = cAdd(cDivide(ONE, source), cScale(s, this.#plainF));
    let slope = cAdd(cScale(cDivide(ONE, cMultiply(source, source)), -this.#circuit.sourceH), {
      re: this.#plainF,
      im: 0,
    });
    for (const branch of this.#reactors) {
      const z = branchZ(branch, s);
      value = cAdd(value, cDivide(ONE, z.value));
      slope = cSubtract(slope, cDivide(z.slope, cMultiply(z.value, z.value)));
    }
    return { value, slope };
  }

  /**
   * Zeros of F(s) = 1 + Z_closing·Y_rest by simultaneous iteration. F has poles at 0, −R/L of the source and the two
   * zeros of each connected reactor branch; its numerator's logarithmic derivative is F'/F + Σ 1/(s − pole).
   */
  zeros(): ComplexNumber[] {
    const poles = this.#poles();
    const count = poles.length + this.#growth();
    const roots = this.#guesses(count);
    for (let round = 0; round < MOST_ITERATIONS; round++) {
      let moved = 0;
      for (let k = 0; k < count; k++) moved = Math.max(moved, this.#improve(roots, k, poles));
      if (moved < ROOT_SHARE) break;
    }
    return roots;
  }

  #growth(): number {
    return this.#circuit.closing.inductanceH > 0 && this.#plainF > 0 ? 2 : 0;
  }

  #poles(): ComplexNumber[] {
    const { sourceOhm, sourceH } = this.#circuit;
    const poles: ComplexNumber[] = [
      { re: 0, im: 0 },
      { re: -sourceOhm / sourceH, im: 0 },
    ];
    for (const branch of this.#reactors) poles.push(...branchZeros(branch));
    return poles;
  }

  #improve(roots: ComplexNumber[], k: number, poles: readonly ComplexNumber[]): number {
    const s = roots[k]!;
    const closing = branchZ(this.#circuit.closing, s);
    const rest = this.#rest(s);
    const f = cAdd(ONE, cMultiply(closing.value, rest.value));
    const fSlope = cAdd(cMultiply(closing.slope, rest.value), cMultiply(closing.value, rest.slope));
    // Newton's step is −1/(N'/N); the other roots push it away (Aberth's correction).
    let logSlope = cDivide(fSlope, f);
    for (const pole of poles) logSlope = cAdd(logSlope, cDivide(ONE, cSubtract(s, pole)));
    for (let other = 0; other < roots.length; other++) {
      if (other !== k) logSlope = cSubtract(logSlope, cDivide(ONE, cSubtract(s, roots[other]!)));
    }
    const step = cDivide(ONE, logSlope);
    if (!Number.isFinite(step.re) || !Number.isFinite(step.im)) return 0;
    roots[k] = cSubtract(s, step);
    return cAbs(step) / cAbs(roots[k]!);
  }

  // Spread over the natural frequencies of the parts, off the axes so that no two start alike.
  #guesses(count: number): ComplexNumber[] {
    const { sourceH, closing } = this.#circuit;
    const loopH = closing.inductanceH > 0 ? Math.min(closing.inductanceH, sourceH) : sourceH;
    const low =
      1 / Math.sqrt((sourceH + closing.inductanceH) * (closing.capacitanceF + this.#plainF + this.#reactorF()));
    const high = 2 / Math.sqrt(loopH * closing.capacitanceF);
    return Array.from({ length: count }, (_, k) => {
      const pair = Math.floor(k / 2);
      const pairs = Math.max(1, Math.ceil(count / 2) - 1);
      const size = low * (high / low) ** (pair / pairs);
      return { re: -size * (0.05 + 0.01 * k), im: (k % 2 === 0 ? 1 : -1) * size };
    });
  }

  #reactorF(): number {
    return this.#reactors.reduce((sum, branch) => sum + branch.capacitanceF, 0);
  }
}

function branchZ(branch: SeriesBranch, s: ComplexNumber): { value: ComplexNumber; slope: ComplexNumber } {
  const capacitive = cDivide(ONE, cScale(s, branch.capacitanceF));
  return {
    value: cAdd(cAdd({ re: branch.rOhm, im: 0 }, cScale(s, branch.inductanceH)), capacitive),
    slope: cSubtract({ re: branch.inductanceH, im: 0 }, cDivide(capacitive, s)),
  };
}

function branchZeros({ rOhm, inductanceH, capacitanceF }: SeriesBranch): ComplexNumber[] {
  const half = rOhm / (2 * inductanceH);
  const rest = 1 / (inductanceH * capacitanceF) - half * half;
  const root = Math.sqrt(Math.abs(rest));
  return rest >= 0
    ? [
        { re: -half, im: root },
        { re: -half, im: -root },
      ]
    : [
        { re: -half + root, im: 0 },
        { re: -half - root, im: 0 },
      ];
}

// Branches of one tuning and quality are one branch of their sum: left apart they would hide a double zero.
function mergedBranches(branches: readonly SeriesBranch[]): SeriesBranch[] {
  const merged: SeriesBranch[] = [];
  for (const branch of branches) {
    const alike = merged.find(
      (known) =>
        nearly(known.inductanceH * known.capacitanceF, branch.inductanceH * branch.capacitanceF) &&
        nearly(known.rOhm * known.capacitanceF, branch.rOhm * branch.capacitanceF),
    );
    if (alike === undefined) {
      merged.push({ ...branch });
      continue;
    }
    const share = alike.capacitanceF / (alike.capacitanceF + branch.capacitanceF);
    alike.rOhm *= share;
    alike.inductanceH *= share;
    alike.capacitanceF += branch.capacitanceF;
  }
  return merged;
}

function nearly(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b));
}
