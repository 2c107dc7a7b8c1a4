import type { BankOutcome, StageOut } from '#libs/engine/index.js';
import { FIRMNESS_HEADS, firmnessFinding, firmnessRows } from '#libs/present/firmness.js';
import { formatQuantity } from '#libs/present/format-number.js';
import { verdictWords } from '#libs/present/verdict-words.js';
import { NOTE, type Paper } from './paper.js';
import { drawTable } from './table.js';

/** How far the verdict stands when an input is another one, and what a lost stage changes. */
export function drawSensitivity(paper: Paper, { result }: BankOutcome): void {
  const { robustness } = result;
  if (robustness === null) {
    paper.heading('10', 'Sensitivity: not computed');
    paper.paragraph(['How far the verdict stands when an input moves was not asked for.']);
    return;
  }
  paper.heading('10', `Sensitivity: ${lowered(firmnessFinding(robustness))}`, { keep: 110 });
  if (robustness.ranges.length > 0) {
    const columns = [
      { head: FIRMNESS_HEADS[0], share: 22 },
      { head: FIRMNESS_HEADS[1], share: 39 },
      { head: FIRMNESS_HEADS[2], share: 39 },
    ];
    drawTable(paper, columns, firmnessRows(robustness), { after: 5 });
    paper.paragraph(['Each moved by itself, times its own value, until the verdict is another one.'], { style: NOTE });
  }
  if (robustness.stageOut.length === 0) return;
  const columns = [
    { head: 'one stage out of', share: 22 },
    { head: 'verdict', share: 22 },
    { head: 'nearest to its limit', share: 38 },
    { head: 'share of it', share: 18, align: 'right' as const },
  ];
  drawTable(paper, columns, robustness.stageOut.map(stageRow), { after: 5 });
}

function stageRow({ group, verdict, worstDuty, worstRatio }: StageOut): string[] {
  return [
    `group ${group + 1}`,
    verdictWords(verdict),
    worstDuty ?? '–',
    worstRatio === null ? '–' : formatQuantity(100 * worstRatio, '%'),
  ];
}

function lowered(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}
