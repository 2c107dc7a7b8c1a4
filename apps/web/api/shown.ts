import type { ProblemJson } from '#libs/contract/error-body.js';
import type { MeterMap } from '#libs/contract/meter-map.js';
import type { EstimateResult, RecordSummary, Reevaluation, Remark, Result, Verdict } from '#libs/engine/index.js';
import type { QualityStated } from '#libs/present/quality-words.js';
import type { ReviewState } from '#libs/review/review.js';

/** A site file as JSON: what was typed into it, units and all. */
export type SiteDocument = Record<string, unknown> & { name: string; timeZone: string };

/** A site as the API gives it. */
export interface SiteShown {
  id: string;
  number: number;
  name: string;
  version: number;
  createdAt: string;
  updatedAt: string;
  site: SiteDocument;
}

/** A site in the list. */
export interface SiteListed extends Omit<SiteShown, 'site'> {
  latest: { revision: number; verdict: Verdict; proposed: string; createdAt: string; stateText: string } | null;
}

/** A load record as the API gives it. */
export interface RecordShown {
  id: string;
  /** counts the revisions of one record from 1 */
  revision: number;
  /** the revision it extends, null for the first */
  previousId: string | null;
  hash: string;
  file: { name: string | null; sha256: string; bytes: number; header: string | null };
  record: RecordSummary;
  quality: QualityStated;
  /** how the record's peak stands against the site's transformers, as they are now */
  againstSupply: Remark[];
  createdAt: string;
}

/** A revision in a list. */
export interface RevisionHeadShown {
  siteId: string;
  number: string;
  revision: number;
  kind: 'plan' | 'assess';
  verdict: Verdict;
  createdAt: string;
  author: string | null;
  reason: string | null;
  proposed: string;
  /** null where the site's own estimate stood in for a record */
  recordId: string | null;
  engineVersion: string;
  contentHash: string;
  /** of its review; absent where it has just been made */
  state?: ReviewState;
  links: { self: string; proposal: string; record: string | null };
}

/** A revision in full. */
export interface RevisionShown extends RevisionHeadShown {
  rival: { name: string; verdict: Verdict; levelsOver: number; levelsAll: number } | null;
  inputs: { site: SiteDocument };
  result: Result | EstimateResult;
}

/** A site's bank as it stands now, beside what a revision found. */
export interface ReevaluationShown {
  revision: RevisionHeadShown;
  reevaluation: Reevaluation;
  /** the bank judged as it measures */
  result: Result;
}

/** Where the review of a revision stands, as much of it as the page tells. */
export interface ReviewShown {
  stateText: string;
  /** what its issue still waits for */
  open: string[];
  log: { sequence: number; at: string; by: { name: string }; text: string }[];
  links: { approved: string | null };
}

/** A job as the API gives it. */
export interface JobShown {
  id: string;
  kind: 'plan' | 'assess' | 'import';
  state: 'queued' | 'running' | 'done' | 'failed' | 'cancelled';
  progress: number;
  error: ProblemJson | null;
  revision: number | null;
  /** [s], null before anything is known */
  remainingS: number | null;
  bytesPerS: number | null;
  links: { self: string; record: string | null };
}

/** One version of a shared tariff or price book, as a list gives it. */
export interface PaperShown {
  id: string;
  kind: 'tariff' | 'prices';
  name: string;
  version: number;
  /** the day from which it holds */
  date: string;
  createdAt: string;
}

/** Answers about meter files that are kept under a name. */
export interface KeptMapShown {
  id: string;
  name: string;
  map: MeterMap;
  version: number;
}

export type { Remark };
