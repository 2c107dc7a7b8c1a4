import { type ComplexNumber, cAbs, cAdd, cDivide, cMultiply, cSubtract } from '../quantity/complex-number.js';
import { type ClosingCircuit, LoopImpedance, mergedBranches } from './loop-impedance.js';
import { NetworkLoop } from './network-loop.js';

/** The greatest current of the closing branch over every closing instant. */
export interface ClosingPeak {
  peakA: number;
  /** when after closing [s] */
  afterS: number;
  /** phase of the source at closing, e(t) = Ê·cos(ωt + φ) [rad] */
  phaseRad: number;
}

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
 * @param floorA a peak known to be less than this is not looked for; what is returned then is at most this [A]
 * @returns peak [A] and its time
 * @source method-inrush
 */
export function closingPeak(circuit: ClosingCircuit, floorA = 0): ClosingPeak {
  const loop = loopOf(circuit);
  const omega = 2 * Math.PI * circuit.frequencyHz;
  const atOmega: ComplexNumber = { re: 0, im: omega };
  const busV = loop.busVoltage(atOmega, circuit.crestV);
  const terms = [
    { s: atOmega, c: cDivide(busV, loop.value(atOmega)) },
    ...loop.zeros().map((s) => ({ s, c: cDivide(busV, cMultiply(cSubtract(s, atOmega), loop.slope(s))) })),
  ];
  const most = terms.reduce((sum, { c }) => sum + cAbs(c), 0);
  if (most <= floorA) return { peakA: most, afterS: 0, phaseRad: 0 };
  const found = greatest(terms, MOST_PERIODS / circuit.frequencyHz);
  const z = sumAt(terms, found.afterS);
  return { ...found, phaseRad: -Math.atan2(z.im, z.re) };
}

function loopOf(circuit: ClosingCircuit): LoopImpedance | NetworkLoop {
  const { network, connected, closing } = circuit;
  return network === undefined
    ? new LoopImpedance(circuit)
    : new NetworkLoop(network, mergedBranches(connected), closing);
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
