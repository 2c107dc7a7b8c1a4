// The shape of a signed PDF by ISO 32000-1, 7.5.6 (incremental updates) and 12.8.1 (/ByteRange): what a signing program
// adds behind the bytes it was given. The signature itself is a placeholder; no certificate is judged here.

/** What a saver of the file writes besides the signature. */
export interface Saving {
  /** objects by number, each the text between `obj` and `endobj`; frozen ones may be written again */
  objects?: Record<number, string>;
  /** leaves the signature out: a saving that only adds */
  unsigned?: boolean;
  /** replaces the trailer's /Prev */
  previous?: number;
  /** shows the field on the page of this object number, 0 for an invisible one */
  page?: number;
}

/**
 * A PDF saved once more behind its bytes, by default with a signature over all of it.
 * @param pdf as it was, its cross-references in the classic table
 * @param saving what differs
 */
export function savedAfterwards(pdf: Uint8Array, saving: Saving = {}): Buffer {
  const head = Buffer.from(pdf).toString('latin1');
  const start = Number(/startxref\s+(\d+)\s+%%EOF\s*$/.exec(head)![1]);
  const trailer = head.slice(head.lastIndexOf('trailer'));
  const size = Number(/\/Size (\d+)/.exec(trailer)![1]);
  const root = Number(/\/Root (\d+) 0 R/.exec(trailer)![1]);
  const objects = new Map(Object.entries(saving.objects ?? {}).map(([number, text]) => [Number(number), text]));
  if (saving.unsigned !== true) addSignature(objects, { head, size, root, page: saving.page ?? 0 });
  let text = '';
  const places: [number, number][] = [];
  for (const [number, body] of [...objects].sort(([a], [b]) => a - b)) {
    places.push([number, head.length + text.length]);
    text += `${number} 0 obj\n${body}\nendobj\n`;
  }
  const table = places.map(([number, at]) => `${number} 1\n${String(at).padStart(10, '0')} 00000 n \n`).join('');
  const last = Math.max(size - 1, ...objects.keys()) + 1;
  const end = `trailer\n<< /Size ${last} /Root ${root} 0 R /Prev ${saving.previous ?? start} >>\n`;
  const whole = `${head}${text}xref\n${table}${end}startxref\n${head.length + text.length}\n%%EOF\n`;
  return Buffer.from(ranged(whole, head.length), 'latin1');
}

/** The text of an object as it stands in a file. */
export function objectText(pdf: Uint8Array, number: number): string {
  const text = Buffer.from(pdf).toString('latin1');
  const found = [...text.matchAll(new RegExp(`(?<!\\d)${number} 0 obj\\s([\\s\\S]*?)\\sendobj`, 'g'))].at(-1);
  return found![1]!;
}

const HOLE = '0'.repeat(600);
const RANGE = `[0 ${'*'.repeat(10)} ${'*'.repeat(10)} ${'*'.repeat(10)}]`;

function addSignature(
  objects: Map<number, string>,
  { head, size, root, page }: { head: string; size: number; root: number; page: number },
): void {
  const [field, value] = [size, size + 1];
  const before = Buffer.from(head, 'latin1');
  objects.set(
    value,
    `<< /Type /Sig /Filter /Adobe.PPKLite /SubFilter /adbe.pkcs7.detached /ByteRange ${RANGE} /Contents <${HOLE}> >>`,
  );
  const shown = page === 0 ? '/Rect [0 0 0 0]' : `/Rect [40 40 160 80] /P ${page} 0 R`;
  objects.set(field, `<< /Type /Annot /Subtype /Widget /FT /Sig /T (signature ${size}) ${shown} /V ${value} 0 R >>`);
  const form = `/AcroForm << /Fields [${field} 0 R] /SigFlags 3 >>`;
  const catalog = (objects.get(root) ?? objectText(before, root)).replace(/\/AcroForm << .*? >>\s*/, '');
  objects.set(root, catalog.replace(/>>$/, `${form}\n>>`));
  if (page !== 0)
    objects.set(page, (objects.get(page) ?? objectText(before, page)).replace(/>>$/, `/Annots [${field} 0 R]\n>>`));
}

/** Fills the range in: everything but the hole for the signature. */
function ranged(text: string, from: number): string {
  const hole = text.indexOf(`<${HOLE}>`, from);
  if (hole < 0) return text;
  const after = hole + HOLE.length + 2;
  const numbers = [hole, after, text.length - after].map((n) => String(n).padEnd(10, ' '));
  return text.slice(0, from) + text.slice(from).replace(RANGE, `[0 ${numbers.join(' ')}]`);
}
