import { InputProblem } from '#libs/engine/index.js';
import { builtInStyle, formatStyle } from './number-format.js';
import type { DateStyle } from './serial-text.js';
import type { XmlListener } from './xml-part.js';

const MOST_STYLES = 65_536;
const LONGEST_FORMAT = 1000;

/** Takes the number formats of cell styles (ECMA-376 part 1, 18.8), as far as they show dates. */
export class CellStyles implements XmlListener {
  /** by number of the style; null where it shows a number */
  readonly styles: (DateStyle | null)[] = [];
  readonly #own = new Map<string, DateStyle | null>();
  readonly #part: string;
  #inCells = false;

  constructor(part: string) {
    this.#part = part;
  }

  opened(name: string, attributes: Readonly<Record<string, string>>): void {
    if (name === 'cellXfs') this.#inCells = true;
    else if (name === 'numFmt') this.#takeFormat(attributes.numFmtId ?? '', attributes.formatCode ?? '');
    else if (name === 'xf' && this.#inCells) this.#takeStyle(attributes.numFmtId ?? '0');
  }

  text(): void {}

  closed(name: string): void {
    if (name === 'cellXfs') this.#inCells = false;
  }

  #takeFormat(id: string, code: string): void {
    if (code.length > LONGEST_FORMAT) this.#refuse(`${LONGEST_FORMAT} characters in a number format`);
    this.#own.set(id, formatStyle(code));
    if (this.#own.size > MOST_STYLES) this.#refuse(`${MOST_STYLES} number formats`);
  }

  #takeStyle(id: string): void {
    const own = this.#own.get(id);
    this.styles.push(own === undefined ? builtInStyle(Number(id)) : own);
    if (this.styles.length > MOST_STYLES) this.#refuse(`${MOST_STYLES} cell styles`);
  }

  #refuse(most: string): never {
    throw new InputProblem([{ code: 'too-large', path: this.#part, expected: `at most ${most}`, found: 'more' }]);
  }
}
