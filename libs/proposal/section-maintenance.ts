import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { say } from '#libs/present/language.js';
import { maintenanceLines } from '#libs/present/maintenance-lines.js';
import { NOTE, type Paper } from './paper.js';
import { drawTable } from './table.js';

/** How often the bank is looked at, and what is rejected. */
export function drawMaintenance(paper: Paper, outcome: Outcome | EstimateOutcome): void {
  const lines = maintenanceLines(outcome);
  if (lines.length === 0) {
    paper.heading('18', say`Maintenance: there is no bank`);
    paper.paragraph([say`Nothing is connected, so nothing has to be looked after.`]);
    return;
  }
  paper.heading('18', say`Maintenance: ${lines.length} checks with their reject values`);
  const columns = [
    { head: say`check`, share: 36 },
    { head: say`every`, share: 14, align: 'right' as const },
    { head: say`expected`, share: 17, align: 'right' as const },
    { head: say`rejected`, share: 36 },
    { head: say`basis`, share: 32 },
  ];
  drawTable(
    paper,
    columns,
    lines.map(({ check, every, expected, rejected, basis }) => [check, every, expected, rejected, basis]),
    { after: 5 },
  );
  paper.paragraph(
    [
      say`All of them once more a week after the first switching on. Intervals are common practice; dust, heat and many switchings
        call for shorter ones. A stage that is rejected comes out, and section 10 says what is left without it. Section 15 first.`,
    ],
    { style: NOTE },
  );
}
