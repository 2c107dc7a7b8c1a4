import { InputProblem, type ProblemCode } from '#libs/engine/index.js';
import { SheetText } from '../sheet/sheet-text.js';
import { LONGEST_CELL } from './shared-strings.js';
import type { SheetCell, SheetCells } from './sheet-cells.js';
import type { XmlListener } from './xml-part.js';

/** A sheet has no more rows and columns (ECMA-376 part 1, annex on limits: XFD1048576). */
const MOST_ROWS = 1_048_576;
const MOST_COLUMNS = 16_384;
const REFERENCE = /^\$?([A-Z]{1,3})\$?(\d{1,7})$/;

/** Takes the rows of a sheet (ECMA-376 part 1, 18.3.1.80) and writes them as delimited text, one line a row. */
export class SheetRows implements XmlListener {
  readonly written = new SheetText();
  readonly #cells: SheetCells;
  readonly #path: string;
  #row = 0;
  #line: string[] = [];
  #cell: SheetCell = { row: 0, column: 0, type: 'n', style: 0, value: '', formula: false };
  #takes = false;
  #phonetic = false;

  constructor(cells: SheetCells, path: string) {
    this.#cells = cells;
    this.#path = path;
  }

  opened(name: string, attributes: Readonly<Record<string, string>>): void {
    switch (name) {
      case 'row':
        this.#openRow(attributes.r);
        break;
      case 'c':
        this.#openCell(attributes);
        break;
      case 'v':
        this.#takes = true;
        break;
      case 'f':
        this.#cell.formula = true;
        break;
      case 'rPh':
        this.#phonetic = true;
        break;
      case 't':
        this.#takes = !this.#phonetic;
        break;
    }
  }

  text(text: string): void {
    if (!this.#takes) return;
    this.#cell.value += text;
    if (this.#cell.value.length > LONGEST_CELL) this.#refuse('too-large', `${LONGEST_CELL} characters`, 'more');
  }

  closed(name: string): void {
    switch (name) {
      case 'v':
      case 't':
        this.#takes = false;
        break;
      case 'rPh':
        this.#phonetic = false;
        break;
      case 'c':
        this.#closeCell();
        break;
      case 'row':
        this.#closeRow();
        break;
    }
  }

  #openRow(reference: string | undefined): void {
    const row = reference === undefined ? this.#row + 1 : Number(reference);
    if (!Number.isInteger(row) || row <= this.#row || row > MOST_ROWS) {
      const expected = `a row above ${this.#row} and at most ${MOST_ROWS}`;
      const found = JSON.stringify((reference ?? String(row)).slice(0, 20));
      throw new InputProblem([{ code: 'unreadable', path: this.#path, row: this.#row + 1, expected, found }]);
    }
    this.#row = row;
    this.#line = [];
    this.#cell.column = 0;
  }

  #openCell({ r, t, s }: Readonly<Record<string, string>>): void {
    const before = this.#cell.column;
    const style = s === undefined ? 0 : Number(s);
    this.#cell = { row: this.#row, column: before + 1, type: t ?? 'n', style, value: '', formula: false };
    if (r !== undefined) this.#cell.column = this.#columnOf(r);
    const { column } = this.#cell;
    if (column > before && column <= MOST_COLUMNS) return;
    this.#refuse('unreadable', `a column above ${before} and at most ${MOST_COLUMNS}`, r ?? String(column));
  }

  #columnOf(reference: string): number {
    const parts = REFERENCE.exec(reference);
    if (parts === null || Number(parts[2]) !== this.#row) {
      this.#refuse('unreadable', `a cell of row ${this.#row}`, reference.slice(0, 20));
    }
    let column = 0;
    for (const letter of parts[1]!) column = column * 26 + letter.charCodeAt(0) - 64;
    return column;
  }

  #closeCell(): void {
    const text = this.#cells.text(this.#cell);
    if (text !== '') this.#line[this.#cell.column - 1] = text;
  }

  #closeRow(): void {
    this.written.add(this.#row, this.#line);
  }

  #refuse(code: ProblemCode, expected: string, found: string): never {
    const { row, column } = this.#cell;
    throw new InputProblem([
      { code, path: this.#path, row, column, expected: code === 'too-large' ? `at most ${expected}` : expected, found },
    ]);
  }
}
