import { InputProblem } from '#libs/engine/index.js';
import type { XmlListener } from './xml-part.js';

/** One a row of the longest sheet, and a header. */
const MOST_STRINGS = 1_100_000;
const MOST_CHARACTERS = 33_554_432;
/** Longest text of a cell (ECMA-376 part 1, 18.4.12 and its implementers' notes). */
export const LONGEST_CELL = 32_767;

/** Takes the texts that cells share (ECMA-376 part 1, 18.4); of formatted text the runs together, without phonetic hints. */
export class SharedStrings implements XmlListener {
  readonly strings: string[] = [];
  readonly #part: string;
  #runs = '';
  #inText = false;
  #phonetic = false;
  #characters = 0;

  constructor(part: string) {
    this.#part = part;
  }

  opened(name: string): void {
    if (name === 'si') this.#runs = '';
    else if (name === 'rPh') this.#phonetic = true;
    this.#inText = name === 't' && !this.#phonetic;
  }

  text(text: string): void {
    if (!this.#inText) return;
    this.#runs += text;
    this.#characters += text.length;
    if (this.#runs.length > LONGEST_CELL) this.#refuse(`${LONGEST_CELL} characters in a text`);
    if (this.#characters > MOST_CHARACTERS) this.#refuse(`${MOST_CHARACTERS} characters in all`);
  }

  closed(name: string): void {
    this.#inText = false;
    if (name === 'rPh') this.#phonetic = false;
    if (name !== 'si') return;
    this.strings.push(this.#runs);
    if (this.strings.length > MOST_STRINGS) this.#refuse(`${MOST_STRINGS} texts`);
  }

  #refuse(most: string): never {
    throw new InputProblem([{ code: 'too-large', path: this.#part, expected: `at most ${most}`, found: 'more' }]);
  }
}
