import type { PaperSize } from './paper.js';
import type { PrintedReview } from './printed-review.js';

/** States of a proposal, in the words of document control. */
export type ProposalState = 'draft, not reviewed' | 'for review' | 'approved' | 'superseded' | 'withdrawn';

/** What a proposal carries besides the outcome it prints. */
export interface ProposalFrame {
  number: string;
  revision: number;
  state: ProposalState;
  preparedBy: string | null;
  /** 64 hex digits over the frozen inputs */
  contentHash: string;
  engineVersion: string;
  /** signatures and acceptances of the paper of an approval */
  review?: PrintedReview;
  paper?: PaperSize;
}
