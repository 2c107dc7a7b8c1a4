import { targetKw } from '../requirement/need.js';
import { primaryFromBus } from '../supply/transformer-passage.js';
import { type Figure, figure } from './figure.js';
import { meteringOf } from './metering-of.js';
import type { SettledSite } from './settled-site.js';

/** One load at the bus with the kvar it needs for the target at the meter. */
export interface LoadWithNeed {
  /** [kW] */
  activeKw: number;
  /** the load's own, lagging > 0 [kvar] */
  reactiveKvar: number;
  /** [kvar] */
  needKvar: number;
}

/**
 * The need of one load: N = max(0, Q − P⁺·tan φ) at the bus. Behind transformers N = max(0, Q + Q_x − P₁⁺·tan φ), P₁ being
 * what the primary takes and Q_x what the transformers do while N is connected; only the N that meets the target agrees.
 * @param id name of the figure
 * @param site settled site
 * @param load the load and its need
 * @returns a figure
 * @throws InputProblem where the meter stands at the primary of transformers on boards of their own
 * @source method-requirement
 */
export function needFigure(id: string, site: SettledSite, { activeKw, reactiveKvar, needKvar }: LoadWithNeed): Figure {
  const metering = meteringOf(site);
  const needed = { value: needKvar, unit: 'kvar' };
  const left = reactiveKvar - needKvar;
  const primary = metering.at === 'bus' ? null : primaryFromBus(metering.passage, activeKw, left);
  if (primary === null) {
    return figure(id, needed, { formula: 'max(0, Q − P · √(1 / λ^2 − 1))', source: 'method, requirement' }, [
      ['Q', reactiveKvar, 'kvar'],
      ['P', targetKw(activeKw, site.onExport), 'kW'],
      ['λ', site.targetPowerFactor, ''],
    ]);
  }
  const how = {
    formula: 'max(0, Q + Q_x − P_1 · √(1 / λ^2 − 1))',
    source: 'method, requirement, meter at the primary',
  };
  return figure(id, needed, how, [
    ['Q', reactiveKvar, 'kvar'],
    ['Q_x', primary.reactiveKvar - left, 'kvar'],
    ['P_1', targetKw(primary.activeKw, site.onExport), 'kW'],
    ['λ', site.targetPowerFactor, ''],
  ]);
}
