// How firm the verdict is, on paper against the result it was drawn from, read back by a text extractor (poppler's
// pdftotext): where the verdict changes, to the digit it is printed with.
import { expect, it } from 'vitest';
import { type Outcome, withRobustness } from '#libs/engine/index.js';
import { formatNumber } from '#libs/present/format-number.js';
import { trialReason } from '#libs/present/trial-rows.js';
import { renderProposal } from '#libs/proposal/render-proposal.js';
import { MADE_BANK, madeFrame, madeOutcome } from '../support/outcome.js';
import { squeezed, textOf } from '../support/pdf-text.js';

async function paperOf(outcome: Outcome): Promise<string> {
  const text = squeezed(textOf(await renderProposal(outcome, madeFrame())));
  return text.slice(text.indexOf(squeezed('10Sensitivity:')), text.indexOf(squeezed('11Money:')));
}

/** Rows of the ranges that the paper has to hold. */
function rowsOf({ result }: Outcome): string[] {
  return result.robustness!.ranges.map(({ quantity, lowFactor, leastTried }) =>
    squeezed(`${quantity}× ${formatNumber(lowFactor ?? leastTried)}, ${lowFactor === null ? 'as far' : 'beyond it'}`),
  );
}

it('prints how far each input may move, and what a lost stage leaves', async () => {
  const outcome = withRobustness(madeOutcome({ bank: MADE_BANK }, { days: 75 }));
  const text = await paperOf(outcome);
  const rows = rowsOf(outcome);
  expect(rows.length).toBeGreaterThan(2);
  expect(rows.filter((row) => !text.includes(row))).toEqual([]);
  for (const { group } of outcome.result.robustness!.stageOut) expect(text).toContain(squeezed(`group ${group + 1}`));
  const reasons = outcome.result.reactorTrials.map((trial) => squeezed(trialReason(trial)));
  expect(reasons.length).toBeGreaterThan(4);
  expect(reasons.filter((reason) => !text.includes(reason))).toEqual([]);
  // the control: a range of another result is not on this paper
  const ranges = outcome.result.robustness!.ranges.map((range) => ({ ...range, lowFactor: 0.4321 }));
  const other = { ...outcome, result: { ...outcome.result, robustness: { ranges, stageOut: [] } } };
  expect(rowsOf(other).filter((row) => text.includes(row))).toEqual([]);
});

it('says where this was not asked for', async () => {
  expect(await paperOf(madeOutcome({ bank: MADE_BANK }, { days: 75 }))).toContain(
    squeezed('Sensitivity: not computed'),
  );
});
