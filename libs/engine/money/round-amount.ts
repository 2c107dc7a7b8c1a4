/** Half a unit is rounded away from zero, with this much to spare for the last digits of a sum. */
const HALF_WIDTH = 1e-6;

/**
 * Rounds an amount: sign(x)·⌊|x|·10^d + ½ + 10⁻⁶⌋ / 10^d.
 * @param amount any amount
 * @param decimals d, 0 or more, or null to leave it as it is
 * @returns the rounded amount, never −0
 * @source method-money
 */
export function roundAmount(amount: number, decimals: number | null): number {
  if (decimals === null) return amount;
  const scale = 10 ** decimals;
  const size = Math.floor(Math.abs(amount) * scale + 0.5 + HALF_WIDTH) / scale;
  return amount < 0 ? 0 - size : size;
}
