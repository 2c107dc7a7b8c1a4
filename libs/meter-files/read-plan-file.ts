import { areDocumentRows, DOCUMENT_HEADS, documentFromRows } from '#libs/contract/document-rows.js';
import {
  AlteredExport,
  type PlanDocument,
  type TakenCalculation,
  type TakenPlan,
  takeBack,
  type TextHash,
} from '#libs/contract/plan-document.js';
import { type EstimateResult, InputProblem, type Problem, type Result } from '#libs/engine/index.js';
import { isXlsx } from './format-starts.js';
import { DOCUMENT_SHEET, SEAL_HEADS } from './plan-file.js';
import { textRows } from './site-document.js';
import type { NamedTable } from './write-tables.js';
import { oneChunk, readWorkbookTables, type SheetRead } from './xlsx/read-workbook-rows.js';

/** No plan of a site is larger as a file [bytes]. */
export const MOST_PLAN_BYTES = 20_000_000;
/** A plan of many buses has some ten thousand values. */
const MOST_ROWS = 400_000;

const FIGURE_HEADS = ['id', 'label', 'value', 'unit', 'formula', 'working', 'source', 'inputs'] as const;
const CALCULATION_HEADS = [...FIGURE_HEADS, ...SEAL_HEADS];
/** "P_1 = 12.5 kW" */
const INPUT = /^(\S+) = (-?(?:\d+\.?\d*)(?:e[+-]?\d+)?)(?: (.+))?$/;

/** What the reading needs of the rim. */
export interface Takes {
  hash: TextHash;
  /** the sheets a plan's workbook has besides its document */
  tablesOf: (result: Result | EstimateResult) => readonly NamedTable[];
}

/**
 * Takes a plan or a calculation sheet back from the file it was exported as, in any of its forms.
 * @param bytes of the file
 * @param takes hash and tables of the rim
 * @returns what was exported, to the bit
 * @throws AlteredExport where the file was changed since, InputProblem where it is none
 */
export async function readPlanFile(bytes: Uint8Array, takes: Takes): Promise<TakenPlan | TakenCalculation> {
  if (bytes.length > MOST_PLAN_BYTES) {
    const found = `${bytes.length}`;
    throw new InputProblem([{ code: 'too-large', expected: `a file of at most ${MOST_PLAN_BYTES} bytes`, found }]);
  }
  if (bytes.length === 0) throw new InputProblem([{ code: 'empty-file', expected: EXPECTED, found: 'an empty file' }]);
  if (!isXlsx(bytes)) return takeBack(isJson(bytes) ? jsonDocument(bytes) : documentOf(textRows(bytes)), takes.hash);
  const sheets = await readWorkbookTables(oneChunk(bytes));
  const whole = sheets.find(({ name }) => name === DOCUMENT_SHEET) ?? sheets[0]!;
  const taken = await takeBack(documentOf(whole.rows), takes.hash);
  if (taken.kind === 'plan') needSameSheets(sheets, takes.tablesOf(taken.result), taken.contentHash);
  return taken;
}

/** What an exported file says for itself, before a register is asked. */
export interface HeldExport {
  kind: 'plan' | 'calculation';
  contentHash: string;
  /** result of a plan, figures of a sheet; null where the file is not what was exported */
  numbers: object | null;
  /** how it shows that it is not */
  fault: Problem | null;
}

/**
 * What a file holds of a plan, whether or not it is as it was exported.
 * @param bytes of the file
 * @param takes hash and tables of the rim
 * @returns null where it is no export
 */
export async function heldExport(bytes: Uint8Array, takes: Takes): Promise<HeldExport | null> {
  if (!mayBePlanFile(bytes)) return null;
  try {
    const taken = await readPlanFile(bytes, takes);
    const { kind, contentHash } = taken;
    return { kind, contentHash, numbers: taken.kind === 'plan' ? taken.result : taken.figures, fault: null };
  } catch (error) {
    if (error instanceof AlteredExport) {
      return { kind: error.kind, contentHash: error.contentHash, numbers: null, fault: error.problems[0]! };
    }
    if (error instanceof InputProblem) return null;
    throw error;
  }
}

const EXPECTED = 'a plan or a calculation sheet as it was exported: JSON, CSV or XLSX';

/**
 * Whether bytes begin as an exported plan or calculation sheet may: a workbook, JSON, or rows with their heads.
 * @param bytes of the file
 */
export function mayBePlanFile(bytes: Uint8Array): boolean {
  if (isXlsx(bytes) || isJson(bytes)) return true;
  const start = Buffer.from(bytes.subarray(0, 200))
    .toString('utf8')
    .replace(/^\ufeff/, '');
  return [DOCUMENT_HEADS, FIGURE_HEADS].some((heads) => start.startsWith(heads.join(',')));
}

