import type { BankOutcome } from '#libs/engine/index.js';
import { controllerSheet } from '#libs/present/controller-sheet.js';
import { say } from '#libs/present/language.js';
import { blankCell } from './blank-cell.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, drawTable } from './table.js';

/** The sheet for whoever sets the controller: every setting, where it comes from, and room for what was left. */
export function drawSettings(paper: Paper, outcome: BankOutcome): void {
  const lines = controllerSheet(outcome);
  if (lines.length === 0) {
    paper.heading('16', say`Controller settings: there is no controller`);
    paper.paragraph([say`Nothing is switched, so nothing is to be set.`]);
    return;
  }
  paper.turnUnlessFresh();
  paper.heading('16', say`Controller settings: ${lines.length} to be entered and written down as left`);
  const columns = [
    { head: say`setting`, share: 38 },
    { head: say`enter`, share: 20, align: 'right' as const },
    { head: say`how derived`, share: 42 },
    { head: say`as left`, share: 18 },
  ];
  drawTable(
    paper,
    columns,
    lines.map(({ setting, value, derived }): Cell[] => [setting, value, derived, blankCell(paper)]),
    { after: 5 },
  );
  paper.paragraph(
    [
      say`The controller’s own names differ. What is left otherwise than here is written down, and the plan is computed again.`,
    ],
    { style: NOTE },
  );
}
