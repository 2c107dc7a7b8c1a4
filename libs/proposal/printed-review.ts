/** A signature with what it says. */
export interface PrintedSignature {
  /** what it answers for, in a word or two */
  capacity: string;
  statement: string;
  name: string;
  licence: string;
  jurisdiction: string;
  /** "2026-12-01" */
  date: string;
}

/** What a review adds to the paper of its approval. */
export interface PrintedReview {
  signatures: readonly PrintedSignature[];
  /** decisive figures worked out by hand, each under its frozen label */
  handChecks: readonly { figure: string; label: string; said: string }[];
  /** findings in their frozen words */
  accepted: readonly { id: string; what: string; reason: string; by: string; date: string }[];
  /** said where nobody but who prepared it has checked it */
  ownApproval: string | null;
}
