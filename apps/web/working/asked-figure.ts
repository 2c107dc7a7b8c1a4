import { useAddress } from '../address.js';
import type { Picks } from '../desk/look.js';

/** The figure whose working the address asks for, null for none. */
export function useAskedFigure(): string | null {
  const address = useAddress();
  return address.page === 'site' ? address.figure : null;
}

/**
 * What must be picked for an asked figure to be drawn: the moment it belongs to, or the level.
 * @param id name of a figure
 * @param levelsKvar levels of the bank, ascending [kvar]
 */
export function picksOf(id: string | null, levelsKvar: readonly number[]): Partial<Picks> | null {
  const [, kind, number] = /^(moment|margins)\[(\d+)\]/.exec(id ?? '') ?? [];
  if (kind === 'moment') return { momentS: Number(number), cursorS: null };
  if (kind === 'margins') return { levelKvar: levelsKvar[Number(number)] ?? null };
  return null;
}
