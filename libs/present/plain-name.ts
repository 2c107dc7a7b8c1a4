/** Left-to-right and other direction marks, joiners of nothing, byte-order marks, soft hyphens. */
const INVISIBLE = /[\u00ad\u061c\u180e\u200b\u200e\u200f\u202a-\u202e\u2060-\u206f\ufeff\ufff9-\ufffb]/g;
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is removed here
const CONTROL = /[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g;
const LONE_SURROGATE = /[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g;

/**
 * Text fit to be printed on one line: composed, without control characters or marks that reverse what stands around them.
 * @param text any text
 * @returns the same words; a run of control characters becomes one space, a broken character U+FFFD
 */
export function printable(text: string): string {
  return text.replace(LONE_SURROGATE, '\ufffd').normalize('NFC').replace(INVISIBLE, '').replace(CONTROL, ' ');
}

/**
 * A name that a person typed, fit to be printed: no spaces around it, one at a time within it.
 * @param text as entered
 * @returns the name
 */
export function plainName(text: string): string {
  return printable(text).replace(/ {2,}/g, ' ').trim();
}
