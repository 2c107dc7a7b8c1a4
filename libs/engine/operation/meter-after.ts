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
 * @param after receives them, each at its own place, length n; its columns may be the record's own, where those may change
 * @param given record, load and connected kvar, each of length n
 * @param from first interval
 * @param end the interval to stop before
 * @throws InputProblem where the transformers can't carry an interval
 * @source method-requirement
 */
export function meterAfterInto(after: MeterAfter, given: MeteredBefore, from: number, end: number): void {
  const { record, load, connectedKvar } = given;
  if (load.metering.at === 'bus') {
    meterAtBusInto(after, given, from, end);
    return;
  }
  const { activeKw, laggingKvar, leadingKvar } = after;
  const { passage } = load.metering;
  const { laggingKvar: laggingBefore, leadingKvar: leadingBefore } = record;
  for (let i = from; i < end; i++) {
    const lagging = laggingBefore[i]!;
    const leading = leadingBefore[i]!;
    const netKvar = load.reactiveKvar[i]! - connectedKvar[i]!;
    const primary = primaryFromBus(passage, load.activeKw[i]!, netKvar);
    if (primary === null) throw cannotCarry(record.beginS[i]!, load.activeKw[i]!, netKvar);
    const fall = lagging - leading - primary.reactiveKvar;
    activeKw[i] = primary.activeKw;
    if (fall >= 0) {
      laggingKvar[i] = Math.max(lagging - fall, 0);
      leadingKvar[i] = leading + Math.max(fall - lagging, 0);
    } else {
      leadingKvar[i] = Math.max(leading + fall, 0);
      laggingKvar[i] = lagging + Math.max(-fall - leading, 0);
    }
  }
}

interface MeteredBefore {
  record: LoadRecord;
  load: BusLoad;
  connectedKvar: Float64Array;
}

// At the bus the active power stays: where it is the record's own column, nothing is written. A search passes a record some
// hundred times.
function meterAtBusInto(
  after: MeterAfter,
  { record, load, connectedKvar }: MeteredBefore,
  from: number,
  end: number,
): void {
  const { laggingKvar: laggingBefore, leadingKvar: leadingBefore, activeKw } = record;
  const { reactiveKvar } = load;
  const { laggingKvar, leadingKvar } = after;
  if (after.activeKw !== activeKw) for (let i = from; i < end; i++) after.activeKw[i] = activeKw[i]!;
  for (let i = from; i < end; i++) {
    const lagging = laggingBefore[i]!;
    const leading = leadingBefore[i]!;
    const fall = lagging - leading - (reactiveKvar[i]! - connectedKvar[i]!);
    const left = fall >= 0 ? lagging - fall : leading + fall;
    const kept = Math.max(left, 0);
    const over = kept - left;
    laggingKvar[i] = fall >= 0 ? kept : lagging + over;
    leadingKvar[i] = fall >= 0 ? leading + over : kept;
  }
}
