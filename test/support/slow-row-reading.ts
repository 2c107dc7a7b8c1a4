// Slow and plain readings of quadrant rows, of rows of days, and of sheets and tables that are delimited text in another dress.
import { brotliDecompressSync, gunzipSync } from 'node:zlib';
import { parquetReadObjects } from 'hyparquet';
import { slowMean } from './slow-mean.js';
import type { SlowRows } from './slow-message-reading.js';
import { readSlowly, SlowRefusal } from './slow-meter-reading.js';
import { SlowUnsure } from './slow-xml-reading.js';

function numberOf(text: string): number {
  if (!/^\d+(?:\.\d+)?$/.test(text)) throw new SlowUnsure(`number ${text}`);
  return Number(text);
}

function linesOf(text: string, delimiter: string): string[][] {
  const lines = text.split(/\r?\n/).filter((line) => line.trim() !== '');
  if (/["\r]/.test(text.replaceAll('\r\n', '\n'))) throw new SlowUnsure('quotation marks or other ends of lines');
  return lines.map((line) => line.split(delimiter).map((cell) => cell.trim()));
}

function commonest(times: readonly number[]): number {
  const sorted = [...times].sort((a, b) => a - b);
  const steps = sorted.slice(1).map((time, i) => time - sorted[i]!);
  const count = (step: number) => steps.filter((other) => other === step).length;
  return steps.reduce((best, step) => (count(step) > count(best) ? step : best), steps[0] ?? Number.NaN);
}

/**
 * @param text rows of stamp (d/m/y), flag and six energies in kWh and kvarh, standard time being UTC, decimal points
 * @param begins whether stamps mark beginnings
 */
export function readQuadrantsSlowly(text: string, begins: boolean): SlowRows {
  const found = new Map<number, number[]>();
  for (const cells of linesOf(text, ';')) {
    if (cells.at(-1) === '' && cells.length === 9) cells.pop();
    const stamp = /^(\d\d)\/(\d\d)\/(\d{4}) (\d\d):(\d\d)$/.exec(cells[0]!);
    if (stamp === null || cells.length !== 8 || !/^[01]$/.test(cells[1]!))
      throw new SlowUnsure(`row ${cells.join(' ')}`);
    const [, day, month, year, hour, minute] = stamp.map(Number);
    const atS = Date.UTC(year!, month! - 1, day, hour, minute) / 1000 - Number(cells[1]) * 3600;
    const values = cells.slice(2).map(numberOf);
    if (found.has(atS) && found.get(atS)!.join() !== values.join()) throw new SlowRefusal(`two rows at ${atS}`);
    found.set(atS, values);
  }
  const intervalS = commonest([...found.keys()]);
  const rows: SlowRows['rows'] = new Map();
  for (const [atS, values] of found) {
    const [ai, ae, r1, r2, r3, r4] = values as [number, number, number, number, number, number];
    const mean = (energy: number) => slowMean(energy, intervalS);
    rows.set(atS - (begins ? 0 : intervalS), [mean(ai) - mean(ae), mean(r1 + r2), mean(r3 + r4)]);
  }
  return { intervalS, rows };
}

/** @param text a header of date, unit, H01 … H24 and rows in kWh and kvarh, days of UTC */
export function readDaysSlowly(text: string): SlowRows {
  const [header = [], ...lines] = linesOf(text, ',');
  const hours = Array.from({ length: 24 }, (_, i) => `H${String(i + 1).padStart(2, '0')}`);
  if (header.join() !== ['date', 'unit', ...hours].join()) throw new SlowUnsure('another header');
  const columns = { kWh: new Map<number, number>(), kvarh: new Map<number, number>() };
  for (const [date = '', unit = '', ...cells] of lines) {
    if (date === 'date') continue;
    if (!/^\d{4}-\d\d-\d\d$/.test(date) || (unit !== 'kWh' && unit !== 'kvarh'))
      throw new SlowUnsure(`${date} ${unit}`);
    if (cells.length !== 24) throw new SlowRefusal(`${cells.length} hours`);
    cells.forEach((cell, hour) => {
      const atS = Date.parse(date) / 1000 + hour * 3600;
      const known = columns[unit].get(atS);
      const value = cell === '' ? Number.NaN : numberOf(cell);
      if (known !== undefined && !Object.is(known, value)) throw new SlowRefusal(`two values at ${atS}`);
      columns[unit].set(atS, value);
    });
  }
  const rows: SlowRows['rows'] = new Map();
  for (const [atS, kw] of columns.kWh) {
    const kvar = columns.kvarh.get(atS) ?? Number.NaN;
    if (!Number.isNaN(kw + kvar)) rows.set(atS, [kw, kvar, 0]);
  }
  return { intervalS: 3600, rows };
}

type Cell = string | number | bigint | Date | null | undefined;

/** A table as delimited text, which another slow reading reads. */
function tableSlowly(table: readonly (readonly Cell[])[]): SlowRows {
  const text = table.map((cells) =>
    cells
      .map((cell) => (cell instanceof Date ? cell.toISOString().slice(0, 19) : String(cell ?? '')))
      .map((cell) => (/[",\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell))
      .join(','),
  );
  const bytes = new TextEncoder().encode(text.join('\n'));
  return readSlowly(bytes, { delimiter: ',', decimal: '.', dates: 'ymd', stamp: 'begin' });
}

/** @param parts of a workbook of one sheet with stamps as serial numbers in column A */
export function readSheetSlowly(sheet: string, strings: string): SlowRows {
  const texts = [...strings.matchAll(/<si>(.*?)<\/si>/g)].map(
    ([, item]) => /<t[^>]*>(.*?)<\/t>/.exec(item!)?.[1] ?? '',
  );
  if (/<!--|CDATA|&/.test(sheet + strings)) throw new SlowUnsure('more than plain text');
  const table = [...sheet.matchAll(/<row\b[^>]*>(.*?)<\/row>/gs)].map(([, row]) => {
    const cells: Cell[] = [];
    for (const [, attributes = '', content = ''] of row!.matchAll(/<c\b([^>]*)>(.*?)<\/c>/gs)) {
      const letter = /r="([A-C])\d+"/.exec(attributes)?.[1];
      if (letter === undefined) throw new SlowUnsure('a cell elsewhere');
      cells['ABC'.indexOf(letter)] = sheetCell(attributes, content, texts);
    }
    return Array.from(cells);
  });
  return tableSlowly(table.filter((cells) => cells.length > 0).map((cells) => [0, 1, 2].map((at) => cells[at])));
}

function sheetCell(attributes: string, content: string, texts: readonly string[]): Cell {
  const values = [...content.matchAll(/<v>([^<]*)<\/v>/g)];
  if (values.length !== 1) throw new SlowUnsure('another cell');
  const text = values[0]![1]!.trim();
  if (/t="s"/.test(attributes)) return texts[Number(text)];
  if (/\bt=/.test(attributes)) throw new SlowUnsure('another kind of cell');
  if (/s="2"/.test(attributes)) return new Date(Math.round((Number(text) - 25_569) * 86_400) * 1000);
  if (/\bs=/.test(attributes)) throw new SlowUnsure('another style');
  return text === '' ? null : Number(text);
}

const unpacked = (bytes: Uint8Array) => Uint8Array.from(bytes);
const compressors = Object.fromEntries([
  ['GZIP', (input: Uint8Array) => unpacked(gunzipSync(input))],
  ['BROTLI', (input: Uint8Array) => unpacked(brotliDecompressSync(input))],
]);

/** @param bytes a table of a stamp, kW and kvar, and columns that have no meaning */
export async function readParquetSlowly(bytes: Uint8Array): Promise<SlowRows> {
  const file = Uint8Array.from(bytes).buffer;
  let objects: Record<string, Cell>[];
  try {
    objects = await parquetReadObjects({ file, compressors });
  } catch (error) {
    throw new SlowUnsure(`the other reader stops: ${String(error)}`);
  }
  const names = Object.keys(objects[0] ?? {}).filter((name) => !/feeder|mark/.test(name));
  const times = names.filter((name) => !/\[|^kW$|^kvar$/.test(name));
  if (names.length !== 3 || times.length !== 1) throw new SlowUnsure(`columns ${names.join()}`);
  return tableSlowly([
    names,
    ...objects.map((object) => names.map((name) => stampOf(object[name], name === times[0]))),
  ]);
}

function stampOf(cell: Cell, stamp: boolean): Cell {
  if (!stamp || typeof cell === 'string' || cell instanceof Date) return cell;
  throw new SlowUnsure('stamps of another kind');
}
