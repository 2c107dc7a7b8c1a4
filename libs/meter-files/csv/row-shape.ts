import type { Problem } from '#libs/engine/index.js';
import type { RowCells } from './row-cells.js';

const TOTAL =
  /^(?:grand )?(?:total|totals|sum|summe|gesamt|gesamtsumme|somme|suma|mean|average|mittelwert|moyenne|promedio|max|maximum|min|minimum)\b/i;

/** Rows that were read but hold no interval. */
export interface SkippedRows {
  count: number;
  /** row of the first of them, 0 where there is none */
  first: number;
}

/**
 * Counts a row among those that hold no interval.
 * @param skipped the count
 * @param row counted from 1
 */
export function skip(skipped: SkippedRows, row: number): true {
  skipped.count++;
  if (skipped.count === 1) skipped.first = row;
  return true;
}

/**
 * Whether a row repeats the header; names of the layout may have a unit of a second header row behind them.
 * @param texts the row
 * @param names of the columns
 */
export function isHeaderRow(texts: readonly string[], names: readonly string[]): boolean {
  return texts.every((text, index) => {
    const name = names[index] ?? '';
    return text === name || (text !== '' && name.startsWith(`${text} [`));
  });
}

/**
 * Whether a row holds totals: the word for it stands in place of a stamp.
 * @param texts the row
 * @param stamp column of the stamp
 */
export function isTotalRow(texts: readonly string[], stamp: number): boolean {
  const first = texts.findIndex((text) => text !== '');
  return (first === stamp || texts[stamp] === '') && TOTAL.test(texts[first] ?? '');
}

/**
 * What is wrong with a row as a row of its header.
 * @param cells the row
 * @param names of the columns
 * @param row counted from 1
 */
export function shapeProblem(cells: RowCells, names: readonly string[], row: number): Problem | null {
  if (cells.badQuote > 0) {
    const expected = 'the end of the cell behind its closing quotation mark';
    return { code: 'unreadable', row, column: cells.badQuote, expected, found: 'more text' };
  }
  const short = cells.count < names.length && names.slice(cells.count).some((name) => name !== '');
  const long = cells.count > names.length && !cells.isBlankFrom(names.length);
  if (!short && !long) return null;
  const column = Math.min(cells.count, names.length) + 1;
  return { code: 'wrong-length', row, column, expected: `${names.length} cells`, found: `${cells.count}` };
}
