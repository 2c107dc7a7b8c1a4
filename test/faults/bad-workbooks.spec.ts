// Workbooks that are damaged or made to harm: each is refused within a second with the place and the reason, a sound one
// beside them is read, and nothing of a refused one is left in memory.
import { describe, expect, it } from 'vitest';
import type { InputProblem } from '#libs/engine/index.js';
import { type ZipPart, madeZip } from '../support/made-zip.js';
import { type MadeCell, madeWorkbook, workbookParts } from '../support/made-workbook.js';
import { readMeterText, refusalOf } from '../support/meter-text.js';

const HEADER = ['interval begin', 'kW', 'kvar'];
const ROWS: MadeCell[][] = Array.from({ length: 30 }, (_, i) => [
  `2024-05-06 ${String(i % 24).padStart(2, '0')}:00`,
  i,
  1,
]);
const SOUND = { sheets: [{ name: 'Load', rows: [HEADER, ...ROWS.slice(0, 24)] }] };
const SHEET = 'xl/worksheets/sheet1.xml';

/** A sound workbook with one of its parts changed. */
function changed(name: string, change: (part: ZipPart) => Partial<ZipPart>): Uint8Array {
  return madeZip(workbookParts(SOUND).map((part) => (part.name === name ? { ...part, ...change(part) } : part)));
}

const within = (name: string, from: string, to: string) =>
  changed(name, ({ content }) => ({ content: String(content).replace(from, to) }));
const added = (...parts: ZipPart[]) => madeZip([...workbookParts(SOUND), ...parts]);
const sound = madeWorkbook(SOUND);
const cells = (xml: string) => within(SHEET, '<sheetData>', `<sheetData>${xml}`);
const doctype = '<!DOCTYPE worksheet [<!ENTITY a "ha"><!ENTITY b "&a;&a;&a;&a;">]>';
const mebibyte = 'x'.repeat(1 << 20);

function compound(text: string): Uint8Array {
  const bytes = Buffer.alloc(4096);
  bytes.set([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1]);
  bytes.write(text, 1024, 'utf16le');
  return bytes;
}

/** A mebibyte of zeros for each byte it takes, as far as deflating goes: 32 MiB out of 32 KiB. */
const bomb = `<worksheet><sheetData>${' '.repeat(32 << 20)}</sheetData></worksheet>`;

