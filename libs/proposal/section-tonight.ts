import type { BankTonight } from '#libs/engine/index.js';
import { tonightSentences } from '#libs/present/tonight-words.js';
import { INK, STROKE } from './ink.js';
import { leading, type Paper, STRONG } from './paper.js';
import { BODY } from './typesetter.js';

const PADDING = 12;
const GAP = 5;

/** What to do at once with an installed bank that is over a limit, framed, before anything else the paper says. */
export function drawTonight(paper: Paper, tonight: BankTonight): void {
  const paragraphs = tonightSentences(tonight).map((sentence, at) => {
    const style = at === 0 ? STRONG : BODY;
    const lines = paper.type.wrap([sentence], style, paper.width - 2 * PADDING);
    return { lines, style, height: lines.length * leading(style) };
  });
  if (paragraphs.length === 0) return;
  const inside = paragraphs.reduce((sum, { height }) => sum + height + GAP, -GAP);
  const height = inside + 2 * PADDING;
  paper.need(height);
  const top = paper.y;
  paper.artifact(() => {
    paper.doc.lineWidth(STROKE.load).rect(paper.left, top, paper.width, height).stroke(INK);
  });
  let y = top + PADDING;
  for (const { lines, style, height: tall } of paragraphs) {
    paper.tagged('P', () => paper.lines(lines, style, { x: paper.left + PADDING, y }));
    y += tall + GAP;
  }
  paper.y = top + height + 12;
}
