import { shown } from '#libs/contract/shown.js';
import { InputProblem, type Remark } from '#libs/engine/index.js';
import { isCompound } from '../format-starts.js';
import type { MeterBytes } from '../meter-bytes.js';
import type { MeterReading, ReadOptions } from '../meter-format.js';
import { note } from '../note.js';
import { readingOf } from '../sheet/read-sheet-text.js';
import { SpooledFile } from '../spooled-file.js';
import { CellStyles } from './cell-styles.js';
import { chooseSheet, type SheetAttempt } from './choose-sheet.js';
import { type OpenWorkbook, readSheet } from './read-sheet.js';
import { SharedStrings } from './shared-strings.js';
import { readWorkbook, type Workbook, type Worksheet } from './workbook-parts.js';
import { readXml } from './xml-part.js';
import { ZipArchive } from './zip-archive.js';

/** Spooling is a small part of the work. */
const SPOOL_SHARE = 0.05;

/**
 * Reads a workbook: every sheet row by row, the sheet that holds the record chosen.
 * @param source the file
 * @param options what is said about it; the map may name the sheet
 * @returns the record and its quality
 * @throws InputProblem where it can't be read, Question where several sheets hold a record
 */
export async function readXlsx(source: MeterBytes, options: ReadOptions): Promise<MeterReading> {
  refuseCompound(source.head);
  source.isShareOfWork(SPOOL_SHARE);
  const file = await SpooledFile.from(source);
  try {
    const archive = await ZipArchive.open(file);
    const workbook = await readWorkbook(archive);
    return await readWorkbookSheets(archive, workbook, options);
  } finally {
    await file.close();
  }
}

async function readWorkbookSheets(
  archive: ZipArchive,
  workbook: Workbook,
  options: ReadOptions,
): Promise<MeterReading> {
  const wanted = wantedSheets(workbook.sheets, options.map?.sheet);
  const open: OpenWorkbook = { archive, options, context: await contextOf(archive, workbook) };
  const onRead = progress(archive, wanted, options);
  const attempts: SheetAttempt[] = [];
  for (const [index, sheet] of wanted.entries()) {
    attempts.push({ sheet, result: await attemptAt(open, sheet, (bytes) => onRead(index, bytes)) });
  }
  const { sheet, reading } = chooseSheet(attempts);
  return readingOf(reading, 'xlsx', sheetNotes(sheet, workbook.sheets));
}

async function attemptAt(open: OpenWorkbook, sheet: Worksheet, onRead: (bytes: number) => void) {
  try {
    return await readSheet(open, sheet, onRead);
  } catch (problem) {
    if (problem instanceof InputProblem) return problem;
    throw problem;
  }
}

/** What the cells of a workbook are read by: its shared texts and the styles of its numbers. */
export async function contextOf(archive: ZipArchive, { strings, styles, since1904 }: Workbook) {
  const shared = new SharedStrings(strings ?? '');
  const formats = new CellStyles(styles ?? '');
  if (strings !== null) await readXml(strings, archive.part(strings), shared);
  if (styles !== null) await readXml(styles, archive.part(styles), formats);
  return { strings: shared.strings, styles: formats.styles, since1904 };
}

function wantedSheets(sheets: Worksheet[], said: number | string | undefined): Worksheet[] {
  if (said === undefined) return sheets;
  const found =
    typeof said === 'number'
      ? sheets[said - 1]
      : (sheets.find(({ name }) => name === said) ??
        sheets.find(({ name }) => name.trim().toLowerCase() === said.trim().toLowerCase()));
  if (found !== undefined) return [found];
  const expected = `a sheet of the workbook: ${namesOf(sheets)}`;
  throw new InputProblem([{ code: 'out-of-range', path: 'sheet', expected, found: shown(said) }]);
}

/** Share of the sheets' packed bytes that has been read. */
function progress(archive: ZipArchive, sheets: Worksheet[], { watch }: ReadOptions) {
  const sizes = sheets.map(({ part }) => archive.packedBytes(part));
  const whole = sizes.reduce((sum, size) => sum + size, 0) || 1;
  let most = 0;
  return (index: number, bytes: number) => {
    const before = sizes.slice(0, index).reduce((sum, size) => sum + size, 0);
    most = Math.max(most, Math.min(1, (before + bytes) / whole));
    watch?.report(SPOOL_SHARE + (1 - SPOOL_SHARE) * most);
  };
}

function sheetNotes(sheet: Worksheet, sheets: readonly Worksheet[]): Remark[] {
  const hidden = sheets.filter((other) => other.hidden);
  return [
    ...(sheets.length > 1 ? [note('sheet-read', { sheet: sheet.name, sheets: sheets.length })] : []),
    ...(hidden.length > 0 ? [note('sheets-hidden', { sheets: namesOf(hidden) })] : []),
  ];
}

function namesOf(sheets: readonly Worksheet[]): string {
  const names = sheets.map(({ name }) => name).join(', ');
  return names.length > 300 ? `${names.slice(0, 300)}…` : names;
}

/** The directory of a compound file names the stream of an encrypted package in UTF-16 (MS-OFFCRYPTO, 2.3.4.4). */
function refuseCompound(head: Uint8Array): void {
  if (!isCompound(head)) return;
  const encrypted = Buffer.from(head).includes(Buffer.from('EncryptedPackage', 'utf16le'));
  const found = encrypted ? 'a workbook with a password' : 'a workbook with a password or of the older format (.xls)';
  throw new InputProblem([
    { code: 'unknown-format', expected: 'a workbook saved as .xlsx, without a password', found },
  ]);
}
