import { type Remark, remark } from '#libs/engine/index.js';
import type { NoteCode, NoteTable } from './note-codes.js';

/**
 * A note of a reader: code and the values the tables of codes ask for.
 * @param code row of the table
 * @param values one a name that stands there
 */
export function note<Code extends NoteCode>(
  code: Code,
  values: Record<NoteTable[Code][number], number | string>,
): Remark {
  return remark(code, values);
}
