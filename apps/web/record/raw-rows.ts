/** Rows of a meter file as they stand in it. */
export interface RawRows {
  first: string[];
  last: string[];
}

const BYTES = 6000;
const FIRST = 7;
const LAST = 4;
/** A line longer than this is cut for show. */
const LONGEST = 160;

const keyOf = (recordId: string) => `varwright:rows:${recordId}`;

/**
 * The first and last rows of a file, without reading what lies between.
 * @returns null where the file is no text
 */
export async function rowsAtEnds(file: Blob): Promise<RawRows | null> {
  const head = await textOf(file.slice(0, BYTES));
  const tail = await textOf(file.slice(Math.max(0, file.size - BYTES)));
  if (head === null || tail === null) return null;
  const isWhole = file.size <= BYTES;
  const after = linesOf(tail).slice(isWhole ? 0 : 1);
  return { first: linesOf(head).slice(0, FIRST), last: after.slice(-LAST) };
}

/** Keeps the rows in this browser, beside the record they became. */
export function keepRawRows(recordId: string, rows: RawRows | null): void {
  try {
    if (rows !== null) localStorage.setItem(keyOf(recordId), JSON.stringify(rows));
  } catch {}
}

/** @returns the rows of the file a record was read from; null where this browser did not send it */
export function keptRawRows(recordId: string): RawRows | null {
  try {
    return JSON.parse(localStorage.getItem(keyOf(recordId)) ?? 'null') as RawRows | null;
  } catch {
    return null;
  }
}

async function textOf(part: Blob): Promise<string | null> {
  const bytes = new Uint8Array(await part.arrayBuffer());
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes);
  return bytes.includes(0) ? null : new TextDecoder().decode(bytes);
}

function linesOf(text: string): string[] {
  return text
    .split(/\r\n|\n|\r/)
    .filter((line) => line.trim() !== '')
    .map((line) => (line.length > LONGEST ? `${line.slice(0, LONGEST)} …` : line));
}
