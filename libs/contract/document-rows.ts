import { InputProblem, type Problem } from '#libs/engine/index.js';
import type { TableCell } from './csv-text.js';

/** Names of the columns of a document written as rows. */
export const DOCUMENT_HEADS = ['path', 'kind', 'value'] as const;

const KEY = /^[A-Za-z_]\w*$/;
const STEP = /([A-Za-z_]\w*)|\[(\d{1,5})\]|\[("(?:[^"\\]|\\.){0,200}")\]/y;
/** A site file is written by hand. */
const MOST_ROWS = 50_000;
const MOST_DEPTH = 24;
/** What a cell of a sheet does not keep: line ends, control characters, halves of a character. */
const BROKEN = /\p{Cc}|\p{Cs}|[\ufffe\uffff]/u;

/**
 * A document of plain JSON as rows of path, kind and value, in its own order; nothing of it is lost.
 * @param document numbers, texts, booleans, null, lists and objects with plain keys
 * @returns rows, the heads first
 */
export function documentRows(document: unknown): TableCell[][] {
  const rows: TableCell[][] = [[...DOCUMENT_HEADS]];
  rowsInto(rows, '', document);
  return rows;
}

function rowsInto(rows: TableCell[][], path: string, value: unknown): void {
  if (Array.isArray(value)) listRowsInto(rows, path, value);
  else if (typeof value === 'object' && value !== null) objectRowsInto(rows, path, value);
  else if (typeof value === 'string' && BROKEN.test(value)) rows.push([path, 'quoted text', jsonText(value)]);
  else if (value !== undefined) rows.push([path, kindOf(value), value as TableCell]);
}

function listRowsInto(rows: TableCell[][], path: string, list: readonly unknown[]): void {
  if (list.length === 0) rows.push([path, 'empty list', null]);
  list.forEach((entry, at) => {
    rowsInto(rows, `${path}[${at}]`, entry);
  });
}

function objectRowsInto(rows: TableCell[][], path: string, object: object): void {
  const entries = Object.entries(object).filter(([, member]) => member !== undefined);
  if (entries.length === 0) rows.push([path, 'empty object', null]);
  for (const [key, member] of entries) {
    const step = KEY.test(key) ? `${path === '' ? '' : '.'}${key}` : `[${JSON.stringify(key)}]`;
    rowsInto(rows, `${path}${step}`, member);
  }
}

function jsonText(text: string): string {
  const escaped = (letter: string) => `\\u${letter.charCodeAt(0).toString(16).padStart(4, '0')}`;
  return JSON.stringify(text).replace(/[\u007f-\u009f\ufffe\uffff]/g, escaped);
}

function kindOf(value: unknown): string {
  if (value === null) return 'null';
  if (typeof value === 'string') return 'text';
  if (typeof value === 'number' || typeof value === 'boolean') return typeof value;
  throw new Error(`no row for a ${typeof value}`);
}

/**
 * Whether rows are a document written by `documentRows`.
 * @param rows cells as texts
 */
export function areDocumentRows(rows: readonly (readonly string[])[]): boolean {
  return DOCUMENT_HEADS.every((head, at) => rows[0]?.[at] === head);
}

/**
 * The document that its rows were written from.
 * @param rows cells as texts, no longer guarded, the heads first
 * @param mostRows more are refused
 * @returns the document
 * @throws InputProblem naming every row that can't be understood
 */
export function documentFromRows(rows: readonly (readonly string[])[], mostRows = MOST_ROWS): unknown {
  if (rows.length > mostRows) {
    throw new InputProblem([{ code: 'too-large', expected: `at most ${mostRows} rows`, found: `${rows.length}` }]);
  }
  const holder: Tree = { root: undefined };
  const problems: Problem[] = [];
  rows.slice(1).forEach((row, at) => {
    const [path = '', kind = '', value = ''] = row;
    if (row.every((cell) => cell === '')) return;
    const steps = stepsOf(path);
    const read = readValue(kind, value);
    if (steps === null) problems.push(rowProblem(at + 2, 1, 'a path such as supply.transformers[0].ratedKva', path));
    else if (read === undefined)
      problems.push(rowProblem(at + 2, 3, `a value of the kind ${kind || 'that is missing'}`, value));
    else if (!put(holder, steps, read.value))
      problems.push(rowProblem(at + 2, 1, 'a path once, entries in order', path));
  });
  if (problems.length > 0) throw new InputProblem(problems);
  return holder.root;
}

type Step = string | number;
interface Tree {
  root: unknown;
}

function rowProblem(row: number, column: number, expected: string, found: string): Problem {
  return { code: 'unreadable', row, column, expected, found: JSON.stringify(found.slice(0, 80)) };
}

function stepsOf(path: string): Step[] | null {
  const steps: Step[] = [];
  let at = 0;
  while (at < path.length) {
    STEP.lastIndex = at;
    const found = STEP.exec(path);
    const step = found === null ? null : stepOf(found);
    if (found === null || step === null || step === '__proto__' || steps.length === MOST_DEPTH) return null;
    steps.push(step);
    at += found[0].length;
    if (path[at] === '.') at++;
    else if (at < path.length && path[at] !== '[') return null;
  }
  return path.endsWith('.') ? null : steps;
}

function stepOf([, name, at, quoted]: RegExpExecArray): Step | null {
  if (quoted === undefined) return name ?? Number(at);
  return textOfJson(quoted);
}

/** @returns the text, null where it is none */
function textOfJson(json: string): string | null {
  try {
    const value: unknown = JSON.parse(json);
    return typeof value === 'string' ? value : null;
  } catch {
    return null;
  }
}

function readValue(kind: string, value: string): { value: unknown } | undefined {
  switch (kind) {
    case 'text':
      return { value };
    case 'quoted text': {
      const text = textOfJson(value);
      return text === null ? undefined : { value: text };
    }
    case 'number': {
      const number = Number(value);
      return value.trim() === '' || !Number.isFinite(number) ? undefined : { value: number };
    }
    case 'boolean': {
      const lower = value.toLowerCase();
      return lower === 'true' || lower === 'false' ? { value: lower === 'true' } : undefined;
    }
    case 'null':
      return { value: null };
    case 'empty list':
      return { value: [] };
    case 'empty object':
      return { value: {} };
    default:
      return undefined;
  }
}

type Branch = Record<string, unknown> | unknown[];

/** @returns false where the place is taken, or a list would have a hole */
function put(holder: Tree, steps: readonly Step[], value: unknown): boolean {
  let parent: Branch = holder as unknown as Record<string, unknown>;
  let key: Step = 'root';
  for (const step of steps) {
    const branch = branchAt(parent, key, typeof step === 'number');
    if (branch === null) return false;
    parent = branch;
    key = step;
  }
  return member(parent, key) === undefined && set(parent, key, value);
}

/** What stands there, or a new list or object where nothing does; null where something else does. */
function branchAt(parent: Branch, key: Step, isList: boolean): Branch | null {
  const inside = member(parent, key);
  if (inside === undefined) {
    const made: Branch = isList ? [] : {};
    return set(parent, key, made) ? made : null;
  }
  const isBranch = typeof inside === 'object' && inside !== null && Array.isArray(inside) === isList;
  return isBranch ? (inside as Branch) : null;
}

function member(parent: Branch, key: Step): unknown {
  return Object.hasOwn(parent, key) ? (parent as Record<Step, unknown>)[key] : undefined;
}

function set(parent: Branch, key: Step, value: unknown): boolean {
  if (Array.isArray(parent) && key !== parent.length) return false;
  (parent as Record<Step, unknown>)[key] = value;
  return true;
}
