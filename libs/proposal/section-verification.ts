import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { isEstimate } from '#libs/engine/index.js';
import { say } from '#libs/present/language.js';
import type { Paper } from './paper.js';
import type { ProposalFrame } from './proposal-frame.js';
import { stateWords } from './state-words.js';
import { drawTable } from './table.js';

/** By what this paper is told from another: numbers that a person can type from a copy. */
export function drawVerification(paper: Paper, outcome: Outcome | EstimateOutcome, frame: ProposalFrame): void {
  paper.heading('21', say`Verification: a paper is known by its content number`, { keep: 110 });
  const record = isEstimate(outcome) ? say`none: an estimate` : inFours(frame.recordHash ?? '');
  const rows = [
    [say`proposal`, say`${frame.number}, revision ${frame.revision}, ${stateWords(frame.state)}`],
    [say`content number`, inFours(frame.contentHash)],
    ...(record === '' ? [] : [[say`record`, record]]),
    [say`engine`, frame.engineVersion],
  ];
  drawTable(
    paper,
    [
      { head: say`of this paper`, share: 20 },
      { head: '', share: 80 },
    ],
    rows,
    { after: 5 },
  );
  paper.paragraph([
    say`The content number is the SHA-256 of site, record, time zone, kind and engine version. The same inputs give the same number,
      the same figures and the same bytes; a figure that was altered on the way belongs to no number. A scan is checked by typing the
      first sixteen digits, which stand at the head of every page.`,
  ]);
}

function inFours(hash: string): string {
  return (hash.match(/.{1,4}/g) ?? []).join(' ');
}
