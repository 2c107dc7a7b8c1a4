import { InputProblem } from '#libs/engine/index.js';
import type { MeterBytes } from '../meter-bytes.js';

/** A row longer than this is no row of a meter file [bytes]. */
export const LONGEST_ROW_BYTES = 1_048_576;

const FIRST_BYTES = 98_304;

/**
 * The part of a file that is being read: `bytes` from `start` to `end`. Reused from chunk to chunk; what has been read is
 * dropped when more is asked for. The last row always ends with a row end, as if the file had one there.
 */
export class RowBuffer {
  bytes = new Uint8Array(FIRST_BYTES);
  /** the same bytes, several at a time */
  view = new DataView(this.bytes.buffer);
  start = 0;
  end = 0;
  /** rows that lie before `start` */
  rowsBefore = 0;
  /** the byte that ends a row: LF, or CR in a file that has no LF near its beginning */
  readonly rowEnd: number;
  readonly #source: MeterBytes;
  #ended = false;
  #gotBytes = 0;

  constructor(source: MeterBytes) {
    this.#source = source;
    this.rowEnd = !source.head.includes(0x0a) && source.head.includes(0x0d) ? 0x0d : 0x0a;
  }

  get ended(): boolean {
    return this.#ended;
  }

  /** Bytes of the file that lie before `start`. */
  get takenBytes(): number {
    return this.#gotBytes - (this.end - this.start);
  }

  /**
   * Adds the next chunk.
   * @returns false where the file has no more
   * @throws InputProblem where a single row outgrows every meter file
   */
  async more(): Promise<boolean> {
    if (this.#ended) return false;
    const chunk = await this.#source.next();
    if (chunk === null) {
      this.#ended = true;
      if (this.end === this.start || this.bytes[this.end - 1] === this.rowEnd) return false;
      this.#append(Uint8Array.of(this.rowEnd));
      return true;
    }
    this.#append(chunk);
    return true;
  }

  /** Refuses a row that has not ended within the longest length there is. */
  refuseEndlessRow(): void {
    if (this.end - this.start <= LONGEST_ROW_BYTES) return;
    throw new InputProblem([
      {
        code: 'too-large',
        row: this.rowsBefore + 1,
        expected: `a row of at most ${LONGEST_ROW_BYTES} bytes`,
        found: 'a longer one, or a quotation mark that is never closed',
      },
    ]);
  }

  /** Refuses a last row that has grown longer than a row can be, before anything is looked for in it. */
  refuseEndlessTail(): void {
    const from = Math.max(this.start, this.bytes.lastIndexOf(this.rowEnd, this.end - 1) + 1);
    if (this.end - from <= LONGEST_ROW_BYTES) return;
    let row = this.rowsBefore + 1;
    for (let at = this.start; at < from; at++) if (this.bytes[at] === this.rowEnd) row++;
    const expected = `a row of at most ${LONGEST_ROW_BYTES} bytes`;
    throw new InputProblem([{ code: 'too-large', row, expected, found: 'a longer one' }]);
  }

  #append(chunk: Uint8Array): void {
    const kept = this.end - this.start;
    this.#gotBytes += chunk.length;
    if (kept + chunk.length > this.bytes.length) {
      const larger = new Uint8Array(Math.max(2 * this.bytes.length, kept + chunk.length));
      larger.set(this.bytes.subarray(this.start, this.end));
      this.bytes = larger;
      this.view = new DataView(larger.buffer);
    } else if (this.start > 0) {
      this.bytes.copyWithin(0, this.start, this.end);
    }
    this.bytes.set(chunk, kept);
    this.start = 0;
    this.end = kept + chunk.length;
  }
}
