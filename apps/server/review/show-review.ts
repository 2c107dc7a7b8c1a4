import { actWords, handCheckWords, openWords, STATE_WORDS, stalenessWords } from '#libs/present/review-words.js';
import type { Result } from '#libs/engine/index.js';
import { installedBank } from '#libs/review/installed-bank.js';
import type { Staleness } from '#libs/review/refusals.js';
import type { Review } from '#libs/review/review.js';
import type { AuditEntry } from '#libs/store/audit-entry.js';
import { eventOf } from '#libs/store/audit-log.js';
import type { VersionedReview } from '#libs/store/reviews.js';
import type { Revision } from '#libs/store/revision.js';

/** What surrounds a review when it is shown. */
export interface ReviewSurroundings {
  revision: Revision;
  entries: readonly AuditEntry[];
  stale: Staleness | null;
}

/** A review as the API shows it: where it stands, what is open, what was said, and its lines of the log. */
export function showReview({ review, version }: VersionedReview, { revision, entries, stale }: ReviewSurroundings) {
  const { siteId, number, revision: count } = revision;
  const self = `/api/sites/${siteId}/revisions/${count}`;
  const isIssued = review.approval !== null;
  return {
    ...{ siteId, number, revision: count, version },
    ...review,
    stateText: STATE_WORDS[review.state],
    handChecks: review.handChecks.map((check) => ({ ...check, text: handCheckWords(check) })),
    open: review.state === 'forReview' ? openWords(review) : [],
    stale: stale === null ? null : { ...stale, text: stalenessWords(stale) },
    log: entries.map((entry) => {
      const { at, by, act } = eventOf(entry);
      const { sequence, previousHash, hash } = entry;
      return { sequence, at, by, act: act.act, text: actWords(act), previousHash, hash };
    }),
    /** the site file's bank by the latest record "as installed", for the bank to be judged again */
    installedBank: installedOf(review, revision),
    links: {
      self: `${self}/review`,
      revision: self,
      draft: `${self}/proposal.pdf`,
      approved: isIssued ? `${self}/approved.pdf` : null,
    },
  };
}

function installedOf({ commissioning }: Review, { result }: Revision) {
  const latest = commissioning.at(-1);
  if (latest === undefined) return null;
  const { bank } = JSON.parse(result) as Pick<Result, 'bank'>;
  return installedBank(bank.stages, latest.record);
}
