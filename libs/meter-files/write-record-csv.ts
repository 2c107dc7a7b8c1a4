import type { LoadRecord } from '#libs/engine/index.js';
import { utcStamp } from './record/reading-shown.js';

const ROWS_A_CHUNK = 8192;
const POWER_NAMES = [
  'interval begin [UTC]',
  'active power [kW]',
  'lagging reactive power [kvar]',
  'leading reactive power [kvar]',
];
const END_NAME = 'interval end [UTC]';

/**
 * Whether a header is that of a record written here.
 * @param names of the columns
 */
export function isRecordForm(names: readonly string[]): boolean {
  return names.at(-1) === END_NAME && POWER_NAMES.every((name, k) => names[k] === name);
}

/**
 * A record as plain CSV: stamps in UTC, means of the interval, lagging and leading apart, valid intervals only.
 * Reading it back gives the same columns to the bit; the last column, the interval's end, states the interval's length
 * even where the record has a single interval.
 * @param record the record
 * @returns the whole text
 */
export function writeRecordCsv(record: LoadRecord): string {
  return [...recordCsvChunks(record)].join('');
}

/**
 * The same in pieces, for writing to a stream.
 * @param record the record
 */
export function* recordCsvChunks(record: LoadRecord): Generator<string> {
  const optional: [string, Float64Array | Uint8Array][] = [];
  if (record.voltageV !== null) optional.push(['voltage [V]', record.voltageV]);
  if (record.connectedKvar !== null) optional.push(['connected bank [kvar]', record.connectedKvar]);
  if (record.standby !== null) optional.push(['standby', record.standby]);
  const names = [...POWER_NAMES, ...optional.map(([name]) => name), END_NAME];
  yield `${names.join(',')}\n`;
  const { beginS, intervalS, activeKw, laggingKvar, leadingKvar } = record;
  for (let from = 0; from < beginS.length; from += ROWS_A_CHUNK) {
    const rows: string[] = [];
    for (let i = from; i < Math.min(from + ROWS_A_CHUNK, beginS.length); i++) {
      const more = optional.map(([, values]) => `${values[i]},`).join('');
      const ends = utcStamp(beginS[i]! + intervalS);
      rows.push(`${utcStamp(beginS[i]!)},${activeKw[i]},${laggingKvar[i]},${leadingKvar[i]},${more}${ends}\n`);
    }
    yield rows.join('');
  }
}
