import type { Build } from '../layout/search-space.js';
import type { CostBasis } from '../money/capital.js';
import type { PresentWeights } from '../money/present-weights.js';
import { switchLife } from '../money/running-cost.js';

/** What worn switches cost at the least, however the switchings fall on the stages. */
export interface LeastWear {
  /**
   * @param switchingsPerYear of all stages together, at the least
   * @returns present value of the replacements, at the least
   */
  leastCost(switchingsPerYear: number): number;
}

const NO_WEAR: LeastWear = { leastCost: () => 0 };

/**
 * The least that replacing the switches of a bank costs. A switch of life L is replaced at ⌈12kL⌉, k = 1, 2 … before the last
 * month T + 1. While the weights w of the months never rise, each replacement weighs no less than any month up to the next
 * one, so that Σ w ≥ (Σ w over all months)/12L − w₁; added over the stages, 1/L is their switchings over the switches' life.
 * Where weights rise the same holds of their least.
 * @param build its stages
 * @param cost prices and the kind of switch
 * @param weights of the months
 * @returns a function of the switchings a year
 * @source derived
 */
export function leastWear(build: Build, cost: CostBasis, weights: PresentWeights): LeastWear {
  const { prices, switchKind } = cost;
  const kind = prices.switches?.find((entry) => entry.kind === switchKind);
  const life = kind?.lifeSwitchings;
  if (life === undefined) return NO_WEAR;
  const smallestRatedKvar = (build.smallestKvar / build.totalKvar) * build.ratedKvar;
  const { amount } = switchLife(kind, smallestRatedKvar, 1, prices.replacementFactor ?? 1);
  const { all, once } = weights.everyMonth;
  // the last digits of the rounding up to months
  const share = (1 - 1e-6) / (12 * life);
  return {
    leastCost: (switchingsPerYear) => amount * Math.max(0, all * share * switchingsPerYear - build.stages * once),
  };
}
