import { InputProblem, type Problem } from '#libs/engine/index.js';
import { intervalsAnHour } from './intervals-an-hour.js';

/** Quantities a record is made of. */
export const QUANTITIES = [
  'active',
  'exported',
  'reactive',
  'lagging',
  'leading',
  'voltage',
  'connected',
  'standby',
] as const;

export type Quantity = (typeof QUANTITIES)[number];

/** A column of a file that gives a quantity, and how its numbers become kW, kvar or V: value × times ÷ over. */
export interface QuantitySource {
  quantity: Quantity;
  /** one number a row of the file, NaN where it has none */
  values: Float64Array;
  /** energies of the interval, not means */
  energy: boolean;
  times: number;
  over: number;
  /** column of the file, counted from 1; 0 where the format has none */
  column: number;
  /** whether nobody needs the values afterwards, so that they may be turned into the record's own in place */
  spare?: boolean;
}

/** The columns of a record, one entry a valid interval, in time order. */
export interface RecordColumns {
  intervalS: number;
  beginS: Float64Array;
  activeKw: Float64Array;
  laggingKvar: Float64Array;
  leadingKvar: Float64Array;
  voltageV: Float64Array | null;
  connectedKvar: Float64Array | null;
  standby: Uint8Array | null;
}

/** Rows in time order with the beginning of their interval. */
export interface OrderedRows {
  intervalS: number;
  /** rows of the file in time order */
  kept: Int32Array;
  /** they are known to be all rows, as they stand in the file */
  isEveryRow?: boolean;
  /** moment of each row of the file, UTC [s], and how far the beginning of its interval lies before it [s] */
  utcS: Float64Array;
  shiftS: number;
  rowNumber: Int32Array;
  /** whether nobody needs the moments afterwards, so that they may be turned into the record's own in place */
  spare?: boolean;
  /** where columns come from, all 0 */
  fresh?: (length: number) => Float64Array;
}

/** Columns, and what was left out of them. */
export interface BuiltColumns {
  columns: RecordColumns;
  /** rows without a value in one of the columns */
  withoutValue: number;
  /** intervals with a negative value in a signed reactive column */
  negativeReactive: number;
}

const MOST_PROBLEMS = 20;

/**
 * Turns rows into the columns of a record: units become kW, kvar and V, energies means of the interval
 * (kW = kWh · 3600 ÷ intervalS), a signed reactive column is split, rows without a value are left out.
 * @param rows in time order
 * @param sources the columns of the file
 * @param leadingPositive whether a positive number in a signed reactive column is leading
 * @returns the columns
 * @throws InputProblem where a column that can't be negative is, naming row and column
 */
export function buildColumns(
  rows: OrderedRows,
  sources: readonly QuantitySource[],
  leadingPositive = false,
): BuiltColumns {
  const valid = validRows(rows.kept, sources);
  refuseNegative(rows, valid, sources);
  const n = valid.length;
  const sourceOf = (quantity: Quantity) => sources.find((source) => source.quantity === quantity);
  const of = (quantity: Quantity) => taken(rows, valid, sourceOf(quantity));
  const exported = of('exported');
  const fresh = freshOf(rows);
  const imported = of('active') ?? fresh(n);
  if (exported !== null) for (let i = 0; i < n; i++) exported[i] = imported[i]! - exported[i]!;
  const activeKw = exported ?? imported;
  const signed = of('reactive');
  const isSpare = signed !== null && isOwn(signed, sourceOf('reactive')!);
  const lagging = isSpare ? signed : ((signed === null ? of('lagging') : null) ?? fresh(n));
  const leading = (signed === null ? of('leading') : null) ?? fresh(n);
  const negativeReactive = signed === null ? 0 : split(signed, lagging, leading, leadingPositive);
  const standby = of('standby');
  const columns: RecordColumns = {
    intervalS: rows.intervalS,
    beginS: beginnings(rows, valid),
    activeKw,
    laggingKvar: lagging,
    leadingKvar: leading,
    voltageV: of('voltage'),
    connectedKvar: of('connected'),
    standby: standby === null ? null : Uint8Array.from(standby),
  };
  return { columns, withoutValue: rows.kept.length - n, negativeReactive };
}

function freshOf({ fresh }: OrderedRows): (length: number) => Float64Array {
  return fresh ?? ((length) => new Float64Array(length));
}

function validRows(kept: Int32Array, sources: readonly QuantitySource[]): Int32Array {
  if (!sources.some(({ values }) => hasGap(kept, values))) return kept;
  const valid = new Int32Array(kept.length);
  let count = 0;
  for (let i = 0; i < kept.length; i++) {
    const row = kept[i]!;
    let whole = true;
    for (let k = 0; k < sources.length; k++) if (Number.isNaN(sources[k]!.values[row]!)) whole = false;
    if (whole) valid[count++] = row;
  }
  return valid.subarray(0, count);
}

