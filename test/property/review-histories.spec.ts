// Second method: a clerk's card that writes every crossing of states out by itself (test/support/slow-review).
import { describe, expect, it } from 'vitest';
import { type Attempt, refusals } from '#libs/review/refusals.js';
import { afterEvent, newReview, type Review, reviewOf } from '#libs/review/review.js';
import type { ReviewEvent } from '#libs/review/review-act.js';
import { chance } from '../support/chance.js';
import { anyAttempt } from '../support/made-review.js';
import { runs, SEED } from '../support/soak.js';
import { ClerkCard } from '../support/slow-review.js';

const HISTORIES = runs(250, 1000);
const ATTEMPTS = 60;
const AT = '2026-01-31T10:20:30.456Z';

type Judge = (review: Review, attempt: Attempt) => boolean;
const rules: Judge = (review, attempt) => refusals(review, attempt).length === 0;

/** The crossings a state may make, by the words of document control. */
const CROSSINGS = new Set(
  'draft>forReview forReview>draft forReview>approved approved>superseded draft>withdrawn forReview>withdrawn approved>withdrawn'.split(
    ' ',
  ),
);

interface History {
  disagreements: number;
  illegal: string[];
  events: ReviewEvent[];
  review: Review;
}

/** Lets a judge decide a made-up history, beside the clerk. */
function history(seed: number, judge: Judge): History {
  const random = chance(seed);
  const card = new ClerkCard();
  const found: History = { disagreements: 0, illegal: [], events: [], review: newReview() };
  for (let i = 0; i < ATTEMPTS; i++) {
    const attempt = anyAttempt(random);
    const isAllowed = judge(found.review, attempt);
    if (isAllowed !== card.allows(attempt)) found.disagreements++;
    if (!isAllowed) continue;
    // An act nobody could carry out, which only a sabotaged judge lets through.
    if (
      attempt.act.act === 'handCheck' &&
      !found.review.figures.some(({ id }) => id === (attempt.act as { figure: string }).figure)
    )
      continue;
    const before = found.review.state;
    const event = { at: AT, by: attempt.by, act: attempt.act };
    found.events.push(event);
    found.review = afterEvent(found.review, event);
    card.note(attempt);
    const crossing = `${before}>${found.review.state}`;
    if (before !== found.review.state && !CROSSINGS.has(crossing)) found.illegal.push(crossing);
    if (card.state !== found.review.state) found.illegal.push(`${crossing}, the clerk has ${card.state}`);
  }
  return found;
}

describe(`${HISTORIES} reviews of ${ATTEMPTS} attempts each (seed ${SEED})`, () => {
  const all = Array.from({ length: HISTORIES }, (_, n) => history(SEED + n, rules));

  it('make no crossing that document control does not know, and agree with the clerk at every attempt', () => {
    expect(all.flatMap(({ illegal }) => illegal)).toEqual([]);
    expect(all.reduce((sum, { disagreements }) => sum + disagreements, 0)).toBe(0);
  });

  it('reach every state, so that the histories are worth something', () => {
    const reached = all.map(({ review }) => review.state);
    for (const state of ['draft', 'forReview', 'approved', 'superseded', 'withdrawn']) expect(reached).toContain(state);
    const approved = all.filter(({ review }) => review.approval !== null);
    expect(approved.length).toBeGreaterThan(HISTORIES / 20);
    expect(approved.some(({ review }) => review.approval!.isOwn)).toBe(true);
    expect(approved.some(({ review }) => !review.approval!.isOwn)).toBe(true);
  });

  it('are approved by nobody who prepared the plan, unless the administrator allowed it and the record says so', () => {
    for (const { review } of all) {
      if (review.approval === null) continue;
      const { by, isOwn } = review.approval;
      expect(isOwn).toBe(review.preparers.some(({ id }) => id === by.id));
      if (isOwn) expect(review.ownApproval).toMatchObject({ by: { role: 'administrator' } });
    }
  });

  it('are what their events say when they are read again from the first', () => {
    for (const { events, review } of all) expect(reviewOf(JSON.parse(JSON.stringify(events)))).toEqual(review);
  });

  const sabotage: [what: string, judge: Judge][] = [
    [
      'takes everybody for an administrator',
      (review, { by, ...rest }) => rules(review, { ...rest, by: { ...by, role: 'administrator' } }),
    ],
    ['forgets who prepared the plan', (review, attempt) => rules({ ...review, preparers: [] }, attempt)],
    ['lets stale plans pass', (review, attempt) => rules(review, { ...attempt, stale: null })],
    ['forgets open findings', (review, attempt) => rules({ ...review, findings: [] }, attempt)],
    ['takes every state for the one it needs', (review, attempt) => rules({ ...review, state: 'forReview' }, attempt)],
  ];

  it.each(sabotage)('and a judge that %s is found out', (_what, judge) => {
    const bad = Array.from({ length: 100 }, (_, n) => history(SEED + n, judge));
    expect(bad.reduce((sum, { disagreements }) => sum + disagreements, 0)).toBeGreaterThan(0);
  });
});
