import type { BankOutcome, Reevaluation } from '#libs/engine/index.js';
import { say } from '#libs/present/language.js';
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
} from '#libs/present/reevaluation-words.js';
import { measuredGroupSentences } from '#libs/present/tonight-words.js';
import { NOTE, type Paper } from './paper.js';
import { type Column, drawTable } from './table.js';
import { BODY, type Style } from './typesetter.js';

const SMALL: Style = { ...BODY, size: 8.8 };

/** Shares of the columns; the first is words, the others figures. */
const CHANGE_SHARES = [34, 16, 16, 14, 28];
const REMEDY_SHARES = [52, 18, 15, 15, 16, 16];
const INPUT_SHARES = [50, 25, 25];
const LIKE_SHARES = [54, 23, 23];

/** A bank judged again: what changed in numbers, what would mend it, and since when. */
export function drawReevaluation(paper: Paper, { site }: BankOutcome, reevaluation: Reevaluation | undefined): void {
  if (reevaluation === undefined) return;
  const currency = site.currency ?? '';
  paper.heading('A', say`Judged again: ${reevaluationFinding(reevaluation)}`, { level: 3, keep: 90 });
  for (const sentence of measuredGroupSentences(reevaluation)) paper.paragraph([sentence]);
  drawPart(paper, { heads: INPUT_HEADS, shares: INPUT_SHARES, right: [] }, inputRows(reevaluation));
  drawPart(paper, { heads: CHANGE_HEADS, shares: CHANGE_SHARES, right: [1, 2, 3] }, changeRows(reevaluation, currency));
  drawPart(
    paper,
    { heads: REMEDY_HEADS, shares: REMEDY_SHARES, right: [2, 3, 4, 5] },
    remedyRows(reevaluation, currency),
  );
  for (const sentence of sinceSentences(reevaluation)) paper.paragraph([sentence]);
  drawPart(paper, { heads: LIKE_HEADS, shares: LIKE_SHARES, right: [1, 2] }, likeRows(reevaluation));
  paper.paragraph(
    [
      say`Before and after are judged by the same engine, the bank as it measures. A way to mend it is weighed by itself, with
        the lowest set point that meets the target; parts are capacitors, stages, reactors and switches by the price book,
        and more cabinets where a larger bank needs them: no offer. The day of a change leaves the least sum of squares,
        each weekday with a mean of its own.`,
    ],
    { style: NOTE },
  );
}

interface Part {
  heads: readonly string[];
  shares: readonly number[];
  /** columns of figures */
  right: readonly number[];
}

function drawPart(paper: Paper, { heads, shares, right }: Part, rows: readonly string[][]): void {
  if (rows.length === 0) return;
  const columns: Column[] = heads.map((head, k) => ({
    head,
    share: shares[k]!,
    align: right.includes(k) ? 'right' : 'left',
  }));
  drawTable(paper, columns, [...rows], { style: SMALL, padding: 2.4, after: 5 });
}
