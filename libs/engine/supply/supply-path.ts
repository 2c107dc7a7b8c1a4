import { InputProblem } from '../problem.js';
import { resistanceGrowth } from '../quantity/resistance-growth.js';
import type { SettledTransformer, Supply } from './supply.js';

/** Series resistance and reactance per phase at the fundamental, at the bus voltage [Ω]. */
export interface SeriesOhm {
  rOhm: number;
  xOhm: number;
}

/** The way from the ideal source to the bus: the network, then the transformers in parallel (none: straight on). */
export interface SupplyPath {
  source: SeriesOhm;
  transformers: SeriesOhm[];
  /** exponent k of R ∝ h^k */
  resistanceExponent: number;
}

/** Which end of the impedance tolerance a transformer is taken at. */
export type ToleranceEnd = 'least' | 'asGiven' | 'most';

/**
 * The network behind the transformer: |Z| = U²/S_k, X = |Z|/√(1+ρ²), R = ρ·X; no voltage factor.
 * @param faultLevelMva S_k [MVA] > 0
 * @param nominalV U, line to line at the bus [V]
 * @param rOverX ρ
 * @returns R and X at the fundamental [Ω]
 * @source iec-60909-0 (network feeder, without the voltage factor)
 */
export function networkOhm(faultLevelMva: number, nominalV: number, rOverX: number): SeriesOhm {
  const zOhm = (nominalV * nominalV) / (faultLevelMva * 1e6);
  const xOhm = zOhm / Math.sqrt(1 + rOverX * rOverX);
  return { rOhm: rOverX * xOhm, xOhm };
}

/**
 * A transformer's series impedance: R = P_k/S_r · U²/S_r, |Z| = u_k · U²/S_r, X = √(Z² − R²).
 * @param transformer nameplate
 * @param nominalV U, line to line at the bus [V]
 * @param end which end of the tolerance on u_k; R is unchanged by it
 * @returns R and X at the fundamental [Ω]
 * @throws InputProblem where the load loss leaves no reactance
 * @source iec-60909-0 (two-winding transformers)
 */
export function transformerOhm(transformer: SettledTransformer, nominalV: number, end: ToleranceEnd): SeriesOhm {
  const sign = end === 'least' ? -1 : end === 'most' ? 1 : 0;
  const impedancePu = (transformer.impedancePct / 100) * (1 + (sign * transformer.impedanceTolerancePct) / 100);
  const resistancePu = transformer.loadLossKw / transformer.ratedKva;
  if (!(impedancePu > resistancePu)) {
    throw new InputProblem([
      {
        code: 'inconsistent',
        path: 'supply.transformers',
        expected: `an impedance voltage above the resistive part of ${resistancePu * 100} %, tolerance included`,
        found: `${impedancePu * 100}`,
        unit: '%',
      },
    ]);
  }
  const baseOhm = (nominalV * nominalV) / (transformer.ratedKva * 1000);
  return {
    rOhm: resistancePu * baseOhm,
    xOhm: Math.sqrt(impedancePu * impedancePu - resistancePu * resistancePu) * baseOhm,
  };
}

/**
 * The supply path at one fault level; the greatest level goes with the least u_k and the other way round.
 * @param supply settled supply
 * @param nominalV bus voltage [V]
 * @param faultLevelMva at the transformer's primary, or at the bus where there is none [MVA]
 * @param end tolerance end of every transformer
 * @returns series impedances, per phase at the bus voltage [Ω]
 * @source method-network
 */
export function supplyPath(supply: Supply, nominalV: number, faultLevelMva: number, end: ToleranceEnd): SupplyPath {
  return {
    source: networkOhm(faultLevelMva, nominalV, supply.rOverX),
    transformers: supply.transformers.map((transformer) => transformerOhm(transformer, nominalV, end)),
    resistanceExponent: supply.resistanceExponent,
  };
}

/**
 * Impedance of the whole path at an order: Z(h) = R·h^k + jhX, transformers paralleled as complex numbers.
 * @param path supply path
 * @param orderH order h ≥ 1
 * @param out receives [Re, Im] in Ω per phase
 * @source method-network
 */
export function pathImpedanceInto(path: SupplyPath, orderH: number, out: Float64Array): void {
  const growth = resistanceGrowth(orderH, path.resistanceExponent);
  let re = path.source.rOhm * growth;
  let im = path.source.xOhm * orderH;
  if (path.transformers.length > 0) {
    let gSum = 0;
    let bSum = 0;
    for (const { rOhm, xOhm } of path.transformers) {
      const r = rOhm * growth;
      const x = xOhm * orderH;
      const square = r * r + x * x;
      gSum += r / square;
      bSum -= x / square;
    }
    const square = gSum * gSum + bSum * bSum;
    re += gSum / square;
    im -= bSum / square;
  }
  out[0] = re;
  out[1] = im;
}

/**
 * Short-circuit power at the bus, bank and load not counted: S_k = U²/|Z(1)|.
 * @param path supply path
 * @param nominalV bus voltage [V]
 * @returns S_k [MVA]
 * @source method-network
 */
export function shortCircuitMva(path: SupplyPath, nominalV: number): number {
  const z = new Float64Array(2);
  pathImpedanceInto(path, 1, z);
  return (nominalV * nominalV) / Math.hypot(z[0]!, z[1]!) / 1e6;
}
