import { Question } from '#libs/contract/question.js';
import { InputProblem, type LoadRecord } from '#libs/engine/index.js';
import type { MeterReading, ReadOptions } from '#libs/meter-files/meter-format.js';
import { writeRecordCsv } from '#libs/meter-files/write-record-csv.js';
import { readMeterText } from './meter-text.js';
import type { SlowRows } from './slow-message-reading.js';

const COLUMNS = ['beginS', 'activeKw', 'laggingKvar', 'leadingKvar', 'voltageV', 'connectedKvar', 'standby'] as const;

/**
 * Reads a file.
 * @returns the reading, or what it is refused or asked about with
 * @throws Error whatever else comes out: a fault of the reader
 */
export async function attempt(bytes: Uint8Array, options: ReadOptions): Promise<MeterReading | InputProblem> {
  try {
    return await readMeterText(bytes, options);
  } catch (problem) {
    if (!(problem instanceof InputProblem)) throw problem;
    if (problem.problems.length === 0) throw new Error('refused without a problem');
    return problem;
  }
}

/** @returns how two records differ, to the bit; null where they are the same */
export function recordDifference(a: LoadRecord, b: LoadRecord): string | null {
  if (a.intervalS !== b.intervalS) return `intervals of ${a.intervalS} and ${b.intervalS} s`;
  for (const name of COLUMNS) {
    const [one, other] = [a[name], b[name]];
    if (one?.length !== other?.length) return `${name} has ${one?.length} and ${other?.length} values`;
    const at = one === null ? -1 : one.findIndex((value, i) => !Object.is(value, other![i]));
    if (at >= 0) return `${name}[${at}] is ${one![at]} and ${other![at]}`;
  }
  return null;
}

/** @returns what is wrong with an accepted record by itself: a value that is none, or another one behind its export */
export async function exportDifference(record: LoadRecord): Promise<string | null> {
  for (const name of COLUMNS) {
    const at = record[name]?.findIndex((value) => !Number.isFinite(value)) ?? -1;
    if (at >= 0) return `${name}[${at}] is ${record[name]![at]}`;
  }
  const again = await attempt(new TextEncoder().encode(writeRecordCsv(record)), { siteTimeZone: 'UTC' });
  if (again instanceof InputProblem) return `its export is refused: ${JSON.stringify(again.problems)}`;
  return recordDifference(record, again.record);
}

/** @returns how a record differs from an independent reading of its file; null where it does not */
export function slowDifference(record: LoadRecord, { intervalS, rows }: SlowRows): string | null {
  if (record.intervalS !== intervalS) return `intervals of ${record.intervalS} s, slowly ${intervalS} s`;
  if (record.beginS.length !== rows.size) return `${record.beginS.length} intervals, slowly ${rows.size}`;
  for (const [i, beginS] of record.beginS.entries()) {
    const mine = [record.activeKw[i]!, record.laggingKvar[i]!, record.leadingKvar[i]!];
    const theirs = rows.get(beginS);
    // adding 0 makes −0 and 0 one value
    if (theirs === undefined || mine.some((value, k) => !Object.is(value + 0, theirs[k]! + 0))) {
      return `at ${beginS}: ${mine.join(', ')}, slowly ${theirs?.join(', ')}`;
    }
  }
  return null;
}

/** Reads a file on with the first reading that each question offers, up to three of them. */
export async function answered(bytes: Uint8Array, options: ReadOptions, first: InputProblem) {
  let outcome: MeterReading | InputProblem = first;
  let map = options.map ?? {};
  for (let n = 0; n < 3 && outcome instanceof Question; n++) {
    const [reading] = outcome.questions[0]!.readings;
    if (reading === undefined) throw new Error('a question without a reading');
    map = { ...map, ...reading.map };
    outcome = await attempt(bytes, { ...options, map });
  }
  return outcome;
}
