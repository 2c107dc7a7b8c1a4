import { type MeterAfter, meterAfter } from '../operation/meter-after.js';
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
  const times = (column: Float64Array): Float64Array => column.map((value) => value * factor);
  const { activeKw, laggingKvar, leadingKvar } = study.record;
  const load = {
    ...study.load,
    activeKw: times(study.load.activeKw),
    reactiveKvar: times(study.load.reactiveKvar),
  };
  const scaled = {
    ...study.record,
    activeKw: times(activeKw),
    laggingKvar: times(laggingKvar),
    leadingKvar: times(leadingKvar),
  };
  const meter: MeterAfter = meterAfter(scaled, load, oldBankKvar(study));
  return { ...study, load, record: { ...scaled, ...meter } };
}

function oldBankKvar({ site, record, turned }: Study): Float64Array {
  if (turned !== null) return turned.turned.kvar;
  const { recordedBank } = site;
  if (recordedBank.state === 'logged' && record.connectedKvar !== null) return record.connectedKvar;
  return new Float64Array(record.beginS.length).fill(recordedBank.state === 'fixed' ? recordedBank.kvar : 0);
}
