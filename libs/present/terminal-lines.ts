/**
 * A table of plain text, every column as wide as its widest cell.
 * @param head names of the columns
 * @param rows cells, as many a row as there are names
 */
export function tableLines(head: readonly string[], rows: readonly string[][]): string[] {
  const widths = head.map((text, at) => Math.max(text.length, ...rows.map((cells) => cells[at]!.length)));
  return [head, ...rows].map((cells) => cells.map((cell, at) => cell.padStart(widths[at]!)).join('  '));
}

/**
 * Lines as one text that ends with a line end.
 * @param lines without line ends
 */
export function finished(lines: readonly string[]): string {
  return `${lines.join('\n').trimEnd()}\n`;
}
