import type { LoadRecord } from '../record/load-record.js';
import { type BusLoad, cannotCarry } from '../requirement/bus-load.js';
import { primaryFromBus } from '../supply/transformer-passage.js';

/** What the meter would have read with the bank; length n. */
export interface MeterAfter {
  /** [kW] */
  activeKw: Float64Array;
  /** [kvar] */
  laggingKvar: Float64Array;
  /** [kvar] */
  leadingKvar: Float64Array;
}

/**
 * The meter's columns after the bank. Δ = the fall of net Q at the meter:
 * lagging' = max(lagging − Δ, 0), leading' = leading + max(Δ − lagging, 0); where net Q rises (an old bank taken
 * away) the same with the sides changed, so that leading kvar are used up before lagging ones appear.
 * @param record as metered, length n
 * @param load the load's own power at the bus, length n
 * @param connectedKvar kvar at the bus, length n
 * @returns columns at the meter, length n
 * @throws InputProblem where the transformers can't carry an interval
 * @source method-requirement
 */
export function meterAfter(record: LoadRecord, load: BusLoad, connectedKvar: Float64Array): MeterAfter {
  const n = connectedKvar.length;
  const after: MeterAfter = {
    activeKw: new Float64Array(n),
    laggingKvar: new Float64Array(n),
    leadingKvar: new Float64Array(n),
  };
  meterAfterInto(after, { record, load, connectedKvar }, 0, n);
  return after;
}

/**
 * The meter's columns after the bank, for some of the intervals.
 * @param after receives them, each at its own place, length n
 * @param given record, load and connected kvar, each of length n
 * @param from first interval
 * @param end the interval to stop before
 * @throws InputProblem where the transformers can't carry an interval
 * @source method-requirement
 */
export function meterAfterInto(
  after: MeterAfter,
  given: { record: LoadRecord; load: BusLoad; connectedKvar: Float64Array },
  from: number,
  end: number,
): void {
  const { record, load, connectedKvar } = given;
  const { activeKw, laggingKvar, leadingKvar } = after;
  const passage = load.metering.at === 'primary' ? load.metering.passage : null;
  const { laggingKvar: laggingBefore, leadingKvar: leadingBefore } = record;
  for (let i = from; i < end; i++) {
    const lagging = laggingBefore[i]!;
    const leading = leadingBefore[i]!;
    let kw = record.activeKw[i]!;
    let netKvar = load.reactiveKvar[i]! - connectedKvar[i]!;
    if (passage !== null) {
      const primary = primaryFromBus(passage, load.activeKw[i]!, netKvar);
      if (primary === null) throw cannotCarry(record.beginS[i]!, load.activeKw[i]!, netKvar);
      kw = primary.activeKw;
      netKvar = primary.reactiveKvar;
    }
    const fall = lagging - leading - netKvar;
    activeKw[i] = kw;
    if (fall >= 0) {
      laggingKvar[i] = Math.max(lagging - fall, 0);
      leadingKvar[i] = leading + Math.max(fall - lagging, 0);
    } else {
      leadingKvar[i] = Math.max(leading + fall, 0);
      laggingKvar[i] = lagging + Math.max(-fall - leading, 0);
    }
  }
}
