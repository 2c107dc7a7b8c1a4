import { describe, expect, it } from 'vitest';
import { InputProblem, type Problem } from '#libs/engine/index.js';
import { MeterBytes } from '../meter-bytes.js';
import { walkXml, XML_BOUNDS, type XmlBounds } from './walk-xml.js';
import { XmlText } from './xml-text.js';

/** Bad input is refused within this. */
const LONGEST_MS = 1000;

async function* chunksOf(bytes: Uint8Array, size: number): AsyncGenerator<Uint8Array> {
  for (let at = 0; at < bytes.length; at += size) yield bytes.subarray(at, at + size);
}

interface Walked {
  /** path and text of each element in the order in which they end */
  elements: string[];
  notes: string[];
}

async function walk(content: string | Uint8Array, size = 65_536, bounds?: XmlBounds): Promise<Walked> {
  const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
  const text = new XmlText(await MeterBytes.open(chunksOf(bytes, size)));
  const path: string[] = [];
  const elements: string[] = [];
  const visitor = {
    opened: ({ name }: { name: string }) => void path.push(name),
    closed: ({ text: said, row, column }: { text: string; row: number; column: number }) => {
      elements.push(`${path.join('/')} ${row}:${column} ${said}`);
      path.pop();
    },
  };
  await walkXml(text, visitor, bounds);
  return { elements, notes: text.notes.map(({ code }) => code) };
}

async function refusal(content: string | Uint8Array, bounds?: XmlBounds): Promise<Problem> {
  const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
  const since = performance.now();
  try {
    await walk(bytes, 65_536, bounds);
  } catch (problem) {
    expect(performance.now() - since).toBeLessThan(LONGEST_MS);
    if (problem instanceof InputProblem) return problem.problems[0]!;
    throw problem;
  }
  throw new Error('nothing was refused');
}

const utf16 = (text: string) => new Uint8Array(Buffer.from(`\ufeff${text}`, 'utf16le'));
const latin1 = (text: string) => new Uint8Array(Buffer.from(text, 'latin1'));

describe('a walk through XML', () => {
  it('gives names without prefixes, the text of leaves, and where it begins', async () => {
    const { elements } = await walk(
      '<?xml version="1.0"?>\n<a:root xmlns:a="x">\n  <b> 1 &lt; <![CDATA[2 & ]]>3<!-- no --></b><c/>mixed</a:root>',
    );
    expect(elements).toEqual(['root/b 3:6 1 < 2 & 3', 'root/c 3:50 ', 'root 2:21 ']);
  });

  it('gives the same however the file is cut', async () => {
    const text = '<?xml version="1.0"?><!-- <a --><r><v>12.5</v><![CDATA[<!x]]><v k="<">é</v></r>'.replace(
      '"<"',
      '"&lt;"',
    );
    const whole = await walk(text);
    for (const size of [1, 2, 3, 7, 11]) expect(await walk(text, size)).toEqual(whole);
  });

  it('reads UTF-8, UTF-16 and Latin-1, by the bytes where the declaration is wrong', async () => {
    const text = (encoding: string) => `<?xml version="1.0" encoding="${encoding}"?><v>Straße</v>`;
    const read = async (content: string | Uint8Array) => {
      const { elements, notes } = await walk(content);
      return [elements[0]!.split(' ')[2], ...notes];
    };
    expect(await read(text('utf-8'))).toEqual(['Straße']);
    expect(await read(utf16(text('UTF-16')))).toEqual(['Straße', 'encoding-converted']);
    expect(await read(latin1(text('ISO-8859-1')))).toEqual(['Straße', 'encoding-converted']);
    expect(await read(text('utf-16'))).toEqual(['Straße', 'xml-encoding-misdeclared']);
    expect(await read(utf16(text('utf-8')))).toEqual(['Straße', 'encoding-converted', 'xml-encoding-misdeclared']);
    expect(await refusal(latin1(text('utf-8')))).toMatchObject({ code: 'unreadable', found: 'bytes that are none' });
    expect(await refusal(text('EBCDIC-CP-US'))).toMatchObject({ code: 'not-supported-yet', row: 1 });
  });

  it('passes over a style sheet and refuses any other processing instruction', async () => {
    const style = '<?xml version="1.0"?><?xml-stylesheet href="a.xslt" type="text/xsl"?><v>1</v>';
    expect((await walk(style)).elements).toHaveLength(1);
    expect(await refusal(style.replace('xml-stylesheet', 'php'))).toMatchObject({ code: 'unreadable', found: '"php"' });
  });
});

