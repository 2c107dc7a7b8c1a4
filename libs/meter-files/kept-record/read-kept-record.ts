import { csvRows, unguarded } from '#libs/contract/csv-text.js';
import { type LoadRecord, UTC_TABLE } from '#libs/engine/index.js';
import type { MeterBytes } from '../meter-bytes.js';
import { MAX_INTERVALS, type MeterReading } from '../meter-format.js';
import { qualityOf } from '../record/quality.js';
import {
  isNote,
  KEPT_COLUMNS,
  KEPT_HEAD,
  type KeptColumn,
  type KeptColumns,
  type KeptHead,
  keptNote,
  keptRecord,
  refused,
} from './kept-record.js';

/** What a reading of a kept record says its format was. */
export const KEPT_FORMAT = 'kept record';
/** As JSON a record is read whole [bytes]. */
const MOST_JSON_BYTES = 268_435_456;

const TEXT_STARTS = [KEPT_HEAD.join(','), KEPT_HEAD.map((cell) => `"${cell}"`).join(',')];
const JSON_START = `{"${KEPT_HEAD[0]}":"${KEPT_HEAD[1]}"`;

/**
 * Whether a file is a record as this program keeps it, in text or JSON.
 * @param head its first bytes
 */
export function isKeptRecord(head: Uint8Array): boolean {
  const start = Buffer.from(head.subarray(0, 64)).toString('latin1');
  return [...TEXT_STARTS, JSON_START].some((known) => start.startsWith(known));
}

/**
 * Takes a kept record back: the same record, its hash included.
 * @param source the file
 * @returns the record with the quality that its notes state
 * @throws InputProblem where it was damaged, naming row and column
 */
export async function readKeptRecord(source: MeterBytes): Promise<MeterReading> {
  const isJson = source.head[0] === 0x7b;
  const record = isJson ? await fromJson(source) : await fromText(source);
  const counts = { format: KEPT_FORMAT, rowsRead: record.beginS.length, rejectedRows: 0 };
  const repair = { method: 'none' as const, upToS: null };
  const quality = qualityOf(record, counts, UTC_TABLE, { measured: record, repair, suspectZeros: [] });
  return { record, quality };
}

async function fromText(source: MeterBytes): Promise<LoadRecord> {
  const rows = new KeptRows();
  for await (const line of linesOf(source)) rows.take(line);
  return rows.record();
}

/** Rows of a kept record, one after the other. */
class KeptRows {
  readonly #head: KeptHead = { intervalS: 0, repaired: 0, duplicates: 0, notes: [] };
  #names: KeptColumn[] = [];
  #columns: number[][] = [];
  #row = 0;

  take(line: string): void {
    this.#row++;
    if (line === '') return;
    const cells = csvRows(line)?.[0];
    if (cells === undefined) throw refused('a row of cells', 'a quote that is not closed', { row: this.#row });
    if (this.#names.length > 0) this.#takeInterval(cells);
    else if (cells[0] === KEPT_COLUMNS[0]) this.#takeNames(cells);
    else this.#takeHead(cells);
  }

  record(): LoadRecord {
    const columns = Object.fromEntries(this.#names.map((name, at) => [name, this.#columns[at]!]));
    return keptRecord(this.#head, columns);
  }

  #takeHead([name = '', value = '']: string[]): void {
    if (name === 'note') this.#head.notes.push(this.#note(unguarded(value)));
    else if (name === 'intervalS' || name === 'repaired' || name === 'duplicates')
      this.#head[name] = this.#number(value, 2);
    else if (name !== KEPT_HEAD[0])
      throw refused('a name of the record’s head', JSON.stringify(name.slice(0, 40)), { row: this.#row, column: 1 });
  }

  #note(text: string): KeptHead['notes'][number] {
    const note = keptNote(text);
    if (note === null) throw refused('a note', JSON.stringify(text.slice(0, 40)), { row: this.#row, column: 2 });
    return note;
  }

  #takeInterval(cells: string[]): void {
    const first = this.#columns[0]!;
    if (first.length === MAX_INTERVALS) throw refused(`at most ${MAX_INTERVALS} intervals`, 'more', { row: this.#row });
    for (const [at, column] of this.#columns.entries()) column.push(this.#number(cells[at] ?? '', at + 1));
  }

  #number(text: string, column: number): number {
    const value = Number(text);
    if (text.trim() !== '' && Number.isFinite(value)) return value;
    throw refused('a number', JSON.stringify(text.slice(0, 40)), { row: this.#row, column });
  }

  /** The row that names the columns ends the head. */
  #takeNames(cells: readonly string[]): void {
    const known = cells.filter((cell) => cell !== '') as KeptColumn[];
    const isPart = known.every((cell) => KEPT_COLUMNS.includes(cell)) && new Set(known).size === known.length;
    if (!isPart) throw refused(`columns out of ${KEPT_COLUMNS.join(', ')}`, 'others', { row: this.#row });
    this.#names = known;
    this.#columns = known.map(() => []);
  }
}

async function* linesOf(source: MeterBytes): AsyncGenerator<string> {
  const decoder = new TextDecoder();
  let rest = '';
  for (let chunk = await source.next(); chunk !== null; chunk = await source.next()) {
    const lines = (rest + decoder.decode(chunk, { stream: true })).split(/\r?\n/);
    rest = lines.pop()!;
    yield* lines;
  }
  if (rest !== '') yield rest;
}

async function fromJson(source: MeterBytes): Promise<LoadRecord> {
  const parts: Uint8Array[] = [];
  let size = 0;
  for (let chunk = await source.next(); chunk !== null; chunk = await source.next()) {
    size += chunk.length;
    if (size > MOST_JSON_BYTES) throw refused(`at most ${MOST_JSON_BYTES} bytes of JSON`, 'more');
    parts.push(new Uint8Array(chunk));
  }
  let value: unknown;
  try {
    value = JSON.parse(Buffer.concat(parts).toString('utf8'));
  } catch {
    throw refused('a whole JSON document', 'a damaged one');
  }
  return fromDocument(value as Record<string, unknown>);
}

function fromDocument({ intervalS, repaired, duplicates, notes, columns }: Record<string, unknown>): LoadRecord {
  const whole = [intervalS, repaired, duplicates].every((one) => typeof one === 'number' && Number.isFinite(one));
  if (!whole || !Array.isArray(notes) || !notes.every(isNote)) throw refused('the head of a record', 'another');
  const isColumn = (column: unknown) => Array.isArray(column) && column.every((one) => Number.isFinite(one));
  const named = typeof columns === 'object' && columns !== null ? Object.entries(columns) : [];
  for (const [name, column] of named) {
    const isKnown = KEPT_COLUMNS.includes(name as KeptColumn);
    if (!isKnown || !isColumn(column)) throw refused('a column of numbers', JSON.stringify(name.slice(0, 40)));
    if ((column as number[]).length > MAX_INTERVALS) throw refused(`at most ${MAX_INTERVALS} intervals`, 'more');
  }
  const head = { intervalS, repaired, duplicates, notes } as unknown as KeptHead;
  return keptRecord(head, Object.fromEntries(named) as KeptColumns);
}
