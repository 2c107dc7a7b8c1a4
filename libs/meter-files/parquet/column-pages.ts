import { crc32 } from 'node:zlib';
import type { SpooledFile } from '../spooled-file.js';
import { hybridRuns } from './hybrid-runs.js';
import { inflatePage } from './inflate-page.js';
import { PageError } from './page-error.js';
import { type PageHeader, readPageHeader } from './page-header.js';
import { lengthPrefixed, type Physical, pageValues, plainValues, type RawValues } from './page-values.js';
import type { RawValue, ValueText } from './value-text.js';

/** Larger than any writer makes a page [bytes]. */
const MOST_PAGE_BYTES = 67_108_864;
const HEADER_BYTES = 65_536;

/** A column within a row group. */
export interface ColumnChunk {
  physical: Physical;
  optional: boolean;
  codec: string;
  /** where its pages begin and end in the file */
  from: number;
  to: number;
  text: ValueText;
}

/** Rows of one page: which of them hold a value, and the text of each value. */
interface OpenPage {
  rows: number;
  /** 1 where the row holds a value; null where all do */
  levels: Uint32Array | null;
  textAt: (index: number) => string;
}

/** The values of a column in order, one page in memory at a time. */
export class ColumnPages {
  readonly #file: SpooledFile;
  readonly #chunk: ColumnChunk;
  #at: number;
  #left: number;
  #dictionary: string[] | null = null;
  #page: OpenPage = { rows: 0, levels: null, textAt: () => '' };
  #row = 0;
  #value = 0;

  /**
   * @param file the file
   * @param chunk the column
   * @param rows of the row group
   */
  constructor(file: SpooledFile, chunk: ColumnChunk, rows: number) {
    this.#file = file;
    this.#chunk = chunk;
    this.#at = chunk.from;
    this.#left = rows;
  }

  /** Rows that can be taken before another page is opened. */
  get ready(): number {
    return this.#page.rows - this.#row;
  }

  /** The cell of the next row. */
  take(): string {
    const { levels, textAt } = this.#page;
    const holds = levels === null || levels[this.#row] === 1;
    this.#row++;
    return holds ? textAt(this.#value++) : '';
  }

  /**
   * Opens the next page of rows.
   * @throws PageError where there is none, or it is not what it says
   */
  async open(): Promise<void> {
    while (this.ready === 0) {
      if (this.#at >= this.#chunk.to) throw new PageError('fewer values than rows');
      const header = await this.#header();
      const packed = await this.#packed(header);
      if (header.kind === 'dictionary') this.#openDictionary(header, packed);
      else if (header.kind !== 'other') this.#openRows(header, packed);
    }
  }

  /**
   * Ends the column.
   * @throws PageError where it holds more than the row group has rows
   */
  async end(): Promise<void> {
    while (this.#at < this.#chunk.to) {
      const { kind, values, packedBytes } = await this.#header();
      if (kind === 'rows' || kind === 'rowsV2' ? values > 0 : kind === 'dictionary') {
        throw new PageError('more values than rows');
      }
      this.#at += packedBytes;
    }
  }

  async #header(): Promise<PageHeader> {
    const start = await this.#file.read(this.#at, Math.min(HEADER_BYTES, this.#chunk.to - this.#at));
    const header = readPageHeader(start);
    this.#at += header.headerBytes;
    return header;
  }

  async #packed(header: PageHeader): Promise<Uint8Array> {
    const { packedBytes, bytes, crc } = header;
    if (bytes > MOST_PAGE_BYTES || packedBytes > MOST_PAGE_BYTES) {
      throw new PageError(`a page of ${Math.max(bytes, packedBytes)} bytes; ${MOST_PAGE_BYTES} are the most`);
    }
    if (packedBytes > this.#chunk.to - this.#at) throw new PageError('a page that goes beyond its column');
    const packed = await this.#file.read(this.#at, packedBytes);
    this.#at += packedBytes;
    if (crc !== null && crc32(packed) !== crc >>> 0) throw new PageError('a page with another check sum');
    return packed;
  }

  #openDictionary({ values, bytes }: PageHeader, packed: Uint8Array): void {
    const { physical, codec, text } = this.#chunk;
    if (this.#dictionary !== null) throw new PageError('two dictionaries of a column');
    if (values > bytes) throw new PageError('a dictionary of more values than bytes');
    const raw = plainValues(inflatePage(packed, codec, bytes), values, physical);
    this.#dictionary = Array.from(raw as ArrayLike<RawValue>, text);
  }

  #openRows(header: PageHeader, packed: Uint8Array): void {
    const { values: rows } = header;
    if (rows < 0 || rows > this.#left) throw new PageError('more values than rows');
    const { levels, bytes } =
      header.kind === 'rows' ? this.#firstKind(header, packed) : this.#secondKind(header, packed);
    const count = levels === null ? rows : levels.reduce((sum, level) => sum + level, 0);
    this.#page = { rows, levels, textAt: this.#texts(header.encoding, bytes, count) };
    this.#left -= rows;
    this.#row = 0;
    this.#value = 0;
  }

  /** Levels and values are packed together. */
  #firstKind(header: PageHeader, packed: Uint8Array): { levels: Uint32Array | null; bytes: Uint8Array } {
    const page = inflatePage(packed, this.#chunk.codec, header.bytes);
    if (!this.#chunk.optional) return { levels: null, bytes: page };
    if (header.levelEncoding !== 'RLE') throw new PageError(`levels in the encoding ${header.levelEncoding}`);
    const runs = lengthPrefixed(page);
    return { levels: hybridRuns(runs, 1, header.values), bytes: page.subarray(4 + runs.length) };
  }

  /** Levels stand before the packed values. */
  #secondKind(header: PageHeader, packed: Uint8Array): { levels: Uint32Array | null; bytes: Uint8Array } {
    const { levelBytes, repeatBytes, bytes, values } = header;
    const before = levelBytes + repeatBytes;
    if (levelBytes < 0 || repeatBytes !== 0 || before > packed.length || before > bytes) {
      throw new PageError('levels larger than their page');
    }
    const levels = this.#chunk.optional ? hybridRuns(packed.subarray(0, before), 1, values) : null;
    const rest = packed.subarray(before);
    // a page without a value may be packed to nothing at all
    if (!header.packed || bytes === before) return { levels, bytes: rest };
    return { levels, bytes: inflatePage(rest, this.#chunk.codec, bytes - before) };
  }

  #texts(encoding: string, bytes: Uint8Array, count: number): (index: number) => string {
    if (encoding === 'RLE_DICTIONARY' || encoding === 'PLAIN_DICTIONARY') return this.#dictionaryTexts(bytes, count);
    const values: RawValues = pageValues(bytes, encoding, count, this.#chunk.physical);
    return (index) => this.#chunk.text(values[index]!);
  }

  #dictionaryTexts(bytes: Uint8Array, count: number): (index: number) => string {
    const dictionary = this.#dictionary;
    if (dictionary === null) throw new PageError('a page of a dictionary that is missing');
    const places = hybridRuns(bytes.subarray(1), count === 0 ? 0 : (bytes[0] ?? 33), count);
    for (const place of places) {
      if (place >= dictionary.length) throw new PageError('a value that is not in the dictionary');
    }
    return (index) => dictionary[places[index]!]!;
  }
}
