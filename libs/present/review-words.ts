import type { FieldDifference } from '#libs/review/field-differences.js';
import type { HandCheck } from '#libs/review/hand-check.js';
import type { PaperStanding } from '#libs/review/paper-standing.js';
import type { Staleness } from '#libs/review/refusals.js';
import type { Review, ReviewState } from '#libs/review/review.js';
import type { Capacity, ReviewAct } from '#libs/review/review-act.js';
import { formatNumber, formatQuantity } from './format-number.js';
import { say, words } from './language.js';
import { codeWords, partWords } from './path-words.js';

/** A revision's state as a person reads it. */
export const STATE_WORDS: Record<ReviewState, string> = words({
  draft: 'draft, not reviewed',
  forReview: 'for review',
  approved: 'approved',
  superseded: 'superseded',
  withdrawn: 'withdrawn',
});

/** What each signature says, above the name. */
export const SIGNATURE_STATEMENTS: Record<Capacity, string> = words({
  design: 'I designed this from the data it names, and answer for the design as far as those data hold.',
  checking:
    'I checked this design against the basis it states, worked decisive figures out by hand, and accepted each finding listed ' +
    'as accepted by me, for the reason given. I answer for the checking.',
  installation:
    'The bank was isolated, tested and put into service as this record says. I answer for the installation as I left it.',
});

/** What a signature answers for, in a word or two. */
export const CAPACITY_WORDS: Record<Capacity, string> = words({
  design: 'design',
  checking: 'checking and approval',
  installation: 'installation',
});

/** Stands on the paper where whoever prepared a plan approved it. */
export function ownApproval(): string {
  return say`Whoever approved this also prepared it. The administrator allowed that; no second person has checked it.`;
}

/** What an approval gives as the reason where it puts an earlier revision out of use. */
export function replacedWords(revision: number): string {
  return `Revision ${revision} was approved.`;
}

/** Why a revision is stale, and what to do. */
export function stalenessWords({ why, found }: Staleness): string {
  return {
    laterRevision: `There is a later one, ${found}. Review that, or withdraw it.`,
    engineChanged: `Computed with an earlier engine; this is ${found}. Compute again and compare.`,
    siteChanged: 'The site has changed since. Compute it again, or put the site back.',
    recordChanged: `A load record came later, ${found}. Compute again with it.`,
  }[why];
}

/** Who has approved what, for whoever holds a paper. */
export interface ToldPaper {
  standing: PaperStanding;
  signedAfterwards: boolean;
  /** "P-0001, revision 3", null where the paper led to none */
  name: string | null;
  state: ReviewState | null;
  supersededBy: number | null;
  /** whether the register itself agrees with its log */
  registerHolds: boolean;
}

/**
 * What is said to whoever holds a paper: the finding first, then what to do.
 * @param told from the register
 */
export function paperWords({
  standing,
  signedAfterwards,
  name,
  state,
  supersededBy,
  registerHolds,
}: ToldPaper): string {
  if (!registerHolds)
    return `The register does not agree with its log on ${name}. Trust no paper of it before that is settled.`;
  const signed = signedAfterwards
    ? ' It was signed afterwards; who signed is for a program that knows certificates.'
    : '';
  const later = supersededBy === null ? 'a later revision' : `revision ${supersededBy}`;
  return {
    approved: signedAfterwards
      ? `Approved content, signed afterwards: ${name}.${signed}`
      : `Approved as it stands: ${name}.`,
    superseded: `Superseded: ${name} was approved, and ${later} has taken its place.${signed}`,
    withdrawn: `Withdrawn: ${name} is not to be used.${signed}`,
    draft: `A draft: ${name} as it was before review; the revision is now ${state === null ? 'unknown' : STATE_WORDS[state]}. Not for construction.`,
    altered: `Altered: it names ${name}, and is not what was issued. Ask for the issued paper.`,
    unknown:
      'Unknown: no paper of this register. It may come from another installation, or be a scan; type its content number.',
  }[standing];
}

/** What a typed content number leads to, for whoever has a scan. */
export function numberWords(name: string, state: ReviewState, supersededBy: number | null): string {
  const later = supersededBy === null ? '' : ` by revision ${supersededBy}`;
  return `${name} is ${STATE_WORDS[state]}${later}. Compare the scan with it: a number says nothing of the rest of the sheet.`;
}

/** A hand check in one line. */
export function handCheckWords({ value, computed, unit, deviationPct, isBeyond }: HandCheck): string {
  const apart = deviationPct === null ? say`where 0 was computed` : say`${formatNumber(deviationPct)}\u00a0% apart`;
  const pair = say`${formatQuantity(value, unit, 'given')} by hand, ${formatQuantity(computed, unit, 'given')} computed`;
  return `${pair}, ${apart}${isBeyond ? say`: more than 2\u00a0%, to be explained` : ''}`;
}

/** What happened, in one line of the log. */
export function actWords(act: ReviewAct): string {
  switch (act.act) {
    case 'prepare':
      return 'prepared';
    case 'submit':
      return `sent for review${act.note === null ? '' : `: ${act.note}`}`;
    case 'acceptFinding':
      return `accepted ${act.finding}: ${act.reason}`;
    case 'handCheck':
      return `checked ${act.figure} by hand: ${formatNumber(act.value, 'given')}`;
    case 'comment':
      return `on ${act.figure ?? 'the plan'}: ${act.text}`;
    case 'return':
      return `returned to draft: ${act.reason}`;
    case 'allowOwnApproval':
      return `allowed whoever prepared it to approve it: ${act.reason}`;
    case 'approve':
      return `approved as ${act.signature.name}, ${act.signature.licence}, ${act.signature.jurisdiction}`;
    case 'supersede':
      return `superseded by revision ${act.by}: ${act.reason}`;
    case 'withdraw':
      return `withdrawn: ${act.reason}`;
    case 'commission':
      return `recorded as installed on ${act.record.doneOn}, by ${act.signature.name}`;
  }
}

/** A value of a field as it is compared: numbers with their digits, nothing as a dash. */
export function fieldWords(value: unknown): string {
  if (value === undefined) return '–';
  if (value === null) return 'none';
  if (typeof value === 'number') return formatNumber(value, 'given');
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'string') return codeWords(value);
  return partWords(value, fieldWords);
}

/**
 * How two revisions differ, one line a field, for a terminal or a message.
 * @param differences of their inputs or results
 */
export function differenceLines(differences: readonly FieldDifference[]): string[] {
  return differences.map(({ path, before, after }) => `${path}: ${fieldWords(before)} → ${fieldWords(after)}`);
}

/** What still stands between a review and its approval, in one line each. */
export function openWords({ findings, handChecks, comments }: Review): string[] {
  const open = findings.filter(({ acceptance }) => acceptance === null);
  const blocking = open.filter(({ level }) => level === 'blocks issue').length;
  const unexplained = handChecks.filter(
    ({ isBeyond, figure }) => isBeyond && !comments.some((comment) => comment.figure === figure),
  ).length;
  return [
    ...(blocking === 0 ? [] : [`${blocking} ${blocking === 1 ? 'finding blocks' : 'findings block'} its issue`]),
    ...(open.length === blocking ? [] : [`${open.length - blocking} to be accepted, each with a reason`]),
    ...(handChecks.length > 0 ? [] : ['no decisive figure checked by hand']),
    ...(unexplained === 0 ? [] : [`${unexplained} hand check more than 2\u00a0% off without a comment`]),
  ];
}
