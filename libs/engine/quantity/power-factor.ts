/**
 * Reactive over active power at a displacement factor: tan φ = √(1/λ² − 1).
 * @param powerFactor λ, 0 < λ ≤ 1
 * @returns tan φ, 0 at unity
 * @source iec-60050-131 (power factor, displacement factor)
 */
export function tanFromPowerFactor(powerFactor: number): number {
  return Math.sqrt(Math.max(0, 1 / (powerFactor * powerFactor) - 1));
}

/**
 * Power factor of a period from its energies: λ = E_p / √(E_p² + E_q²).
 * @param activeKwh E_p ≥ 0 [kWh]
 * @param reactiveKvarh E_q [kvarh], either sign
 * @returns λ, or null where no active energy flowed
 * @source iec-60050-131 (power factor), taken over energies as billing does
 */
export function energyPowerFactor(activeKwh: number, reactiveKvarh: number): number | null {
  if (activeKwh <= 0) return null;
  return activeKwh / Math.sqrt(activeKwh * activeKwh + reactiveKvarh * reactiveKvarh);
}

/**
 * True power factor of a load with distorted current: λ = cos φ₁ / √(1 + THD_i²).
 * @param displacementFactor cos φ₁
 * @param currentDistortionPct THD_i [%]
 * @returns λ; a bank moves cos φ₁ only
 * @source grady-gilleskie-1993
 */
export function truePowerFactor(displacementFactor: number, currentDistortionPct: number): number {
  const distortion = currentDistortionPct / 100;
  return displacementFactor / Math.sqrt(1 + distortion * distortion);
}
