import sax from 'sax';
import { InputProblem } from '#libs/engine/index.js';
import { damaged } from '../sheet/read-sheet-text.js';
import { forbiddenAt, LONGEST_FORBIDDEN } from '../xml/forbidden-xml.js';

/** Hears the elements of a part; names come without their prefix. */
export interface XmlListener {
  opened(name: string, attributes: Readonly<Record<string, string>>): void;
  text(text: string): void;
  closed(name: string): void;
}

const MOST_DEPTH = 64;
/** A part that is read so far without an element beginning or ending is no workbook's [characters]. */
const LONGEST_TAG = 262_144;

/**
 * Reads a part as XML, chunk by chunk. Declarations of document types and entities are refused before they are read; depth,
 * attributes and the length of what has to be held are bounded.
 */
export class XmlPart {
  readonly #name: string;
  readonly #listener: XmlListener;
  readonly #parser = sax.parser(true);
  #decoder: InstanceType<typeof TextDecoder> | null = null;
  #carried = '';
  #depth = 0;
  #sinceTag = 0;

  /**
   * @param name of the part, for refusals
   * @param listener hears its elements
   */
  constructor(name: string, listener: XmlListener) {
    this.#name = name;
    this.#listener = listener;
    this.#listen();
  }

  /**
   * Reads on.
   * @param chunk bytes of the part
   * @throws InputProblem where they are no XML that a workbook may have
   */
  write(chunk: Uint8Array): void {
    this.#decoder ??= new TextDecoder(encodingOf(chunk), { fatal: true });
    this.#parse(decoded(this.#name, () => this.#decoder!.decode(chunk, { stream: true })));
  }

  /** Ends the part. */
  end(): void {
    this.#parse(decoded(this.#name, () => this.#decoder?.decode() ?? ''));
    this.#parser.close();
  }

  #parse(text: string): void {
    const held = this.#carried + text;
    const at = forbiddenAt(held);
    if (at >= 0 && held[at] === '<') {
      throw damaged(this.#name, 'XML without a document type or entities of its own', '<!DOCTYPE or <!ENTITY');
    }
    if (at >= 0) throw damaged(this.#name, 'characters of XML', JSON.stringify(held[at]));
    this.#carried = held.slice(1 - LONGEST_FORBIDDEN);
    this.#sinceTag += text.length;
    this.#parser.write(text);
    if (this.#sinceTag > LONGEST_TAG) this.#refuse(`${LONGEST_TAG} characters of one element`);
  }

  #listen(): void {
    const parser = this.#parser;
    parser.onerror = (error) => {
      throw damaged(this.#name, 'well-formed XML', error.message.split('\n', 1)[0]!.toLowerCase());
    };
    parser.onopentag = ({ name, attributes }) => {
      this.#sinceTag = 0;
      if (++this.#depth > MOST_DEPTH) this.#refuse(`a depth of ${MOST_DEPTH} elements`);
      this.#listener.opened(local(name), attributes as Record<string, string>);
    };
    parser.onclosetag = (name) => {
      this.#sinceTag = 0;
      this.#depth--;
      this.#listener.closed(local(name));
    };
    parser.ontext = (text) => this.#listener.text(text);
    parser.oncdata = (text) => this.#listener.text(text);
  }

  #refuse(most: string): never {
    throw new InputProblem([{ code: 'too-large', path: this.#name, expected: `at most ${most}`, found: 'more' }]);
  }
}

/**
 * Reads a whole part.
 * @param name of the part
 * @param chunks its content
 * @param listener hears its elements
 */
export async function readXml(name: string, chunks: AsyncIterable<Uint8Array>, listener: XmlListener): Promise<void> {
  const part = new XmlPart(name, listener);
  for await (const chunk of chunks) part.write(chunk);
  part.end();
}

function local(name: string): string {
  return name.slice(name.indexOf(':') + 1);
}

/** Parts are UTF-8 or UTF-16 (ECMA-376 part 2, 8.1.4). */
function encodingOf(chunk: Uint8Array): string {
  const [first, second] = chunk;
  if ((first === 0xff && second === 0xfe) || (first === 0x3c && second === 0)) return 'utf-16le';
  if ((first === 0xfe && second === 0xff) || (first === 0 && second === 0x3c)) return 'utf-16be';
  return 'utf-8';
}

function decoded(name: string, decode: () => string): string {
  try {
    return decode();
  } catch {
    throw damaged(name, 'text in UTF-8 or UTF-16', 'bytes that are none');
  }
}
