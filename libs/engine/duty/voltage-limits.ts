import type { RuleSet } from './rules.js';

/** Harmonic voltage limits of one edition, in % of nominal. */
export interface VoltageLimits {
  /** name with edition, as printed beside a figure */
  source: string;
  /** limit on THD_V [%] */
  distortionPct: number;
  /**
   * @param orderH order h
   * @returns limit on V_h [%], or null where the edition has no row
   */
  orderPct(orderH: number): number | null;
}

type EmcClass = 1 | 2 | 3;

/** IEC 61000-2-4 compatibility levels, [class 1, class 2, class 3] in % of nominal. */
const IEC_61000_2_4: Record<EmcClass, { distortionPct: number; rows: Record<number, number> }> = {
  1: {
    distortionPct: 5,
    rows: { 2: 2, 3: 3, 4: 1, 5: 3, 6: 0.5, 7: 3, 8: 0.5, 9: 1.5, 10: 0.5, 11: 3, 13: 3, 15: 0.3, 17: 2, 21: 0.2 },
  },
  2: {
    distortionPct: 8,
    rows: { 2: 2, 3: 5, 4: 1, 5: 6, 6: 0.5, 7: 5, 8: 0.5, 9: 1.5, 10: 0.5, 11: 3.5, 13: 3, 15: 0.4, 17: 2, 21: 0.2 },
  },
  3: {
    distortionPct: 10,
    rows: { 2: 3, 3: 6, 4: 1.5, 5: 8, 6: 1, 7: 7, 8: 1, 9: 2.5, 10: 1, 11: 5, 13: 4.5, 15: 2, 17: 4, 21: 1.75 },
  },
};

function iecOrderPct(emcClass: EmcClass, orderH: number): number | null {
  const row = IEC_61000_2_4[emcClass].rows[orderH];
  if (row !== undefined) return row;
  if (!Number.isInteger(orderH) || orderH < 2 || orderH > 50) return null;
  if (orderH % 2 === 0) return emcClass === 3 ? 1 : (0.25 * 10) / orderH + 0.25;
  if (orderH % 3 === 0) return emcClass === 3 ? 1 : 0.2;
  return emcClass === 3 ? (4.5 * 17) / orderH - 0.5 : (2.27 * 17) / orderH - 0.27;
}

/** IEEE 519 voltage limits: bus voltage up to [kV], individual and total [%]. */
const IEEE_519: readonly { toKv: number; individualPct: number; totalPct: number }[] = [
  { toKv: 1, individualPct: 5, totalPct: 8 },
  { toKv: 69, individualPct: 3, totalPct: 5 },
  { toKv: 161, individualPct: 1.5, totalPct: 2.5 },
  { toKv: Number.POSITIVE_INFINITY, individualPct: 1, totalPct: 1.5 },
];

/**
 * Harmonic voltage limits of a rule set. `iec`: IEC 61000-2-4 by class, orders without a row have no limit;
 * `ieee`: IEEE 519-2022 by bus voltage, one limit for every order up to 50.
 * @param rules rule set
 * @param nominalV bus voltage [V]
 * @param emcClass electromagnetic environment class (iec)
 * @returns limits with the edition's name
 * @source iec-61000-2-4, ieee-519-2022
 */
export function voltageLimits(rules: RuleSet, nominalV: number, emcClass: EmcClass): VoltageLimits {
  if (rules === 'iec') {
    return {
      source: `IEC 61000-2-4:2002 class ${emcClass}`,
      distortionPct: IEC_61000_2_4[emcClass].distortionPct,
      orderPct: (orderH) => iecOrderPct(emcClass, orderH),
    };
  }
  const row = IEEE_519.find(({ toKv }) => nominalV / 1000 <= toKv)!;
  return {
    source: 'IEEE 519-2022',
    distortionPct: row.totalPct,
    orderPct: (orderH) => (orderH <= 50 ? row.individualPct : null),
  };
}
