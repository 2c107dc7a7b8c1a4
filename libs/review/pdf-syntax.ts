/** Where an object of a PDF stands, by its number. */
export type CrossReferences = Map<number, { offset: number; isFree: boolean }>;

/** A classic cross-reference section with its trailer. */
export interface FileSection {
  references: CrossReferences;
  /** keys of the trailer without their slash, values as text */
  trailer: Map<string, string>;
}

const EOL = /\r\n|\r|\n/;

/**
 * Bytes as text of the same length, one character a byte.
 * @param bytes of a file
 */
export function byteText(bytes: Uint8Array): string {
  let text = '';
  for (let from = 0; from < bytes.length; from += 8192) {
    text += String.fromCharCode(...bytes.subarray(from, from + 8192));
  }
  return text;
}

/**
 * Reads the cross-reference table and the trailer that begin at an offset.
 * @param text of the file, one character a byte
 * @param offset of the word `xref`
 * @returns null where no classic table stands there
 */
export function readSection(text: string, offset: number): FileSection | null {
  if (!/^xref\s/.test(text.slice(offset, offset + 5))) return null;
  const end = text.indexOf('trailer', offset);
  if (end < 0) return null;
  const references = readReferences(
    text
      .slice(offset + 4, end)
      .trim()
      .split(EOL),
  );
  const trailer = readDictionary(text, end + 'trailer'.length);
  return references === null || trailer === null ? null : { references, trailer };
}

function readReferences(lines: string[]): CrossReferences | null {
  const references: CrossReferences = new Map();
  for (let at = 0; at < lines.length; ) {
    const head = /^(\d+) (\d+)\s*$/.exec(lines[at]!);
    if (head === null) return null;
    const [first, count] = [Number(head[1]), Number(head[2])];
    if (count > lines.length - at - 1) return null;
    for (let i = 0; i < count; i++) {
      const entry = /^(\d{10}) \d{5} ([nf])\s*$/.exec(lines[at + 1 + i]!);
      if (entry === null) return null;
      references.set(first + i, { offset: Number(entry[1]), isFree: entry[2] === 'f' });
    }
    at += 1 + count;
  }
  return references;
}

/**
 * The dictionary of an object.
 * @param text of the file, one character a byte
 * @param number of the object
 * @param offset where it begins
 * @returns its keys without their slash, each value as text with single blanks; null where another object stands there,
 * or one that is no plain dictionary
 */
export function readObject(text: string, number: number, offset: number): Map<string, string> | null {
  const head = new RegExp(`^${number} 0 obj\\s`).exec(text.slice(offset, offset + 40));
  return head === null ? null : readDictionary(text, offset + head[0].length, 'endobj');
}

const TOKEN = /\s*(<<|>>|\[|\]|\/[^\s<>[\]()/%]*|\((?:\\[\s\S]|[^\\()])*\)|<[0-9A-Fa-f\s]*>|[^\s<>[\]()/%]+)/y;

/** Reads `<< … >>`; `after` is the word that must follow. */
function readDictionary(text: string, from: number, after?: string): Map<string, string> | null {
  const tokens = new RegExp(TOKEN);
  tokens.lastIndex = from;
  const next = () => tokens.exec(text)?.[1];
  if (next() !== '<<') return null;
  const inside = tokensInside(next);
  if (inside === null) return null;
  return after === undefined || next() === after ? keysAndValues(inside) : null;
}

/** A word and how deep it stands, the outermost level being 1. */
type Placed = { token: string; depth: number };

const DEEPER: Record<string, number> = { '<<': 1, '[': 1, '>>': -1, ']': -1 };

/** The words up to the end of what was opened; null where the text ends before. */
function tokensInside(next: () => string | undefined): Placed[] | null {
  const found: Placed[] = [];
  for (let depth = 1; ; ) {
    const token = next();
    if (token === undefined) return null;
    depth += DEEPER[token] ?? 0;
    if (depth === 0) return found;
    found.push({ token, depth });
  }
}

function keysAndValues(tokens: readonly Placed[]): Map<string, string> {
  const found = new Map<string, string>();
  let key: string | null = null;
  let value: string[] = [];
  for (const { token, depth } of tokens) {
    // On the outermost level a name is a key, unless it is the first word after one.
    const isKey = depth === 1 && token.startsWith('/') && (key === null || value.length > 0);
    if (!isKey) {
      value.push(token);
      continue;
    }
    if (key !== null) found.set(key, value.join(' '));
    [key, value] = [token.slice(1), []];
  }
  if (key !== null) found.set(key, value.join(' '));
  return found;
}
