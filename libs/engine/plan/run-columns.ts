import type { MeterAfter } from '../operation/meter-after.js';

/** Columns that runs write into in turn, so that a candidate makes none of its own; length n each. */
export interface RunColumns {
  connectedKvar: Float64Array;
  meter: MeterAfter;
}

/**
 * Columns for runs that take turns.
 * @param n intervals of the record
 * @param activeKw the record's own column where the meter stands at the bus: it stays as it is
 * @returns columns
 */
export function runColumns(n: number, activeKw?: Float64Array): RunColumns {
  const column = (): Float64Array => new Float64Array(n);
  return {
    connectedKvar: column(),
    meter: { activeKw: activeKw ?? column(), laggingKvar: column(), leadingKvar: column() },
  };
}
