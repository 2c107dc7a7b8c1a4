import type { EstimateResult } from '#libs/engine/index.js';
import type { DeskState } from '../desk/desk-state.js';

/** The kept revision's result where it is an estimate, null where it stands on a record or there is none. */
export function keptEstimate({ kept }: DeskState): EstimateResult | null {
  return kept === null || kept.result.record !== null ? null : kept.result;
}
