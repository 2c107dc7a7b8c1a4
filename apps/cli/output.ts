import { once } from 'node:events';

let written = false;

/** Whether anything of the answer has gone out; after that an error document would only spoil it. */
export function hasWritten(): boolean {
  return written;
}

/**
 * Writes to standard output and waits while its reader is slow.
 * @param text part of the answer
 */
export async function write(text: string): Promise<void> {
  written = true;
  if (!process.stdout.write(text)) await once(process.stdout, 'drain');
}

/**
 * Writes one JSON document.
 * @param document what it holds
 */
export async function writeJson(document: unknown): Promise<void> {
  await write(`${JSON.stringify(document)}\n`);
}

/**
 * Says something to the person, not to the program that reads the answer.
 * @param text one or more lines
 */
export function say(text: string): void {
  process.stderr.write(text.endsWith('\n') ? text : `${text}\n`);
}
