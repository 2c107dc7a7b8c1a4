import type { TableCell } from '#libs/contract/csv-text.js';
import { createLoadRecord, InputProblem, type LoadRecord, type Remark } from '#libs/engine/index.js';

/** What the first cell of a kept record says, and its form. */
export const KEPT_HEAD = ['form', 'record 1'] as const;

/** Columns of a record in the order they are hashed; the last three only where the record has them. */
export const KEPT_COLUMNS = [
  'beginS',
  'activeKw',
  'laggingKvar',
  'leadingKvar',
  'voltageV',
  'connectedKvar',
  'standby',
] as const;

export type KeptColumn = (typeof KEPT_COLUMNS)[number];
const NEEDED = 4;

/** A record's numbers by column, of whatever kind the reader has them. */
export type KeptColumns = Partial<Record<KeptColumn, ArrayLike<number>>>;

/** What stands before the intervals. */
export interface KeptHead {
  intervalS: number;
  repaired: number;
  duplicates: number;
  notes: Remark[];
}

/**
 * A record as rows: what is known of it besides its intervals, the names of its columns, an interval a row.
 * @param record the record
 */
export function* keptRows(record: LoadRecord): Generator<TableCell[]> {
  const { intervalS, repaired, duplicates, notes } = record;
  yield [...KEPT_HEAD];
  yield ['intervalS', intervalS];
  yield ['repaired', repaired];
  yield ['duplicates', duplicates];
  for (const note of notes) yield ['note', JSON.stringify(note)];
  const names = presentColumns(record);
  yield [...names];
  const columns = names.map((name) => record[name]!);
  for (let i = 0; i < record.beginS.length; i++) yield columns.map((column) => column[i]!);
}

/**
 * Names of the columns a record has.
 * @param record the record
 */
export function presentColumns(record: LoadRecord): KeptColumn[] {
  return KEPT_COLUMNS.filter((name) => record[name] !== null);
}

/**
 * The record from its parts, bit for bit as it was kept.
 * @param head what stands before the intervals
 * @param columns numbers by column
 * @returns the record
 * @throws InputProblem where a column is missing or a number can't be
 */
export function keptRecord(head: KeptHead, columns: KeptColumns): LoadRecord {
  const missing = KEPT_COLUMNS.slice(0, NEEDED).filter((name) => columns[name] === undefined);
  if (missing.length > 0) throw refused(`the columns ${missing.join(', ')}`, 'none');
  const numbers = (name: KeptColumn) => (columns[name] === undefined ? null : Float64Array.from(columns[name]));
  return createLoadRecord({
    ...head,
    beginS: numbers('beginS')!,
    activeKw: numbers('activeKw')!,
    laggingKvar: numbers('laggingKvar')!,
    leadingKvar: numbers('leadingKvar')!,
    voltageV: numbers('voltageV'),
    connectedKvar: numbers('connectedKvar'),
    standby: columns.standby === undefined ? null : Uint8Array.from(columns.standby),
  });
}

/**
 * A kept record that can't be taken back.
 * @param expected what should stand there
 * @param found what does
 * @param place row and column, counted from 1
 */
export function refused(expected: string, found: string, place: { row?: number; column?: number } = {}): InputProblem {
  return new InputProblem([{ code: 'unreadable', ...place, expected, found }]);
}

/**
 * A note as it was kept.
 * @param text JSON
 * @returns the note, or null where it is none
 */
export function keptNote(text: string): Remark | null {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    return null;
  }
  return isNote(value) ? value : null;
}

/**
 * Whether a value is a note.
 * @param value parsed JSON
 */
export function isNote(value: unknown): value is Remark {
  if (typeof value !== 'object' || value === null) return false;
  const { code, path, values, unit, source, effect, text } = value as Record<string, unknown>;
  const isTextOrNull = (part: unknown) => part === null || typeof part === 'string';
  return (
    typeof code === 'string' &&
    /^[\w.-]{1,80}$/.test(code) &&
    [path, unit, source].every(isTextOrNull) &&
    effect === null &&
    typeof text === 'string' &&
    typeof values === 'object' &&
    values !== null &&
    Object.keys(value).length === 7 &&
    Object.values(values).every((one) => typeof one === 'string' || Number.isFinite(one))
  );
}
