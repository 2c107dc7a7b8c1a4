import type { OrderPct } from '../network/loads.js';
import { LIMIT_EDITIONS, type LimitChoice, type LimitEdition, ownLimitsName, tighter } from './limit-editions.js';
import type { RuleSet } from './rules.js';

/** Harmonic voltage limits, in % of nominal; an edition's total is a number, the user's own may be left out. */
export interface VoltageLimits<Total extends number | null = number> {
  /** name with edition, as printed beside a figure */
  source: string;
  /** limit on THD_V [%] */
  distortionPct: Total;
  /**
   * @param orderH order h
   * @returns limit on V_h [%], or null where the edition has no row
   */
  orderPct(orderH: number): number | null;
}

type EmcClass = 1 | 2 | 3;

/** IEC 61000-2-4 compatibility levels by class, in % of nominal. */
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

/** EN 50160 at low and medium voltage: 95 % of the ten-minute means of a week, in % of nominal; from memory. */
const EN_50160: Readonly<Record<number, number>> = {
  ...{ 2: 2, 3: 5, 4: 1, 5: 6, 7: 5, 9: 1.5, 11: 3.5, 13: 3, 15: 0.5, 17: 2, 19: 1.5, 21: 0.5, 23: 1.5, 25: 1.5 },
  ...Object.fromEntries(Array.from({ length: 10 }, (_, k) => [6 + 2 * k, 0.5])),
};
const EN_50160_DISTORTION_PCT = 8;

/** IEEE 519 voltage limits, the same in both editions: bus voltage up to [kV], individual and total [%]. */
const IEEE_519: readonly { toKv: number; individualPct: number; totalPct: number }[] = [
  { toKv: 1, individualPct: 5, totalPct: 8 },
  { toKv: 69, individualPct: 3, totalPct: 5 },
  { toKv: 161, individualPct: 1.5, totalPct: 2.5 },
  { toKv: Number.POSITIVE_INFINITY, individualPct: 1, totalPct: 1.5 },
];

function ieeeLimits(source: string, nominalV: number): VoltageLimits {
  const row = IEEE_519.find(({ toKv }) => nominalV / 1000 <= toKv)!;
  return {
    source,
    distortionPct: row.totalPct,
    orderPct: (orderH) => (orderH <= 50 ? row.individualPct : null),
  };
}

type OfEdition = (site: { nominalV: number; emcClass: EmcClass }) => VoltageLimits;

const EDITIONS: Record<Exclude<LimitEdition, 'own'>, OfEdition> = {
  'IEC 61000-2-4:2002': ({ emcClass }) => ({
    source: `IEC 61000-2-4:2002 class ${emcClass}`,
    distortionPct: IEC_61000_2_4[emcClass].distortionPct,
    orderPct: (orderH) => iecOrderPct(emcClass, orderH),
  }),
  'EN 50160:2010': () => ({
    source: 'EN 50160:2010',
    distortionPct: EN_50160_DISTORTION_PCT,
    orderPct: (orderH) => EN_50160[orderH] ?? null,
  }),
  'IEEE 519-2014': ({ nominalV }) => ieeeLimits('IEEE 519-2014', nominalV),
  'IEEE 519-2022': ({ nominalV }) => ieeeLimits('IEEE 519-2022', nominalV),
};

/**
 * Harmonic voltage limits of a rule set's first edition. `iec`: IEC 61000-2-4 by class, orders without a row have no limit;
 * `ieee`: IEEE 519-2022 by bus voltage, one limit for every order up to 50.
 * @param rules rule set
 * @param nominalV bus voltage [V]
 * @param emcClass electromagnetic environment class (iec)
 * @returns limits with the edition's name
 * @source iec-61000-2-4, ieee-519-2022
 */
export function voltageLimits(rules: RuleSet, nominalV: number, emcClass: EmcClass): VoltageLimits {
  return EDITIONS[LIMIT_EDITIONS[rules][0]]({ nominalV, emcClass });
}

/**
 * Harmonic voltage limits of a choice: the edition's, tightened by own rows; "own" stands alone.
 * @param nominalV bus voltage [V]
 * @param emcClass electromagnetic environment class (IEC 61000-2-4)
 * @param choice edition and own rows
 * @returns limits with the edition's name
 * @source iec-61000-2-4, en-50160, ieee-519-2014, ieee-519-2022
 */
export function chosenVoltageLimits(
  nominalV: number,
  emcClass: EmcClass,
  { edition, own }: LimitChoice,
): VoltageLimits<number | null> {
  const limits = edition === 'own' ? null : EDITIONS[edition]({ nominalV, emcClass });
  if (own === null && limits !== null) return limits;
  const name = own === null ? edition : ownLimitsName(own);
  return {
    source: limits === null ? name : `${limits.source} and ${name}`,
    distortionPct: tighter(limits?.distortionPct, own?.distortionPct),
    orderPct: (orderH) => tighter(limits?.orderPct(orderH), ownPct(own?.voltage, orderH)),
  };
}

/**
 * The user's own limit on an order.
 * @param rows own rows
 * @param orderH order h
 * @returns limit [%], or null where there is no row
 */
export function ownPct(rows: readonly OrderPct[] | undefined, orderH: number): number | null {
  return rows?.find((row) => row.orderH === orderH)?.pct ?? null;
}
