/**
 * Fault level from a fault current: S = √3·U·I.
 * @param faultKa I, symmetrical, at the place and voltage it is stated for [kA]
 * @param atKv U, line to line [kV]
 * @returns S [MVA]
 * @source derived: definition of the fault level
 */
export function faultLevelOfKa(faultKa: number, atKv: number): number {
  return Math.sqrt(3) * atKv * faultKa;
}

/**
 * Fault level from a source impedance: S = U²/|Z|.
 * @param sourceOhm |Z| per phase [Ω] > 0
 * @param atKv U, line to line [kV]
 * @returns S [MVA]
 * @source derived: definition of the fault level
 */
export function faultLevelOfOhm(sourceOhm: number, atKv: number): number {
  return (atKv * atKv) / sourceOhm;
}
