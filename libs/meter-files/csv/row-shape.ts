import type { Problem } from '#libs/engine/index.js';
import type { RowCells } from './row-cells.js';

const TOTAL =
  /^(?:grand )?(?:total|totals|totaal|totale|totaux|sum|summe|gesamt|gesamtsumme|somme|somma|suma|soma|razem|toplam|mean|average|avg|mittelwert|moyenne|promedio|media|gemiddelde|max|maximum|maximo|massimo|min|minimum|minimo)\b/i;
const LONGEST_TEXT = 300;
/** Words before any digit; names of months and days may begin a stamp that was cut off. */
const TEXT = /^[^\d\p{L}]*(?!jan|feb|mar|apr|may|mai|jun|jul|aug|sep|oct|okt|nov|dec|dez)\p{L}[^\d]*\p{L}{3}/iu;

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
 * Whether a row is a line of text among the data, such as the end of a report: one cell, and words in it.
 * @param texts the row
 */
export function isTextRow(texts: readonly string[]): boolean {
  const said = texts.filter((text) => text !== '');
  if (said.length !== 1 || said[0]!.length > LONGEST_TEXT) return false;
  return TEXT.test(said[0]!.normalize('NFD').replace(/\p{M}/gu, ''));
}

/**
 * Whether a number sums up a column: its sum, its mean, its greatest or its least value as far as decimals allow.
 * @param text the number as it is written
 * @param value the number
 * @param values of the column
 */
export function sumsUp(text: string, value: number, values: Float64Array): boolean {
  let [sum, count, most, least] = [0, 0, Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  for (const one of values) {
    if (Number.isNaN(one)) continue;
    sum += one;
    count++;
    most = Math.max(most, one);
    least = Math.min(least, one);
  }
  if (count < 2) return false;
  const rounded = 0.5 * 10 ** -(/[.,](\d+)\D*$/.exec(text)?.[1]?.length ?? 0);
  return [sum, sum / count, most, least].some((one) => Math.abs(value - one) <= rounded + 1e-9 * Math.abs(one));
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
