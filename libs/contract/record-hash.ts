import type { LoadRecord } from '#libs/engine/index.js';
import { canonicalJson } from './canonical-json.js';

/**
 * The bytes a record is known by, in order: a line of JSON with everything that is not a column, then each column as
 * 64-bit floats, least significant byte first. The rims hash them with SHA-256.
 * Repairs, dropped repeats and notes belong to it, because a proposal prints them.
 * @param record the record
 * @returns chunks, to be hashed one after the other
 */
export function* recordBytes(record: LoadRecord): Generator<Uint8Array> {
  const columns = {
    beginS: record.beginS,
    activeKw: record.activeKw,
    laggingKvar: record.laggingKvar,
    leadingKvar: record.leadingKvar,
    voltageV: record.voltageV,
    connectedKvar: record.connectedKvar,
    standby: record.standby,
  };
  const present = Object.entries(columns).filter(([, values]) => values !== null);
  const head = {
    form: 'record 1',
    intervalS: record.intervalS,
    intervals: record.beginS.length,
    columns: present.map(([name]) => name),
    repaired: record.repaired,
    duplicates: record.duplicates,
    notes: record.notes,
  };
  yield new TextEncoder().encode(`${canonicalJson(head)}\n`);
  for (const [, values] of present) if (values !== null) yield littleEndian(values);
}

function littleEndian(values: Float64Array | Uint8Array): Uint8Array {
  const bytes = new Uint8Array(values.length * 8);
  const view = new DataView(bytes.buffer);
  // adding 0 makes −0 and 0 one value
  for (let i = 0; i < values.length; i++) view.setFloat64(i * 8, values[i]! + 0, true);
  return bytes;
}
