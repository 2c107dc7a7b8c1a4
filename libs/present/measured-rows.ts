import type { MeasuredCheck } from '#libs/engine/index.js';
import { formatNumber, formatQuantity, formatRange } from './format-number.js';
import { say, words } from './language.js';

/** Heads over the cells of `measuredRows`. */
export const MEASURED_HEADS = words([
  'order',
  'quantity',
  'measured',
  'computed',
  'over all corners',
  'difference',
  'stands',
] as const);

/**
 * How a measurement stands against the model, in a few words.
 * @param measured of the result, with at least one row
 * @returns without a full stop
 */
export function measuredFinding({ rows, use }: MeasuredCheck): string {
  if (use === 'fit') return say`the loads’ currents are fitted to it`;
  const off = rows.filter(({ standing }) => standing !== 'within').length;
  return off === 0
    ? say`every reading lies within the model’s corners`
    : say`${off} readings lie outside the model’s corners`;
}

/**
 * What has to be known beside the rows.
 * @param measured of the result
 * @returns two sentences, or three
 */
export function measuredNote({ levelKvar, use }: MeasuredCheck): string {
  return (
    say`With ${formatQuantity(levelKvar, 'kvar')} connected. A reading is never added to the model’s sources; it stands
      outside where it passes the corners by more than a tenth.` +
    (use === 'fit' ? say` The loads’ currents were scaled to meet it, so that agreement is no check of the model.` : '')
  );
}

/**
 * Each reading beside what the model gives.
 * @param measured of the result
 * @returns cells under `MEASURED_HEADS`
 */
export function measuredRows({ rows }: MeasuredCheck): string[][] {
  return rows.map((row) => [
    formatNumber(row.orderH, 'given'),
    row.quantity,
    formatQuantity(row.measured, row.unit, 'given'),
    formatQuantity(row.computed, row.unit),
    formatRange({ low: row.low, high: row.high }, row.unit, 'computed'),
    row.differencePct === null ? '–' : formatQuantity(row.differencePct, '%'),
    row.standing,
  ]);
}
