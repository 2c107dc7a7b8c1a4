import { describe, expect, it } from 'vitest';
import { InputProblem } from '#libs/engine/index.js';
import { madeSite } from '../../test/support/outcome.js';
import { canonicalJson } from './canonical-json.js';
import { csvRows, csvText, guarded, unguarded } from './csv-text.js';
import { areDocumentRows, documentFromRows, documentRows } from './document-rows.js';

const there = (document: unknown) => csvText(documentRows(document));
const back = (text: string) => documentFromRows(csvRows(text)!.map((row) => row.map(unguarded)));

describe('a document as rows', () => {
  it('comes back as it was, empty parts and awkward texts included', () => {
    const documents = [
      madeSite(),
      {
        name: '=HYPERLINK("x")',
        a: [],
        b: {},
        c: null,
        d: [[1, 2], [{ e: true }]],
        f: "'quoted",
        g: 'two\nlines, "so"',
      },
      { marks: '\u0000\u0085\ud800\uffff\r\n', tab: '\ta' },
      { quantities: { 'maxKw.day': 1, 'two "words"]': [2], '=1': 3 } },
      { name: ' blanks ', number: 0.1 + 0.2, tiny: 5e-324, negative: -1 },
    ];
    for (const document of documents) expect(canonicalJson(back(there(document)))).toBe(canonicalJson(document));
    // the control: another value is another document
    expect(canonicalJson(back(there({ a: 1 })))).not.toBe(canonicalJson({ a: 1.000001 }));
  });

  it('is known by its heads', () => {
    expect(areDocumentRows(csvRows(there({ a: 1 }))!)).toBe(true);
    expect(areDocumentRows([['time', 'kW', 'kvar']])).toBe(false);
  });

  it.each([
    ['a path twice', 'a,number,1\na,number,2\n', 3],
    ['a list with a hole', 'a[1],number,1\n', 2],
    ['a number that is none', 'a,number,x\n', 2],
    ['a quoted text that is none', 'a,quoted text,1\n', 2],
    ['an unknown kind', 'a,formula,1\n', 2],
    ['a path into a number', 'a,number,1\na.b,number,2\n', 3],
    ['the key of a prototype', '__proto__.a,number,1\n', 2],
    ['the quoted key of a prototype', '"[""__proto__""].a",number,1\n', 2],
    ['a quoted key that is none', '"[""\\x""]",number,1\n', 2],
    ['a key inherited by every object', 'constructor.prototype.a,number,1\nx..y,number,1\n', 3],
  ])('is refused with %s, naming the row', (_, rows, row) => {
    try {
      back(`path,kind,value\n${rows}`);
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(InputProblem);
      expect((error as InputProblem).problems[0]!.row).toBe(row);
    }
    expect(({} as Record<string, unknown>).a).toBeUndefined();
  });
});

describe('comma-separated text', () => {
  it('keeps numbers bare and marks texts that a spreadsheet would run', () => {
    expect(csvText([[-12.5, '-12.5', '=1+1', '@x', '+4', "'a", 'plain', null, true]])).toBe(
      "-12.5,'-12.5,'=1+1,'@x,'+4,''a,plain,,true\n",
    );
    for (const text of ['=1', "'=1", "''", '\ttab', 'plain', '']) expect(unguarded(guarded(text))).toBe(text);
  });

  it('reads quotes, line ends of every kind and a last line without one', () => {
    expect(csvRows('a,"b ""c"", d"\r\n,\n"x\ny"')).toEqual([['a', 'b "c", d'], ['', ''], ['x\ny']]);
    expect(csvRows('a,"b\n')).toBeNull();
  });
});
