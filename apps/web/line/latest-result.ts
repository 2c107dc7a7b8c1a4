import type { Result } from '#libs/engine/index.js';
import { type DeskState, staleFrom } from '../desk/desk-state.js';

/**
 * The result the figures are taken from: the kept revision's while nothing differs from it, else what the engine says
 * of the document as typed. An estimate has no such result: its figures stand with its paper.
 */
export function latestResult(state: DeskState): Result | null {
  const { kept, look } = state;
  if (kept !== null && (staleFrom(state) === null || look === null))
    return kept.result.record === null ? null : kept.result;
  return look?.result ?? null;
}
