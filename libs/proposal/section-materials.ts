import type { BankOutcome } from '#libs/engine/index.js';
import { say } from '#libs/present/language.js';
import { scheduleOfMaterials } from '#libs/present/schedule-of-materials.js';
import { NOTE, type Paper } from './paper.js';
import { drawTable } from './table.js';

/** What is to be bought, by ratings and never by product. */
export function drawMaterials(paper: Paper, outcome: BankOutcome): void {
  const lines = scheduleOfMaterials(outcome);
  if (lines.length === 0) {
    paper.heading('19', say`Schedule of materials: nothing is built`);
    paper.paragraph([say`Nothing is to be bought.`]);
    return;
  }
  paper.heading('19', say`Schedule of materials: ${lines.length} items, by their ratings`);
  const columns = [
    { head: say`item`, share: 36 },
    { head: say`number`, share: 12, align: 'right' as const },
    { head: say`rating`, share: 72 },
  ];
  drawTable(
    paper,
    columns,
    lines.map(({ item, number, rating }) => [item, number, rating]),
    { after: 5 },
  );
  paper.paragraph(
    [
      say`Least ratings by this plan; section 7.2 names their sources. What is offered otherwise is entered and judged again.`,
    ],
    { style: NOTE },
  );
}
