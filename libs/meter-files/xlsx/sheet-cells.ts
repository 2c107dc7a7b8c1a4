import { InputProblem, type Problem } from '#libs/engine/index.js';
import type { CellText } from '../sheet/cell-text.js';
import { quotedCell } from '../sheet/sheet-text.js';
import { type DateStyle, serialText } from './serial-text.js';

/** What cells refer to. */
export interface CellContext {
  strings: readonly string[];
  styles: readonly (DateStyle | null)[];
  since1904: boolean;
}

/** A cell as it stands in the sheet. */
export interface SheetCell {
  /** counted from 1 */
  row: number;
  column: number;
  /** how the value is stored: n, s, str, inlineStr, b, e, d */
  type: string;
  style: number;
  value: string;
  formula: boolean;
}

const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d{1,4})?$/i;
const UNCALCULATED = 'a formula without a stored value';

/** Writes cells as text; remembers the first formula that was never calculated. */
export class SheetCells {
  uncalculated: Problem | null = null;
  readonly #context: CellContext;
  readonly #path: string;
  readonly #written: CellText;

  /**
   * @param context what cells refer to
   * @param written how values are written
   * @param path the sheet, for refusals
   */
  constructor(context: CellContext, written: CellText, path: string) {
    this.#context = context;
    this.#written = written;
    this.#path = path;
  }

  /**
   * The text of a cell (ECMA-376 part 1, 18.3.1.4 and 18.18.11).
   * @param cell as it stands in the sheet
   * @returns delimited text, quoted where it is a text of its own
   * @throws InputProblem where the value is not of its kind
   */
  text(cell: SheetCell): string {
    switch (cell.type) {
      case 's':
        return this.#written.text(this.#shared(cell));
      case 'str':
      case 'inlineStr':
        return this.#written.text(cell.value);
      case 'b':
        return cell.value === '1' || cell.value === 'true' ? 'true' : cell.value === '' ? '' : 'false';
      case 'e':
      case 'd':
        return quotedCell(cell.value);
      case 'n':
        return this.#numeric(cell);
      default:
        return this.#refuse(cell, 'a value of a known kind', cell.type);
    }
  }

  #shared(cell: SheetCell): string {
    const index = /^\d{1,9}$/.test(cell.value) ? Number(cell.value) : -1;
    const text = this.#context.strings[index];
    return text ?? this.#refuse(cell, 'one of the texts that cells share', cell.value);
  }

  #numeric(cell: SheetCell): string {
    const text = cell.value.trim();
    if (text === '') return cell.formula ? this.#uncalculated(cell) : '';
    const value = NUMBER.test(text) ? Number(text) : Number.NaN;
    if (!Number.isFinite(value)) return this.#refuse(cell, 'a number, as the kind of the cell says', text);
    const style = this.#context.styles[cell.style] ?? null;
    if (style !== null) return serialText(value, style, this.#context.since1904);
    return this.#written.number(value);
  }

  #uncalculated({ row, column }: SheetCell): string {
    this.uncalculated ??= {
      code: 'missing',
      path: this.#path,
      row,
      column,
      expected: 'the stored value of a formula; calculate and save the workbook once more',
      found: 'none',
    };
    return quotedCell(UNCALCULATED);
  }

  #refuse({ row, column }: SheetCell, expected: string, text: string): never {
    const found = JSON.stringify(text.slice(0, 60));
    throw new InputProblem([{ code: 'unreadable', path: this.#path, row, column, expected, found }]);
  }
}
