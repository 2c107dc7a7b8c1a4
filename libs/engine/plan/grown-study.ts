import { meterAfterInto } from '../operation/meter-after.js';
import type { Study } from './study.js';

/** What grown studies are written into in turn, length n each. */
export interface GrownColumns {
  /** at the meter [kW] */
  activeKw: Float64Array;
  /** at the meter [kvar] */
  laggingKvar: Float64Array;
  /** at the meter [kvar] */
  leadingKvar: Float64Array;
  /** the load's own; where the meter stands at the bus, the meter's column [kW] */
  busKw: Float64Array;
  /** the load's own [kvar] */
  busKvar: Float64Array;
}

/**
 * Columns for grown studies that take turns.
 * @param study site and record
 * @returns columns of length n
 */
export function grownColumns({ record, load }: Study): GrownColumns {
  const column = (): Float64Array => new Float64Array(record.beginS.length);
  const activeKw = column();
  const busKw = load.activeKw === record.activeKw ? activeKw : column();
  return { activeKw, laggingKvar: column(), leadingKvar: column(), busKw, busKvar: column() };
}

/**
 * A study with all of its load taken by one factor, active and reactive alike, interval by interval. An old bank that
 * was in while the record was taken gives what it gave; the meter's columns follow from both.
 * @param study site and record
 * @param factor on the load at the bus, ≥ 0
 * @param columns written over; new ones where absent
 * @returns the study; what it says of the need, and its network, are those of the record
 * @throws InputProblem where the transformers can't carry an interval
 * @source method-robustness
 */
export function grownStudy(study: Study, factor: number, columns: GrownColumns = grownColumns(study)): Study {
  const { activeKw, laggingKvar, leadingKvar } = study.record;
  const grownKw = scaledInto(columns.activeKw, activeKw, factor);
  const load = {
    ...study.load,
    activeKw: study.load.activeKw === activeKw ? grownKw : scaledInto(columns.busKw, study.load.activeKw, factor),
    reactiveKvar: scaledInto(columns.busKvar, study.load.reactiveKvar, factor),
  };
  const record = {
    ...study.record,
    activeKw: grownKw,
    laggingKvar: scaledInto(columns.laggingKvar, laggingKvar, factor),
    leadingKvar: scaledInto(columns.leadingKvar, leadingKvar, factor),
  };
  meterAfterInto(record, { record, load, connectedKvar: oldBankKvar(study) }, 0, grownKw.length);
  return { ...study, load, record };
}

function scaledInto(grown: Float64Array, column: Float64Array, factor: number): Float64Array {
  for (let i = 0; i < column.length; i++) grown[i] = column[i]! * factor;
  return grown;
}

function oldBankKvar({ site, record, turned }: Study): Float64Array {
  if (turned !== null) return turned.turned.kvar;
  const { recordedBank } = site;
  if (recordedBank.state === 'logged' && record.connectedKvar !== null) return record.connectedKvar;
  return new Float64Array(record.beginS.length).fill(recordedBank.state === 'fixed' ? recordedBank.kvar : 0);
}
