/** Current limits of one row of IEEE 519: bands by order and the total, % of I_L. */
export interface CurrentLimits {
  source: string;
  totalPct: number;
  /**
   * @param orderH order h
   * @returns limit on I_h, % of I_L
   */
  orderPct(orderH: number): number;
}

/** First order above each band, as the table's columns are bounded. */
const BAND_ENDS_H = [11, 17, 23, 35, Number.POSITIVE_INFINITY];

/** I_sc/I_L from, limits per band and total, % of I_L; systems up to 69 kV. */
const IEEE_519_2022: readonly { from: number; bandsPct: readonly number[]; totalPct: number }[] = [
  { from: 0, bandsPct: [4, 2, 1.5, 0.6, 0.3], totalPct: 5 },
  { from: 20, bandsPct: [7, 3.5, 2.5, 1, 0.5], totalPct: 8 },
  { from: 50, bandsPct: [10, 4.5, 4, 1.5, 0.7], totalPct: 12 },
  { from: 100, bandsPct: [12, 5.5, 5, 2, 1], totalPct: 15 },
  { from: 1000, bandsPct: [15, 7, 6, 2.5, 1.4], totalPct: 20 },
];

/** Even orders up to here have half the band's limit (2022). */
const HALVED_EVEN_TO_H = 6;

/**
 * IEEE 519-2022 current limits at a point of coupling: the row with the greatest lower bound ≤ I_sc/I_L.
 * @param shortCircuitRatio I_sc/I_L at the least fault level
 * @returns limits, % of I_L
 * @source ieee-519-2022
 */
export function currentLimits(shortCircuitRatio: number): CurrentLimits {
  const row = IEEE_519_2022.filter(({ from }) => shortCircuitRatio >= from).at(-1) ?? IEEE_519_2022[0]!;
  return {
    source: 'IEEE 519-2022',
    totalPct: row.totalPct,
    orderPct: (orderH) => {
      const band = row.bandsPct[BAND_ENDS_H.findIndex((end) => orderH < end)]!;
      return orderH % 2 === 0 && orderH <= HALVED_EVEN_TO_H ? band / 2 : band;
    },
  };
}
