import { type ComplexNumber, cAdd, cDivide, cScale, cSubtract } from '../quantity/complex-number.js';

const ONE: ComplexNumber = { re: 1, im: 0 };

/** A series branch at the fundamental's resistance: R + sL + 1/(sC); inductance 0 for a plain stage. */
export interface SeriesBranch {
  rOhm: number;
  /** [H] */
  inductanceH: number;
  /** [F], > 0 */
  capacitanceF: number;
}

/**
 * Impedance of a branch and its slope at a complex frequency: Z = R + sL + 1/(sC).
 * @param branch R, L, C
 * @param s complex frequency [1/s]
 * @returns Z [Ω] and dZ/ds
 */
export function branchZ(branch: SeriesBranch, s: ComplexNumber): { value: ComplexNumber; slope: ComplexNumber } {
  const capacitive = cDivide(ONE, cScale(s, branch.capacitanceF));
  return {
    value: cAdd(cAdd({ re: branch.rOhm, im: 0 }, cScale(s, branch.inductanceH)), capacitive),
    slope: cSubtract({ re: branch.inductanceH, im: 0 }, cDivide(capacitive, s)),
  };
}

/**
 * Where a branch's impedance vanishes.
 * @param branch R, L > 0, C
 * @returns both zeros of Z [1/s]
 */
export function branchZeros({ rOhm, inductanceH, capacitanceF }: SeriesBranch): ComplexNumber[] {
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
 * Branches of one tuning and quality as one branch of their sum: left apart they would hide a double zero.
 * @param branches what is connected
 * @returns fewer branches, alike in nothing
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
