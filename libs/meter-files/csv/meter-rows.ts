import type { MeterMap } from '#libs/contract/meter-map.js';
import { shown } from '#libs/contract/shown.js';
import { InputProblem } from '#libs/engine/index.js';
import type { CsvLayout } from './csv-layout.js';
import type { RowCells } from './row-cells.js';
import { LongRows } from './long-rows.js';
import { RowReader } from './row-reader.js';

/** Rows of further meters are counted only. */
const MOST_METERS = 50;
/** Rows that are kept while it is open which of several meters is meant; each keeps its first ones in any case. */
export const MOST_SHOWN = 2_000_000;
const FIRST_SHOWN = 1000;

/** What reads the rows of one meter. */
export type MeterReader = RowReader | LongRows;

function readerFor(layout: CsvLayout, map: MeterMap): MeterReader {
  return layout.long === null ? new RowReader(layout, map) : new LongRows(layout, layout.long, map);
}

/**
 * Keeps the rows of each meter of a file apart. Where the map says which meter is wanted, rows of the others are passed
 * over after a look at one cell.
 */
export class MeterRows {
  /** the only reader of a file of one meter, or the first */
  first: MeterReader;
  readonly #layout: CsvLayout;
  readonly #map: MeterMap;
  readonly #mostShown: number;
  readonly #readers = new Map<string, MeterReader>();
  /** names met, with those whose rows are not kept */
  readonly #names = new Set<string>();
  // the meter of the row before, and the bytes of its cell
  #lastBytes = new Uint8Array(0);
  #last: MeterReader | null = null;
  #rows = 0;
  /** rows of the file up to which meters are shown; 0 while all are */
  #shownTo = 0;

  /**
   * @param layout of the file
   * @param map what a person says
   * @param mostShown rows that are kept of all meters together while several are met
   */
  constructor(layout: CsvLayout, map: MeterMap, mostShown: number = MOST_SHOWN) {
    this.#mostShown = mostShown;
    this.#layout = layout;
    this.#map = map;
    this.first = readerFor(layout, map);
  }

  /**
   * Reads a row.
   * @param cells the row
   * @param rowNumber counted from 1
   */
  take(cells: RowCells, rowNumber: number): void {
    if (this.#layout.side.meter.length === 0) {
      this.first.take(cells, rowNumber);
      return;
    }
    if (cells.isBlankFrom(0)) return;
    const reader = this.#readerOf(cells);
    if (reader === null) return;
    const before = reader.rows.count;
    if (this.#isShown(before, rowNumber)) return;
    reader.take(cells, rowNumber);
    this.#rows += reader.rows.count - before;
  }

  /**
   * Readers with rows of data, by the meter's name; one without a name where the file names no meters. Of several meters
   * `shownTo` is the row behind which not all are kept, 0 where all are.
   * @throws InputProblem where a row can't be read, or the map wants a meter that is not there
   */
  close(): { readers: Map<string, MeterReader>; meters: number; shownTo: number } {
    if (this.#layout.side.meter.length === 0) this.#readers.set('', this.first);
    for (const reader of this.#readers.values()) {
      reader.end();
      reader.problems.refuse();
    }
    const readers = new Map([...this.#readers].filter(([, { rows }]) => rows.count > 0));
    const { meter } = this.#map;
    if (meter !== undefined && readers.size === 0) this.#refuseAbsent(meter);
    const named = [...readers.keys()].filter((name) => name !== '');
    const nameless = readers.get('');
    if (named.length > 0 && nameless !== undefined) this.#refuseNameless(nameless);
    return { readers, meters: Math.max(readers.size, this.#names.size), shownTo: this.#shownTo };
  }

  /** Whether enough is kept of a meter to show what it is: the one that is chosen is read again, and alone. */
  #isShown(rows: number, rowNumber: number): boolean {
    if (this.#rows < this.#mostShown || rows < FIRST_SHOWN) return false;
    if (this.#shownTo > 0) return true;
    // a repeated header is no second meter
    if ([...this.#readers.values()].filter((reader) => reader.rows.count > 0).length < 2) return false;
    this.#shownTo = rowNumber - 1;
    return true;
  }

  #readerOf(cells: RowCells): MeterReader | null {
    const { meter } = this.#layout.side;
    const [column] = meter;
    if (meter.length === 1 && column! < cells.count && sameBytes(cells, column!, this.#lastBytes)) return this.#last;
    const name = meter.map((one) => cells.text(one)).join(' / ');
    this.#last = this.#readerNamed(name);
    this.#lastBytes =
      column! < cells.count ? cells.bytes.slice(cells.from[column!]!, cells.to[column!]!) : new Uint8Array(0);
    return this.#last;
  }

  #readerNamed(name: string): MeterReader | null {
    const known = this.#readers.get(name);
    if (known !== undefined) return known;
    const isHeader = this.#layout.side.meter.map((column) => this.#layout.names[column]).join(' / ') === name;
    if (!isHeader && name !== '') this.#names.add(name);
    const wanted = this.#map.meter;
    if (wanted !== undefined && wanted.trim() !== name) return null;
    if (this.#readers.size >= MOST_METERS) return null;
    const reader = this.#readers.size === 0 ? this.first : readerFor(this.#layout, this.#map);
    this.#readers.set(name, reader);
    return reader;
  }

  #refuseAbsent(meter: string): never {
    const names = [...this.#names].slice(0, 20).join(', ');
    throw new InputProblem([
      { code: 'out-of-range', path: 'meter', expected: `a meter of the file: ${names}`, found: shown(meter) },
    ]);
  }

  #refuseNameless({ rows }: MeterReader): never {
    const column = this.#layout.side.meter[0]! + 1;
    const expected = 'the name of the meter, as in other rows';
    throw new InputProblem([{ code: 'missing', row: rows.rowNumber[0]!, column, expected, found: 'nothing' }]);
  }
}

function sameBytes({ bytes, from, to }: RowCells, column: number, known: Uint8Array): boolean {
  const at = from[column]!;
  if (known.length === 0 || to[column]! - at !== known.length) return false;
  for (let i = 0; i < known.length; i++) if (bytes[at + i] !== known[i]) return false;
  return true;
}
