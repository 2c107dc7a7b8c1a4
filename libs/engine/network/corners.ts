import type { Supply } from '../supply/supply.js';
import { type SupplyPath, supplyPath } from '../supply/supply-path.js';
import type { Loads } from './loads.js';
import { NAMEPLATE, type ToleranceFactors, toleranceEnds } from './tolerance-factors.js';
import type { NetworkState } from './topology.js';

/** One combination of the uncertain quantities. */
export interface Corner {
  faultLevelMva: number;
  capacitanceFactor: number;
  inductanceFactor: number;
  dampingKw: number;
  /** how couplers, generators, capacitors and transformers stand; absent in the normal standing */
  standing?: string;
  /** capacitors that stand in the network apart from the bank, relative to their nameplate; absent where they are as it says */
  networkCapacitanceFactor?: number;
  networkInductanceFactor?: number;
}

/** The network without the bank: one supply path and one damping load. */
export interface NetworkCase {
  path: SupplyPath;
  dampingKw: number;
  /** standing of a network with several buses; null where there is one bus */
  state: NetworkState | null;
}

/** A corner with the places of its network and of its tolerance factors. */
export interface CornerCase {
  corner: Corner;
  /** index into `networks` */
  network: number;
  /** index into `factors` */
  factors: number;
}

/** All corners, nominal first, and the networks and factors they are made of. */
export interface CornerSet {
  corners: CornerCase[];
  networks: NetworkCase[];
  factors: ToleranceFactors[];
}

/**
 * Corners in their fixed order: nominal (greatest fault level, factors 1, most damping, u_k as given), then fault level
 * {max, min} × capacitance {0.95, 1.10} × inductance {0.97, 1.03} × damping {0, min, max, distinct} × standing, the last
 * running fastest. The greatest fault level goes with u_k·(1−t), the least with u_k·(1+t).
 * @param supply settled supply
 * @param loads settled loads
 * @param nominalV bus voltage [V]
 * @param states standings of the network with the tolerances of its own capacitors, the normal one first; [null] for one bus
 * @returns corners with their networks and factors
 * @source method-network
 */
export function cornerSet(
  supply: Supply,
  loads: Loads,
  nominalV: number,
  states: readonly (NetworkState | null)[] = [null],
): CornerSet {
  const { max, min } = supply.faultLevelMva;
  const dampingsKw = [...new Set([0, loads.dampingKw.min, loads.dampingKw.max])];
  const normal = states[0] ?? null;
  const networks: NetworkCase[] = [
    { path: supplyPath(supply, nominalV, max, 'asGiven'), dampingKw: loads.dampingKw.max, state: normal },
  ];
  const factors: ToleranceFactors[] = [NAMEPLATE, ...toleranceEnds(true)];
  const corners: CornerCase[] = [
    { corner: { faultLevelMva: max, ...factors[0]!, dampingKw: loads.dampingKw.max }, network: 0, factors: 0 },
  ];
  const ends = [
    { faultLevelMva: max, path: supplyPath(supply, nominalV, max, 'least') },
    { faultLevelMva: min, path: supplyPath(supply, nominalV, min, 'most') },
  ];
  for (const { faultLevelMva, path } of ends) {
    const first = networks.length;
    networks.push(...dampingsKw.flatMap((dampingKw) => states.map((state) => ({ path, dampingKw, state }))));
    for (let f = 1; f < factors.length; f++) {
      for (const [k, { dampingKw, state }] of networks.slice(first).entries()) {
        const corner = { faultLevelMva, ...factors[f]!, dampingKw, ...standing(state) };
        corners.push({ corner, network: first + k, factors: f });
      }
    }
  }
  return { corners, networks, factors };
}

function standing(
  state: NetworkState | null,
): Pick<Corner, 'standing' | 'networkCapacitanceFactor' | 'networkInductanceFactor'> {
  if (state === null) return {};
  const { name, tolerance } = state;
  return {
    ...(name === '' ? {} : { standing: name }),
    ...(tolerance === undefined
      ? {}
      : {
          networkCapacitanceFactor: tolerance.capacitanceFactor,
          networkInductanceFactor: tolerance.inductanceFactor,
        }),
  };
}