const BAD: [name: string, bytes: () => Uint8Array, problem: object][] = [
  ['a password', () => compound('EncryptedPackage'), { code: 'unknown-format', found: 'a workbook with a password' }],
  ['the older format', () => compound('Workbook'), { code: 'unknown-format' }],
  [
    'an encrypted part',
    () => changed(SHEET, () => ({ encrypted: true })),
    { code: 'unreadable', path: SHEET, found: 'an encrypted one' },
  ],
  [
    'a document type with entities in a sheet',
    () => within(SHEET, '<worksheet', `${doctype}<worksheet`),
    { code: 'unreadable', path: SHEET, found: '<!DOCTYPE or <!ENTITY' },
  ],
  [
    'a document type in the texts',
    () => within('xl/sharedStrings.xml', '<sst', '<!DOCTYPE sst><sst'),
    { path: 'xl/sharedStrings.xml' },
  ],
  [
    'a document type in the relations',
    () => within('_rels/.rels', '<Relationships', '<!doctype r><Relationships'),
    { path: '_rels/.rels' },
  ],
  [
    'an entity of its own',
    () => cells('<row r="1"><c t="str"><v>&bomb;</v></c></row>'),
    { code: 'unreadable', path: SHEET },
  ],
  ['a bomb that says its size', () => changed(SHEET, () => ({ content: bomb })), { code: 'too-large', path: SHEET }],
  [
    'a bomb that lies about its size',
    () => changed(SHEET, () => ({ content: bomb, statedBytes: 5000 })),
    { code: 'unreadable', path: SHEET, found: 'more than 5000 bytes' },
  ],
  [
    'a size stated too large',
    () => changed(SHEET, ({ content }) => ({ statedBytes: content.length + 1 })),
    { code: 'unreadable', path: SHEET },
  ],
  [
    'a size of four gigabytes stated',
    () => changed(SHEET, () => ({ statedBytes: 0xfffffffe })),
    { code: 'too-large', path: SHEET },
  ],
  ['another check sum', () => changed(SHEET, () => ({ statedCrc: 1 })), { code: 'unreadable', path: SHEET }],
  [
    'a method of packing that is not read',
    () => changed(SHEET, () => ({ method: 14 })),
    { path: SHEET, found: 'compression method 14' },
  ],
  [
    'data that cannot be inflated',
    () => changed(SHEET, ({ content }) => ({ content, stored: true, method: 8 })),
    { path: SHEET },
  ],
  [
    'an archive within the archive',
    () => changed(SHEET, () => ({ content: madeWorkbook(SOUND) })),
    { code: 'unreadable', path: SHEET, found: 'a nested archive' },
  ],
  [
    'a nested archive that nothing refers to',
    () => added({ name: 'xl/media/picture.zip', content: sound }),
    { code: 'unreadable', path: 'xl/media/picture.zip', found: 'a nested archive' },
  ],
  [
    'a nested archive under the name of a picture, as it stands',
    () => added({ name: 'xl/media/image1.png', content: sound, stored: true }),
    { code: 'unreadable', path: 'xl/media/image1.png', found: 'a nested archive' },
  ],
  [
    'a nested archive of nothing',
    () => added({ name: 'docProps/empty.bin', content: madeZip([]) }),
    { code: 'unreadable', path: 'docProps/empty.bin', found: 'a nested archive' },
  ],
  [
    'a nested archive behind as many parts as there may be',
    () =>
      added(
        ...Array.from({ length: 1900 }, (_, i) => ({ name: `xl/media/${i}.png`, content: bomb.slice(0, 1 << 12) })),
        { name: 'xl/media/last.png', content: sound },
      ),
    { code: 'unreadable', path: 'xl/media/last.png', found: 'a nested archive' },
  ],
  [
    'an archive of files',
    () => madeZip([{ name: 'load.csv', content: 'time,kW' }]),
    { code: 'unknown-format', found: 'a ZIP archive of other files, such as "load.csv"' },
  ],
  ['an archive of nothing', () => madeZip([]), { code: 'unknown-format' }],
  [
    'another office format',
    () => madeZip([{ name: 'mimetype', content: 'application/vnd.oasis', stored: true }]),
    { found: 'an OpenDocument file' },
  ],
  [
    'a workbook in binary parts',
    () => within('_rels/.rels', 'workbook.xml', 'workbook.bin'),
    { found: 'a workbook in binary parts (.xlsb)' },
  ],
  [
    'an archive cut off in the middle',
    () => sound.subarray(0, sound.length >> 1),
    { code: 'unreadable', path: 'archive' },
  ],
  ['an archive cut off at its end', () => sound.subarray(0, sound.length - 5), { code: 'unreadable', path: 'archive' }],
  [
    'more parts than any workbook',
    () => added(...Array.from({ length: 2100 }, (_, i) => ({ name: `x${i}`, content: '' }))),
    { code: 'too-large' },
  ],
  [
    'more parts stated than there are',
    () => madeZip(workbookParts(SOUND), 60),
    { code: 'unreadable', path: 'archive' },
  ],
  ['two parts of one name', () => added({ name: SHEET, content: '<worksheet/>' }), { code: 'unreadable', path: SHEET }],
  [
    'a sheet that is missing',
    () => madeZip(workbookParts(SOUND).filter(({ name }) => name !== SHEET)),
    { path: SHEET },
  ],
  [
    'XML that is cut off',
    () => changed(SHEET, ({ content }) => ({ content: String(content).slice(0, -40) })),
    { code: 'unreadable', path: SHEET },
  ],
  ['XML that is nested without end', () => cells('<a>'.repeat(100_000)), { code: 'too-large', path: SHEET }],
  [
    'an element with attributes without end',
    () => cells(`<row ${Array.from({ length: 90_000 }, (_, i) => `a${i}="1"`).join(' ')}/>`),
    { code: 'too-large', path: SHEET },
  ],
  ['an attribute of a mebibyte', () => cells(`<row r="${mebibyte}"/>`), { code: 'unreadable', path: SHEET }],
  [
    'a text of a mebibyte in a cell',
    () => cells(`<row r="1"><c t="str"><v>${mebibyte}</v></c></row>`),
    { code: 'too-large', row: 1, column: 1 },
  ],
  [
    'a shared text of a mebibyte',
    () => within('xl/sharedStrings.xml', '<si>', `<si><t>${mebibyte}</t></si><si>`),
    { code: 'too-large', path: 'xl/sharedStrings.xml' },
  ],
  [
    'bytes that are no text',
    () =>
      changed(SHEET, ({ content }) => ({
        content: Buffer.concat([Buffer.from(String(content)), Uint8Array.of(0xff, 0xfe)]),
      })),
    { code: 'unreadable', path: SHEET },
  ],
  [
    'a row of more than a mebibyte',
    () => cells(`<row r="1">${`<c t="str"><v>${'x'.repeat(30_000)}</v></c>`.repeat(40)}</row>`),
    { code: 'too-large', row: 1 },
  ],
  [
    'a cell beyond the last column',
    () => cells('<row r="1"><c r="XFE1"><v>1</v></c></row>'),
    { code: 'unreadable', row: 1, path: 'sheet "Load"' },
  ],
  ['a cell of another row', () => cells('<row r="1"><c r="A2"><v>1</v></c></row>'), { code: 'unreadable', row: 1 }],
  ['a row beyond the last row', () => cells('<row r="9999999"/>'), { code: 'unreadable', row: 1 }],
  ['a row that stands there twice', () => within(SHEET, '<row r="3"', '<row r="2"'), { code: 'unreadable', row: 3 }],
  [
    'a number that is none',
    () => within(SHEET, '<c r="B5"><v>3', '<c r="B5"><v>3x'),
    { code: 'unreadable', row: 5, column: 2, found: '"3x"' },
  ],
  [
    'a number of a million digits',
    () => within(SHEET, '<c r="B5"><v>3', `<c r="B5"><v>${'9'.repeat(1_000_000)}`),
    { code: 'too-large', row: 5, column: 2 },
  ],
  [
    'a number beyond every number',
    () => within(SHEET, '<c r="B5"><v>3', '<c r="B5"><v>1e999'),
    { code: 'unreadable', row: 5, column: 2 },
  ],
  [
    'a text that no cell shares',
    () => within(SHEET, '<c r="A5" t="s"><v>', '<c r="A5" t="s"><v>99'),
    { code: 'unreadable', row: 5, column: 1 },
  ],
];

