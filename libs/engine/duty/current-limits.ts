import { type LimitChoice, ownLimitsName, tighter } from './limit-editions.js';
import { ownPct } from './voltage-limits.js';

/** Current limits: bands by order and the total, % of I_L; the user's own may leave some out. */
export interface CurrentLimits<Limit extends number | null = number> {
  source: string;
  totalPct: Limit;
  /**
   * @param orderH order h
   * @returns limit on I_h, % of I_L
   */
  orderPct(orderH: number): Limit;
}

/** First order above each band, as the table's columns are bounded. */
const BAND_ENDS_H = [11, 17, 23, 35, Number.POSITIVE_INFINITY];

/** I_sc/I_L from, limits per band and total, % of I_L; systems up to 69 kV, the same in both editions. */
const IEEE_519: readonly { from: number; bandsPct: readonly number[]; totalPct: number }[] = [
  { from: 0, bandsPct: [4, 2, 1.5, 0.6, 0.3], totalPct: 5 },
  { from: 20, bandsPct: [7, 3.5, 2.5, 1, 0.5], totalPct: 8 },
  { from: 50, bandsPct: [10, 4.5, 4, 1.5, 0.7], totalPct: 12 },
  { from: 100, bandsPct: [12, 5.5, 5, 2, 1], totalPct: 15 },
  { from: 1000, bandsPct: [15, 7, 6, 2.5, 1.4], totalPct: 20 },
];

/** What an even order has of its band's limit: to the order, and above it. */
const EVEN_SHARES = {
  'IEEE 519-2022': { toH: 6, share: 0.5 },
  'IEEE 519-2014': { toH: 50, share: 0.25 },
} as const;

/**
 * IEEE 519 current limits at a point of coupling: the row with the greatest lower bound ≤ I_sc/I_L, even orders as the
 * edition has them.
 * @param shortCircuitRatio I_sc/I_L at the least fault level
 * @param edition of IEEE 519
 * @returns limits, % of I_L
 * @source ieee-519-2022, ieee-519-2014
 */
export function currentLimits(
  shortCircuitRatio: number,
  edition: 'IEEE 519-2022' | 'IEEE 519-2014' = 'IEEE 519-2022',
): CurrentLimits {
  const row = IEEE_519.filter(({ from }) => shortCircuitRatio >= from).at(-1) ?? IEEE_519[0]!;
  const even = EVEN_SHARES[edition];
  return {
    source: edition,
    totalPct: row.totalPct,
    orderPct: (orderH) => {
      const band = row.bandsPct[BAND_ENDS_H.findIndex((end) => orderH < end)]!;
      return orderH % 2 === 0 && orderH <= even.toH ? band * even.share : band;
    },
  };
}

/**
 * Current limits of a choice: the edition's, tightened by own rows. The iec editions have none but the user's own.
 * @param shortCircuitRatio I_sc/I_L at the least fault level
 * @param choice edition and own rows
 * @returns limits, % of I_L; null where nothing limits the current
 * @source ieee-519-2022, ieee-519-2014
 */
export function chosenCurrentLimits(
  shortCircuitRatio: number,
  choice: LimitChoice,
): CurrentLimits<number | null> | null {
  const { edition, own } = choice;
  const isIeee = edition === 'IEEE 519-2022' || edition === 'IEEE 519-2014';
  const table = isIeee ? currentLimits(shortCircuitRatio, edition) : null;
  if (own?.current === undefined && own?.currentDistortionPct === undefined) return table;
  const name = ownLimitsName(own);
  return {
    source: table === null ? name : `${table.source} and ${name}`,
    totalPct: tighter(table?.totalPct, own.currentDistortionPct),
    orderPct: (orderH) => tighter(table?.orderPct(orderH), ownPct(own.current, orderH)),
  };
}
