import type { OrderPct } from '../network/loads.js';
import type { RuleSet } from './rules.js';

/** Editions a rule set can be judged by, the first where none is chosen; "own" is the user's own table alone. */
export const LIMIT_EDITIONS = {
  iec: ['IEC 61000-2-4:2002', 'EN 50160:2010', 'own'],
  ieee: ['IEEE 519-2022', 'IEEE 519-2014', 'own'],
} as const satisfies Record<RuleSet, readonly string[]>;

export type LimitEdition = (typeof LIMIT_EDITIONS)[RuleSet][number];

/** Limits of the user's own, from a connection agreement say. Beside an edition the tighter of the two holds. */
export interface OwnLimits {
  /** what they are called in print */
  name?: string;
  /** harmonic voltages [% of nominal] */
  voltage?: OrderPct[];
  /** total distortion of voltage [% of nominal] */
  distortionPct?: number;
  /** harmonic currents [% of the load current I_L] */
  current?: OrderPct[];
  /** total demand distortion [% of I_L] */
  currentDistortionPct?: number;
}

/** The limits part of a site file. */
export interface LimitsInput {
  emcClass?: 1 | 2 | 3;
  edition?: LimitEdition;
  own?: OwnLimits;
}

/** The limits that were chosen. */
export interface LimitChoice {
  edition: LimitEdition;
  own: OwnLimits | null;
}

/**
 * The choice of a site's limits: the rule set's first edition where none is named.
 * @param rules rule set
 * @param input limits of the site file
 * @returns edition and own rows
 */
export function limitChoice(rules: RuleSet, input: LimitsInput | undefined): LimitChoice {
  return { edition: input?.edition ?? LIMIT_EDITIONS[rules][0], own: input?.own ?? null };
}

/**
 * What own limits are called in print.
 * @param own the user's limits
 * @returns their name
 */
export function ownLimitsName(own: OwnLimits): string {
  return own.name ?? 'the site’s own limits';
}

/**
 * The tighter of two limits where either may be missing.
 * @param a first limit
 * @param b second limit
 * @returns the smaller; null where neither stands
 */
export function tighter(a: number | null | undefined, b: number | null | undefined): number | null {
  if (a === null || a === undefined) return b ?? null;
  if (b === null || b === undefined) return a;
  return Math.min(a, b);
}
