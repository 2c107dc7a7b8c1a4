import type { Problem } from '#libs/engine/index.js';
import { hasPrepared, type Review, type ReviewState } from './review.js';
import { type Capacity, type Person, type ReviewAct, ROLES, type Role, type Signature } from './review-act.js';

/** What makes a revision stale: approving it would approve something the site has moved on from. */
export interface Staleness {
  why: 'laterRevision' | 'engineChanged' | 'siteChanged' | 'recordChanged';
  /** in a few words, for the refusal: "revision 4", "engine 0.2.0" */
  found: string;
}

/** Who wants to do what, and what only the rim can know. */
export interface Attempt {
  by: Person;
  act: ReviewAct;
  /** looked at where the act is an approval */
  stale?: Staleness | null;
}

/** In which states an act is possible, and the least role that may do it there. */
export const LEAST_ROLE: { [Name in ReviewAct['act']]: Partial<Record<ReviewState, Role>> } = {
  prepare: { draft: 'planner' },
  submit: { draft: 'planner' },
  acceptFinding: { forReview: 'reviewer' },
  handCheck: { forReview: 'reviewer' },
  comment: { draft: 'planner', forReview: 'planner', approved: 'planner' },
  return: { forReview: 'reviewer' },
  allowOwnApproval: { draft: 'administrator', forReview: 'administrator' },
  approve: { forReview: 'reviewer' },
  supersede: { approved: 'reviewer' },
  withdraw: { draft: 'planner', forReview: 'planner', approved: 'reviewer' },
  commission: { approved: 'planner' },
};

/**
 * Why an act is not possible now.
 * @param review as it stands
 * @param attempt who wants to do what
 * @returns every reason, none where the act is allowed
 */
export function refusals(review: Review, attempt: Attempt): Problem[] {
  const { act, by } = attempt;
  const least = LEAST_ROLE[act.act][review.state];
  if (least === undefined) return [wrongState(act.act, review.state)];
  if (ROLES.indexOf(by.role) < ROLES.indexOf(least)) return [lowRole(least, by.role)];
  return [...ownWork(review, attempt), ...emptyTexts(act), ...RULES[act.act](review, attempt)];
}

type Rule = (review: Review, attempt: Attempt) => Problem[];
const NOTHING: Rule = () => [];

const RULES: Record<ReviewAct['act'], Rule> = {
  prepare: ({ preparers }) =>
    preparers.length === 0 ? [] : [conflict('a revision that is made once', 'one that stands')],
  submit: (_review, { act }) => signatureProblems(act, 'design'),
  acceptFinding: unknownFinding,
  handCheck: unknownFigure,
  comment: NOTHING,
  return: NOTHING,
  allowOwnApproval: NOTHING,
  approve: (review, attempt) => [
    ...signatureProblems(attempt.act, 'checking'),
    ...staleProblems(attempt),
    ...openFindings(review),
    ...openHandChecks(review),
  ],
  supersede: NOTHING,
  withdraw: NOTHING,
  commission: (_review, { act }) => signatureProblems(act, 'installation'),
};

/** What only another than the preparer may do, unless the administrator allowed it. */
const FOUR_EYES: ReviewAct['act'][] = ['acceptFinding', 'handCheck', 'approve'];

function ownWork(review: Review, { act, by }: Attempt): Problem[] {
  if (!FOUR_EYES.includes(act.act) || review.ownApproval !== null || !hasPrepared(review, by)) return [];
  return [
    conflict('somebody who had no hand in the plan, or the administrator’s leave', `${by.name}, who prepared it`),
  ];
}

function openFindings({ findings }: Review): Problem[] {
  return findings.flatMap(({ id, level, what, acceptance }) => {
    const path = `findings.${id}`;
    if (level === 'blocks issue') return [{ ...conflict('a plan without findings that block its issue', what), path }];
    return acceptance === null ? [{ ...conflict('this finding accepted with a reason', `open: ${what}`), path }] : [];
  });
}

