import type { BankOutcome, ReactorTrial, StageOut } from '#libs/engine/index.js';
import { engineName } from '#libs/present/engine-name.js';
import { FIRMNESS_HEADS, firmnessFinding, firmnessRows } from '#libs/present/firmness.js';
import { lowered } from '#libs/present/first-letter.js';
import { formatQuantity } from '#libs/present/format-number.js';
import { say } from '#libs/present/language.js';
import { trialTable } from '#libs/present/trial-rows.js';
import { verdictWords } from '#libs/present/verdict-words.js';
import { NOTE, type Paper } from './paper.js';
import { drawTable } from './table.js';
import { BODY } from './typesetter.js';

/** How far the verdict stands when an input is another one, and what a lost stage changes. */
export function drawSensitivity(paper: Paper, { result, site }: BankOutcome): void {
  const { robustness } = result;
  if (robustness === null) {
    paper.heading('10', say`Sensitivity: not computed`);
    paper.paragraph([say`How far the verdict stands when an input moves was not asked for.`]);
    return;
  }
  paper.heading('10', say`Sensitivity: ${lowered(firmnessFinding(robustness))}`, { keep: 110 });
  if (robustness.ranges.length > 0) {
    const columns = [
      { head: FIRMNESS_HEADS[0], share: 22 },
      { head: FIRMNESS_HEADS[1], share: 39 },
      { head: FIRMNESS_HEADS[2], share: 39 },
    ];
    drawTable(paper, columns, firmnessRows(robustness), { after: 5 });
    paper.paragraph([say`Each moved by itself, times its own value, until the verdict is another one.`], {
      style: NOTE,
    });
  }
  drawStagesOut(paper, robustness.stageOut);
  drawTrials(paper, result.reactorTrials, site.papers.currency);
}

function drawStagesOut(paper: Paper, stageOut: readonly StageOut[]): void {
  if (stageOut.length === 0) return;
  const columns = [
    { head: say`one stage out of`, share: 22 },
    { head: say`verdict`, share: 22 },
    { head: say`nearest to its limit`, share: 38 },
    { head: say`share of it`, share: 18, align: 'right' as const },
  ];
  drawTable(paper, columns, stageOut.map(stageRow), { after: 5 });
}

function drawTrials(paper: Paper, trials: readonly ReactorTrial[], currency: string): void {
  if (trials.length === 0) return;
  paper.heading('10.1', say`Reactor ratios tried with the same stages`, { level: 3 });
  const { columns, rows } = trialTable(trials, currency);
  drawTable(paper, columns, rows, { style: { ...BODY, size: 8.6 }, after: 5 });
  const note = say`A filter is tuned a little below the order of the greatest current, to take it up; its stage carries that current.`;
  paper.paragraph([note], { style: NOTE });
}

function stageRow({ group, verdict, worstDuty, worstRatio }: StageOut): string[] {
  return [
    say`group ${group + 1}`,
    verdictWords(verdict),
    worstDuty === null ? '–' : engineName(worstDuty),
    worstRatio === null ? '–' : formatQuantity(100 * worstRatio, '%'),
  ];
}
