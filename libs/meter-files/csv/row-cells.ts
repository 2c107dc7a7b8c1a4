const QUOTE = 0x22;
const CR = 0x0d;

const utf8 = new TextDecoder('utf-8', { fatal: true });
const western = new TextDecoder('windows-1252');

/**
 * The cells of one row, as places in the bytes they were found in (RFC 4180: a cell that begins with a quotation mark
 * runs to the closing one, two in a row standing for one). Reused from row to row.
 */
export class RowCells {
  bytes = new Uint8Array(0);
  count = 0;
  /** bounds of each cell, without its quotation marks */
  readonly from: number[] = [];
  readonly to: number[] = [];
  /** 0 bare, 1 quoted, 2 quoted with doubled quotation marks inside */
  readonly quoting: number[] = [];
  /** cell, counted from 1, whose closing quotation mark is followed by something else; 0 where none is */
  badQuote = 0;

  /**
   * Splits the row that begins at `start`.
   * @param bytes the buffer
   * @param start where the row begins
   * @param end where the bytes read so far end
   * @param marks delimiter and row end, as bytes
   * @returns where the next row begins, or −1 where this one is not complete yet
   */
  split(bytes: Uint8Array, start: number, end: number, marks: { delimiter: number; rowEnd: number }): number {
    this.bytes = bytes as Uint8Array<ArrayBuffer>;
    this.count = 0;
    this.badQuote = 0;
    let at = start;
    for (;;) {
      const stop = bytes[at] === QUOTE && at < end ? this.#quotedCell(at, end) : this.#bareCell(at, end, marks);
      if (stop < 0) return -1;
      at = this.#afterCell(stop, end, marks);
      if (at < 0) return -1;
      if (bytes[at] === marks.rowEnd) break;
      at++;
    }
    return at + 1;
  }

  /**
   * The text of a cell; bytes that are no UTF-8 are taken as Windows-1252.
   * @param index cell counted from 0
   * @returns text without surrounding blanks; '' where the row has no such cell
   */
  text(index: number): string {
    if (index >= this.count) return '';
    const cell = decodeText(this.bytes.subarray(this.from[index]!, this.to[index]!)).trim();
    return this.quoting[index] === 2 ? cell.replaceAll('""', '"') : cell;
  }

  /** @returns the texts of all cells */
  texts(): string[] {
    return Array.from({ length: this.count }, (_, index) => this.text(index));
  }

  /**
   * Whether a cell holds blanks only.
   * @param index cell counted from 0
   */
  isBlank(index: number): boolean {
    for (let at = this.from[index]!; at < this.to[index]!; at++) {
      const byte = this.bytes[at]!;
      if (byte !== 0x20 && byte !== 0x09 && byte !== CR) return false;
    }
    return true;
  }

  /** Whether every cell from the given one on is blank. */
  isBlankFrom(first: number): boolean {
    for (let index = first; index < this.count; index++) if (!this.isBlank(index)) return false;
    return true;
  }

  #bareCell(at: number, end: number, marks: { delimiter: number; rowEnd: number }): number {
    const { bytes } = this;
    let stop = at;
    while (stop < end && bytes[stop] !== marks.delimiter && bytes[stop] !== marks.rowEnd) stop++;
    if (stop >= end) return -1;
    const cr = bytes[stop] === marks.rowEnd && stop > at && bytes[stop - 1] === CR;
    this.#add(at, cr ? stop - 1 : stop, 0);
    return stop;
  }

  #quotedCell(at: number, end: number): number {
    const { bytes } = this;
    let stop = at + 1;
    let doubled = false;
    for (;;) {
      while (stop < end && bytes[stop] !== QUOTE) stop++;
      // the byte after a quotation mark decides whether it closes
      if (stop + 1 >= end) return -1;
      if (bytes[stop + 1] !== QUOTE) break;
      doubled = true;
      stop += 2;
    }
    this.#add(at + 1, stop, doubled ? 2 : 1);
    return stop + 1;
  }

  /** Where the delimiter or row end behind a cell stands. */
  #afterCell(stop: number, end: number, marks: { delimiter: number; rowEnd: number }): number {
    const { bytes } = this;
    let at = stop;
    while (at < end && bytes[at] !== marks.delimiter && bytes[at] !== marks.rowEnd) {
      const blank = bytes[at] === 0x20 || (bytes[at] === CR && bytes[at + 1] === marks.rowEnd);
      if (!blank && this.badQuote === 0) this.badQuote = this.count;
      at++;
    }
    return at < end ? at : -1;
  }

  #add(from: number, to: number, quoting: number): void {
    this.from[this.count] = from;
    this.to[this.count] = to;
    this.quoting[this.count] = quoting;
    this.count++;
  }
}

/**
 * Bytes as text: UTF-8, or Windows-1252 where they are not.
 * @param bytes a cell or a row
 */
export function decodeText(bytes: Uint8Array): string {
  try {
    return utf8.decode(bytes);
  } catch {
    return western.decode(bytes);
  }
}
