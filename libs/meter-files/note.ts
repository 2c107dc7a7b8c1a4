import { type Remark, remark } from '#libs/engine/index.js';
import type { NOTE_CODES, NoteCode } from './note-codes.js';

/**
 * A note of a reader: code and the values the table of codes asks for.
 * @param code row of the table
 * @param values one a name that stands there
 */
export function note<Code extends NoteCode>(
  code: Code,
  values: Record<(typeof NOTE_CODES)[Code][number], number | string>,
): Remark {
  return remark(code, values);
}
