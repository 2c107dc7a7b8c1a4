import { summarizeNetwork } from '../network/network-check.js';
import type { NetworkModel } from '../network/network-model.js';
import type { Topology } from '../network/topology.js';
import type { LimitChoice } from './limit-editions.js';
import { networkLimits } from './network-duties.js';
import type { RuleSet } from './rules.js';

/** The limits a bank was judged by, and where. */
export interface LimitsPoint {
  /** edition of the voltage limits, as printed */
  voltage: string;
  /** edition of the current limits; null where none apply */
  current: string | null;
  /** buses whose voltage was held against them, and "primary" where that is the point of coupling */
  points: string[];
  /** where the site meets the network, one of the points: a bus, or "primary" */
  couplingPoint: string;
}

/** What decides which limits apply, and where. */
export interface LimitedSite {
  rules: RuleSet;
  nominalV: number;
  emcClass: 1 | 2 | 3;
  limits: LimitChoice;
}

/**
 * Is the transformers' primary the point of coupling: the network part says so, else the meter stands there.
 * @param site where it is metered, and its topology
 * @returns true where the voltage at the primary is judged too
 * @source method-limits
 */
export function couplesAtPrimary(site: { meteredAt: 'bus' | 'primary'; topology: Topology | null }): boolean {
  return site.topology === null ? site.meteredAt === 'primary' : site.topology.couplingPoint === 'primary';
}

/**
 * The edition and the point of a site's limits. In a network every bus is judged; the point of coupling is the one the
 * network part names, else where the site is metered; a transformers' primary is then judged beside the buses.
 * @param model the network without the bank
 * @param site rules, edition and voltage
 * @returns editions and points
 * @source method-limits
 */
export function limitsPoint(model: NetworkModel, site: LimitedSite): LimitsPoint {
  const ends = summarizeNetwork(model, []);
  const limits = networkLimits({ ...site, shortCircuitMinMva: ends.shortCircuitMinMva, loadA: model.loadA });
  const topology = model.nodal?.topology;
  const bus = topology === undefined || topology.couplingPoint === 'primary' ? model.bankBus : topology.couplingPoint;
  const couplingPoint = model.primary ? 'primary' : model.buses[bus]!;
  const points = model.primary ? [...model.buses, 'primary'] : model.buses;
  return {
    voltage: limits.voltage.source,
    current: limits.current?.source ?? null,
    points,
    couplingPoint,
  };
}
