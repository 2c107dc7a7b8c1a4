import type { BankOutcome } from '#libs/engine/index.js';
import { AGEING_HEADS, ageingNote, ageingFinding, ageingRows } from '#libs/present/ageing-rows.js';
import { say } from '#libs/present/language.js';
import { HISTORY_HEADS, historyRows } from '#libs/present/stage-history-words.js';
import { NOTE, type Paper } from './paper.js';
import { type Column, drawTable } from './table.js';

const SHARES = [30, 17, 14, 13, 18, 24];
const IS_RIGHT = [false, true, true, true, false, true];

/** What becomes of the verdict as capacitors age, and the capacitance at which a stage must come out. */
export function drawAgeing(paper: Paper, outcome: BankOutcome): void {
  const { ageing } = outcome.result;
  const { measured } = ageing;
  if (ageing.cases.length === 0) return;
  paper.heading('12.1', say`Ageing: ${ageingFinding(ageing)}`, { level: 3 });
  const heads = AGEING_HEADS.map(
    (head, at): Column => ({ head, share: SHARES[at]!, ...(IS_RIGHT[at] ? { align: 'right' } : {}) }),
  );
  drawTable(paper, heads, ageingRows(ageing), { after: 4 });
  paper.paragraph([ageingNote()], { style: NOTE });
  if (measured.length === 0) return;
  const shares = [17, 25, 20, 12, 13, 21];
  const columns = HISTORY_HEADS.map((head, k) => ({
    head,
    share: shares[k]!,
    align: k < 2 ? ('left' as const) : ('right' as const),
  }));
  drawTable(paper, columns, historyRows(measured), { after: 4 });
  paper.paragraph(
    [
      say`Measured stages: kvar of the capacitors at their rated voltage, Q_N · ΣC/(3 · C_N), from three line currents at the
        bus voltage, the reactor taken off, or from three capacitances between terminals. Harmonics read with the
        currents make a stage look larger.`,
    ],
    { style: NOTE },
  );
}
