import type { EstimateOutcome, Outcome } from '#libs/engine/index.js';
import { isEstimate } from '#libs/engine/index.js';
import type { Paper } from './paper.js';
import type { ProposalFrame } from './proposal-frame.js';
import { drawTable } from './table.js';

/** By what this paper is told from another: numbers that a person can type from a copy. */
export function drawVerification(paper: Paper, outcome: Outcome | EstimateOutcome, frame: ProposalFrame): void {
  paper.heading('21', 'Verification: a paper is known by its content number', { keep: 110 });
  const record = isEstimate(outcome) ? 'none: an estimate' : inFours(frame.recordHash ?? '');
  const rows = [
    ['proposal', `${frame.number}, revision ${frame.revision}, ${frame.state}`],
    ['content number', inFours(frame.contentHash)],
    ...(record === '' ? [] : [['record', record]]),
    ['engine', frame.engineVersion],
  ];
  drawTable(
    paper,
    [
      { head: 'of this paper', share: 20 },
      { head: '', share: 80 },
    ],
    rows,
    { after: 5 },
  );
  paper.paragraph([
    'The content number is the SHA-256 of site, record, time zone, kind and engine version. The same inputs give the same number, ' +
      'the same figures and the same bytes; a figure that was altered on the way belongs to no number. A scan is checked by typing the ' +
      'first sixteen digits, which stand at the head of every page.',
  ]);
}

function inFours(hash: string): string {
  return (hash.match(/.{1,4}/g) ?? []).join(' ');
}
