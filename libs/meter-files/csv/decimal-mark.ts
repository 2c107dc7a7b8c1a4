import { RowSet } from '../row-set.js';
import type { NumberForm } from './number-cell.js';

const COMMA = 0x2c;

/** More columns than this are never read from one file. */
export const KEPT_COLUMNS = 128;

export type DecimalSign = '.' | ',';

/** Where a number stands in the file, and the row and column of the values it is kept in. */
export interface DecimalPlace {
  quoted: boolean;
  row: number;
  index: number;
  k: number;
}

/** Places of numbers whose mark is open: rows of each column of the rows' values. */
export class OpenNumbers {
  readonly rows: (RowSet | undefined)[] = [];
  count = 0;

  add({ index, k }: { index: number; k: number }): void {
    this.rows[k] ??= new RowSet();
    this.rows[k].add(index);
    this.count++;
  }
}

/**
 * The decimal mark of a file: given, or settled by the first number that can be written in one way only.
 * Until then numbers such as 1,234 are kept as open; a file in which every number is open has to be asked about.
 * In a comma-delimited file a bare dot is the decimal mark, since a decimal comma could not stand there unquoted.
 */
export class DecimalMark {
  sign: DecimalSign | null;
  /** row that settled the sign, 0 where it was given or is not settled */
  settledAtRow = 0;
  /** open numbers read before the sign was settled */
  readonly openDots = new OpenNumbers();
  readonly openCommas = new OpenNumbers();
  readonly #bareDotSettles: boolean;

  constructor(given: DecimalSign | undefined, delimiter: number) {
    this.sign = given ?? null;
    this.#bareDotSettles = delimiter === COMMA;
  }

  /**
   * The number a cell stands for.
   * @param cell what was read, an open mark taken as decimal mark
   * @param place whether the cell is quoted, its row in the file, and where the number is kept
   * @returns the number; NaN where it contradicts the sign that was settled
   */
  numberOf(cell: { form: NumberForm; value: number }, place: DecimalPlace): number {
    const { form, value } = cell;
    if (form === 'plain' || form === 'missing') return value;
    if (form === 'openDot' && !(this.#bareDotSettles && !place.quoted)) return this.#openNumber('.', value, place);
    if (form === 'openComma') return this.#openNumber(',', value, place);
    return this.#settles(form === 'comma' ? ',' : '.', place.row) ? value : Number.NaN;
  }

  #settles(sign: DecimalSign, row: number): boolean {
    if (this.sign === null) {
      this.sign = sign;
      this.settledAtRow = row;
    }
    return this.sign === sign;
  }

  #openNumber(mark: DecimalSign, value: number, place: DecimalPlace): number {
    if (this.sign === null) (mark === '.' ? this.openDots : this.openCommas).add(place);
    else if (this.sign !== mark) return thousands(value);
    return value;
  }
}

/**
 * An open number with its mark dividing thousands: 1,234 as 1234.
 * @param value the number with the mark taken as decimal mark
 */
export function thousands(value: number): number {
  return Math.round(value * 1000);
}
