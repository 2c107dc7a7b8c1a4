import { InputProblem } from '#libs/engine/index.js';
import { LONGEST_ROW_BYTES } from '../csv/row-buffer.js';

const CHUNK_CHARACTERS = 65_536;
const NEEDS_BLANK = /[\r\n\0]+/g;

/**
 * Rows of cells as comma-delimited text. Every row stands on the line of its own number and is as wide as the widest before
 * it, so that rows and columns of the text are those of the sheet and an empty cell at the end is an empty cell.
 */
export class SheetText {
  readonly #encoder = new TextEncoder();
  #text = '';
  #width = 0;
  #row = 0;

  /** the row written last, counted from 1 */
  get row(): number {
    return this.#row;
  }

  /**
   * Writes a row, and blank lines for those that were left out before it.
   * @param row its number, above the one before
   * @param cells as they are to stand in the text, quoted where they have to be; missing ones are empty
   */
  add(row: number, cells: readonly (string | undefined)[]): void {
    this.#text += '\n'.repeat(row - this.#row - 1);
    this.#row = row;
    this.#width = Math.max(this.#width, cells.length);
    let line = cells[0] ?? '';
    for (let column = 1; column < this.#width; column++) line += `,${cells[column] ?? ''}`;
    if (line.length > LONGEST_ROW_BYTES) {
      const expected = `a row of at most ${LONGEST_ROW_BYTES} bytes`;
      throw new InputProblem([{ code: 'too-large', row, expected, found: 'a longer one' }]);
    }
    this.#text += `${line}\n`;
  }

  /** Enough for a chunk. */
  get full(): boolean {
    return this.#text.length >= CHUNK_CHARACTERS;
  }

  /** What was written since it was asked for the last time. */
  take(): Uint8Array {
    const bytes = this.#encoder.encode(this.#text);
    this.#text = '';
    return bytes;
  }
}

/**
 * A text as a quoted cell on one line.
 * @param text any
 */
export function quotedCell(text: string): string {
  if (text === '') return '';
  return `"${text.replace(NEEDS_BLANK, ' ').replaceAll('"', '""')}"`;
}
