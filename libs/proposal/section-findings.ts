import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { blocking, type Finding, findingCount, findingNumbers, findings, levelWords } from '#libs/present/findings.js';
import { say, words } from '#libs/present/language.js';
import type { FindingLevel } from '#libs/present/message.js';
import { rulesEvaluated, rulesWords } from '#libs/present/rules-evaluated.js';
import { blankCell } from './blank-cell.js';
import { INK, PAPER, SOFT, STROKE } from './ink.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, type Column, drawTable } from './table.js';
import { BODY, NEW_LINE, type Piece, type Style } from './typesetter.js';

const STYLE: Style = { ...BODY, size: 9 };
const COLUMNS: Column[] = words([
  { head: 'level', share: 0, fixed: 63 },
  { head: 'what, and its source', share: 58 },
  { head: 'value', share: 0, fixed: 58, align: 'right' },
  { head: 'limit', share: 0, fixed: 43, align: 'right' },
  { head: 'consequence', share: 42 },
  { head: 'accepted', share: 0, fixed: 37 },
]);

/** What a reviewer has to know, gravest first; each finding to be accepted has a line to sign on. */
export function drawFindings(paper: Paper, outcome: Outcome | EstimateOutcome): void {
  const list = findings(outcome);
  paper.heading('2', say`Findings: ${findingCount(list)}`, { keep: 120 });
  const evaluated = rulesWords(rulesEvaluated(outcome.result));
  if (list.length === 0) {
    paper.paragraph([say`No rule was triggered. ${evaluated}`]);
    return;
  }
  drawTable(
    paper,
    COLUMNS,
    list.map((finding) => findingRow(paper, finding)),
    { style: STYLE, gutter: 10, after: 5 },
  );
  const blocks = blocking(list).length > 0 ? say` While a finding blocks issue, this paper stays a draft.` : '';
  paper.paragraph([`${evaluated}${blocks}`], { style: NOTE });
}

function findingRow(paper: Paper, finding: Finding): Cell[] {
  const { level, what, source, consequence } = finding;
  const { value, limit } = findingNumbers(finding);
  const accepted = level === 'to be accepted' ? blankCell(paper, -1) : '';
  const named: Piece[] = source === '' ? [what] : [what, NEW_LINE, { text: source, ink: SOFT, size: 8.4 }];
  return [levelCell(paper, level), named, value, limit, consequence, accepted];
}

/** The more ink, the graver: white on black, a heavy frame, a thin frame, bare. */
function levelCell(paper: Paper, level: FindingLevel): Cell {
  const blocks = level === 'blocks issue';
  const style: Style = { ...STYLE, size: 8.4, weight: 'semibold', ink: blocks ? PAPER : INK };
  const width = paper.type.width([levelWords(level)], style);
  return {
    pieces: [{ text: levelWords(level), size: style.size, weight: style.weight, ink: style.ink }],
    inset: 4,
    draw({ x, y, height }) {
      const box = [x, y + 0.2, width + 8, height - 0.6] as const;
      if (blocks) paper.doc.rect(...box).fill(INK);
      else if (level === 'to be accepted')
        paper.doc
          .lineWidth(1.5)
          .rect(...box)
          .stroke(INK);
      else if (level === 'to be noted')
        paper.doc
          .lineWidth(STROKE.tick)
          .rect(...box)
          .stroke(INK);
    },
  };
}