function hasGap(kept: Int32Array, values: Float64Array): boolean {
  if (!hasNaN(values)) return false;
  for (let i = 0; i < kept.length; i++) if (Number.isNaN(values[kept[i]!]!)) return true;
  return false;
}

/** A sum shows it, four of them in a third of the time that comparing takes; so does a sum of opposite infinities. */
function hasNaN(values: Float64Array): boolean {
  const n = values.length;
  let a = 0;
  let b = 0;
  let c = 0;
  let d = 0;
  let i = 0;
  for (; i + 3 < n; i += 4) {
    a += values[i]!;
    b += values[i + 1]!;
    c += values[i + 2]!;
    d += values[i + 3]!;
  }
  for (; i < n; i++) a += values[i]!;
  return Number.isNaN(a + b + c + d);
}

function beginnings(rows: OrderedRows, valid: Int32Array): Float64Array {
  const { utcS, shiftS, spare = false } = rows;
  const moments = picked(rows, { values: utcS, spare }, valid);
  if (shiftS === 0) return moments;
  const beginS = spare || moments !== utcS ? moments : freshOf(rows)(valid.length);
  for (let i = 0; i < valid.length; i++) beginS[i] = moments[i]! - shiftS;
  return beginS;
}

/** More room than this behind the values of a column is not worth keeping for the sake of a copy saved. */
const MOST_ROOM = 1.1;

/**
 * The values of the valid rows: the column itself where every row is, since nobody writes to it any more, and its own
 * beginning where nobody needs the rest.
 */
function picked(
  rows: OrderedRows,
  { values, spare = false }: Pick<QuantitySource, 'values' | 'spare'>,
  valid: Int32Array,
): Float64Array {
  const fits = values.buffer.byteLength <= MOST_ROOM * valid.length * values.BYTES_PER_ELEMENT;
  const { kept, isEveryRow = false } = rows;
  if (fits && ((isEveryRow && valid === kept) || isEveryOf(valid, values.length))) return values;
  const column = fits && spare && isAscending(valid) ? values.subarray(0, valid.length) : freshOf(rows)(valid.length);
  for (let i = 0; i < valid.length; i++) column[i] = values[valid[i]!]!;
  return column;
}

/** Then each value is taken from where it goes or from behind it. */
function isAscending(rows: Int32Array): boolean {
  for (let i = 1; i < rows.length; i++) if (rows[i]! < rows[i - 1]!) return false;
  return true;
}

function isEveryOf(valid: Int32Array, rows: number): boolean {
  if (valid.length !== rows) return false;
  for (let i = 0; i < rows; i++) if (valid[i] !== i) return false;
  return true;
}

function taken(rows: OrderedRows, valid: Int32Array, source: QuantitySource | undefined): Float64Array | null {
  if (source === undefined) return null;
  const { times, over, energy, quantity } = source;
  const { intervalS } = rows;
  const whole = picked(rows, source, valid);
  const own = isOwn(whole, source);
  // what is exported is written to
  if (times === 1 && over === 1 && !energy && (own || quantity !== 'exported')) return whole;
  const hour = energy ? intervalsAnHour(intervalS) : { times: 1, over: 1 };
  const column = own ? whole : freshOf(rows)(valid.length);
  for (let i = 0; i < column.length; i++) column[i] = (((whole[i]! * times) / over) * hour.times) / hour.over;
  return column;
}

/** Whether a column belongs to the record alone, so that it may be written to. */
function isOwn(column: Float64Array, { values, spare }: QuantitySource): boolean {
  return column !== values || spare === true;
}

/** lagging = max(Q, 0), which may be the signed column itself; leading = max(−Q, 0), 0 where it comes in */
function split(signed: Float64Array, lagging: Float64Array, leading: Float64Array, leadingPositive: boolean): number {
  let negative = 0;
  for (let i = 0; i < signed.length; i++) {
    const value = signed[i]!;
    if (value < 0) negative++;
    const kvar = leadingPositive ? -value : value;
    lagging[i] = Math.max(kvar, 0);
    // most records lead seldom or never: memory that nobody writes to is not taken up
    if (kvar < 0) leading[i] = -kvar;
  }
  return negative;
}

const NEVER_NEGATIVE: readonly Quantity[] = ['exported', 'lagging', 'leading', 'voltage', 'connected'];

function refuseNegative(rows: OrderedRows, valid: Int32Array, sources: readonly QuantitySource[]): void {
  const problems: Problem[] = [];
  for (const { quantity, values, column } of sources) {
    if (!NEVER_NEGATIVE.includes(quantity)) continue;
    for (let i = 0; i < valid.length && problems.length < MOST_PROBLEMS; i++) {
      const value = values[valid[i]!]!;
      if (value >= 0) continue;
      const place = { row: rows.rowNumber[valid[i]!]!, ...(column > 0 ? { column } : {}) };
      problems.push({ code: 'out-of-range', ...place, expected: `0 or more (${quantity})`, found: `${value}` });
    }
  }
  problems.sort((a, b) => a.row! - b.row!);
  if (problems.length > 0) throw new InputProblem(problems);
}