async function timed(bytes: Uint8Array): Promise<{ refusal: InputProblem; ms: number }> {
  const startMs = performance.now();
  const refusal = await refusalOf(bytes);
  return { refusal, ms: performance.now() - startMs };
}

describe('a workbook with', () => {
  it.each(BAD)('%s is refused within a second, and the next one is read', async (_, bytes, problem) => {
    const made = bytes();
    const { refusal, ms } = await timed(made);
    expect(refusal.problems).toMatchObject([problem]);
    expect(ms).toBeLessThan(1000);
    expect((await readMeterText(sound)).record.beginS).toHaveLength(24);
  });

  it('nothing wrong is read, so that it is the change that is refused', async () => {
    expect((await readMeterText(madeZip(workbookParts(SOUND)))).record.beginS).toHaveLength(24);
    // the mark of an archive elsewhere than at the beginning makes none
    const picture = Buffer.concat([Buffer.from('\u0089PNG\r\n', 'latin1'), sound]);
    for (const stored of [true, false]) {
      const beside = added({ name: 'xl/media/picture.zip', content: picture, stored });
      expect((await readMeterText(beside)).record.beginS).toHaveLength(24);
    }
    expect((await readMeterText(within(SHEET, '<c r="B5"><v>3', '<c r="B5"><v>3.5'))).record.activeKw[3]).toBe(3.5);
  });
});
