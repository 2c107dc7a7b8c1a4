import { RowSet } from '../row-set.js';
import type { ColumnChoice } from './column-choice.js';
import { says, wordsOf } from './header-words.js';
import { type ReadUnit, readUnit } from './unit-text.js';

const TAILED = /^(.*[\d.,])\s*([^\d.,\s][^\d.,]*)$/u;
const LONGEST = 60;

/** A number and what stands behind it. */
interface TailedNumber {
  number: string;
  tail: string;
}

/**
 * A cell such as `12.5 kW` or `0,95 ind.` as its number and what stands behind it.
 * @param text the cell
 * @returns null where nothing stands behind a number
 */
function tailedNumber(text: string): TailedNumber | null {
  const [, number, tail] = (text.length > LONGEST ? null : TAILED.exec(text.replace(/\.$/, ''))) ?? [];
  return number === undefined || tail === undefined ? null : { number, tail: tail.trim() };
}

/**
 * The unit behind the numbers of a column, as the first cell that has one writes it; others are refused in their rows.
 * @param cells first cells of the column
 * @returns null where no number has anything behind it, or the first has what is no unit
 */
export function unitInCells(cells: readonly string[]): string | null {
  const first = cells.map(tailedNumber).find((one) => one !== null);
  return first === undefined || readUnit(first.tail) === null ? null : first.tail;
}

/** Reads what stands behind numbers in their cells: their unit again, and on which side of 1 a power factor lies. */
export class CellTails {
  /** rows whose power factor says lagging or leading, by its column */
  readonly sides = new Map<number, RowSet>();
  readonly #units = new Map<number, ReadUnit[]>();
  readonly #factors = new Set<number>();

  constructor(choices: readonly ColumnChoice[]) {
    for (const { quantity, column, unit } of choices.flatMap(({ columns }) => columns)) {
      if (quantity === 'powerFactor') this.#factors.add(column);
      else this.#units.set(column, [...(this.#units.get(column) ?? []), unit]);
    }
  }

  /**
   * The number in a cell that is none by itself.
   * @param text the cell
   * @param place its column and the index of its row
   * @returns the number's text and whether it leads; null where what stands behind it is not what the column holds
   */
  read(text: string, { column, index }: { column: number; index: number }): { number: string; leads: boolean } | null {
    const tailed = tailedNumber(text);
    if (tailed === null) return null;
    if (this.#factors.has(column)) return this.#factor(tailed, column, index);
    const units = this.#units.get(column);
    const said = readUnit(tailed.tail);
    if (said === null || units === undefined || !units.every((unit) => isSameUnit(unit, said))) return null;
    return { number: tailed.number, leads: false };
  }

  #factor({ number, tail }: TailedNumber, column: number, index: number) {
    const word = tail.replace(/^%\s*/, '');
    if (word === '') return { number, leads: false };
    const words = wordsOf(word);
    const lags = says(words, 'lagging') || word.toLowerCase() === 'i';
    const leads = says(words, 'leading') || word.toLowerCase() === 'c';
    // a sign beside the word would say it twice, or say something else
    if (lags === leads || /^[-+−]/.test(number)) return null;
    const rows = this.sides.get(column) ?? new RowSet();
    rows.add(index);
    this.sides.set(column, rows);
    return { number, leads };
  }
}

function isSameUnit(a: ReadUnit, b: ReadUnit): boolean {
  return a.family === b.family && a.energy === b.energy && a.times === b.times && a.over === b.over;
}
