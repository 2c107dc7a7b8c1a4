import sax, { type SAXParser } from 'sax';
import { shown } from '#libs/contract/shown.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { forbidden, forbiddenAt, LONGEST_FORBIDDEN } from './forbidden-xml.js';
import { XmlText } from './xml-text.js';

/** How large a file may be in every way but its length. */
export interface XmlBounds {
  depth: number;
  /** of one element */
  attributes: number;
  /** characters of one text, attribute, name or comment */
  characters: number;
  elements: number;
}

/** Ten years of one-minute intervals in four channels, with room to spare. */
export const XML_BOUNDS: XmlBounds = { depth: 64, attributes: 64, characters: 65_536, elements: 250_000_000 };

/** An element as a visitor sees it; reused from element to element. */
export interface XmlElement {
  /** without its prefix, as are all names here */
  name: string;
  /** name of the element around it, empty for the root */
  parent: string;
  /** what is written in an element without elements, else empty */
  text: string;
  attributes: Readonly<Record<string, string>>;
  /** where its content begins, counted from 1 */
  row: number;
  column: number;
}

/** Hears of the elements of a file in the order in which they stand. */
export interface XmlVisitor {
  /** @param element its text is not known yet */
  opened(element: XmlElement): void;
  /** @param element its attributes are forgotten */
  closed(element: XmlElement): void;
}

/** The parser looks at the length of what it holds after each piece. */
const PIECE = 16_384;
const NONE: Readonly<Record<string, string>> = {};

/**
 * Walks through an XML file without holding it.
 * Refused are document types and entities, processing instructions but for style sheets, which are passed over, and what
 * is beyond the bounds.
 * @param text of the file
 * @param visitor hears of each element
 * @param bounds how deep, wide and long
 * @throws InputProblem with row and column, both counted from 1, where the file is no such XML
 */
export async function walkXml(text: XmlText, visitor: XmlVisitor, bounds: XmlBounds = XML_BOUNDS): Promise<void> {
  const walk = new XmlWalk(visitor, bounds);
  for (let piece = await text.next(); piece !== null; piece = await text.next()) walk.take(piece);
  walk.end(text.broken);
}

interface Opened {
  name: string;
  row: number;
  column: number;
}

class XmlWalk {
  readonly #visitor: XmlVisitor;
  readonly #bounds: XmlBounds;
  readonly #parser: SAXParser;
  readonly #stack: Opened[] = [];
  readonly #element: XmlElement = { name: '', parent: '', text: '', attributes: NONE, row: 1, column: 1 };
  #held = '';
  #text = '';
  #leaf = false;
  #elements = 0;
  #attributes = 0;

  constructor(visitor: XmlVisitor, bounds: XmlBounds) {
    this.#visitor = visitor;
    this.#bounds = bounds;
    // only the five entities of XML itself, not those of HTML
    const options = { position: true, strictEntities: true };
    const parser = sax.parser(true, options);
    parser.onerror = ({ message }) => this.#refuse(problemOf(message));
    parser.onopentag = ({ name, attributes }) => this.#open(localName(name), attributes as Record<string, string>);
    parser.onclosetag = () => this.#close();
    parser.ontext = (piece) => this.#addText(piece);
    parser.oncdata = (piece) => this.#addText(piece);
    parser.onattribute = () => {
      this.#attributes++;
      if (this.#attributes > bounds.attributes) this.#tooLarge(`at most ${bounds.attributes} attributes`, 'more');
    };
    parser.onprocessinginstruction = ({ name }) => {
      if (/^xml(?:-stylesheet)?$/.test(name)) return;
      this.#refuse({ code: 'unreadable', expected: 'no processing instruction', found: shown(name) });
    };
    this.#parser = parser;
  }

  take(piece: string): void {
    const text = this.#held + piece;
    const at = forbiddenAt(text);
    if (at >= 0) {
      this.#write(text.slice(0, at));
      this.#refuse({ code: 'unreadable', ...forbidden(text, at) });
    }
    // the beginning of a declaration may end with the piece
    const last = text.lastIndexOf('<');
    const cut = last >= 0 && text.length - last < LONGEST_FORBIDDEN ? last : text.length;
    this.#held = text.slice(cut);
    this.#write(text.slice(0, cut));
  }

  /** @param broken what is wrong behind the last piece */
  end(broken: Problem | null): void {
    this.#write(this.#held);
    if (broken !== null) this.#refuse(broken);
    if (this.#elements === 0 || this.#stack.length > 0) {
      const found = this.#elements === 0 ? 'no element' : 'the end of the file';
      const expected = this.#elements === 0 ? 'an XML document' : `the end of ${shown(this.#stack.at(-1)?.name)}`;
      this.#refuse({ code: 'unreadable', expected, found });
    }
    this.#parser.close();
  }

  #write(text: string): void {
    for (let at = 0; at < text.length; at += PIECE) this.#parser.write(text.slice(at, at + PIECE));
  }

  #open(name: string, attributes: Record<string, string>): void {
    const stack = this.#stack;
    const { depth, elements } = this.#bounds;
    if (stack.length >= depth) this.#tooLarge(`elements at most ${depth} deep`, 'deeper ones');
    if (stack.length === 0 && this.#elements > 0) {
      this.#refuse({ code: 'unreadable', expected: 'one element around all others', found: `another, ${shown(name)}` });
    }
    this.#elements++;
    this.#attributes = 0;
    if (this.#elements > elements) this.#tooLarge(`at most ${elements} elements`, 'more');
    const parent = stack.at(-1)?.name ?? '';
    const opened = { name, row: this.#parser.line + 1, column: this.#parser.column + 1 };
    stack.push(opened);
    this.#text = '';
    this.#leaf = true;
    this.#visitor.opened(Object.assign(this.#element, opened, { parent, text: '', attributes }));
  }

  #close(): void {
    const opened = this.#stack.pop();
    if (opened === undefined) throw new Error('an element closed that was not open');
    const element = this.#element;
    element.name = opened.name;
    element.row = opened.row;
    element.column = opened.column;
    element.parent = this.#stack.at(-1)?.name ?? '';
    element.text = this.#leaf ? this.#text.trim() : '';
    element.attributes = NONE;
    this.#text = '';
    this.#leaf = false;
    this.#visitor.closed(element);
  }

  #addText(piece: string): void {
    this.#text += piece;
    const { characters } = this.#bounds;
    if (this.#text.length > characters) this.#tooLarge(`texts of at most ${characters} characters`, 'a longer one');
  }

  #tooLarge(expected: string, found: string): never {
    this.#refuse({ code: 'too-large', expected, found });
  }

  #refuse(problem: Problem): never {
    throw new InputProblem([{ row: this.#parser.line + 1, column: this.#parser.column + 1, ...problem }]);
  }
}

function localName(name: string): string {
  return name.slice(name.indexOf(':') + 1);
}

function problemOf(message: string): Problem {
  const found = message.split('\n')[0] ?? '';
  if (!found.startsWith('Max buffer length')) return { code: 'unreadable', expected: 'well-formed XML', found };
  return { code: 'too-large', expected: 'names, attributes and comments of a usual length', found: 'a longer one' };
}
