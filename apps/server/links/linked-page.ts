import { STATE_WORDS } from '#libs/present/review-words.js';
import { noPermission, VERDICT_WORDS } from '#libs/present/verdict-words.js';
import type { ReviewState } from '#libs/review/review.js';
import type { Revision } from '#libs/store/revision.js';
import { html } from '../home/html.js';
import { formPage } from '../people/form-page.js';

interface Linked {
  state: ReviewState;
  expiresAt: Date;
  base: string;
}

/**
 * The page behind a link to a revision.
 * @param revision what it shows
 * @param link where its review stands, until when it shows it, and the address of the same for programs
 */
export function linkedPage(revision: Revision, { state, expiresAt, base }: Linked): string {
  const { number, revision: count, kind, proposed, verdict, author, createdAt } = revision;
  return formPage(
    `${number}, revision ${count}`,
    html`<p>${kind === 'plan' ? 'Proposed' : 'Judged'}: ${proposed}</p>
<p><span class="verdict ${verdict}">${VERDICT_WORDS[verdict]}</span></p>
<p class="soft">${noPermission()}</p>
<p>${author === null ? 'Made' : `Prepared by ${author}`} on ${day(createdAt)}. Review: ${STATE_WORDS[state]}.</p>
<ul class="links"><li><a href="${base}/proposal.pdf">Proposal (PDF)</a></li><li><a href="${base}">The same as JSON</a></li></ul>
<p class="soft">This link shows this revision alone, until ${day(expiresAt)} or until it is revoked.</p>`,
  );
}

const day = (moment: Date) => moment.toISOString().slice(0, 10);
