// An independent reading of NEM12 files, for holding the reader against: a CSV library and a map from interval to value.
import Papa from 'papaparse';
import { slowMean } from './slow-mean.js';
import { SlowRefusal, type SlowRow } from './slow-meter-reading.js';

/** Values of one stream by the beginning of each interval [s]; null where the file says there is none. */
type Values = Map<number, number | null>;

interface Stream {
  name: string;
  minutes: number;
  scale: number;
  energy: boolean;
}

/** The record that stands open while a file is read from top to bottom. */
class Desk {
  readonly streams = new Map<string, Values>();
  readonly lengths = new Set<number>();
  stream: Stream | null = null;
  day: { firstS: number; values: (number | null)[] } | null = null;

  take(cells: string[]): void {
    const kind = cells[0]!;
    if (kind !== '400' && kind !== '500') this.close();
    if (kind === '200') this.stream = streamOf(cells);
    else if (kind === '300') this.openDay(cells);
    else if (kind === '400') this.qualify(cells);
    else if (!['100', '500', '900'].includes(kind)) throw new SlowRefusal(`record ${kind}`);
  }

  close(): void {
    const { day, stream } = this;
    if (day === null || stream === null) return;
    const known = this.streams.get(stream.name) ?? new Map<number, number | null>();
    for (const [i, value] of day.values.entries()) {
      const atS = day.firstS + i * stream.minutes * 60;
      if (known.has(atS) && known.get(atS) !== value) throw new SlowRefusal('a day twice');
      known.set(atS, value);
    }
    this.streams.set(stream.name, known);
    this.day = null;
  }

  openDay(cells: string[]): void {
    if (this.stream === null) throw new SlowRefusal('no 200 record');
    if (!isUsed(this.stream.name)) return;
    this.lengths.add(this.stream.minutes);
    this.day = { firstS: dayOf(cells[1]!), values: valuesOf(cells, this.stream) };
  }

  qualify(cells: string[]): void {
    if (this.stream !== null && !isUsed(this.stream.name)) return;
    if (this.day === null) throw new SlowRefusal('no 300 record');
    if (/^n/i.test(cells[3]!)) this.day.values.fill(null, Number(cells[1]) - 1, Number(cells[2]));
  }
}

const isUsed = (name: string) => /^[EBQK]/.test(name);

/**
 * Reads a file.
 * @returns intervals by the beginning of each [s]
 * @throws SlowRefusal where it should be refused or asked about
 */
export function readNem12Slowly(text: string): { intervalS: number; rows: Map<number, SlowRow> } {
  const { data, errors } = Papa.parse<string[]>(text, { delimiter: ',', newline: '\n' });
  if (errors.some(({ type }) => type === 'Quotes')) throw new SlowRefusal('quotes');
  const desk = new Desk();
  for (const cells of data.map((row) => row.map((cell) => cell.trim()))) {
    if (cells.some((cell) => cell !== '')) desk.take(cells);
  }
  desk.close();
  if (desk.lengths.size !== 1) throw new SlowRefusal('lengths differ');
  return { intervalS: [...desk.lengths][0]! * 60, rows: joined(desk.streams) };
}

function streamOf(cells: string[]): Stream {
  const unit = /^([kM]?)(W|var)(h?)$/i.exec(cells[7] ?? '');
  const name = `${(cells[4] ?? '').toUpperCase()} ${cells[1]}`;
  if (unit === null && isUsed(name)) throw new SlowRefusal(`unit ${cells[7]}`);
  const scale = { '': 0.001, k: 1, m: 1000 }[(unit?.[1] ?? 'k').toLowerCase()]!;
  return { name, minutes: Number(cells[8]), scale, energy: unit?.[3] !== '' };
}

function dayOf(text: string): number {
  const [, year, month, day] = /^(\d{4})(\d\d)(\d\d)$/.exec(text) ?? [];
  const moment = Date.UTC(Number(year), Number(month) - 1, Number(day)) / 1000;
  if (Number.isNaN(moment) || new Date(moment * 1000).toISOString().slice(0, 10).replaceAll('-', '') !== text)
    throw new SlowRefusal(`date ${text}`);
  return moment - 36_000;
}

function valuesOf(cells: string[], { minutes, scale, energy }: Stream) {
  const count = 1440 / minutes;
  const flag = cells[2 + count]?.toUpperCase() ?? 'none';
  if (!/^([ASFENV]\d{0,2})?$/.test(flag)) throw new SlowRefusal(`flag ${flag}`);
  return cells.slice(2, 2 + count).map((cell) => {
    if (/^(na|n\/a|nan|null|\?|-|--|\.|\*|#|nil|none|nd)?$/i.test(cell)) return null;
    const value = /^(?:[+]|-(?=[0.]*$))?(?:\d+(?: \d{3})*\.?\d*|\.\d+)(?:e[-+]?\d+)?$/i.test(cell)
      ? Number(cell.replaceAll(' ', '')) + 0
      : Number.NaN;
    if (!Number.isFinite(value)) throw new SlowRefusal(`value ${cell}`);
    if (flag.startsWith('N')) return null;
    const inKilo = scale === 0.001 ? value / 1000 : value * scale;
    return energy ? slowMean(inKilo, minutes * 60) : inKilo;
  });
}

function joined(streams: Map<string, Values>): Map<number, SlowRow> {
  if (new Set([...streams.keys()].map((name) => name.split(' ')[1])).size > 1) throw new SlowRefusal('several meters');
  const of = (letter: string) => [...streams].filter(([name]) => name.startsWith(letter)).map(([, values]) => values);
  if (of('E').length === 0 || of('Q').length === 0) throw new SlowRefusal('a stream is missing');
  const rows = new Map<number, SlowRow>();
  for (const at of new Set([...streams.values()].flatMap((values) => [...values.keys()]))) {
    const sum = (letter: string) =>
      of(letter).reduce<number | null>((total, values) => {
        const value = values.get(at);
        return total === null || value === undefined || value === null ? null : total + value;
      }, 0);
    const [e, b, q, k] = ['E', 'B', 'Q', 'K'].map(sum);
    if (e === null || b === null || q === null || k === null) continue;
    rows.set(at, [e! - b!, q!, k!]);
  }
  return rows;
}