function isJson(bytes: Uint8Array): boolean {
  return /^\ufeff?\s*\{/.test(Buffer.from(bytes.subarray(0, 64)).toString('utf8'));
}

function jsonDocument(bytes: Uint8Array): unknown {
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes));
  } catch (error) {
    const found = error instanceof SyntaxError ? error.message.slice(0, 120) : 'bytes that are no UTF-8';
    throw new InputProblem([{ code: 'unreadable', expected: 'a JSON document in UTF-8', found }]);
  }
}

function documentOf(rows: string[][] | null): unknown {
  if (rows !== null && areDocumentRows(rows)) return documentFromRows(rows, MOST_ROWS);
  if (rows !== null && CALCULATION_HEADS.every((head, at) => rows[0]?.[at] === head)) return calculationOf(rows);
  const isOlder = FIGURE_HEADS.every((head, at) => rows?.[0]?.[at] === head);
  const found = isOlder ? 'a calculation sheet that names no plan: export it again' : 'another file';
  throw new InputProblem([{ code: 'unknown-format', expected: EXPECTED, found }]);
}

/** The document of a calculation sheet from its rows; which plan it is of stands in each of them. */
function calculationOf([, ...rows]: string[][]): PlanDocument {
  const problems: Problem[] = [];
  const filled = rows.flatMap((row, at) => (row.every((cell) => cell === '') ? [] : [{ row, number: at + 2 }]));
  const figures = filled.map(({ row, number }) => {
    const [id, label, value, unit, formula, working, source] = row;
    const inputs = inputsOf(row[7] ?? '');
    if (inputs === null) problems.push(cellProblem(number, 8, 'symbol = value unit; …', row[7]!));
    const isNumber = value !== undefined && value.trim() !== '' && Number.isFinite(Number(value));
    if (!isNumber) problems.push(cellProblem(number, 3, 'a number', value ?? ''));
    return { id, label, value: Number(value), unit, formula, working, source, inputs };
  });
  const [first] = filled;
  for (const { row, number } of filled) {
    const other = SEAL_HEADS.findIndex(
      (_, at) => row[FIGURE_HEADS.length + at] !== first!.row[FIGURE_HEADS.length + at],
    );
    if (other < 0) continue;
    problems.push(cellProblem(number, FIGURE_HEADS.length + other + 1, 'the plan of the rows before', row.at(-1)!));
  }
  if (first === undefined) problems.push(cellProblem(2, 1, 'a figure', ''));
  if (problems.length > 0) throw new InputProblem(problems);
  const seal = SEAL_HEADS.map((head, at) => [head, first!.row[FIGURE_HEADS.length + at]]);
  return { figures, frozen: Object.fromEntries(seal) };
}

function cellProblem(row: number, column: number, expected: string, found: string): Problem {
  return { code: 'unreadable', row, column, expected, found: JSON.stringify(found.slice(0, 80)) };
}

function inputsOf(text: string): object[] | null {
  if (text === '') return [];
  const inputs = text.split('; ').map((one) => INPUT.exec(one));
  if (inputs.some((found) => found === null)) return null;
  return inputs.map((found) => ({ symbol: found![1], value: Number(found![2]), unit: found![3] ?? '' }));
}

/** What a reader of the workbook sees is what its document holds, cell by cell. */
function needSameSheets(sheets: readonly SheetRead[], tables: readonly NamedTable[], contentHash: string): void {
  for (const { name, heads, rows } of tables) {
    const sheet = sheets.find((one) => one.name === name);
    if (sheet === undefined) continue;
    const cells = [heads, ...rows];
    for (let row = 0; row < Math.max(cells.length, sheet.rows.length); row++) {
      const [written = [], read = []] = [cells[row], sheet.rows[row]];
      const columns = Array.from({ length: Math.max(written.length, read.length) }, (_, at) => at);
      const column = columns.findIndex((at) => !isSameCell(written[at] ?? null, read[at] ?? ''));
      if (column < 0) continue;
      const place = { path: `sheet ${JSON.stringify(name)}`, row: row + 1, column: column + 1 };
      const expected = `what the plan holds, ${JSON.stringify(written[column] ?? null)?.slice(0, 80)}`;
      const found = JSON.stringify((read[column] ?? '').slice(0, 80));
      throw new AlteredExport({ code: 'inconsistent', ...place, expected, found }, { kind: 'plan', contentHash });
    }
  }
}

function isSameCell(written: NamedTable['rows'][number][number], read: string): boolean {
  if (typeof written === 'number') return read !== '' && Number(read) === written;
  if (typeof written === 'string') return shownText(written) === shownText(read);
  return read.toLowerCase() === (written === null ? '' : String(written));
}

/** A text as a sheet keeps it. */
function shownText(text: string): string {
  return text.replace(/\p{Cc}+|\p{Cs}|[\ufffd-\uffff]/gu, ' ');
}
