import { MeterBytes } from './meter-bytes.js';

/** The header stands among so many rows or is not looked for. */
const MOST_ROWS = 200;
const SEPARATORS = /[,;\t|]/g;

/**
 * The rows that name the columns of a delimited file: two exports of one meter have the same, whatever they hold.
 * It is the last row above the data, and the one above it where that has as many cells (names above units).
 * @param source the file, or its beginning
 * @returns the text without differences of letter case and spaces; null where no header shows
 */
export async function headerText(source: AsyncIterable<Uint8Array>): Promise<string | null> {
  const bytes = await MeterBytes.open(source);
  try {
    return headerOf(bytes.head);
  } finally {
    await bytes.close();
  }
}

function headerOf(head: Uint8Array): string | null {
  if (head.includes(0)) return null;
  const rows = new TextDecoder('latin1')
    .decode(head)
    .split(/\r\n|[\r\n]/, MOST_ROWS)
    .map((row) => row.trim())
    .filter((row) => row !== '');
  const first = rows.findIndex(isData);
  const last = first < 1 ? undefined : rows[first - 1]!;
  if (last === undefined || cellsOf(last) < 2) return null;
  const above = rows[first - 2];
  const names = above !== undefined && cellsOf(above) === cellsOf(last) ? [above, last] : [last];
  return names.map((row) => row.toLowerCase().replace(/\s+/g, ' ')).join('\n');
}

/** A row of readings holds more digits than letters: a date, a time, numbers. */
function isData(row: string): boolean {
  const digits = row.match(/\d/g)?.length ?? 0;
  const letters = row.match(/\p{L}/gu)?.length ?? 0;
  return digits > letters && cellsOf(row) >= 2;
}

function cellsOf(row: string): number {
  return (row.match(SEPARATORS)?.length ?? 0) + 1;
}
