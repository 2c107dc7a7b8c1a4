import type { BankOutcome, Figure } from '#libs/engine/index.js';
import { engineName } from '#libs/present/engine-name.js';
import { formatNumber, printedArithmetic } from '#libs/present/format-number.js';
import { handChecked } from '#libs/present/hand-checked.js';
import { say } from '#libs/present/language.js';
import { blankCell } from './blank-cell.js';
import { SOFT } from './ink.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, type Column, drawTable } from './table.js';
import { NEW_LINE } from './typesetter.js';

/** The few decisive figures to be worked again by hand, with room for the checker's own. */
export function drawHandCheck(paper: Paper, outcome: BankOutcome): void {
  const rows = handChecked(outcome.result.figures);
  paper.heading('13', say`Hand check: work these again, apart from this paper`);
  const columns: Column[] = [
    { head: say`quantity`, share: 30 },
    { head: say`by hand`, share: 46 },
    { head: say`gives`, share: 16, align: 'right' },
    { head: say`checker’s figure`, share: 18 },
  ];
  drawTable(
    paper,
    columns,
    rows.map((figure) => checkRow(paper, figure)),
    { after: 4 },
  );
  paper.paragraph([say`The resonance is the closed form, damping left out; the scan of section 9 lies beside it.`], {
    style: NOTE,
  });
}

function checkRow(paper: Paper, figure: Figure): Cell[] {
  const unit = figure.unit === '' ? '' : `\u00a0${engineName(figure.unit)}`;
  return [
    figure.label,
    [{ text: printedArithmetic(figure.formula), ink: SOFT }, NEW_LINE, printedArithmetic(figure.working)],
    [{ text: `${formatNumber(figure.value, 'answer')}${unit}`, weight: 'semibold' }],
    blankCell(paper),
  ];
}
