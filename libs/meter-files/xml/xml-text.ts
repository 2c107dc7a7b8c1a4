import { shown } from '#libs/contract/shown.js';
import { InputProblem, type Problem, type Remark } from '#libs/engine/index.js';
import { type MeterBytes, soundText } from '../meter-bytes.js';
import { note } from '../note.js';

/** Codes of eight bits that are read beside UTF-8, by the labels of the WHATWG encoding standard. */
const EIGHT_BITS = /^(?:iso-?8859-1|latin-?1|windows-1252|cp-?1252|iso-?8859-15|latin-?9)$/i;
const UTF_8 = /^(?:utf-?8|us-ascii|ascii)$/i;
const UTF_16 = /^(?:utf-?16(?:le|be)?|iso-10646-ucs-2|ucs-2)$/i;

const RETURN = 0x0d;
const NEW_LINE = 0x0a;

/**
 * The text of an XML file. Bytes decide between UTF-16 and eight bits, where only one of them is possible; what the
 * declaration says decides between UTF-8 and Latin-1.
 */
export class XmlText {
  readonly notes: readonly Remark[];
  /** what is wrong behind the last piece, where its bytes are none of the encoding; no piece comes after it */
  broken: Problem | null = null;
  readonly #source: MeterBytes;
  readonly #label: string;
  readonly #decoder: InstanceType<typeof TextDecoder>;
  /** rows end with a carriage return alone, which is read as the line feed that it stands for (XML 1.0, 2.11) */
  readonly #loneReturns: boolean;

  /** @throws InputProblem where the declared encoding is none that is read */
  constructor(source: MeterBytes) {
    this.#source = source;
    const declared = declaredEncoding(source.head);
    const wide = source.encoding !== 'utf-8';
    const label = wide || declared === null || UTF_8.test(declared) || UTF_16.test(declared) ? 'utf-8' : declared;
    if (label !== 'utf-8' && !EIGHT_BITS.test(label)) refuseEncoding(label);
    this.#label = labelOf(label);
    this.#decoder = new TextDecoder(this.#label, { fatal: true });
    this.#loneReturns = source.head.includes(RETURN) && !source.head.includes(NEW_LINE);
    const agrees = declared === null || UTF_16.test(declared) === wide;
    const taken = wide ? 'UTF-16' : 'UTF-8';
    this.notes = [
      ...(wide || label !== 'utf-8' ? [note('encoding-converted', { encoding: wide ? 'UTF-16' : label })] : []),
      ...(agrees ? [] : [note('xml-encoding-misdeclared', { declared, taken })]),
    ];
  }

  /**
   * The next piece of text.
   * @returns text, or null at the end of the file
   */
  async next(): Promise<string | null> {
    if (this.broken !== null) return null;
    const bytes = await this.#source.next();
    const text = this.#decoded(bytes);
    return text === null || !this.#loneReturns ? text : text.replaceAll('\r', '\n');
  }

  #decoded(bytes: Uint8Array | null): string | null {
    try {
      if (bytes !== null) return this.#decoder.decode(bytes, { stream: true });
      this.#decoder.decode();
      return null;
    } catch {
      const expected = 'text in UTF-8, or a declaration of another encoding';
      this.broken = { code: 'unreadable', expected, found: 'bytes that are none' };
      return soundText(bytes, this.#label);
    }
  }
}

function labelOf(label: string): string {
  if (/15|9$/.test(label)) return 'iso-8859-15';
  return label === 'utf-8' ? label : 'windows-1252';
}

function declaredEncoding(head: Uint8Array): string | null {
  const start = String.fromCharCode(...head.subarray(0, 400));
  return /^\s*<\?xml\s[^>]*?encoding\s*=\s*["']([\w.-]{1,40})["']/i.exec(start)?.[1] ?? null;
}

function refuseEncoding(declared: string): never {
  const expected = 'XML in UTF-8, UTF-16 or ISO-8859-1';
  throw new InputProblem([{ code: 'not-supported-yet', row: 1, expected, found: shown(declared) }]);
}
