import { invertInto } from '../network/nodal-impedance.js';
import { type ComplexNumber, cAbs, cAdd, cDivide, cMultiply, cScale, cSubtract } from '../quantity/complex-number.js';
import { improvedRoots } from './aberth.js';
import type { ClosingNetwork, NetworkBranch, SeriesBranch } from './closing-parts.js';

const ONE: ComplexNumber = { re: 1, im: 0 };
/** Equal feeders have modes the bank does not see; parts a millionth apart keep each mode by itself. */
const APART = 1e-6;
/** At a zero of Z its two parts cancel to this share of either. */
const SEEN_SHARE = 1e-6;
/** Where the number of modes is read off: s beyond, and below, every natural frequency [1/s]. */
const FAR = 1e14;
const NEAR = 1e-7;

/** Z(s) = Z_closing(s) + z_bb(s) of a network, with its slope and its zeros. */
export class NetworkLoop {
  readonly #nodes: number;
  readonly #bankNode: number;
  readonly #branches: NetworkBranch[];
  readonly #closing: NetworkBranch;
  readonly #matrix: Float64Array;
  readonly #inverse: Float64Array;

  /**
   * @param network what stands round the bank
   * @param connected stages that are in
   * @param closing the stage that is closed
   */
  constructor(network: ClosingNetwork, connected: readonly SeriesBranch[], closing: SeriesBranch) {
    const atBank = { from: network.bankNode, to: -1, driven: false };
    this.#nodes = network.nodes;
    this.#bankNode = network.bankNode;
    this.#closing = { ...closing, ...atBank };
    this.#branches = [...network.branches, ...connected.map((branch) => ({ ...branch, ...atBank }))].map(
      (branch, k) => ({
        ...branch,
        inductanceH: branch.inductanceH * (1 + k * APART),
        capacitanceF: branch.capacitanceF * (1 + k * APART),
      }),
    );
    this.#matrix = new Float64Array(2 * network.nodes * network.nodes);
    this.#inverse = new Float64Array(this.#matrix.length);
  }

  value(s: ComplexNumber): ComplexNumber {
    this.#invertAt(s, this.#branches);
    return cAdd(cDivide(ONE, admittance(this.#closing, s).value), this.#z(this.#bankNode, this.#bankNode));
  }

  slope(s: ComplexNumber): ComplexNumber {
    this.#invertAt(s, this.#branches);
    const { value, slope } = admittance(this.#closing, s);
    let sum = cScale(cDivide(slope, cMultiply(value, value)), -1);
    for (const branch of this.#branches) {
      const across = this.#across(branch, this.#bankNode);
      sum = cSubtract(sum, cMultiply(admittance(branch, s).slope, cMultiply(across, across)));
    }
    return sum;
  }

  // Every source drives its own branch.
  busVoltage(s: ComplexNumber, crestV: number): ComplexNumber {
    return this.nodeVoltage(this.#bankNode, s, crestV);
  }

  nodeVoltage(node: number, s: ComplexNumber, crestV: number): ComplexNumber {
    this.#invertAt(s, this.#branches);
    return this.#branches
      .filter(({ driven }) => driven)
      .map((branch) => cMultiply(this.#z(node, branch.from), cScale(admittance(branch, s).value, crestV)))
      .reduce(cAdd);
  }

  /**
   * Natural frequencies of the closed circuit: zeros of N(s) = det Y(s)·Π D_k(s), D_k the denominator of branch k, a
   * polynomial with the logarithmic derivative Σ y_k'·z_k + Σ D_k'/D_k, z_k what is seen across the branch. Its degree is
   * what s·N'/N comes to far out, less the zeros at 0, which carry no current through a capacitor.
   */
  zeros(): ComplexNumber[] {
    const count = this.#powerAt(FAR) - this.#powerAt(NEAR);
    return improvedRoots(this.#guesses(count), (s) => this.#logSlope(s)).filter((s) => this.#isSeen(s));
  }

  // Currents that go round in a mesh of their own leave Z as it is; the bank takes no part in them.
  #isSeen(s: ComplexNumber): boolean {
    return cAbs(this.value(s)) <= SEEN_SHARE * cAbs(this.#z(this.#bankNode, this.#bankNode));
  }

  #powerAt(s: number): number {
    const real = { re: s, im: 0 };
    return Math.round(cScale(this.#logSlope(real), s).re);
  }

  #logSlope(s: ComplexNumber): ComplexNumber {
    const all = [...this.#branches, this.#closing];
    this.#invertAt(s, all);
    return all.reduce<ComplexNumber>(
      (sum, branch) => {
        const seen = cSubtract(
          this.#across(branch, branch.from),
          branch.to < 0 ? { re: 0, im: 0 } : this.#across(branch, branch.to),
        );
        const own = cMultiply(admittance(branch, s).slope, seen);
        return cAdd(sum, cAdd(own, denominatorLogSlope(branch, s)));
      },
      { re: 0, im: 0 },
    );
  }

  // Spread over the natural frequencies of the parts, off the axes so that no two start alike.
  #guesses(count: number): ComplexNumber[] {
    const all = [...this.#branches, this.#closing];
    const henries = all.map(({ inductanceH }) => inductanceH).filter((henry) => henry > 0);
    const farads = all.map(({ capacitanceF }) => capacitanceF).filter((farad) => farad > 0);
    const sum = (values: number[]): number => values.reduce((total, value) => total + value, 0);
    const low = 1 / Math.sqrt(sum(henries) * sum(farads));
    const high = 2 / Math.sqrt(Math.min(...henries) * Math.min(...farads));
    return Array.from({ length: count }, (_, k) => {
      const pair = Math.floor(k / 2);
      const size = low * (high / low) ** (pair / Math.max(1, Math.ceil(count / 2) - 1));
      return { re: -size * (0.05 + 0.01 * k), im: (k % 2 === 0 ? 1 : -1) * size };
    });
  }

  #invertAt(s: ComplexNumber, branches: readonly NetworkBranch[]): void {
    const n = this.#nodes;
    this.#matrix.fill(0);
    const add = (row: number, column: number, y: ComplexNumber, sign: number): void => {
      const at = 2 * (row * n + column);
      this.#matrix[at]! += sign * y.re;
      this.#matrix[at + 1]! += sign * y.im;
    };
    for (const branch of branches) {
      const { value } = admittance(branch, s);
      add(branch.from, branch.from, value, 1);
      if (branch.to < 0) continue;
      add(branch.to, branch.to, value, 1);
      add(branch.from, branch.to, value, -1);
      add(branch.to, branch.from, value, -1);
    }
    invertInto(this.#matrix, n, this.#inverse, 0);
  }

  #z(row: number, column: number): ComplexNumber {
    const at = 2 * (row * this.#nodes + column);
    return { re: this.#inverse[at]!, im: this.#inverse[at + 1]! };
  }

  // Voltage across a branch for a unit current at a node.
  #across({ from, to }: NetworkBranch, node: number): ComplexNumber {
    return to < 0 ? this.#z(from, node) : cSubtract(this.#z(from, node), this.#z(to, node));
  }
}

/**
 * Admittance of a series branch and its slope: 1/(R + sL), or sC/(1 + sRC + s²LC).
 * @param branch the branch
 * @param s complex frequency [1/s]
 * @returns y [S] and dy/ds
 */
export function admittance(branch: SeriesBranch, s: ComplexNumber): { value: ComplexNumber; slope: ComplexNumber } {
  const { below, belowSlope } = denominator(branch, s);
  const { capacitanceF } = branch;
  const above = capacitanceF > 0 ? cScale(s, capacitanceF) : ONE;
  const value = cDivide(above, below);
  // (above/below)' = (above' − value·below')/below
  const risen = cSubtract({ re: capacitanceF, im: 0 }, cMultiply(value, belowSlope));
  return { value, slope: cDivide(risen, below) };
}

function denominator(
  { rOhm, inductanceH, capacitanceF }: SeriesBranch,
  s: ComplexNumber,
): { below: ComplexNumber; belowSlope: ComplexNumber } {
  const series = cAdd({ re: rOhm, im: 0 }, cScale(s, inductanceH));
  if (capacitanceF === 0) return { below: series, belowSlope: { re: inductanceH, im: 0 } };
  return {
    below: cAdd(ONE, cMultiply(cScale(s, capacitanceF), series)),
    belowSlope: cScale(cAdd({ re: rOhm, im: 0 }, cScale(s, 2 * inductanceH)), capacitanceF),
  };
}

function denominatorLogSlope(branch: SeriesBranch, s: ComplexNumber): ComplexNumber {
  const { below, belowSlope } = denominator(branch, s);
  return cAbs(belowSlope) === 0 ? { re: 0, im: 0 } : cDivide(belowSlope, below);
}
