import type { Sha256 } from './audit-chain.js';
import { judgeUpdate } from './later-update.js';
import { byteText } from './pdf-syntax.js';
import type { ReviewState } from './review.js';
import type { PaperMark } from './review-act.js';

/** What can be said of a paper somebody holds. */
export const PAPER_STANDINGS = ['approved', 'superseded', 'withdrawn', 'draft', 'altered', 'unknown'] as const;
export type PaperStanding = (typeof PAPER_STANDINGS)[number];

/** What a file tells of where it may come from. */
export interface PaperTraces {
  /** the file as it is */
  whole: PaperMark;
  /** the file as it was before each saving that was added to it */
  earlier: PaperMark[];
  /** content hashes it names, 64 hexadecimal digits */
  contentHashes: string[];
  /** number and revision it names, as "P-0001, revision 3" */
  names: string[];
}

/** A paper of the register. */
export interface KnownPaper {
  siteId: string;
  revisionId: string;
  number: string;
  revision: number;
  /** of its revision, now */
  state: ReviewState;
  supersededBy: number | null;
  contentHash: string;
  /** the paper of the approval, the paper of the draft, or neither: only the content's hash or number led here */
  matched: 'issued' | 'draft' | 'named';
  /** SHA-256 of the paper that matched, null where only a name led here */
  sha256: string | null;
}

/** The answer to whoever holds a paper. */
export interface PaperAnswer {
  standing: PaperStanding;
  /** what was added afterwards is a digital signature, or several */
  signedAfterwards: boolean;
  paper: KnownPaper | null;
}

/** No proposal is larger, nor is a signed one with its certificates. */
export const MOST_PAPER_BYTES = 20_000_000;

const MOST_ENDS = 64;

/**
 * What is looked up to judge a file.
 * @param bytes the file
 * @param sha256 of the rim
 */
export function tracesOf(bytes: Uint8Array, sha256: Sha256): PaperTraces {
  const text = byteText(bytes);
  const mark = (length: number): PaperMark => ({ sha256: sha256(bytes.subarray(0, length)), bytes: length });
  const ends = [...text.matchAll(/%%EOF(\r\n|\r|\n)?/g)].map(({ 0: found, index }) => index + found.length);
  return {
    whole: mark(bytes.length),
    earlier: ends
      .filter((end) => end < bytes.length)
      .slice(0, MOST_ENDS)
      .map(mark),
    contentHashes: unique(text.match(/(?<![0-9a-f])[0-9a-f]{64}(?![0-9a-f])/g) ?? []),
    names: unique([...text.matchAll(/Proposal (P-\d{4,9}, revision [1-9]\d{0,8}),/g)].map(([, name]) => name!)),
  };
}

function unique(words: readonly string[]): string[] {
  return [...new Set(words)].slice(0, MOST_ENDS);
}

/**
 * Judges a file by the papers of the register that its traces led to.
 * @param bytes the file
 * @param traces of the same file
 * @param known every paper the traces were found to match
 */
export function paperStanding(bytes: Uint8Array, traces: PaperTraces, known: readonly KnownPaper[]): PaperAnswer {
  const whole = known.find(({ sha256 }) => sha256 === traces.whole.sha256);
  if (whole !== undefined) return { standing: standingOf(whole), signedAfterwards: false, paper: whole };
  for (const { sha256, bytes: length } of traces.earlier) {
    const paper = known.find((one) => one.sha256 === sha256);
    if (paper === undefined) continue;
    const isSigned = judgeUpdate(bytes, length) === 'signed';
    return { standing: isSigned ? standingOf(paper) : 'altered', signedAfterwards: isSigned, paper };
  }
  const [named = null] = known;
  return { standing: named === null ? 'unknown' : 'altered', signedAfterwards: false, paper: named };
}

/** A paper that is what it was; the paper of a draft stays a draft whatever became of its revision. */
function standingOf({ matched, state }: KnownPaper): PaperStanding {
  if (matched === 'named') return 'altered';
  if (state === 'withdrawn') return 'withdrawn';
  if (matched === 'draft') return 'draft';
  return state === 'approved' || state === 'superseded' ? state : 'altered';
}

const CONTENT_NUMBER = /^[0-9a-f]{16}([0-9a-f]{48})?$/;

/**
 * A content number as it is typed from a paper: the 16 digits of its head, or all 64.
 * @param typed with or without blanks and hyphens, in any case
 * @returns the digits, null where it is none
 */
export function contentNumber(typed: string): string | null {
  const digits = typed.replace(/[\s\u00a0-]+/g, '').toLowerCase();
  return CONTENT_NUMBER.test(digits) ? digits : null;
}
