import type { BankOutcome, Figure } from '#libs/engine/index.js';
import { formatNumber } from '#libs/present/format-number.js';
import { INK, SOFT, STROKE } from './ink.js';
import { NOTE, type Paper } from './paper.js';
import { type Cell, type Column, drawTable } from './table.js';
import { NEW_LINE } from './typesetter.js';

const MOST_ROWS = 10;

/** The few decisive figures to be worked again by hand, with room for the checker's own. */
export function drawHandCheck(paper: Paper, outcome: BankOutcome): void {
  const rows = handChecked(outcome.result.figures);
  paper.heading('13', 'Hand check: work these again, apart from this paper');
  const columns: Column[] = [
    { head: 'quantity', share: 30 },
    { head: 'by hand', share: 46 },
    { head: 'gives', share: 16, align: 'right' },
    { head: 'checker’s figure', share: 18 },
  ];
  drawTable(
    paper,
    columns,
    rows.map((figure) => checkRow(paper, figure)),
    { after: 4 },
  );
  paper.paragraph(['The resonance is the closed form, damping left out; the scan of section 9 lies beside it.'], {
    style: NOTE,
  });
}

/** Fault level, one stage of each group, bank, tuned order, parallel resonance. */
function handChecked(figures: readonly Figure[]): Figure[] {
  const wanted = [
    /^network\.shortCircuitMva$/,
    /^bank\.group\[\d+\]\.effectiveKvar$/,
    /^bank\.effectiveKvar$/,
    /^bank\.group\[\d+\]\.tunedOrderH$/,
    /^network\.parallelOrderClosedFormH$/,
  ];
  const found = wanted.flatMap((pattern) => figures.filter(({ id }) => pattern.test(id)));
  const distinct = found.filter(({ working }, at) => found.findIndex((other) => other.working === working) === at);
  if (distinct.length <= MOST_ROWS) return distinct;
  const single = (id: string) => !/\[[1-9]\d*\]/.test(id);
  return distinct.filter(({ id }) => single(id)).slice(0, MOST_ROWS);
}

function checkRow(paper: Paper, figure: Figure): Cell[] {
  const blank: Cell = {
    pieces: [''],
    inset: 0,
    draw: ({ x, y, width, height }) => {
      const foot = y + height + 1;
      paper.doc
        .lineWidth(STROKE.tick)
        .moveTo(x, foot)
        .lineTo(x + width, foot)
        .stroke(INK);
    },
  };
  const unit = figure.unit === '' ? '' : `\u00a0${figure.unit}`;
  return [
    figure.label,
    [{ text: figure.formula, ink: SOFT }, NEW_LINE, figure.working],
    [{ text: `${formatNumber(figure.value, 'answer')}${unit}`, weight: 'semibold' }],
    blank,
  ];
}
