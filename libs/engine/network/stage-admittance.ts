import type { StageGroup } from '../layout/bank.js';
import { stageOhm } from '../layout/stage.js';
import { resistanceGrowth } from '../quantity/resistance-growth.js';
import type { ComplexColumn } from './bus-admittance.js';
import type { ToleranceFactors } from './tolerance-factors.js';

/** A stage's branch at the fundamental in one corner, per phase [Ω]. */
export interface StageBranch {
  capacitiveOhm: number;
  inductiveOhm: number;
  resistanceOhm: number;
  resistanceExponent: number;
}

/**
 * A stage in a corner: X_C ÷ capacitance factor, X_L × inductance factor, R_L from nominal values.
 * @param group nameplate
 * @param factors tolerance factors of the corner
 * @param resistanceExponent k of R ∝ h^k
 * @returns the branch at the fundamental
 * @source method-network
 */
export function stageBranch(group: StageGroup, factors: ToleranceFactors, resistanceExponent: number): StageBranch {
  const nominal = stageOhm(group);
  return {
    capacitiveOhm: nominal.capacitiveOhm / factors.capacitanceFactor,
    inductiveOhm: nominal.inductiveOhm * factors.inductanceFactor,
    resistanceOhm: nominal.resistanceOhm,
    resistanceExponent,
  };
}

/**
 * Reactor ratio of a branch in its corner: p' = X_L'/X_C'.
 * @param branch stage in a corner
 * @returns p', 0 … below 1
 */
export function branchRatio(branch: StageBranch): number {
  return branch.inductiveOhm / branch.capacitiveOhm;
}

/**
 * Admittance of one stage over orders: y(h) = 1/(R_L·h^k + j(h·X_L − X_C/h)).
 * @param branch stage in a corner
 * @param ordersH orders, length n
 * @returns y per phase [S], length n
 * @source method-network
 */
export function stageAdmittance(branch: StageBranch, ordersH: Float64Array): ComplexColumn {
  const n = ordersH.length;
  const out: ComplexColumn = { re: new Float64Array(n), im: new Float64Array(n) };
  for (let i = 0; i < n; i++) {
    const h = ordersH[i]!;
    const r = branch.resistanceOhm === 0 ? 0 : branch.resistanceOhm * resistanceGrowth(h, branch.resistanceExponent);
    const x = h * branch.inductiveOhm - branch.capacitiveOhm / h;
    const square = r * r + x * x;
    out.re[i] = r / square;
    out.im[i] = -x / square;
  }
  return out;
}
