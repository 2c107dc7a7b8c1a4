import { madeZip, type ZipPart } from './made-zip.js';

/** A cell: a number, a text (shared), a truth, nothing, or what only the file format tells apart. */
export type MadeCell =
  | number
  | string
  | boolean
  | null
  | { serial: number; style: number }
  | { inline: string }
  | { error: string }
  | { formula: string; value?: number | string }
  | { rich: readonly string[] }
  | { iso: string }
  | { raw: string };

export interface MadeSheet {
  name: string;
  rows: readonly (readonly MadeCell[])[];
  state?: 'hidden' | 'veryHidden';
  /** more XML behind the rows, for example merged cells */
  after?: string;
}

export interface MadeWorkbook {
  sheets: readonly MadeSheet[];
  since1904?: boolean;
  /** own number formats, numbered from 164; style k + FIRST_OWN_STYLE has the k-th of them */
  formats?: readonly string[];
  /** elements carry this prefix, as some programs write them */
  prefix?: string;
}

/** Styles of every made workbook: a number, then the built-in formats 14 (date), 22 (date and time), 20 (clock). */
export const STYLES = { number: 0, date: 1, stamp: 2, clock: 3 } as const;
export const FIRST_OWN_STYLE = 4;

const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const RELATIONS = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const PACKAGE = 'http://schemas.openxmlformats.org/package/2006';
const DECLARATION = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';

const escaped = (text: string) =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');

/** Letters of a column counted from 0. */
export function columnLetters(column: number): string {
  const letters = String.fromCharCode(65 + (column % 26));
  return column < 26 ? letters : columnLetters(Math.floor(column / 26) - 1) + letters;
}

/** Texts that the cells of a workbook share. */
class Shared {
  readonly items: string[] = [];
  readonly #known = new Map<string, number>();

  indexOf(item: string): number {
    const known = this.#known.get(item);
    if (known !== undefined) return known;
    this.#known.set(item, this.items.length);
    return this.items.push(item) - 1;
  }
}

function cellXml(cell: MadeCell, reference: string, shared: Shared): string {
  const c = (attributes: string, content: string) => `<c r="${reference}"${attributes}>${content}</c>`;
  if (cell === null) return '';
  if (typeof cell === 'number') return c('', `<v>${cell}</v>`);
  if (typeof cell === 'boolean') return c(' t="b"', `<v>${cell ? 1 : 0}</v>`);
  if (typeof cell === 'string') {
    return c(' t="s"', `<v>${shared.indexOf(`<t xml:space="preserve">${escaped(cell)}</t>`)}</v>`);
  }
  if ('serial' in cell) return c(` s="${cell.style}"`, `<v>${cell.serial}</v>`);
  if ('inline' in cell) return c(' t="inlineStr"', `<is><t>${escaped(cell.inline)}</t></is>`);
  if ('error' in cell) return c(' t="e"', `<v>${cell.error}</v>`);
  if ('iso' in cell) return c(' t="d"', `<v>${cell.iso}</v>`);
  if ('raw' in cell) return cell.raw.replaceAll('REF', reference);
  if ('rich' in cell) {
    const runs = cell.rich.map((run) => `<r><rPr><b/></rPr><t>${escaped(run)}</t></r>`).join('');
    return c(' t="s"', `<v>${shared.indexOf(`${runs}<rPh sb="0" eb="1"><t>hint</t></rPh>`)}</v>`);
  }
  const formula = `<f>${escaped(cell.formula)}</f>`;
  if (cell.value === undefined) return c('', `${formula}<v></v>`);
  return typeof cell.value === 'string'
    ? c(' t="str"', `${formula}<v>${escaped(cell.value)}</v>`)
    : c('', `${formula}<v>${cell.value}</v>`);
}

function sheetXml({ rows, after = '' }: MadeSheet, shared: Shared): string {
  const xml = rows.map((row, index) => {
    const cells = row.map((cell, column) => cellXml(cell, `${columnLetters(column)}${index + 1}`, shared));
    return row.length === 0 ? '' : `<row r="${index + 1}">${cells.join('')}</row>`;
  });
  return `${DECLARATION}<worksheet xmlns="${MAIN}"><sheetData>${xml.join('')}</sheetData>${after}</worksheet>`;
}

