import { deflateRawSync } from 'node:zlib';
import type { TableCell } from '#libs/contract/csv-text.js';
import { crc32 } from './crc32.js';

/** A sheet to be written: its name and its rows. */
export interface SheetToWrite {
  name: string;
  rows: Iterable<readonly TableCell[]>;
}

const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const PACKAGE = 'http://schemas.openxmlformats.org/package/2006';
const RELATED = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const DECLARATION = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';
const LONGEST_NAME = 31;

/**
 * A workbook of plain cells (ISO/IEC 29500-1, SpreadsheetML): numbers as numbers, texts as inline texts, which are never
 * run as formulas. Equal sheets give equal bytes.
 * @param sheets their names unlike each other
 * @returns the file
 */
export function writeWorkbook(sheets: readonly SheetToWrite[]): Buffer {
  const names = sheets.map(({ name }) => name.replace(/[[\]:*?/\\]/g, ' ').slice(0, LONGEST_NAME));
  const part = (at: number): string => `worksheets/sheet${at + 1}.xml`;
  const types = names.map(
    (_, at) =>
      `<Override PartName="/xl/${part(at)}" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml"/>`,
  );
  const listed = names.map((name, at) => `<sheet name="${escaped(name)}" sheetId="${at + 1}" r:id="rId${at + 1}"/>`);
  const links = names.map(
    (_, at) => `<Relationship Id="rId${at + 1}" Type="${RELATED}/worksheet" Target="${part(at)}"/>`,
  );
  return zipped([
    [
      '[Content_Types].xml',
      `${DECLARATION}<Types xmlns="${PACKAGE}/content-types"><Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Override PartName="/xl/workbook.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.sheet.main+xml"/>${types.join('')}</Types>`,
    ],
    [
      '_rels/.rels',
      `${DECLARATION}<Relationships xmlns="${PACKAGE}/relationships"><Relationship Id="rId1" Type="${RELATED}/officeDocument" Target="xl/workbook.xml"/></Relationships>`,
    ],
    [
      'xl/workbook.xml',
      `${DECLARATION}<workbook xmlns="${MAIN}" xmlns:r="${RELATED}"><sheets>${listed.join('')}</sheets></workbook>`,
    ],
    [
      'xl/_rels/workbook.xml.rels',
      `${DECLARATION}<Relationships xmlns="${PACKAGE}/relationships">${links.join('')}</Relationships>`,
    ],
    ...sheets.map(({ rows }, at): [string, string] => [`xl/${part(at)}`, sheetXml(rows)]),
  ]);
}

function sheetXml(rows: Iterable<readonly TableCell[]>): string {
  const written: string[] = [];
  let number = 0;
  for (const row of rows) {
    number++;
    written.push(
      `<row r="${number}">${row.map((cell, at) => cellXml(cell, `${columnName(at)}${number}`)).join('')}</row>`,
    );
  }
  return `${DECLARATION}<worksheet xmlns="${MAIN}"><sheetData>${written.join('')}</sheetData></worksheet>`;
}

function cellXml(cell: TableCell, place: string): string {
  if (cell === null || cell === '') return '';
  if (typeof cell === 'number') return `<c r="${place}"><v>${cell}</v></c>`;
  if (typeof cell === 'boolean') return `<c r="${place}" t="inlineStr"><is><t>${cell}</t></is></c>`;
  return `<c r="${place}" t="inlineStr"><is><t xml:space="preserve">${escaped(cell)}</t></is></c>`;
}

function columnName(at: number): string {
  const letter = String.fromCharCode(65 + (at % 26));
  return at < 26 ? letter : `${columnName(Math.floor(at / 26) - 1)}${letter}`;
}

/** XML has no way to write these. */
const UNWRITABLE = /(?![\t\n\r\u007f-\u009f])\p{Cc}|[\ufffe\uffff]|\p{Cs}/gu;

function escaped(text: string): string {
  return text
    .replace(UNWRITABLE, '\ufffd')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll('\r', '&#13;');
}

/** A zip archive without dates, its parts in the order given. */
function zipped(parts: readonly [name: string, text: string][]): Buffer {
  const bodies: Buffer[] = [];
  const directory: Buffer[] = [];
  let offset = 0;
  for (const [name, text] of parts) {
    const path = Buffer.from(name);
    const plain = Buffer.from(text);
    const packed = deflateRawSync(plain, { level: 6 });
    const head = Buffer.alloc(26);
    head.writeUInt16LE(20, 0);
    head.writeUInt16LE(8, 4);
    head.writeUInt16LE(0x21, 8);
    head.writeUInt32LE(crc32(plain), 10);
    head.writeUInt32LE(packed.length, 14);
    head.writeUInt32LE(plain.length, 18);
    head.writeUInt16LE(path.length, 22);
    const local = Buffer.concat([Buffer.from('PK\x03\x04', 'latin1'), head, path, packed]);
    const place = Buffer.alloc(14);
    place.writeUInt32LE(offset, 10);
    directory.push(Buffer.concat([Buffer.from('PK\x01\x02\x14\x00', 'latin1'), head, place, path]));
    bodies.push(local);
    offset += local.length;
  }
  const listed = Buffer.concat(directory);
  const end = Buffer.alloc(22);
  end.write('PK\x05\x06', 0, 'latin1');
  end.writeUInt16LE(parts.length, 8);
  end.writeUInt16LE(parts.length, 10);
  end.writeUInt32LE(listed.length, 12);
  end.writeUInt32LE(offset, 16);
  return Buffer.concat([...bodies, listed, end]);
}
