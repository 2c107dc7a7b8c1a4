import { type ComplexNumber, cAdd, cDivide, cMultiply, cScale, cSubtract } from '../quantity/complex-number.js';
import { improvedRoots } from './aberth.js';
import type { ClosingNetwork } from './network-loop.js';

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
  /** takes the source's place where other capacitors stand behind an impedance */
  network?: ClosingNetwork;
  /** crest of the source's phase voltage [V] */
  crestV: number;
  frequencyHz: number;
}

const ONE: ComplexNumber = { re: 1, im: 0 };

/** Z(s) = Z_closing(s) + 1/Y_rest(s) with its slope and its zeros. */
export class LoopImpedance {
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
    return improvedRoots(this.#guesses(count), (s) => this.#logSlope(s, poles));
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

  #logSlope(s: ComplexNumber, poles: readonly ComplexNumber[]): ComplexNumber {
    const closing = branchZ(this.#circuit.closing, s);
    const rest = this.#rest(s);
    const f = cAdd(ONE, cMultiply(closing.value, rest.value));
    const fSlope = cAdd(cMultiply(closing.slope, rest.value), cMultiply(closing.value, rest.slope));
    return poles.reduce((sum, pole) => cAdd(sum, cDivide(ONE, cSubtract(s, pole))), cDivide(fSlope, f));
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

/**
 * Branches of one tuning and quality are one branch of their sum: left apart they would hide a double zero.
 * @param branches in parallel
 * @returns one branch a tuning and quality
 */
export function mergedBranches(branches: readonly SeriesBranch[]): SeriesBranch[] {
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
