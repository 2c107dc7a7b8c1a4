import type { BankTonight, Reevaluation } from '#libs/engine/index.js';
import type { Language } from '#libs/present/languages.js';
import type { RevisionNumbers } from '#libs/present/revision-numbers.js';
import type { PaperSize } from './paper.js';
import type { PrintedReview } from './printed-review.js';

/** States of a proposal, in the words of document control. */
export type ProposalState = 'draft, not reviewed' | 'for review' | 'approved' | 'superseded' | 'withdrawn';

/** An earlier revision, as the revision history prints it. */
export interface PastRevision {
  revision: number;
  kind: 'plan' | 'assess';
  /** "2026-12-01"; null where it was not kept */
  date: string | null;
  author: string | null;
  reason: string | null;
  contentHash: string;
  engineVersion: string;
  numbers: RevisionNumbers;
}

/** What a proposal carries besides the outcome it prints. */
export interface ProposalFrame {
  number: string;
  revision: number;
  state: ProposalState;
  preparedBy: string | null;
  /** 64 hex digits over the frozen inputs */
  contentHash: string;
  /** 64 hex digits over the record; null or absent without one */
  recordHash?: string | null;
  engineVersion: string;
  /** why this revision was made, and when */
  reason?: string | null;
  date?: string | null;
  /** revisions before this one, the first of them first */
  history?: readonly PastRevision[];
  /** signatures and acceptances of the paper of an approval */
  review?: PrintedReview;
  paper?: PaperSize;
  /** English where nothing is said */
  language?: Language;
  /** the site's logo, a PNG or JPEG file */
  logo?: Uint8Array | null;
  /** where an installed bank was judged again */
  reevaluation?: Reevaluation;
  /** where a bank that stands there was judged by itself */
  tonight?: BankTonight | null;
}
