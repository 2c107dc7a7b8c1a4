import type { BankOutcome } from '#libs/engine/index.js';
import { AGEING_HEADS, AGEING_NOTE, ageingFinding, ageingRows } from '#libs/present/ageing-rows.js';
import { NOTE, type Paper } from './paper.js';
import { type Column, drawTable } from './table.js';

const SHARES = [30, 17, 14, 13, 18, 24];
const IS_RIGHT = [false, true, true, true, false, true];

const COLUMNS = AGEING_HEADS.map(
  (head, at): Column => ({ head, share: SHARES[at]!, ...(IS_RIGHT[at] ? { align: 'right' } : {}) }),
);

/** What becomes of the verdict as capacitors age, and the capacitance at which a stage must come out. */
export function drawAgeing(paper: Paper, outcome: BankOutcome): void {
  const { ageing } = outcome.result;
  if (ageing.cases.length === 0) return;
  paper.heading('12.1', `Ageing: ${ageingFinding(ageing)}`, { level: 3 });
  drawTable(paper, COLUMNS, ageingRows(ageing), { after: 4 });
  paper.paragraph([AGEING_NOTE], { style: NOTE });
}
