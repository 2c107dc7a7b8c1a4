/**
 * Growth of a resistance with order: h^k.
 * @param orderH h
 * @param exponent k
 * @returns factor on the resistance at the fundamental
 * @source method-network
 */
export function resistanceGrowth(orderH: number, exponent: number): number {
  // The usual exponent: a root costs a tenth of a power.
  return exponent === 0.5 ? Math.sqrt(orderH) : orderH ** exponent;
}
