import type { MeterMap, QualityMeaning } from '#libs/contract/meter-map.js';
import { InputProblem } from '#libs/engine/index.js';
import { RowSet } from '../row-set.js';
import { meaningOf } from './quality-codes.js';
import type { RowCells } from './row-cells.js';

/** More codes than this are no codes. */
const MOST_CODES = 64;

/** What the quality columns of a file say, row by row. */
export class RowQualities {
  /** codes as they first stood in the file; rows that have none are not counted */
  readonly codes: string[] = [];
  readonly #columns: readonly number[];
  /** rows of each code, as indexes of the reader's rows */
  readonly #rows: RowSet[] = [];
  readonly #known = new Map<string, number>();

  constructor(columns: readonly number[]) {
    this.#columns = columns;
  }

  /**
   * Takes the qualities of a row.
   * @param cells the row
   * @param index its index among the rows that are read
   * @param rowNumber row of the file, for a refusal
   */
  take(cells: RowCells, index: number, rowNumber: number): void {
    for (const column of this.#columns) {
      const text = cells.text(column);
      if (text === '') continue;
      this.#rows[this.#codeOf(text, rowNumber, column)]!.add(index);
    }
  }

  /**
   * Rows by what their quality means; a row with several qualities has the worst.
   * @param said what a map or an answer says of codes
   */
  byMeaning(said: Readonly<Record<string, QualityMeaning>>): {
    missing: RowSet;
    estimated: RowSet;
    unknown: { codes: string[]; rows: number };
  } {
    const missing = new RowSet();
    const estimated = new RowSet();
    const unknown = { codes: [] as string[], rows: 0 };
    for (const [k, code] of this.codes.entries()) {
      const meaning = saidOf(said, code) ?? meaningOf(code);
      if (meaning === null) {
        unknown.codes.push(code);
        unknown.rows += this.#rows[k]!.size;
      }
      const rows = meaning === 'missing' ? missing : meaning === 'estimated' ? estimated : null;
      if (rows !== null) for (const index of this.#rows[k]!) rows.add(index);
    }
    for (const index of missing) estimated.delete(index);
    return { missing, estimated, unknown };
  }

  /**
   * What the codes can mean: what the map says, and every meaning of those that files use differently.
   * @param map what a person says
   */
  readings({ quality = {} }: MeterMap): Record<string, QualityMeaning>[] {
    const open = this.codes.filter((code) => saidOf(quality, code) === undefined && meaningOf(code) === 'ambiguous');
    if (open.length === 0) return [quality];
    const all = (meaning: QualityMeaning) => ({
      ...quality,
      ...Object.fromEntries(open.map((code) => [code, meaning])),
    });
    return [all('measured'), all('missing')];
  }

  #codeOf(text: string, row: number, column: number): number {
    const known = this.#known.get(text);
    if (known !== undefined) return known;
    if (this.codes.length >= MOST_CODES) {
      const expected = `at most ${MOST_CODES} different qualities`;
      throw new InputProblem([{ code: 'unreadable', row, column: column + 1, expected, found: 'more' }]);
    }
    this.#known.set(text, this.codes.length);
    this.#rows.push(new RowSet());
    return this.codes.push(text) - 1;
  }
}

function saidOf(said: Readonly<Record<string, QualityMeaning>>, code: string): QualityMeaning | undefined {
  const lower = code.toLowerCase();
  const key = Object.keys(said).find((name) => name.toLowerCase() === lower);
  return key === undefined ? undefined : said[key];
}
