import type { StageHistory } from '#libs/engine/index.js';
import { formatQuantity } from './format-number.js';
import { say, words } from './language.js';
import { formatDate } from './local-stamp.js';
import { plainName } from './plain-name.js';

/** Heads of the table of measured stages. */
export const HISTORY_HEADS = words([
  'stage',
  'measured',
  'kvar at rated voltage',
  'loss',
  'unbalance',
  'loss a year',
] as const);

/**
 * The measured stages of an installed bank, one row a measurement.
 * @param histories the measured stages
 * @returns cells, one a head; the rate stands with a stage's last measurement
 */
export function historyRows(histories: readonly StageHistory[]): string[][] {
  return histories.flatMap(({ group, stage, points, lossPctPerYear, rateFrom }) =>
    points.map((point, k) => [
      say`group ${group + 1}, stage ${stage}`,
      `${formatDate(point.date)}${point.instrument === null ? '' : `, ${plainName(point.instrument)}`}`,
      formatQuantity(point.ratedKvar, 'kvar'),
      formatQuantity(point.lossPct, '%'),
      formatQuantity(point.unbalancePct, '%'),
      k < points.length - 1 || lossPctPerYear === null
        ? '–'
        : `${formatQuantity(lossPctPerYear, '%')}${rateFrom === 'nameplate' ? say` since commissioning` : ''}`,
    ]),
  );
}
