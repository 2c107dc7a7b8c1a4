import type { BankOutcome } from '#libs/engine/index.js';
import { say } from '#libs/present/language.js';
import { INK, STROKE } from './ink.js';
import { leading, type Paper, STRONG } from './paper.js';
import { BODY } from './typesetter.js';

/** All cautions, always; the one section where hazard words stand. */
export function drawCautions(paper: Paper, outcome: BankOutcome): void {
  paper.heading('15', say`Cautions`);
  const indent = 20;
  outcome.result.cautions.forEach(({ text }, at) => {
    const lines = paper.type.wrap([text], BODY, paper.width - indent);
    const height = lines.length * leading(BODY);
    paper.need(height + 8);
    const top = paper.y;
    paper.tagged('P', () => {
      paper.type.put([`${at + 1}`], STRONG, paper.left, top + BODY.size);
      paper.lines(lines, BODY, { x: paper.left + indent, y: top });
    });
    paper.y = top + height + 6;
  });
  paper.rule({ y: paper.y + 2, ink: INK, width: STROKE.load });
  paper.y += 8;
}
