// An independent reading of delimited meter files, for holding the reader against: a CSV library, a text a cell, a date
// object a stamp. It knows the files it is given (their delimiter, decimal mark and kind of stamp) and finds out nothing else.
import Papa from 'papaparse';
import { slowFillers } from './slow-fillers.js';
import { byHeader, type SlowLong, type TurnedRows, turned } from './slow-long-rows.js';
import { slowMean } from './slow-mean.js';

/** What is known of a file beforehand. */
export interface Dialect {
  delimiter: string;
  decimal: '.' | ',';
  dates: 'ymd' | 'dmy';
  /** which end of the interval a stamp marks; midnight may stand under the ending day */
  stamp: 'begin' | 'end' | 'endOldDate';
  /** where a file that has a row for each channel and moment has what; left out where it has a row a moment */
  long?: SlowLong;
}

/** What a file comes to, intervals by the beginning of each [s]. */
export interface SlowReadingOf {
  intervalS: number;
  rows: Map<number, SlowRow>;
  /** numbers left out because they stand for missing ones */
  fillers: number;
  /** channels that no record is made of */
  leftOut: ReadonlySet<string>;
  /** rows with nothing but words in one cell, such as a remark between the rows of data */
  remarks: number;
}

/** One interval: kW, lagging and leading kvar. */
export type SlowRow = [kw: number, lagging: number, leading: number];

/** The slow reader's verdict that a file can't be read, and why. */
export class SlowRefusal extends Error {}

/**
 * Reads a file.
 * @returns intervals by the beginning of each [s]
 * @throws SlowRefusal where it should be refused or asked about
 */
export function readSlowly(bytes: Uint8Array, dialect: Dialect): SlowReadingOf {
  const { data, errors } = Papa.parse<string[]>(slowText(bytes), { delimiter: dialect.delimiter, newline: '\n' });
  const table = data.map((cells) => cells.map((cell) => cell.trim()));
  const headerAt = table.findIndex((cells) => isHeader(cells, dialect));
  if (headerAt < 0) throw new SlowRefusal('no header');
  const broken = errors.find(({ type, row = 0 }) => type === 'Quotes' && row >= headerAt);
  if (broken !== undefined) throw new SlowRefusal(broken.message);
  const rows = table
    .slice(headerAt + 1)
    .filter((cells) => cells.some((cell) => cell !== '') && cells.join('\n') !== table[headerAt]!.join('\n'));
  const full = rows.filter((cells) => !isRemark(cells));
  const { header, body, leftOut } = momentRows(table[headerAt]!, full, dialect);
  const columns = columnsOf(header.map(plain), body, dialect);
  const read = body.map((cells) => rowOf(cells, header, columns, dialect));
  return { ...underFillers(read, columns, dialect), leftOut, remarks: rows.length - full.length };
}

const plain = (name: string) => name.normalize('NFD').replace(/\p{M}/gu, '');

function isRemark(cells: string[]): boolean {
  const said = cells.filter((cell) => cell !== '');
  return said.length === 1 && /^[^\d]*\p{L}[^\d]*\p{L}{3}/u.test(said[0]!);
}

function isHeader(cells: string[], { long }: Dialect): boolean {
  if (cells.some((cell) => /^[\d.,]+$|^\d+[-/.]\d+[-/.]\d/.test(cell))) return false;
  return long === undefined ? cells.some((cell) => UNIT.test(cell)) : cells.filter((cell) => cell !== '').length > 2;
}

/** The rows of moments, made of those of channels where the file has these. */
function momentRows(header: string[], rows: string[][], dialect: Dialect): TurnedRows {
  const { long, dates } = dialect;
  if (long === undefined) return { header, body: rows, leftOut: new Set() };
  for (const cells of rows) {
    refuseWidth(cells, header);
    if (cells[long.channel] === '') throw new SlowRefusal('a channel without a name');
  }
  const momentOf = (stamp: string) => {
    const { clockS, offsetS } = stampOf(stamp, dates);
    return `${clockS} ${offsetS}`;
  };
  return turned(rows, byHeader(header, long), momentOf);
}

type Gridded = Omit<SlowReadingOf, 'leftOut' | 'remarks'>;

