import { INK, SOFT, STROKE } from './ink.js';
import { LABEL, leading, type Paper, rise } from './paper.js';
import type { ProposalFrame } from './proposal-frame.js';
import { BODY, type Style } from './typesetter.js';

const ROLES: [string, string, string][] = [
  ['prepared', 'planner', 'date'],
  ['checked', 'licence', 'date'],
  ['approved', 'licence, jurisdiction', 'date'],
];
const NOTE_STYLE: Style = { ...LABEL, ink: SOFT };
const HEIGHT = 62;

/** Three places to sign; a name only where somebody gave one. */
export function drawSignatures(paper: Paper, frame: ProposalFrame): void {
  paper.heading('1', 'Prepared, checked, approved', { keep: HEIGHT + 4 });
  const gutter = 16;
  const width = (paper.width - 2 * gutter) / 3;
  const top = paper.y;
  const name = paper.type.wrap([frame.preparedBy ?? ''], BODY, width);
  const drop = (Math.max(name.length, 1) - 1) * leading(BODY);
  ROLES.forEach(([role, below, date], at) => {
    const x = paper.left + at * (width + gutter);
    paper.rule({ y: top, from: x, to: x + width, width: STROKE.load, ink: INK });
    paper.tagged('P', () => {
      paper.type.put([role], NOTE_STYLE, x, top + 4 + rise(LABEL));
      if (at === 0) paper.lines(name, BODY, { x, y: top + 21 });
      paper.type.put([below], NOTE_STYLE, x, top + drop + 40 + rise(LABEL));
      paper.type.put(
        [date],
        NOTE_STYLE,
        x + width - paper.type.width([date], NOTE_STYLE),
        top + drop + 40 + rise(LABEL),
      );
    });
    paper.rule({ y: top + drop + 37, from: x, to: x + width, width: STROKE.hair, ink: INK });
  });
  paper.y = top + drop + HEIGHT - 6;
}
