import type { LoadRecord } from '#libs/engine/index.js';

/** The columns of `read --intervals`, one entry a valid interval. */
export interface RecordColumnsJson {
  /** UTC [s] */
  beginS: number[];
  activeKw: number[];
  laggingKvar: number[];
  leadingKvar: number[];
  voltageV?: number[];
  connectedKvar?: number[];
  standby?: number[];
}

/**
 * The columns of a record as plain lists; those a file need not have stand there only where it had them.
 * @param record the record
 */
export function recordColumns(record: LoadRecord): RecordColumnsJson {
  return {
    beginS: Array.from(record.beginS),
    activeKw: Array.from(record.activeKw),
    laggingKvar: Array.from(record.laggingKvar),
    leadingKvar: Array.from(record.leadingKvar),
    ...(record.voltageV === null ? {} : { voltageV: Array.from(record.voltageV) }),
    ...(record.connectedKvar === null ? {} : { connectedKvar: Array.from(record.connectedKvar) }),
    ...(record.standby === null ? {} : { standby: Array.from(record.standby) }),
  };
}
