import type { Reevaluation } from '#libs/engine/index.js';
import type { PaperSize } from './paper.js';

/** What a proposal carries besides the outcome it prints. */
export interface ProposalFrame {
  number: string;
  revision: number;
  state: 'draft, not reviewed';
  preparedBy: string | null;
  /** 64 hex digits over the frozen inputs */
  contentHash: string;
  engineVersion: string;
  paper?: PaperSize;
  /** where an installed bank was judged again */
  reevaluation?: Reevaluation;
}