function stylesXml(formats: readonly string[]): string {
  const own = formats.map((code, index) => `<numFmt numFmtId="${164 + index}" formatCode="${escaped(code)}"/>`);
  const ids = [0, 14, 22, 20, ...formats.map((_, index) => 164 + index)];
  const styles = ids.map((id) => `<xf numFmtId="${id}" applyNumberFormat="1"/>`);
  return (
    `${DECLARATION}<styleSheet xmlns="${MAIN}"><numFmts>${own.join('')}</numFmts>` +
    `<cellStyleXfs><xf numFmtId="22"/></cellStyleXfs><cellXfs>${styles.join('')}</cellXfs></styleSheet>`
  );
}

function relationsXml(relations: readonly (readonly [id: string, kind: string, target: string])[]): string {
  const items = relations.map(
    ([id, kind, target]) => `<Relationship Id="${id}" Type="${RELATIONS}/${kind}" Target="${target}"/>`,
  );
  return `${DECLARATION}<Relationships xmlns="${PACKAGE}/relationships">${items.join('')}</Relationships>`;
}

/** The parts of a workbook, to be changed before they are packed. */
export function workbookParts({ sheets, since1904, formats = [], prefix }: MadeWorkbook): ZipPart[] {
  const shared = new Shared();
  const bodies = sheets.map((sheet) => sheetXml(sheet, shared));
  const listed = sheets.map(({ name, state }, index) => {
    const hidden = state === undefined ? '' : ` state="${state}"`;
    return `<sheet name="${escaped(name)}" sheetId="${index + 1}"${hidden} r:id="rId${index + 1}"/>`;
  });
  const workbook =
    `${DECLARATION}<workbook xmlns="${MAIN}" xmlns:r="${RELATIONS}">` +
    `<workbookPr${since1904 ? ' date1904="1"' : ''}/><sheets>${listed.join('')}</sheets></workbook>`;
  const strings = `${DECLARATION}<sst xmlns="${MAIN}">${shared.items.map((item) => `<si>${item}</si>`).join('')}</sst>`;
  const last = sheets.length;
  const relations = relationsXml([
    ...sheets.map((_, index) => [`rId${index + 1}`, 'worksheet', `worksheets/sheet${index + 1}.xml`] as const),
    [`rId${last + 1}`, 'styles', 'styles.xml'],
    [`rId${last + 2}`, 'sharedStrings', '/xl/sharedStrings.xml'],
  ]);
  const parts: ZipPart[] = [
    { name: '[Content_Types].xml', content: `${DECLARATION}<Types xmlns="${PACKAGE}/content-types"/>` },
    { name: '_rels/.rels', content: relationsXml([['rId1', 'officeDocument', 'xl/workbook.xml']]) },
    { name: 'xl/workbook.xml', content: workbook },
    { name: 'xl/_rels/workbook.xml.rels', content: relations },
    { name: 'xl/styles.xml', content: stylesXml(formats) },
    { name: 'xl/sharedStrings.xml', content: strings },
    ...bodies.map((content, index) => ({ name: `xl/worksheets/sheet${index + 1}.xml`, content })),
  ];
  return prefix === undefined ? parts : parts.map((part) => ({ ...part, content: prefixed(part, prefix) }));
}

function prefixed({ name, content }: ZipPart, prefix: string): string {
  const text = String(content);
  if (!name.startsWith('xl/w')) return text;
  return text
    .replace(/<(\/?)(?=[a-zA-Z])/g, `<$1${prefix}:`)
    .replace(`xmlns="${MAIN}"`, `xmlns:${prefix}="${MAIN}"`)
    .replace(/<x:(\/?)Relationship/g, '<$1Relationship');
}

/** A workbook as a file. */
export function madeWorkbook(workbook: MadeWorkbook): Uint8Array {
  return madeZip(workbookParts(workbook));
}

/** Days since the 1900 system's day 0 of a wall time. */
export function serialOf(stamp: string): number {
  return 25_569 + Date.parse(`${stamp.replace(' ', 'T')}Z`) / 86_400_000;
}
