import type { MeterColumns } from './meter-columns.js';

/**
 * Between what and what a meter's columns lie, interval by interval. Lagging is least where leading is most, so the net
 * lies between `low.laggingKvar − high.leadingKvar` and `high.laggingKvar − low.leadingKvar`.
 */
export interface MeterBox {
  low: MeterColumns;
  high: MeterColumns;
}

/**
 * The box of a meter that is known.
 * @param columns what it reads
 * @returns both ends the same
 */
export function exactBox(columns: MeterColumns): MeterBox {
  return { low: columns, high: columns };
}
