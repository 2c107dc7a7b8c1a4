import { shown } from '#libs/contract/shown.js';

/** Nothing of a document type is wanted: entities can grow without end, and name other files. */
const DECLARATION = /<!(?:DOCTYPE|ENTITY|ELEMENT|ATTLIST|NOTATION)/i;
/** Characters that are none of XML (XML 1.0, 2.2), behind which a word may hide from whoever reads it. */
// biome-ignore lint/suspicious/noControlCharactersInRegex: these are the characters that are refused
const CHARACTER = /[\0-\x08\x0b\x0c\x0e-\x1f\ufffe\uffff]/;

/** Longest forbidden word, so much of which may stand at the end of a piece [characters]. */
export const LONGEST_FORBIDDEN = '<!NOTATION'.length;

/**
 * Where a text holds what no file may hold: a declaration of a document type or entity, or a character that is none of XML.
 * @param text a piece of a file
 * @returns the first place, −1 where there is none
 */
export function forbiddenAt(text: string): number {
  const [word, character] = [text.search(DECLARATION), text.search(CHARACTER)];
  return word < 0 || character < 0 ? Math.max(word, character) : Math.min(word, character);
}

/**
 * What is wrong at a forbidden place, as a refusal says it.
 * @param text a piece of a file
 * @param at what `forbiddenAt` found in it
 */
export function forbidden(text: string, at: number): { expected: string; found: string } {
  if (text[at] !== '<') return { expected: 'characters of XML', found: shown(text[at]) };
  const found = shown(text.slice(at, at + 20).split(/\s/)[0]);
  return { expected: 'XML without document type or entities', found };
}
