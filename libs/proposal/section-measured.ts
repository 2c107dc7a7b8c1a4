import type { BankOutcome } from '#libs/engine/index.js';
import { say } from '#libs/present/language.js';
import { MEASURED_HEADS, measuredFinding, measuredNote, measuredRows } from '#libs/present/measured-rows.js';
import { plainName } from '#libs/present/plain-name.js';
import { NOTE, type Paper } from './paper.js';
import { type Column, drawTable } from './table.js';

const SHARES = [10, 16, 16, 16, 24, 14, 16];
const IS_RIGHT = [true, false, true, true, true, true, false];

const COLUMNS = MEASURED_HEADS.map(
  (head, at): Column => ({ head, share: SHARES[at]!, ...(IS_RIGHT[at] ? { align: 'right' } : {}) }),
);

/** A measurement beside the model with the same kvar connected. */
export function drawMeasured(paper: Paper, outcome: BankOutcome): void {
  const { measured } = outcome.result;
  if (measured === null || measured.rows.length === 0) return;
  paper.heading('9.7', say`Measured at ${plainName(measured.bus)}: ${measuredFinding(measured)}`, { level: 3 });
  drawTable(paper, COLUMNS, measuredRows(measured), { after: 4 });
  paper.paragraph([measuredNote(measured)], { style: NOTE });
}