function openHandChecks({ handChecks, comments }: Review): Problem[] {
  if (handChecks.length === 0) {
    return [{ code: 'missing', path: 'handChecks', expected: 'a hand check of a decisive figure', found: 'none' }];
  }
  return handChecks
    .filter(({ isBeyond, figure }) => isBeyond && !comments.some((comment) => comment.figure === figure))
    .map(({ figure, value, computed }) => ({
      ...conflict(
        'a comment on a figure whose hand check is more than 2 % off',
        `${value} by hand, ${computed} computed`,
      ),
      path: `handChecks.${figure}`,
    }));
}

function staleProblems({ stale }: Attempt): Problem[] {
  if (stale === undefined || stale === null) return [];
  return [{ code: 'stale', path: stale.why, expected: STALE_EXPECTED[stale.why], found: stale.found }];
}

const STALE_EXPECTED: Record<Staleness['why'], string> = {
  laterRevision: 'the latest revision of its kind',
  engineChanged: 'a revision computed with the engine that would print it: compute it again and compare',
  siteChanged: 'a revision made from the site as it stands',
  recordChanged: 'a revision made from the latest load record of the site',
};

function unknownFinding({ findings }: Review, { act }: Attempt): Problem[] {
  if (act.act !== 'acceptFinding') return [];
  const found = findings.find(({ id }) => id === act.finding);
  if (found?.level === 'to be accepted') {
    return found.acceptance === null ? [] : [conflict('a finding that is open', `${found.id}, accepted already`)];
  }
  const expected = 'a finding of this plan that is to be accepted';
  if (found !== undefined) return [conflict(expected, `${found.id}, which blocks the issue`)];
  return [{ code: 'not-found', path: 'finding', expected, found: JSON.stringify(act.finding) }];
}

function unknownFigure({ figures }: Review, { act }: Attempt): Problem[] {
  if (act.act !== 'handCheck') return [];
  if (!Number.isFinite(act.value)) {
    return [{ code: 'not-finite', path: 'value', expected: 'a number', found: String(act.value) }];
  }
  if (figures.some(({ id }) => id === act.figure)) return [];
  const expected = `one of ${figures.map(({ id }) => id).join(', ')}`;
  return [{ code: 'not-found', path: 'figure', expected, found: JSON.stringify(act.figure) }];
}

function signatureProblems(act: ReviewAct, capacity: Capacity): Problem[] {
  const signature: Signature | null = 'signature' in act ? act.signature : null;
  if (signature === null) return [];
  const empty = (['name', 'licence', 'jurisdiction'] as const).filter((part) => signature[part].trim() === '');
  const problems = empty.map((part) =>
    missing(`signature.${part}`, `the ${part} of whoever signs, in their own words`),
  );
  if (signature.capacity === capacity) return problems;
  const expected = `a signature in the capacity of ${capacity}`;
  return [...problems, { code: 'inconsistent', path: 'signature.capacity', expected, found: signature.capacity }];
}

function emptyTexts(act: ReviewAct): Problem[] {
  const texts = { ...('reason' in act ? { reason: act.reason } : {}), ...('text' in act ? { text: act.text } : {}) };
  return Object.entries(texts)
    .filter(([, text]) => text.trim() === '')
    .map(([path]) => missing(path, path === 'reason' ? 'a reason' : 'a few words'));
}

function missing(path: string, expected: string): Problem {
  return { code: 'missing', path, expected, found: 'nothing' };
}

function conflict(expected: string, found: string): Problem {
  return { code: 'conflict', expected, found };
}

function lowRole(least: Role, role: Role): Problem {
  return conflict(`the role of ${least}`, `a ${role}`);
}

const IN_STATE: Record<ReviewState, string> = {
  draft: 'a draft',
  forReview: 'a revision that is for review',
  approved: 'an approved revision',
  superseded: 'a superseded revision',
  withdrawn: 'a withdrawn revision',
};

function wrongState(act: ReviewAct['act'], state: ReviewState): Problem {
  const possible = (Object.keys(LEAST_ROLE[act]) as ReviewState[]).map((one) => IN_STATE[one]);
  return conflict(possible.join(' or '), IN_STATE[state]);
}
