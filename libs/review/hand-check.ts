/** A hand check that is further off than this has to be explained [%]. */
export const HAND_CHECK_PCT = 2;

/** A reviewer's own figure beside the plan's. */
export interface HandCheck {
  /** id of the figure */
  figure: string;
  value: number;
  computed: number;
  unit: string;
  /** distance as a share of the plan's figure; null where that is 0 and the reviewer's is not [%] */
  deviationPct: number | null;
  isBeyond: boolean;
}

/**
 * How far a hand check is from what was computed: |v − c| / |c|.
 * @param value the reviewer's figure
 * @param computed the plan's, in the same unit
 * @returns the distance in percent, and whether it is beyond 2 %
 */
export function deviationOf(value: number, computed: number): Pick<HandCheck, 'deviationPct' | 'isBeyond'> {
  if (computed === 0)
    return value === 0 ? { deviationPct: 0, isBeyond: false } : { deviationPct: null, isBeyond: true };
  const deviationPct = (Math.abs(value - computed) / Math.abs(computed)) * 100;
  // A figure that is exactly 2 % off by decimal arithmetic must not be flagged for the binary rest of it.
  return { deviationPct, isBeyond: deviationPct > HAND_CHECK_PCT * (1 + 1e-9) };
}
