import { byteText, type FileSection, readObject, readSection } from './pdf-syntax.js';

/**
 * What was added to a file after it was frozen. `signed`: one signature or more and what they need, nothing that is
 * seen has changed; `changed`: anything else, also what cannot be told.
 */
export type LaterUpdate = 'signed' | 'changed';

/** Keys a signature brings to the catalogue and to the page it is shown on. */
const ADDED_KEYS: Record<string, readonly string[]> = {
  '/Catalog': ['AcroForm', 'Perms', 'Extensions', 'DSS', 'Version'],
  '/Page': ['Annots'],
};

/** No signed paper has been saved more often than this. */
const MOST_SAVINGS = 50;

/**
 * Judges what follows the frozen bytes of a PDF: savings that each name the one before, and change nothing but what a
 * signature needs (ISO 32000-1, 7.5.6 incremental updates, 12.8 digital signatures). Whether a signature is valid is
 * for a program that knows certificates.
 * @param bytes the whole file
 * @param frozenBytes length of the part that was frozen [bytes]
 */
export function judgeUpdate(bytes: Uint8Array, frozenBytes: number): LaterUpdate {
  const text = byteText(bytes);
  const frozen = frozenPart(text.slice(0, frozenBytes));
  if (frozen === null) return 'changed';
  let previous = frozen.start;
  let from = frozenBytes;
  let signatures = 0;
  for (let savings = 0; text.slice(from).trim() !== ''; savings++) {
    const end = endOfSaving(text, from);
    if (end === null || savings === MOST_SAVINGS) return 'changed';
    const saving: Saving = { text, from, to: end.to };
    const section = readSection(text, end.start);
    if (section === null || end.start < from || !isHonest(saving, section, { frozen, previous })) return 'changed';
    signatures += signaturesOf(saving, frozenBytes);
    previous = end.start;
    from = end.to;
  }
  return signatures > 0 ? 'signed' : 'changed';
}

interface Frozen {
  text: string;
  section: FileSection;
  /** offset of its cross-reference table */
  start: number;
  /** objects it numbers */
  size: number;
}

/** One saving: the bytes it added. */
interface Saving {
  text: string;
  from: number;
  to: number;
}

function frozenPart(text: string): Frozen | null {
  const start = Number(/startxref\s+(\d+)\s+%%EOF\s*$/.exec(text)?.[1] ?? Number.NaN);
  const section = Number.isNaN(start) ? null : readSection(text, start);
  if (section === null) return null;
  return { text, section, start, size: Number(section.trailer.get('Size') ?? 0) };
}

/** Where the next saving ends, and where its cross-reference table begins. */
function endOfSaving(text: string, from: number): { to: number; start: number } | null {
  const mark = /startxref\s+(\d+)\s+%%EOF(\r\n|\r|\n)?/g;
  mark.lastIndex = from;
  const found = mark.exec(text);
  return found === null ? null : { to: mark.lastIndex, start: Number(found[1]) };
}

function isHonest(saving: Saving, section: FileSection, { frozen, previous }: { frozen: Frozen; previous: number }) {
  const { trailer, references } = section;
  if (trailer.get('Prev') !== String(previous) || trailer.has('XRefStm') || trailer.has('Encrypt')) return false;
  if (trailer.get('Root') !== frozen.section.trailer.get('Root')) return false;
  for (const [number, { offset, isFree }] of references) {
    if (number === 0) continue;
    if (isFree || offset < saving.from || offset >= saving.to) return false;
    if (!new RegExp(`^${number} 0 obj\\s`).test(saving.text.slice(offset, offset + 40))) return false;
    if (number < frozen.size && !keepsLook(saving, section, { frozen, number })) return false;
  }
  return true;
}

/** Whether an object of the frozen paper that was written again still says what it said. */
function keepsLook(saving: Saving, section: FileSection, { frozen, number }: { frozen: Frozen; number: number }) {
  const old = frozen.section.references.get(number);
  const before = old === undefined ? null : readObject(frozen.text, number, old.offset);
  const after = readObject(saving.text, number, section.references.get(number)!.offset);
  if (after === null) return false;
  // Title, author and dates of the file are not part of what is read on the paper.
  if (frozen.section.trailer.get('Info') === `${number} 0 R`) return true;
  if (before === null) return false;
  const added = ADDED_KEYS[before.get('Type') ?? ''] ?? [];
  const keys = [...new Set([...before.keys(), ...after.keys()])];
  return (
    keys.every((key) => added.includes(key) || before.get(key) === after.get(key)) && onlyFields(saving, section, after)
  );
}

/** What a page shows on top of its content may be the field of a signature and nothing else. */
function onlyFields(saving: Saving, { references }: FileSection, page: Map<string, string>): boolean {
  const numbers = [...(page.get('Annots') ?? '').matchAll(/(\d+) 0 R/g)].map(([, number]) => Number(number));
  return numbers.every((number) => {
    const place = references.get(number);
    const field = place === undefined ? null : readObject(saving.text, number, place.offset);
    return field?.get('Subtype') === '/Widget' && field.get('FT') === '/Sig';
  });
}

/** Signatures of a saving whose range of bytes begins with the frozen paper and ends with the saving. */
function signaturesOf({ text, from, to }: Saving, frozenBytes: number): number {
  const ranges = text.slice(from, to).matchAll(/\/ByteRange\s*\[\s*0\s+(\d+)\s+(\d+)\s+(\d+)\s*\]/g);
  return [...ranges].filter(([, first, second, length]) => {
    const end = Number(second) + Number(length);
    return Number(first) >= frozenBytes && end <= to && text.slice(end, to).trim() === '';
  }).length;
}
