/** Capacitance and inductance relative to the nameplate. */
export interface ToleranceFactors {
  capacitanceFactor: number;
  inductanceFactor: number;
}

/** A stage as its nameplate says. */
export const NAMEPLATE: Readonly<ToleranceFactors> = { capacitanceFactor: 1, inductanceFactor: 1 };

const CAPACITANCE_FACTORS = [0.95, 1.1];
const INDUCTANCE_FACTORS = [0.97, 1.03];

/**
 * Both ends of the tolerance on capacitors and, where there are reactors, on those.
 * @param reactors whether inductance varies too
 * @returns capacitance {0.95, 1.10} × inductance {0.97, 1.03}, the last running fastest
 * @source method-network
 */
export function toleranceEnds(reactors: boolean): ToleranceFactors[] {
  const inductances = reactors ? INDUCTANCE_FACTORS : [1];
  return CAPACITANCE_FACTORS.flatMap((capacitanceFactor) =>
    inductances.map((inductanceFactor) => ({ capacitanceFactor, inductanceFactor })),
  );
}
