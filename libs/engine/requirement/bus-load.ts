import { InputProblem } from '../problem.js';
import type { LoadRecord } from '../record/load-record.js';
import { busFromPrimary, primaryFromBus, type TransformerPassage } from '../supply/transformer-passage.js';

/** Where the meter stands: at the bus, or at the primary of these transformers. */
export type Metering = { at: 'bus' } | { at: 'primary'; passage: TransformerPassage };

/** What an old bank added while the record was taken. */
export type OldBank = { state: 'none' } | { state: 'fixed'; kvar: number } | { state: 'logged' };

/** The load's own power at the bus, old bank taken out; length n. */
export interface BusLoad {
  metering: Metering;
  /** where the meter stands at the bus, the record's own column [kW] */
  activeKw: Float64Array;
  /** net, lagging > 0 [kvar] */
  reactiveKvar: Float64Array;
}

/**
 * The load at the bus from the meter's record: transformers removed where the meter is at the primary,
 * then the kvar of an old bank added back (a record taken with a bank working is not the load).
 * @param record the meter's record, length n
 * @param metering where the meter stands
 * @param oldBank what was connected while the record was taken
 * @returns powers at the bus, length n
 * @throws InputProblem where the logged column is missing, or a transformer could not have carried an interval
 * @source method-requirement
 */
export function busLoad(record: LoadRecord, metering: Metering, oldBank: OldBank): BusLoad {
  const n = record.beginS.length;
  const activeKw = metering.at === 'bus' ? record.activeKw : new Float64Array(n);
  const reactiveKvar = new Float64Array(n);
  const logged = oldBank.state === 'logged' ? loggedColumn(record) : null;
  const addedKvar = oldBank.state === 'fixed' ? oldBank.kvar : 0;
  for (let i = 0; i < n; i++) {
    let q = record.laggingKvar[i]! - record.leadingKvar[i]!;
    if (metering.at === 'primary') {
      const p = record.activeKw[i]!;
      const bus = busFromPrimary(metering.passage, p, q);
      const back = primaryFromBus(metering.passage, bus.activeKw, bus.reactiveKvar);
      if (back === null || Math.abs(back.reactiveKvar - q) > 1e-6 * metering.passage.baseKva) {
        throw cannotCarry(record.beginS[i]!, p, q);
      }
      activeKw[i] = bus.activeKw;
      q = bus.reactiveKvar;
    }
    reactiveKvar[i] = q + addedKvar + (logged === null ? 0 : logged[i]!);
  }
  return { metering, activeKw, reactiveKvar };
}

function loggedColumn(record: LoadRecord): Float64Array {
  if (record.connectedKvar !== null) return record.connectedKvar;
  throw new InputProblem([
    {
      code: 'missing',
      path: 'recordedBank.state',
      expected: 'a column with the connected kvar in the meter file, as "logged" says',
      found: 'none',
      unit: 'kvar',
    },
  ]);
}

/**
 * The refusal for a load beyond what the transformers can carry at all.
 * @param beginS beginning of the interval [s]
 * @param activeKw [kW]
 * @param reactiveKvar [kvar]
 * @returns the problem, to be thrown
 */
export function cannotCarry(beginS: number, activeKw: number, reactiveKvar: number): InputProblem {
  return new InputProblem([
    {
      code: 'load-too-large',
      path: 'supply.transformers',
      expected: 'transformers that can carry the recorded load',
      found: `${activeKw} kW and ${reactiveKvar} kvar in the interval beginning at ${beginS} s, beyond the greatest power the impedance lets through`,
    },
  ]);
}
