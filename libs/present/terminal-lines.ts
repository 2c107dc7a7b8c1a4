/**
 * A table of plain text, every column as wide as its widest cell.
 * @param head names of the columns
 * @param rows cells, as many a row as there are names
 */
export function tableLines(head: readonly string[], rows: readonly string[][]): string[] {
  const widths = head.map((text, at) => Math.max(text.length, ...rows.map((cells) => cells[at]!.length)));
  return [head, ...rows].map((cells) => cells.map((cell, at) => cell.padStart(widths[at]!)).join('  '));
}

/** A line of a terminal. */
const LINE_WIDTH = 96;

/**
 * A table of plain text with its columns to the left, every column as wide as its widest cell.
 * @param head names of the columns
 * @param rows cells, as many a row as there are names
 */
export function leftTableLines(head: readonly string[], rows: readonly string[][]): string[] {
  const widths = head.map((text, at) => Math.max(text.length, ...rows.map((cells) => cells[at]!.length)));
  return [head, ...rows].map((cells) =>
    cells
      .map((cell, at) => cell.padEnd(widths[at]!))
      .join('  ')
      .trimEnd(),
  );
}

/**
 * A text in lines of a terminal's width.
 * @param text words parted by blanks
 * @param indent of every line but the first
 */
export function wrapped(text: string, indent: string): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    if (line !== '' && line.length + 1 + word.length > LINE_WIDTH) {
      lines.push(line);
      line = `${indent}${word}`;
    } else line = line === '' ? word : `${line} ${word}`;
  }
  return [...lines, line];
}

/**
 * Lines as one text that ends with a line end.
 * @param lines without line ends
 */
export function finished(lines: readonly string[]): string {
  return `${lines.join('\n').trimEnd()}\n`;
}
