import type { CommissioningRecord } from '#libs/contract/review-schema.js';
import { deviationOf, type HandCheck } from './hand-check.js';
import type {
  DecisiveFigure,
  FrozenPlanMark,
  Person,
  ReviewAct,
  ReviewEvent,
  ReviewFinding,
  Signature,
} from './review-act.js';

/** Where a revision stands in document control. */
export const REVIEW_STATES = ['draft', 'forReview', 'approved', 'superseded', 'withdrawn'] as const;
export type ReviewState = (typeof REVIEW_STATES)[number];

/** Who said something, and when. */
export interface Said {
  by: Person;
  at: string;
}

/** A finding with the one who took it on, if anybody did. */
export interface WeighedFinding extends ReviewFinding {
  acceptance: (Said & { reason: string }) | null;
}

/** A revision's review: everything that follows from its events, and nothing else. */
export interface Review {
  state: ReviewState;
  /** everybody who had a hand in the plan */
  preparers: Person[];
  findings: WeighedFinding[];
  figures: DecisiveFigure[];
  handChecks: (HandCheck & Said)[];
  comments: (Said & { figure: string | null; text: string })[];
  signatures: (Said & Signature)[];
  /** the administrator's leave for one who prepared the plan to approve it */
  ownApproval: (Said & { reason: string }) | null;
  approval: (Said & FrozenPlanMark & { isOwn: boolean }) | null;
  /** why it was last returned to draft */
  returned: (Said & { reason: string }) | null;
  /** number of the revision that took its place */
  supersededBy: number | null;
  withdrawal: (Said & { reason: string }) | null;
  commissioning: (Said & { record: CommissioningRecord })[];
}

/** A revision nobody has done anything with. */
export function newReview(): Review {
  return {
    state: 'draft',
    preparers: [],
    findings: [],
    figures: [],
    handChecks: [],
    comments: [],
    signatures: [],
    ownApproval: null,
    approval: null,
    returned: null,
    supersededBy: null,
    withdrawal: null,
    commissioning: [],
  };
}

/**
 * The review after one more event. Whether the event is allowed is asked of `refusals` before.
 * @param review as it stands
 * @param event what happened
 * @returns a new review; the given one is left as it is
 */
export function afterEvent(review: Review, { at, by, act }: ReviewEvent): Review {
  return STEPS[act.act](review, act as never, { by, at });
}

/**
 * The review that follows from a list of events.
 * @param events oldest first
 */
export function reviewOf(events: readonly ReviewEvent[]): Review {
  return events.reduce(afterEvent, newReview());
}

type ActOf<Name extends ReviewAct['act']> = Extract<ReviewAct, { act: Name }>;
type Steps = { [Name in ReviewAct['act']]: (review: Review, act: ActOf<Name>, said: Said) => Review };

const STEPS: Steps = {
  prepare: (review, _act, { by }) => withPreparer(review, by),
  submit: (review, { findings, figures, signature }, said) => ({
    ...withPreparer(review, said.by),
    state: 'forReview',
    // What an earlier round said of the plan has to be said again: acceptances and hand checks begin anew.
    findings: findings.map((finding) => ({ ...finding, acceptance: null })),
    figures,
    handChecks: [],
    signatures: signature === null ? [] : [{ ...signature, ...said }],
    returned: null,
  }),
  acceptFinding: (review, { finding, reason }, said) => ({
    ...review,
    findings: review.findings.map((one) => (one.id === finding ? { ...one, acceptance: { reason, ...said } } : one)),
  }),
  handCheck: (review, { figure, value }, said) => {
    const checked = review.figures.find(({ id }) => id === figure);
    if (checked === undefined) throw new Error(`no decisive figure ${figure}`);
    const check = { figure, value, computed: checked.value, unit: checked.unit, ...deviationOf(value, checked.value) };
    const others = review.handChecks.filter((one) => one.figure !== figure);
    return { ...review, handChecks: [...others, { ...check, ...said }] };
  },
  comment: (review, { figure, text }, said) => ({
    ...review,
    comments: [...review.comments, { figure, text, ...said }],
  }),
  return: (review, { reason }, said) => ({ ...review, state: 'draft', returned: { reason, ...said } }),
  allowOwnApproval: (review, { reason }, said) => ({ ...review, ownApproval: { reason, ...said } }),
  approve: (review, { signature, planHash, paper }, said) => ({
    ...review,
    state: 'approved',
    signatures: [...review.signatures, { ...signature, ...said }],
    approval: { planHash, paper, isOwn: hasPrepared(review, said.by), ...said },
  }),
  supersede: (review, { by }) => ({ ...review, state: 'superseded', supersededBy: by }),
  withdraw: (review, { reason }, said) => ({ ...review, state: 'withdrawn', withdrawal: { reason, ...said } }),
  commission: (review, { record, signature }, said) => ({
    ...review,
    signatures: [...review.signatures, { ...signature, ...said }],
    commissioning: [...review.commissioning, { record, ...said }],
  }),
};

function withPreparer(review: Review, person: Person): Review {
  return hasPrepared(review, person) ? review : { ...review, preparers: [...review.preparers, person] };
}

/**
 * Whether somebody had a hand in the plan.
 * @param review as it stands
 * @param person by their account, whatever name or role they have now
 */
export function hasPrepared({ preparers }: Pick<Review, 'preparers'>, { id }: Pick<Person, 'id'>): boolean {
  return preparers.some((preparer) => preparer.id === id);
}
