import { open } from 'node:fs/promises';
import { InputProblem, type ProblemCode } from '#libs/engine/index.js';
import { fileChunks } from '#libs/meter-files/file-chunks.js';
import { STDIN } from './command-line.js';

/** A site or a map is written by hand; far larger files are something else. */
const MOST_JSON_BYTES = 8 * 1024 * 1024;

/** A file on its way in; a chunk of it holds until the one after it is asked for. */
export interface InputFile {
  bytes: AsyncIterable<Uint8Array>;
  /** undefined for standard input */
  sizeBytes: number | undefined;
}

/**
 * Opens a file, or standard input for "-".
 * @param path what was typed
 * @returns its bytes in chunks
 * @throws InputProblem where it can't be opened
 */
export async function openInput(path: string): Promise<InputFile> {
  if (path === STDIN) return { bytes: process.stdin, sizeBytes: undefined };
  try {
    const file = await open(path, 'r');
    const { size } = await file.stat();
    return { bytes: readable(fileChunks(file), path), sizeBytes: size };
  } catch (error) {
    throw unreadable(error, path);
  }
}

/**
 * Reads a JSON file of moderate size.
 * @param path what was typed
 * @returns what JSON.parse gave
 * @throws InputProblem where it can't be opened, is no UTF-8, no JSON, or too large
 */
export async function readJson(path: string): Promise<unknown> {
  return jsonFrom(await readModerate(path));
}

/**
 * Reads a file of moderate size whole.
 * @param path what was typed
 * @returns its bytes
 * @throws InputProblem where it can't be opened, or is too large
 */
export async function readModerate(path: string): Promise<Uint8Array> {
  const bytes = await readSmall(path, MOST_JSON_BYTES);
  if (bytes.length > MOST_JSON_BYTES) throw refusal('too-large', `a file of at most ${MOST_JSON_BYTES} bytes`, 'more');
  return bytes;
}

/**
 * Reads a small file whole.
 * @param path what was typed
 * @param mostBytes beyond these nothing is read [bytes]
 * @returns its bytes; one more than the most where there are more
 * @throws InputProblem where it can't be opened
 */
export async function readSmall(path: string, mostBytes: number): Promise<Uint8Array> {
  const { bytes } = await openInput(path);
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of bytes) {
    size += chunk.length;
    chunks.push(new Uint8Array(chunk));
    if (size > mostBytes) break;
  }
  return Buffer.concat(chunks).subarray(0, mostBytes + 1);
}

/**
 * What a JSON document says.
 * @param bytes UTF-8
 * @returns what JSON.parse gave
 * @throws InputProblem where it is no UTF-8 or no JSON
 */
export function jsonFrom(bytes: Uint8Array): unknown {
  let text: string;
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw refusal('unreadable', 'text in UTF-8', 'other bytes');
  }
  if (text.trim() === '') throw refusal('empty-file', 'a JSON document', 'an empty file');
  try {
    return JSON.parse(text);
  } catch (error) {
    throw notJson(error instanceof Error ? error.message : String(error), text);
  }
}

/** The run-time names a position in some of its messages; where it does, row and column are told. */
function notJson(message: string, text: string): InputProblem {
  const position =
    /at position (\d+)/.exec(message)?.[1] ?? (/end of JSON/.test(message) ? `${text.length}` : undefined);
  const found = message.replace(/ in JSON at position.*| is not valid JSON.*/s, '').slice(0, 120);
  if (position === undefined) return refusal('unreadable', 'a JSON document', found);
  const before = text.slice(0, Number(position)).split('\n');
  const place = { row: before.length, column: (before.at(-1)?.length ?? 0) + 1 };
  return new InputProblem([{ code: 'unreadable', ...place, expected: 'a JSON document', found }]);
}

async function* readable(stream: AsyncIterable<Uint8Array>, path: string): AsyncGenerator<Uint8Array> {
  try {
    yield* stream;
  } catch (error) {
    throw isSystemError(error) ? unreadable(error, path) : error;
  }
}

function unreadable(error: unknown, path: string): unknown {
  if (!isSystemError(error)) return error;
  const named = JSON.stringify(path);
  if (error.code === 'ENOENT') return refusal('not-found', 'a file that is there', `no file ${named}`);
  return refusal('unreadable', 'a file that can be read', `${named} (${error.code})`);
}

function isSystemError(error: unknown): error is Error & { code: string } {
  return error instanceof Error && 'code' in error && typeof error.code === 'string' && 'syscall' in error;
}

function refusal(code: ProblemCode, expected: string, found: string): InputProblem {
  return new InputProblem([{ code, expected, found }]);
}
