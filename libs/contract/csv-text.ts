/** A value of a table that goes out: numbers bare, texts as they are, nothing where there is none. */
export type TableCell = number | string | boolean | null;

/** A spreadsheet takes a text that begins so for a formula; the mark before it is taken off again on the way in. */
const FORMULA = /^['=+\-@\t\r]/;
const QUOTED = /[",\r\n]|^\s|\s$/;

/**
 * Rows as comma-separated text (RFC 4180), each with its line end. Numbers stand bare, in the fewest digits that give them
 * back; a text that a spreadsheet would run has an apostrophe before it.
 * @param rows cells
 */
export function csvText(rows: Iterable<readonly TableCell[]>): string {
  let text = '';
  for (const row of rows) text += csvLine(row);
  return text;
}

/**
 * One row of comma-separated text.
 * @param row cells
 * @returns the line with its end
 */
export function csvLine(row: readonly TableCell[]): string {
  return `${row.map(csvCell).join(',')}\n`;
}

function csvCell(value: TableCell): string {
  if (value === null) return '';
  if (typeof value !== 'string') return String(value);
  const kept = guarded(value);
  return QUOTED.test(kept) ? `"${kept.replaceAll('"', '""')}"` : kept;
}

/**
 * A text that no spreadsheet runs.
 * @param text any
 * @returns the text, an apostrophe before it where it begins as a formula or with an apostrophe
 */
export function guarded(text: string): string {
  return FORMULA.test(text) ? `'${text}` : text;
}

/**
 * The text as it was before it was guarded.
 * @param text a cell
 */
export function unguarded(text: string): string {
  return text.startsWith("'") ? text.slice(1) : text;
}

/**
 * Rows of comma-separated text.
 * @param text as `csvText` writes it, line ends of any kind
 * @returns cells as texts, still guarded; null where a quote is never closed
 */
export function csvRows(text: string): string[][] | null {
  const rows: string[][] = [];
  let row: string[] = [];
  const cell = /"((?:[^"]|"")*)"|([^",\r\n]*)/y;
  let at = 0;
  while (at < text.length) {
    cell.lastIndex = at;
    const found = cell.exec(text)!;
    row.push(found[1] === undefined ? found[2]! : found[1].replaceAll('""', '"'));
    at += found[0].length;
    const next = text[at];
    if (next === ',') {
      at++;
      if (at < text.length) continue;
      row.push('');
    } else if (next !== undefined && next !== '\n' && next !== '\r') return null;
    rows.push(row);
    row = [];
    at += next === '\r' && text[at + 1] === '\n' ? 2 : 1;
  }
  return rows;
}
