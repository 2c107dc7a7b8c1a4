import { InputProblem } from '#libs/engine/index.js';
import { forbiddenAt } from './xml/forbidden-xml.js';
import { xmlStart } from './xml/xml-start.js';

const ROOT = /<(?:[\w.-]+:)?([A-Za-z_][\w.-]*)/;

/**
 * The refusal of a file that no reader takes for its own; of XML with the row that says what it is.
 * @param head the first bytes
 * @param names of the formats that are read
 */
export function unknownFormat(head: Uint8Array, names: string): InputProblem {
  const expected = `a meter file in one of the formats ${names}`;
  const start = xmlStart(head);
  if (start === '') return new InputProblem([{ code: 'unknown-format', expected, found: 'a file of another kind' }]);
  const at = forbiddenAt(start);
  if (at >= 0) {
    const found = start.slice(at, at + 20).split(/\s/)[0] ?? '';
    return new InputProblem([
      { code: 'unreadable', ...placeOf(start, at), expected: 'XML without document type or entities', found },
    ]);
  }
  const root = ROOT.exec(start);
  const found = root === null ? 'XML of another kind' : `XML of another kind, <${root[1]!.slice(0, 40)}>`;
  return new InputProblem([{ code: 'unknown-format', ...placeOf(start, root?.index ?? 0), expected, found }]);
}

function placeOf(text: string, at: number): { row: number; column: number } {
  const rows = text.slice(0, at).split(/\r\n|[\r\n]/);
  return { row: rows.length, column: rows.at(-1)!.length + 1 };
}