describe('what no meter writes is refused within a second, with row and column', () => {
  const entities = Array.from({ length: 30 }, (_, i) => `<!ENTITY e${i + 1} "&e${i};&e${i};">`).join('\n');

  it.each<[string, string | Uint8Array, Partial<Problem>]>([
    [
      'an entity bomb',
      `<?xml version="1.0"?>\n<!DOCTYPE v [${entities}]><v>&e30;</v>`,
      { row: 2, column: 1, found: '"<!DOCTYPE"' },
    ],
    ['an external entity', '<v>\n<!DOCTYPE v SYSTEM "file:///etc/hostname"></v>', { row: 2, column: 1 }],
    ['an entity without a document type', '<v><!ENTITY a "b">1</v>', { row: 1, column: 4, found: '"<!ENTITY"' }],
    ['one in UTF-16', utf16('<?xml version="1.0"?><!DoCtYpE v><v/>'), { row: 1, column: 22 }],
    [
      'a NUL within a word',
      '<v>\n  <kW\0h>1</kW\0h></v>',
      { row: 2, expected: 'characters of XML', found: '"\\u0000"' },
    ],
    ['an entity that is not declared', '<v>\n  &xxe;</v>', { row: 2, expected: 'well-formed XML' }],
    ['an entity of HTML', '<v>&nbsp;</v>', { expected: 'well-formed XML' }],
    ['deep nesting', '<v>'.repeat(1_000_000), { code: 'too-large', row: 1, column: 3 * 65 + 1 }],
    ['a giant text', `<v>${'1'.repeat(10_000_000)}</v>`, { code: 'too-large', row: 1 }],
    ['a giant text in CDATA', `<v><![CDATA[${'1'.repeat(10_000_000)}]]></v>`, { code: 'too-large', row: 1 }],
    ['an attribute of 10 MB', `<v a="${'x'.repeat(10_000_000)}"/>`, { code: 'too-large', row: 1 }],
    ['a name of 10 MB', `<${'v'.repeat(10_000_000)}/>`, { code: 'too-large', row: 1 }],
    ['a comment of 10 MB', `<v><!--${'x'.repeat(10_000_000)}--></v>`, { code: 'too-large', row: 1 }],
    [
      'attributes without end',
      `<v ${Array.from({ length: 200_000 }, (_, i) => `a${i}=""`).join(' ')}/>`,
      { code: 'too-large' },
    ],
    ['a file that is cut', '<r>\n<v>1</v>\n<v>2', { row: 3, found: 'the end of the file' }],
    ['a file that is cut in a tag', '<r>\n<v>1</v>\n<v a="', { row: 3, found: 'the end of the file' }],
    ['a tag closed by another', '<r>\n<v>1</w></r>', { row: 2, expected: 'well-formed XML' }],
    ['two roots', '<r/>\n<r/>', { row: 2 }],
    ['text alone', 'kW,kvar', { code: 'unreadable' }],
    ['nothing but a declaration', '<?xml version="1.0"?>', { expected: 'an XML document' }],
  ])('%s', async (_, content, problem) => {
    expect(await refusal(content)).toMatchObject({ code: 'unreadable', ...problem });
  });

  it('too many elements', async () => {
    const bounds = { ...XML_BOUNDS, elements: 100 };
    expect(await refusal(`<r>${'<v/>'.repeat(100)}</r>`, bounds)).toMatchObject({ code: 'too-large' });
    expect((await walk(`<r>${'<v/>'.repeat(99)}</r>`, 1000, bounds)).elements).toHaveLength(100);
  });

  it('and just within the bounds all of it is read', async () => {
    const deep = `${'<v>'.repeat(64)}1${'</v>'.repeat(64)}`;
    expect((await walk(deep)).elements).toHaveLength(64);
    expect((await walk(`<v>${'1'.repeat(65_536)}</v>`)).elements[0]).toHaveLength('v 1:4 '.length + 65_536);
    expect((await walk(`<v a="${'x'.repeat(60_000)}"/>`)).elements).toHaveLength(1);
    const attributes = Array.from({ length: 64 }, (_, i) => `a${i}=""`).join(' ');
    expect((await walk(`<v ${attributes}/>`)).elements).toHaveLength(1);
  });
});
