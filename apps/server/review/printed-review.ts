import { CAPACITY_WORDS, handCheckWords, ownApproval, SIGNATURE_STATEMENTS } from '#libs/present/review-words.js';
import type { PrintedReview } from '#libs/proposal/printed-review.js';
import type { Review } from '#libs/review/review.js';

/** A review as the paper of its approval prints it. */
export function printedReview({ signatures, findings, figures, handChecks, approval }: Review): PrintedReview {
  return {
    signatures: signatures.map(({ capacity, name, licence, jurisdiction, at }) => ({
      ...{ capacity: CAPACITY_WORDS[capacity], statement: SIGNATURE_STATEMENTS[capacity] },
      ...{ name, licence, jurisdiction, date: at.slice(0, 10) },
    })),
    handChecks: handChecks.map((check) => {
      const label = figures.find(({ id }) => id === check.figure)?.label ?? check.figure;
      return { figure: check.figure, label, said: handCheckWords(check) };
    }),
    accepted: findings.flatMap(({ id, what, acceptance }) =>
      acceptance === null
        ? []
        : [{ id, what, reason: acceptance.reason, by: acceptance.by.name, date: acceptance.at.slice(0, 10) }],
    ),
    ownApproval: approval?.isOwn === true ? ownApproval() : null,
  };
}
