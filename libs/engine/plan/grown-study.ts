import { meterAfterInto } from '../operation/meter-after.js';
import type { Study } from './study.js';

/**
 * A study with all of its load taken by one factor, active and reactive alike, interval by interval. An old bank that
 * was in while the record was taken gives what it gave; the meter's columns follow from both.
 * @param study site and record
 * @param factor on the load at the bus, ≥ 0
 * @returns the study; what it says of the need, and its network, are those of the record
 * @throws InputProblem where the transformers can't carry an interval
 * @source method-robustness
 */
export function grownStudy(study: Study, factor: number): Study {
  const { activeKw, laggingKvar, leadingKvar } = study.record;
  const grownKw = scaled(activeKw, factor);
  const load = {
    ...study.load,
    activeKw: study.load.activeKw === activeKw ? grownKw : scaled(study.load.activeKw, factor),
    reactiveKvar: scaled(study.load.reactiveKvar, factor),
  };
  const record = {
    ...study.record,
    activeKw: grownKw,
    laggingKvar: scaled(laggingKvar, factor),
    leadingKvar: scaled(leadingKvar, factor),
  };
  meterAfterInto(record, { record, load, connectedKvar: oldBankKvar(study) }, 0, grownKw.length);
  return { ...study, load, record };
}

function scaled(column: Float64Array, factor: number): Float64Array {
  const grown = new Float64Array(column.length);
  for (let i = 0; i < column.length; i++) grown[i] = column[i]! * factor;
  return grown;
}

function oldBankKvar({ site, record, turned }: Study): Float64Array {
  if (turned !== null) return turned.turned.kvar;
  const { recordedBank } = site;
  if (recordedBank.state === 'logged' && record.connectedKvar !== null) return record.connectedKvar;
  return new Float64Array(record.beginS.length).fill(recordedBank.state === 'fixed' ? recordedBank.kvar : 0);
}
