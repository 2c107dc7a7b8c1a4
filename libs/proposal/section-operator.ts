import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { operatorPage } from '#libs/present/operator-page.js';
import { blankCell } from './blank-cell.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, drawTable } from './table.js';

/** A page that goes to the network operator by itself: what is planned, what it does, what is asked. */
export function drawOperatorPage(paper: Paper, outcome: Outcome | EstimateOutcome): void {
  const { facts, effects, questions } = operatorPage(outcome);
  paper.turnUnlessFresh();
  paper.heading('17', `For the network operator: ${questions.length} questions before the bank is connected`);
  drawTable(
    paper,
    [
      { head: 'connection and bank', share: 34 },
      { head: '', share: 66 },
    ],
    facts,
  );
  if (effects.length > 0) {
    const columns = [
      { head: 'effect on the network, worst level and corner', share: 44 },
      { head: 'value', share: 16, align: 'right' as const },
      { head: 'limit', share: 14, align: 'right' as const },
      { head: 'source', share: 28 },
      { head: 'verdict', share: 20 },
    ];
    drawTable(
      paper,
      columns,
      effects.map(({ what, value, limit, source, verdict }) => [what, value, limit, source, verdict]),
    );
  }
  drawTable(
    paper,
    [
      { head: 'asked', share: 46 },
      { head: 'taken for this plan', share: 30 },
      { head: 'answer', share: 30 },
    ],
    questions.map(({ question, taken }): Cell[] => [question, taken, blankCell(paper)]),
    { after: 5 },
  );
  paper.paragraph(['An answer that differs from what was taken calls for another revision.'], { style: NOTE });
}
