import { shown } from '#libs/contract/shown.js';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { decodeText } from './csv/row-cells.js';
import { isStrange } from './format-starts.js';
import { forbidden, forbiddenAt } from './xml/forbidden-xml.js';
import { xmlStart } from './xml/xml-start.js';

const ROOT = /<(?:[\w.-]+:)?([A-Za-z_][\w.-]*)/;

/**
 * The refusal of a file that no reader takes for its own, with the place that says what it is.
 * @param head the first bytes
 * @param names of the formats that are read
 */
export function unknownFormat(head: Uint8Array, names: string): InputProblem {
  const expected = `a meter file in one of the formats ${names}`;
  if (xmlStart(head) === '')
    return new InputProblem([strangeFile(head, { expected, found: 'a file of another kind' })]);
  // rows and columns are those of the file, so nothing that stands before its first mark is left out
  const text = decodeText(head);
  const at = forbiddenAt(text);
  if (at >= 0) return new InputProblem([{ code: 'unreadable', ...placeOf(text, at), ...forbidden(text, at) }]);
  const root = ROOT.exec(text);
  const found = root === null ? 'XML of another kind' : `XML of another kind, <${root[1]!.slice(0, 40)}>`;
  return new InputProblem([{ code: 'unknown-format', ...placeOf(text, root?.index ?? 0), expected, found }]);
}

/**
 * The refusal of a file of unknown kind, with the first place of it that no text has; without a place where it has none.
 * @param head the first bytes
 * @param said what is expected, and found
 */
export function strangeFile(head: Uint8Array, { expected, found }: { expected: string; found: string }): Problem {
  const at = head.findIndex(isStrange);
  if (at < 0) return { code: 'unknown-format', expected, found };
  const text = decodeText(head.subarray(0, at));
  const character = shown(String.fromCharCode(head[at]!));
  return {
    code: 'unknown-format',
    ...placeOf(text, text.length),
    expected,
    found: `${found}, with the character ${character}`,
  };
}

function placeOf(text: string, at: number): { row: number; column: number } {
  const rows = text.slice(0, at).split(/\r\n|[\r\n]/);
  return { row: rows.length, column: rows.at(-1)!.length + 1 };
}
