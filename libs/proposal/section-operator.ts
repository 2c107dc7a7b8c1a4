import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { say } from '#libs/present/language.js';
import { operatorPage } from '#libs/present/operator-page.js';
import { blankCell } from './blank-cell.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, drawTable } from './table.js';

/** A page that goes to the network operator by itself: what is planned, what it does, what is asked. */
export function drawOperatorPage(paper: Paper, outcome: Outcome | EstimateOutcome): void {
  const { facts, effects, questions } = operatorPage(outcome);
  paper.turnUnlessFresh();
  paper.heading('17', say`For the network operator: ${questions.length} questions before the bank is connected`);
  drawTable(
    paper,
    [
      { head: say`connection and bank`, share: 34 },
      { head: '', share: 66 },
    ],
    facts,
  );
  if (effects.length > 0) {
    const columns = [
      { head: say`effect on the network, worst level and corner`, share: 44 },
      { head: say`value`, share: 16, align: 'right' as const },
      { head: say`limit`, share: 14, align: 'right' as const },
      { head: say`source`, share: 28 },
      { head: say`verdict`, share: 20 },
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
      { head: say`asked`, share: 46 },
      { head: say`taken for this plan`, share: 30 },
      { head: say`answer`, share: 30 },
    ],
    questions.map(({ question, taken }): Cell[] => [question, taken, blankCell(paper)]),
    { after: 5 },
  );
  paper.paragraph([say`An answer that differs from what was taken calls for another revision.`], { style: NOTE });
}
