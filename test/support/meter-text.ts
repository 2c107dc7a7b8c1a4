import { Question } from '#libs/contract/question.js';
import { InputProblem } from '#libs/engine/index.js';
import type { MeterReading, ReadOptions } from '#libs/meter-files/meter-format.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';

/** A file as a stream of chunks, each wiped once the one after it is asked for: no reader may count on more. */
export async function* streamOf(content: string | Uint8Array, chunkBytes = 65_536): AsyncGenerator<Uint8Array> {
  const bytes = typeof content === 'string' ? new TextEncoder().encode(content) : content;
  for (let at = 0; at < bytes.length; at += chunkBytes) {
    const chunk = new Uint8Array(bytes.subarray(at, at + chunkBytes));
    yield chunk;
    chunk.fill(0);
  }
}

/** Reads a meter file given as text or bytes. */
export function readMeterText(content: string | Uint8Array, options: ReadOptions = {}): Promise<MeterReading> {
  return readMeterFile(streamOf(content), options);
}

/** What a file is refused with; a plain error where it is read. */
export async function refusalOf(content: string | Uint8Array, options: ReadOptions = {}): Promise<InputProblem> {
  try {
    await readMeterText(content, options);
  } catch (problem) {
    if (problem instanceof InputProblem) return problem;
    throw problem;
  }
  throw new Error('the file was read');
}

/** What a file raises a question with. */
export async function questionOf(content: string | Uint8Array, options: ReadOptions = {}): Promise<Question> {
  const problem = await refusalOf(content, options);
  if (problem instanceof Question) return problem;
  throw problem;
}

/** Rows joined to a file, the last one ended too. */
export function lines(...rows: readonly string[]): string {
  return rows.map((row) => `${row}\n`).join('');
}

/** Codes of a record's notes. */
export function noteCodes({ record }: MeterReading): string[] {
  return record.notes.map(({ code }) => code);
}