/** Numbers that may stand for missing ones: as values and as gaps, where that makes no difference. */
function underFillers(read: ReadRow[], columns: Columns, dialect: Dialect): Gridded {
  const used = [...(read[0]?.values.keys() ?? [])];
  const found = used.map((column) => ({ column, ...slowFillers(read.map(({ values }) => values.get(column)!)) }));
  const reading = (isGap: (one: (typeof found)[0], row: number) => boolean): Gridded | SlowRefusal => {
    let fillers = 0;
    const left = read.map((row, at) => {
      const gaps = found.filter((one) => isGap(one, at)).map(({ column }) => column);
      fillers += gaps.length;
      return { ...row, values: new Map([...row.values].map(([k, value]) => [k, gaps.includes(k) ? null : value])) };
    });
    try {
      return { ...onGrid(left, columns, dialect), fillers };
    } catch (problem) {
      if (problem instanceof SlowRefusal) return problem;
      throw problem;
    }
  };
  const asGaps = reading(({ gaps, open }, row) => gaps.has(row) || open.has(row));
  if (found.every(({ open }) => open.size === 0)) return soundOf(asGaps);
  const asValues = reading(({ gaps }, row) => gaps.has(row));
  // a reading that cannot be is no answer to the question
  if (asGaps instanceof SlowRefusal) return soundOf(asValues);
  if (asValues instanceof SlowRefusal) return asGaps;
  const same = ({ intervalS, rows }: Gridded) => JSON.stringify([intervalS, ...rows].sort());
  if (same(asGaps) !== same(asValues)) throw new SlowRefusal('a number that may stand for a missing one');
  return asGaps;
}

function soundOf(reading: Gridded | SlowRefusal): Gridded {
  if (reading instanceof SlowRefusal) throw reading;
  return reading;
}

/**
 * The text of a file, UTF-8 where it can be that.
 * @param bytes the file
 */
export function slowText(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return new TextDecoder('windows-1252').decode(bytes).replace(/^ï»¿/, '');
  }
}

interface Column {
  at: number;
  /** turns a number into kilo units: power, or energy of an hour */
  scale: (value: number) => number;
  energy: boolean;
}

interface Columns {
  time: number;
  kw: Column;
  lagging: Column | null;
  leading: Column | null;
  signed: Column | null;
}

const UNIT = /(?:(?<![a-z])|(?=[kM]))([kM]?)(W|var)(h?)(?:$|[^a-z])/i;

function columnsOf(header: string[], body: string[][], { dates }: Dialect): Columns {
  const find = (fits: (name: string) => boolean) => {
    const found = header.flatMap((name, at) => (fits(name) ? [at] : []));
    if (found.length > 1) throw new SlowRefusal(`${found.length} columns for one quantity`);
    return found.length === 0 ? null : columnOf(header[found[0]!]!, found[0]!);
  };
  const isReactive = (name: string) => /reactive|var/i.test(name);
  const kw =
    find((name) => UNIT.test(name) && !isReactive(name)) ??
    find((name) => /usage|active/i.test(name) && !isReactive(name));
  const lagging = find((name) => /lag/i.test(name));
  const leading = find((name) => /lead/i.test(name));
  const signed = find((name) => UNIT.test(name) && isReactive(name) && !/lag|lead/i.test(name));
  if (kw === null || (lagging ?? signed) === null) throw new SlowRefusal('a column is missing');
  if (lagging !== null && signed !== null) throw new SlowRefusal('a column too many');
  const first = body.find((cells) => cells.some((cell) => isStamp(cell, dates)));
  const time = first?.findIndex((cell) => isStamp(cell, dates)) ?? 0;
  // beside a leading column the other one is lagging
  if (leading !== null) return { time, kw, lagging: lagging ?? signed, leading, signed: null };
  return { time, kw, lagging, leading, signed };
}

function isStamp(cell: string, dates: Dialect['dates']): boolean {
  try {
    return stampOf(cell, dates) !== null;
  } catch {
    return false;
  }
}

function columnOf(name: string, at: number): Column {
  const [, prefix = '', , hour = ''] = UNIT.exec(name) ?? [];
  const scale = {
    '': (value: number) => value / 1000,
    k: (value: number) => value,
    m: (value: number) => value * 1000,
  };
  return { at, scale: scale[prefix.toLowerCase() as keyof typeof scale], energy: hour !== '' };
}

interface ReadRow {
  clockS: number;
  date: string;
  offsetS: number | null;
  values: Map<Column, number | null>;
}

function rowOf(cells: string[], header: string[], columns: Columns, dialect: Dialect): ReadRow {
  refuseWidth(cells, header);
  const stamp = stampOf(cells[columns.time]!, dialect.dates);
  const used = [columns.kw, columns.lagging, columns.leading, columns.signed].filter((column) => column !== null);
  return { ...stamp, values: new Map(used.map((column) => [column, numberOf(cells[column.at]!, dialect.decimal)])) };
}

function refuseWidth(cells: string[], header: string[]): void {
  const extra = cells.slice(header.length).some((cell) => cell !== '');
  if (cells.length < header.length || extra) throw new SlowRefusal(`${cells.length} cells`);
}

