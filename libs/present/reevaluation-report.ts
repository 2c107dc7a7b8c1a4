import type { Reevaluated } from '#libs/engine/index.js';
import {
  CHANGE_HEADS,
  changeRows,
  INPUT_HEADS,
  inputRows,
  LIKE_HEADS,
  likeRows,
  REMEDY_HEADS,
  reevaluationFinding,
  remedyRows,
  sinceSentences,
} from './reevaluation-words.js';
import { finished, leftTableLines, wrapped } from './terminal-lines.js';
import { measuredGroupSentences, tonightSentences } from './tonight-words.js';
import { noPermission } from './verdict-words.js';

/**
 * A bank judged again, for a terminal: what to do first, then what changed, what would mend it, and since when.
 * @param reevaluated the re-evaluation with its outcomes
 * @returns lines of plain text, ending in a line end
 */
export function reevaluationReport({ reevaluation, after }: Reevaluated): string {
  const currency = after.site.currency ?? '';
  const part = (head: readonly string[], rows: readonly string[][]): string[] =>
    rows.length === 0 ? [] : [...leftTableLines(head, rows), ''];
  const tonight = tonightSentences(reevaluation);
  const since = sinceSentences(reevaluation);
  return finished([
    ...wrapped(`Judged again: ${reevaluationFinding(reevaluation)}. ${noPermission()}`, ''),
    '',
    ...tonight.flatMap((sentence) => wrapped(`! ${sentence}`, '  ')),
    ...(tonight.length === 0 ? [] : ['']),
    ...measuredGroupSentences(reevaluation).flatMap((sentence) => [...wrapped(sentence, ''), '']),
    ...part(INPUT_HEADS, inputRows(reevaluation)),
    ...part(CHANGE_HEADS, changeRows(reevaluation, currency)),
    ...part(REMEDY_HEADS, remedyRows(reevaluation, currency)),
    ...since.flatMap((sentence) => wrapped(`- ${sentence}`, '  ')),
    ...(since.length === 0 ? [] : ['']),
    ...part(LIKE_HEADS, likeRows(reevaluation)),
  ]);
}
