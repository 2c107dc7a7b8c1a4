import { networkLimits } from '../duty/network-duties.js';
import { summarizeNetwork } from '../network/network-check.js';
import { type Remark, remark } from '../problem.js';
import type { Study } from './study.js';

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

/**
 * The edition and the point of a study's limits. In a network every bus is judged; the point of coupling is the one the
 * network part names, else where the site is metered.
 * @param study site and record
 * @returns editions and points
 * @source method-limits
 */
export function limitsPoint(study: Study): LimitsPoint {
  const { site, model } = study;
  const ends = summarizeNetwork(model, []);
  const limits = networkLimits({ ...site, shortCircuitMinMva: ends.shortCircuitMinMva, loadA: model.loadA });
  const { topology } = site;
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

/**
 * Where a transformer lies between the bus and the network, that the bus is the point of coupling is an assumption.
 * @param study site and record
 * @param limits the point judged
 * @returns one line or none
 */
export function pointAssumption(study: Study, limits: LimitsPoint): Remark[] {
  const { site } = study;
  if (site.topology !== null || site.supply.transformers.length === 0 || !limits.atCouplingPoint) return [];
  return [remark('default.limits.point', { point: limits.couplingPoint }, { path: 'meteredAt' })];
}
