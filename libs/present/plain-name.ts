/** Left-to-right and other direction marks, joiners of nothing, byte-order marks, soft hyphens. */
const INVISIBLE = /[\u00ad\u061c\u180e\u200b\u200e\u200f\u202a-\u202e\u2060-\u206f\ufeff\ufff9-\ufffb]/g;
// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is removed here
const CONTROL = /[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g;
const LONE_SURROGATE = /[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g;

/**
 * Text that a person typed, made safe to print: composed, on one line, without control characters or marks that
 * reverse what stands around them.
 * @param text as entered
 * @returns the same words; a run of control characters becomes one space, a broken character U+FFFD
 */
export function plainName(text: string): string {
  return text
    .replace(LONE_SURROGATE, '\ufffd')
    .normalize('NFC')
    .replace(INVISIBLE, '')
    .replace(CONTROL, ' ')
    .replace(/ {2,}/g, ' ')
    .trim();
}
