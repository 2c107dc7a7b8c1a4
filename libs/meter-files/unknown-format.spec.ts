import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { lines, readMeterText, refusalOf } from '../../test/support/meter-text.js';

const golden = (name: string) =>
  readFileSync(new URL(`../../test/golden/meter-files/${name}`, import.meta.url), 'utf8');
const ESPI = golden('espi-plain.xml');
const CSV = lines('begin,kW,kvar', '2024-05-06 00:00,1,1', '2024-05-06 01:00,2,1', '2024-05-06 02:00,3,1');
const latin1 = (text: string) => new Uint8Array(Buffer.from(text, 'latin1'));
const wide = (text: string) => new Uint8Array(Buffer.from(`\ufeff${text}`, 'utf16le'));
const joined = (...parts: Uint8Array[]) => new Uint8Array(Buffer.concat(parts));

async function placeOf(content: string | Uint8Array) {
  const [{ code, row, column } = { code: 'none' }] = (await refusalOf(content)).problems;
  return { code, row, column };
}

describe('the place of a refusal', () => {
  const wrong = ESPI.replace(/<value>[^<]*</, '<value>NaN<');
  const valueRow = wrong.slice(0, wrong.indexOf('NaN')).split('\n').length;
  const FILES: [name: string, file: string, problem: { code: string; row: number; column?: number }][] = [
    ['XML of another kind', '<?xml version="1.0"?>\n <rss/>', { code: 'unknown-format', row: 2, column: 2 }],
    ['XML of another kind without a declaration', '<rss/>', { code: 'unknown-format', row: 1, column: 1 }],
    ['a document type', '<?xml version="1.0"?>\n<!DOCTYPE a>\n<a/>', { code: 'unreadable', row: 2, column: 1 }],
    ['a document type before all else', '<!DOCTYPE a>\n<a/>', { code: 'unreadable', row: 1, column: 1 }],
    ['a page', '<!doctype html>\n<html><p>kW,kvar</p></html>', { code: 'unreadable', row: 1, column: 1 }],
    [
      'a feed behind a document type',
      ESPI.replace(/^<\?xml[^>]*>/, '<!DOCTYPE feed>'),
      { code: 'unreadable', row: 1, column: 1 },
    ],
    ['a wrong value in a feed', wrong, { code: 'bad-number', row: valueRow }],
    ['a NUL in XML of another kind', '<rss>\n<\0a/></rss>', { code: 'unreadable', row: 2, column: 2 }],
    ['a wrong value in delimited text', CSV.replace(',2,', ',2x,'), { code: 'bad-number', row: 3, column: 2 }],
  ];

  it.each(FILES)('of %s counts every row of the file, blank ones before its first word too', async (_, file, place) => {
    expect(await placeOf(file)).toMatchObject(place);
    const moved = { ...place, row: place.row + 3 };
    expect(await placeOf(`\n \n\n${file}`)).toMatchObject(moved);
    expect(await placeOf(`\r\n\r\n\r\n${file.replaceAll('\n', '\r\n')}`)).toMatchObject(moved);
    expect(await placeOf(`\r\r\r${file.replaceAll('\n', '\r')}`)).toMatchObject(moved);
  });

  it('lies in files that are read but for what is refused, blank rows before them or not', async () => {
    for (const before of ['', '\n \n\n', '\r\n\r\n']) {
      expect((await readMeterText(before + ESPI)).record.beginS).toHaveLength(3);
      expect((await readMeterText(before + CSV)).record.beginS).toHaveLength(3);
    }
    expect((await readMeterText(`\r\r${ESPI.replaceAll('\n', '\r')}`)).record.beginS).toHaveLength(3);
  });
});

describe('a character that no text holds, early in a file', () => {
  it.each<[string, string, { row: number; column: number }]>([
    ['before XML', `\0${ESPI}`, { row: 1, column: 1 }],
    ['before XML, behind blank rows', `\n\n\0${ESPI}`, { row: 3, column: 1 }],
    ['among names that say nothing', 'remark\nbe\0gin,what\n', { row: 2, column: 3 }],
    ['in great number', `remark\n  ${'\0'.repeat(60)}${CSV}`, { row: 2, column: 3 }],
    ['of a picture', '\u0089PNG\r\n\u001a\n\0\0\0\rIHDR', { row: 2, column: 1 }],
  ])('is told by its row and column: %s', async (_, file, place) => {
    const { problems } = await refusalOf(latin1(file));
    expect(problems).toMatchObject([{ code: 'unknown-format', ...place }]);
    expect(problems[0]!.found).toMatch(/, with the character "\\u00(?:00|1a)"$/);
  });

  it('is not told of where there is none', async () => {
    const { problems } = await refusalOf('remark\nbegin,what\n');
    expect(problems).toEqual([expect.objectContaining({ code: 'unknown-format' })]);
    expect(problems[0]).not.toHaveProperty('row');
    expect(problems[0]!.found).not.toContain('character');
  });
});

describe('bytes that are none of the encoding', () => {
  it('of XML in UTF-8 are told by their place', async () => {
    const [before, behind] = ['<?xml version="1.0"?>\n<a xmlns="http://naesb.org/espi">\n é', '</a>'];
    const bad = joined(new TextEncoder().encode(before), Uint8Array.of(0xff), new TextEncoder().encode(behind));
    expect(await placeOf(bad)).toEqual({ code: 'unreadable', row: 3, column: 3 });
    expect((await refusalOf(before + behind)).code).toBe('empty-file');
  });

  it('of a large feed are told by their place too', async () => {
    const filler = '<!-- é -->\n'.repeat(20_000);
    const cut = ESPI.indexOf('</feed>');
    const parts = [ESPI.slice(0, cut), filler, ESPI.slice(cut)].map((part) => new TextEncoder().encode(part));
    expect((await readMeterText(joined(...parts))).record.beginS).toHaveLength(3);
    const row = ESPI.slice(0, cut).split('\n').length + 20_000;
    const bad = joined(parts[0]!, parts[1]!, Uint8Array.of(0xc3), parts[2]!);
    expect(await placeOf(bad)).toEqual({ code: 'unreadable', row, column: 1 });
  });

  it('of UTF-16 are told by their place, within a file and where it ends', async () => {
    const stamp = (hour: number) => new Date(Date.UTC(2024, 4, 6, hour)).toISOString().slice(0, 16).replace('T', ' ');
    const rows = CSV + Array.from({ length: 20_000 }, (_, i) => `${stamp(3 + i)},1,1\n`).join('');
    const lone = joined(wide(rows), Uint8Array.of(0x41, 0, 0, 0xd8, 0x41, 0));
    expect(await placeOf(lone)).toEqual({ code: 'unreadable', row: 20_005, column: 2 });
    expect(await placeOf(joined(wide(CSV), Uint8Array.of(0x41)))).toEqual({ code: 'unreadable', row: 5, column: 1 });
    expect((await readMeterText(wide(CSV))).record.beginS).toHaveLength(3);
  });
});
