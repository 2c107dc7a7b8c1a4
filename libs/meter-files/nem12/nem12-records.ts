import { shown } from '#libs/contract/shown.js';
import { dayNumber, InputProblem, type Problem } from '#libs/engine/index.js';
import { type NumberCell, readNumberText } from '../csv/number-cell.js';
import type { RowCells } from '../csv/row-cells.js';
import { type ReadUnit, readUnit } from '../csv/unit-text.js';
import type { Quantity } from '../record/build-columns.js';
import { isDate } from '../time/date-orders.js';

/**
 * What the first letter of a data stream's suffix means. The market names flows as the network sees them: E leaves the
 * network for the customer, B enters it; Q and K are their reactive companions.
 */
const STREAMS: Record<string, Quantity> = { E: 'active', B: 'exported', Q: 'lagging', K: 'leading' };

/** A 200 record: whose data follow. */
export interface Stream {
  meter: string;
  suffix: string;
  /** null for a stream the planner has no use for */
  quantity: Quantity | null;
  unit: ReadUnit;
  /** length of an interval [min] */
  minutes: number;
  row: number;
}

/** A 300 record with its 400 records: a day of one stream. */
export interface StreamDay {
  /** days since 1970-01-01 */
  day: number;
  /** of the values, by the 200 record before them */
  unit: ReadUnit;
  /** NaN where the quality flag says there is no value */
  values: Float64Array;
  row: number;
  /** values that are estimates or substitutes */
  substituted: number;
  /** values whose quality is stated nowhere */
  unstated: number;
}

/**
 * Reads a 200 record.
 * @param cells the record
 * @param row of the file
 * @throws InputProblem naming row and column
 */
export function readStream(cells: RowCells, row: number): Stream {
  const suffix = cells.text(4).toUpperCase();
  const quantity = STREAMS[suffix[0] ?? ''] ?? null;
  const unit = readUnit(cells.text(7));
  const minutes = Number(cells.text(8));
  const stream = { meter: cells.text(1), suffix, quantity, minutes, row };
  if (quantity === null) return { ...stream, unit: readUnit('kWh')! };
  const family = quantity === 'active' || quantity === 'exported' ? 'active' : 'reactive';
  const problems: Problem[] = [];
  if (unit === null || unit.family !== family) {
    const expected = family === 'active' ? 'a unit such as KWH' : 'a unit such as KVARH';
    problems.push({ code: 'wrong-unit', row, column: 8, expected, found: shown(cells.text(7)) });
  }
  if (![1, 5, 10, 15, 30, 60].includes(minutes)) {
    const expected = 'an interval of 5, 15 or 30 minutes';
    problems.push({ code: 'out-of-range', row, column: 9, expected, found: shown(cells.text(8)), unit: 'min' });
  }
  if (problems.length > 0 || unit === null) throw new InputProblem(problems);
  return { ...stream, unit };
}

/**
 * Reads a 300 record.
 * @param cells the record
 * @param row of the file
 * @param stream whose day it is
 * @returns the day, its quality settled but for 400 records; null where the row is refused
 */
export function readDay(
  cells: RowCells,
  row: number,
  stream: Stream,
  refuse: (problem: Problem) => void,
): { day: StreamDay; quality: string } | null {
  const count = 1440 / stream.minutes;
  const day = dateNumber(cells.text(1));
  if (day === null) {
    refuse({ code: 'bad-time', row, column: 2, expected: 'a date as YYYYMMDD', found: shown(cells.text(1)) });
    return null;
  }
  const texts = cells.texts();
  // the first flag stands behind the last value
  const flagAt = texts.findIndex((text, index) => index > 1 && /^[ASFENV]\d{0,2}$/i.test(text));
  if (texts.length < count + 3 || (flagAt >= 0 && flagAt !== count + 2)) {
    const found = `${(flagAt >= 0 ? flagAt : texts.length) - 2}`;
    refuse({ code: 'wrong-length', row, expected: `${count} values and a quality flag`, found });
    return null;
  }
  const quality = texts[2 + count]!.toUpperCase();
  if (quality !== '' && flagAt < 0) {
    const expected = 'a quality flag behind the last value';
    refuse({ code: 'wrong-length', row, column: count + 3, expected, found: shown(quality) });
    return null;
  }
  const values = readValues(texts.slice(2, 2 + count), row, refuse);
  const parts: StreamDay = { day, unit: stream.unit, values, row, substituted: 0, unstated: 0 };
  if (quality.startsWith('N')) values.fill(Number.NaN);
  if (/^[SFE]/.test(quality)) parts.substituted = count;
  if (quality === '' || quality.startsWith('V')) parts.unstated = count;
  return { day: parts, quality };
}

function readValues(texts: string[], row: number, refuse: (problem: Problem) => void): Float64Array {
  const cell: NumberCell = { form: 'missing', value: 0 };
  return Float64Array.from(texts, (text, i) => {
    readNumberText(text, cell);
    const place = { row, column: 3 + i, found: shown(text) };
    if (cell.form === 'missing') return Number.NaN;
    if (cell.form === 'wrong' || cell.form.endsWith('omma'))
      refuse({ code: 'bad-number', ...place, expected: 'a number' });
    else if (cell.value < 0) refuse({ code: 'out-of-range', ...place, expected: '0 or more' });
    return cell.value;
  });
}

/**
 * Applies a 400 record to the day before it.
 * @param cells the record
 * @param row of the file
 * @param day whose intervals it qualifies; changed
 */
export function qualify(cells: RowCells, row: number, day: StreamDay, refuse: (problem: Problem) => void): void {
  const first = Number(cells.text(1));
  const last = Number(cells.text(2));
  const quality = cells.text(3).toUpperCase();
  const count = day.values.length;
  if (!(Number.isInteger(first) && Number.isInteger(last) && first >= 1 && first <= last && last <= count)) {
    const found = `${cells.text(1)} to ${cells.text(2)}`;
    refuse({ code: 'out-of-range', row, column: 2, expected: `intervals within 1 to ${count}`, found });
    return;
  }
  if (!/^[ASFEN]\d{0,2}$/.test(quality)) {
    refuse({ code: 'out-of-range', row, column: 4, expected: 'a quality flag', found: shown(quality) });
    return;
  }
  if (quality.startsWith('N')) day.values.fill(Number.NaN, first - 1, last);
  if (/^[SFE]/.test(quality)) day.substituted += last - first + 1;
  day.unstated = Math.max(0, day.unstated - (last - first + 1));
}

function dateNumber(text: string): number | null {
  const parts = /^(\d{4})(\d{2})(\d{2})$/.exec(text);
  if (parts === null) return null;
  const [year, month, day] = [Number(parts[1]), Number(parts[2]), Number(parts[3])];
  return isDate({ year, month, day }) ? dayNumber(year, month, day) : null;
}
