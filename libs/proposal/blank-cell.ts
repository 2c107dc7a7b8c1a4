import { INK, STROKE } from './ink.js';
import type { Paper } from './paper.js';
import type { Cell } from './table.js';

/**
 * A cell to be written into.
 * @param paper the page
 * @param drop from the foot of the first line of text to the rule [pt]
 * @returns a rule at the cell's foot, without text
 */
export function blankCell(paper: Paper, drop = 1): Cell {
  return {
    pieces: [''],
    inset: 0,
    draw: ({ x, y, width, height }) => {
      const foot = y + height + drop;
      paper.doc
        .lineWidth(STROKE.tick)
        .moveTo(x, foot)
        .lineTo(x + width, foot)
        .stroke(INK);
    },
  };
}
