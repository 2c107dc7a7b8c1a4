import { type NumberCell, readNumberText } from '../csv/number-cell.js';
import { marklessNumber, plainDecimal } from './plain-decimal.js';
import { quotedCell } from './sheet-text.js';

/** A number stored as text, with a mark that nothing beside it explains: the rows have to be written without marks. */
export class TypedNumber extends Error {}

/** No number that a person types is longer. */
const LONGEST_NUMBER = 64;

/**
 * Writes values as cells of delimited text. Numbers have a decimal point; where a text turns up that is a number with a mark
 * of its own, such as "1,234", all are written without a mark, so that the mark of texts is settled, or asked, by texts alone.
 */
export class CellText {
  readonly #markless: boolean;
  readonly #cell: NumberCell = { form: 'missing', value: 0 };

  constructor(markless: boolean) {
    this.#markless = markless;
  }

  /** @param value finite */
  number(value: number): string {
    return this.#markless ? marklessNumber(value) : plainDecimal(value);
  }

  /**
   * @param text any
   * @throws TypedNumber where the rows have to be written without marks
   */
  text(text: string): string {
    if (!this.#markless && text.length <= LONGEST_NUMBER && /\d/.test(text)) {
      readNumberText(text, this.#cell);
      const { form } = this.#cell;
      if (form !== 'plain' && form !== 'wrong' && form !== 'missing') throw new TypedNumber();
    }
    return quotedCell(text);
  }
}

/**
 * Writes rows with marks, and once more without where texts of numbers turn up.
 * @param read takes the rows, written as it is told
 */
export async function withCellText<T>(read: (cells: CellText, markless: boolean) => Promise<T>): Promise<T> {
  try {
    return await read(new CellText(false), false);
  } catch (error) {
    if (!(error instanceof TypedNumber)) throw error;
    return read(new CellText(true), true);
  }
}