function stampOf(text: string, order: 'ymd' | 'dmy') {
  const shape =
    order === 'ymd'
      ? /^(\d{4})([-/.]?)(\d{1,2})\2(\d{1,2})(?:\s*,\s*|\s+|T)(\d{1,2})[:.h](\d{2})(?:[:.](\d{2})(?:[.,]0+)?)?\s*(Z|[+-]\d\d(?::?\d\d)?)?$/i
      : /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4})(?:\s*,\s*|\s+|T)(\d{1,2})[:.h](\d{2})(?:[:.](\d{2})(?:[.,]0+)?)?\s*(Z|[+-]\d\d(?::?\d\d)?)?$/i;
  const parts = shape.exec(text);
  if (parts === null) throw new SlowRefusal(`stamp ${text}`);
  const [, one, , two, three, hour, minute, second = '0', zone] = parts;
  const [year, month, day] = (order === 'ymd' ? [one, two, three] : [three, two, one]).map(Number) as [
    number,
    number,
    number,
  ];
  const date = new Date(Date.UTC(year, month - 1, day));
  if (date.getUTCMonth() !== month - 1 || date.getUTCDate() !== day) throw new SlowRefusal(`date ${text}`);
  const clock = Number(hour) * 3600 + Number(minute) * 60 + Number(second);
  const sign = zone?.startsWith('-') ? -1 : 1;
  const digits = zone === undefined || /z/i.test(zone) ? '0000' : zone.replace(/\D/g, '');
  const offsetS = zone === undefined ? null : sign * (Number(digits.slice(0, 2)) * 3600 + Number(digits.slice(2)) * 60);
  return { clockS: date.getTime() / 1000 + clock, date: `${year}-${month}-${day}`, offsetS };
}

function numberOf(text: string, decimal: '.' | ','): number | null {
  if (/^(?:|na|n\/a|nan|null|\?|-|--|\.|\*|#|nil|none|nd)$/i.test(text)) return null;
  const group = decimal === '.' ? ',' : '.';
  const mark = `\\${decimal}`;
  const plain = new RegExp(`^[-+−]?(?:\\d+|\\d{1,3}(?:[\\${group} '’]\\d{3})+)?(?:${mark}\\d*)?(?:e[-+]?\\d+)?$`, 'i');
  if (!plain.test(text) || !/\d/.test(text)) throw new SlowRefusal(`number ${text}`);
  const value = Number(text.replaceAll(group, '').replace(/[ '’]/g, '').replace('−', '-').replace(decimal, '.'));
  if (!Number.isFinite(value)) throw new SlowRefusal(`number ${text}`);
  return value;
}

function onGrid(read: ReadRow[], columns: Columns, { stamp }: Dialect) {
  const moments = momentsOf(read, stamp);
  const times = [...moments.keys()].sort((a, b) => a - b);
  const steps = times.slice(1).map((time, i) => time - times[i]!);
  const intervalS = commonest(steps);
  if (steps.some((step) => step % intervalS !== 0)) throw new SlowRefusal('intervals differ');
  const rows = new Map<number, SlowRow>();
  for (const [atS, row] of moments) {
    const values = slowRow(row, columns, intervalS);
    if (values !== null) rows.set(atS - (stamp === 'begin' ? 0 : intervalS), values);
  }
  return { intervalS, rows };
}

function momentsOf(read: ReadRow[], stamp: Dialect['stamp']): Map<number, ReadRow> {
  const own = read[0]?.offsetS === null;
  if (read.some(({ offsetS }) => (offsetS === null) !== own)) throw new SlowRefusal('offsets on some rows');
  const moments = new Map<number, ReadRow>();
  for (const row of read) {
    const atS = row.clockS - (row.offsetS ?? 0) + (stamp === 'endOldDate' && row.clockS % 86_400 === 0 ? 86_400 : 0);
    const known = moments.get(atS);
    if (known !== undefined && [...row.values].some(([column, value]) => known.values.get(column) !== value)) {
      throw new SlowRefusal('rows of one moment differ');
    }
    moments.set(atS, row);
  }
  return moments;
}

function slowRow({ values }: ReadRow, columns: Columns, intervalS: number): SlowRow | null {
  const inKilo = (column: Column | null): number | null => {
    const value = column === null ? 0 : values.get(column)!;
    if (column === null || value === null) return value;
    return column.energy ? slowMean(column.scale(value), intervalS) : column.scale(value);
  };
  const [kw, lagging, leading, signed] = [columns.kw, columns.lagging, columns.leading, columns.signed].map(inKilo);
  if (kw == null || lagging == null || leading == null || signed == null) return null;
  if (lagging < 0 || leading < 0) throw new SlowRefusal('negative');
  // adding 0 makes −0 and 0 one value
  return [kw + 0, lagging + Math.max(signed, 0) + 0, leading + Math.max(-signed, 0) + 0];
}

function commonest(steps: number[]): number {
  const counts = new Map<number, number>();
  for (const step of steps) counts.set(step, (counts.get(step) ?? 0) + 1);
  const most = Math.max(...counts.values());
  return Math.min(...[...counts].filter(([, count]) => count === most).map(([step]) => step));
}
