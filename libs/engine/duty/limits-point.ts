import { summarizeNetwork } from '../network/network-check.js';
import type { NetworkModel } from '../network/network-model.js';
import type { LimitChoice } from './limit-editions.js';
import { networkLimits } from './network-duties.js';
import type { RuleSet } from './rules.js';

/** The limits a bank was judged by, and where. */
export interface LimitsPoint {
  /** edition of the voltage limits, as printed */
  voltage: string;
  /** edition of the current limits; null where none apply */
  current: string | null;
  /** buses whose voltage was held against them */
  points: string[];
  /** where the site meets the network: a bus, or "primary" */
  couplingPoint: string;
  /** false where the couplingPoint is none of the points judged */
  atCouplingPoint: boolean;
}

/** What decides which limits apply, and where. */
export interface LimitedSite {
  rules: RuleSet;
  nominalV: number;
  emcClass: 1 | 2 | 3;
  limits: LimitChoice;
  meteredAt: 'bus' | 'primary';
}

/**
 * The edition and the point of a site's limits. In a network every bus is judged; the point of coupling is the one the
 * network part names, else where the site is metered.
 * @param model the network without the bank
 * @param site rules, edition, voltage and where it is metered
 * @returns editions and points
 * @source method-limits
 */
export function limitsPoint(model: NetworkModel, site: LimitedSite): LimitsPoint {
  const ends = summarizeNetwork(model, []);
  const limits = networkLimits({ ...site, shortCircuitMinMva: ends.shortCircuitMinMva, loadA: model.loadA });
  const topology = model.nodal?.topology;
  const metered = site.meteredAt === 'primary' ? 'primary' : model.buses[model.bankBus]!;
  const point = topology?.couplingPoint;
  const couplingPoint = point === undefined ? metered : point === 'primary' ? point : topology!.buses[point]!;
  return {
    voltage: limits.voltage.source,
    current: limits.current?.source ?? null,
    points: model.buses,
    couplingPoint,
    atCouplingPoint: model.buses.includes(couplingPoint),
  };
}
