import type { ReactiveBasis } from './papers.js';

/**
 * What a rule looks at of lagging and leading: lagging, leading, both added, or the net lagging max(lagging − leading, 0).
 * @param basis which of them
 * @param lagging kvar or kvarh, ≥ 0
 * @param leading kvar or kvarh, ≥ 0
 * @returns the same unit, ≥ 0
 * @source method-money
 */
export function reactiveOf(basis: ReactiveBasis, lagging: number, leading: number): number {
  switch (basis) {
    case 'lagging':
      return lagging;
    case 'leading':
      return leading;
    case 'both':
      return lagging + leading;
    case 'net':
      return Math.max(lagging - leading, 0);
  }
}
