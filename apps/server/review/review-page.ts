import type { EstimateResult, Result } from '#libs/engine/index.js';
import { formatQuantity } from '#libs/present/format-number.js';
import { CAPACITY_WORDS, handCheckWords, ownApproval } from '#libs/present/review-words.js';
import type { Person } from '#libs/review/review-act.js';
import { hasPrepared } from '#libs/review/review.js';
import type { Revision } from '#libs/store/revision.js';
import { type Html, html } from '../home/html.js';
import { framedPage } from '../home/page-frame.js';
import { actForm, commissioningForm, type FormPlace, numberField, signatureFields, textField } from './review-forms.js';
import type { showReview } from './show-review.js';

/** What the page shows: the review as the API gives it, the revision, and who looks at it. */
export interface ReviewView {
  shown: ReturnType<typeof showReview>;
  revision: Revision;
  siteName: string;
  viewer: Person;
}

/** The page of a review: where it stands, what is open, what whoever looks may do, and the log. */
export function reviewPage(view: ReviewView): string {
  const { shown, revision, siteName } = view;
  const name = `${revision.number}, revision ${revision.revision}`;
  const parts = [
    standing(view),
    findingsPart(view),
    figuresPart(view),
    signaturesPart(view),
    commentsPart(view),
    nextPart(view),
    installedPart(view),
    logPart(view),
  ];
  const main = html`<h1>${name} is ${shown.stateText}</h1>
<p>${siteName}. ${revision.kind === 'plan' ? 'Proposed' : 'Judged'}: ${revision.proposed}</p>${parts}`;
  return framedPage({ title: `${name} – Varwright`, main, footer: ways(view), script: '/review.js' });
}

function place({ shown }: ReviewView): FormPlace {
  return { base: shown.links.self, version: shown.version };
}

function section(id: string, heading: string, content: Html | (Html | null)[]): Html {
  return html`<section aria-labelledby="${id}"><h2 id="${id}">${heading}</h2>${content}</section>`;
}

function standing({ shown }: ReviewView): Html {
  const { supersededBy, withdrawal, returned, approval, open, stale } = shown;
  return html`
${approval === null ? null : html`<p>Approved by ${approval.by.name}, ${approval.at.slice(0, 10)}. Plan and paper are frozen.</p>`}
${approval?.isOwn === true ? html`<p><strong>${ownApproval()}</strong></p>` : null}
${supersededBy === null ? null : html`<p>Superseded by revision ${supersededBy}.</p>`}
${withdrawal === null ? null : html`<p>Withdrawn by ${withdrawal.by.name}: ${withdrawal.reason}</p>`}
${returned === null ? null : html`<p>Returned by ${returned.by.name}: ${returned.reason}</p>`}
${stale === null ? null : html`<p><strong>${stale.text}</strong></p>`}
${open.length === 0 ? null : html`<p>Before approval:</p><ul>${open.map((line) => html`<li>${line}</li>`)}</ul>`}`;
}

function findingsPart(view: ReviewView): Html | null {
  const { findings, state } = view.shown;
  if (state === 'draft') return null;
  const rows = findings.map(({ id, level, what, value, limit, consequence, acceptance }) => {
    const blocks = level === 'blocks issue';
    const limits = value === '' ? '' : ` ${value}${limit === '' ? '' : `, limit ${limit}`}.`;
    const done =
      acceptance === null
        ? null
        : html`<p>Accepted by ${acceptance.by.name}, ${acceptance.at.slice(0, 10)}: ${acceptance.reason}</p>`;
    const form =
      acceptance !== null || blocks || state !== 'forReview' || isBarred(view)
        ? null
        : actForm(place(view), 'findings', 'Accept this finding', [
            html`<input type="hidden" name="finding" value="${id}">`,
            textField('Reason', 'reason', { long: true }),
          ]);
    return html`<li><p><span class="level ${blocks ? 'blocks' : ''}">${level}</span> ${what}${limits} ${consequence}</p>${done}${form}</li>`;
  });
  const heading = rows.length === 0 ? 'Nothing has to be accepted' : 'Findings, each accepted by itself';
  return section('findings', heading, html`<ul>${rows}</ul>`);
}

function figuresPart(view: ReviewView): Html | null {
  const { figures, handChecks, state } = view.shown;
  if (state === 'draft') return null;
  const rows = figures.map(({ id, label, value, unit }) => {
    const check = handChecks.find(({ figure }) => figure === id);
    return html`<tr><th scope="row">${label}</th><td>${formatQuantity(value, unit, 'given')}</td><td>${check === undefined ? '–' : `${handCheckWords(check)} (${check.by.name})`}</td></tr>`;
  });
  const options = figures.map(
    ({ id, label, unit }) => html`<option value="${id}">${label}${unit === '' ? '' : `, ${unit}`}</option>`,
  );
  const form =
    state === 'forReview' && !isBarred(view)
      ? actForm(place(view), 'hand-checks', 'Compare', [
          html`<label><span>Figure</span><select name="figure">${options}</select></label>`,
          numberField('Worked out by hand', 'value'),
        ])
      : null;
  return section('figures', 'Decisive figures, checked by hand', [
    html`<table class="wide"><thead><tr><th scope="col">figure</th><th scope="col">computed</th><th scope="col">by hand</th></tr></thead><tbody>${rows}</tbody></table>`,
    form,
  ]);
}

function signaturesPart({ shown }: ReviewView): Html | null {
  if (shown.signatures.length === 0) return null;
  const items = shown.signatures.map(
    ({ capacity, name, licence, jurisdiction, at }) =>
      html`<li>${CAPACITY_WORDS[capacity]}: ${name}, ${licence}, ${jurisdiction}, ${at.slice(0, 10)}</li>`,
  );
  return section('signatures', 'Signed', html`<ul>${items}</ul>`);
}

function commentsPart(view: ReviewView): Html | null {
  const { comments, state } = view.shown;
  const items = comments.map(
    ({ by, at, figure, text }) =>
      html`<li>${by.name}, ${at.slice(0, 10)}${figure === null ? '' : `, on ${figure}`}: ${text}</li>`,
  );
  const isOver = state === 'superseded' || state === 'withdrawn';
  if (isOver && items.length === 0) return null;
  const result = JSON.parse(view.revision.result) as Result | EstimateResult;
  const options = result.figures.map(({ id, label }) => html`<option value="${id}">${label} (${id})</option>`);
  const form = isOver
    ? null
    : actForm(place(view), 'comments', 'Comment', [
        html`<label><span>On</span><select name="figure"><option value="">the whole plan</option>${options}</select></label>`,
        textField('Comment', 'text', { long: true }),
      ]);
  return section('comments', 'Comments', [items.length === 0 ? null : html`<ul>${items}</ul>`, form]);
}

/** What whoever looks may do next; the server refuses the rest, and says why. */
function nextPart(view: ReviewView): Html | null {
  const { state } = view.shown;
  const withdraw = details(
    'Withdraw',
    actForm(place(view), 'withdraw', 'Withdraw', textField('Reason', 'reason', { long: true })),
  );
  if (state === 'draft') {
    const fields = [textField('What the reviewer should look at', 'note', { long: true })];
    const signed = details('Sign the design as well', signatureFields('design', 'signature.'));
    return section('next', 'Next', [actForm(place(view), 'submit', 'Send for review', [...fields, signed]), withdraw]);
  }
  if (state === 'forReview') return section('next', 'Next', [...reviewerForms(view), withdraw]);
  return state === 'approved' ? section('next', 'Next', [supersedeForm(view), withdraw]) : null;
}

function reviewerForms(view: ReviewView): (Html | null)[] {
  const { ownApproval } = view.shown;
  const returned = actForm(place(view), 'return', 'Return', textField('Reason', 'reason', { long: true }));
  const back = details('Return with a reason', returned);
  if (isBarred(view)) {
    const leave = actForm(place(view), 'own-approval', 'Allow it', textField('Reason', 'reason', { long: true }));
    return [
      html`<p>You prepared this plan; another must approve it.</p>`,
      details('Allow whoever prepared it to approve it (administrator)', leave),
      back,
    ];
  }
  const password = html`<label><span>Password, where you have one</span><input type="password" name="password" autocomplete="current-password"></label>`;
  return [
    ownApproval === null
      ? null
      : html`<p>Whoever prepared it may approve it, by leave of ${ownApproval.by.name}: ${ownApproval.reason}</p>`,
    actForm(place(view), 'approve', 'Approve', [signatureFields('checking'), password]),
    back,
  ];
}

/** Who prepared a plan neither accepts its findings nor checks or approves it, unless that was allowed. */
function isBarred({ shown, viewer }: ReviewView): boolean {
  return shown.ownApproval === null && hasPrepared(shown, viewer);
}

function supersedeForm(view: ReviewView): Html {
  const fields = [numberField('Revision that takes its place', 'by'), textField('Reason', 'reason', { long: true })];
  return details('Supersede', actForm(place(view), 'supersede', 'Supersede', fields));
}

function details(summary: string, content: Html): Html {
  return html`<details><summary>${summary}</summary>${content}</details>`;
}

function installedPart(view: ReviewView): Html | null {
  const { commissioning, state } = view.shown;
  const items = commissioning.map(
    ({ record, by }) =>
      html`<li>${record.doneOn}, recorded by ${by.name}, measured with ${record.instrument}: ${record.stages.length} stages, voltage distortion ${formatQuantity(record.distortionBefore.voltagePct, '%', 'given')} before and ${formatQuantity(record.distortionAfter.voltagePct, '%', 'given')} after</li>`,
  );
  if (state !== 'approved')
    return items.length === 0 ? null : section('installed', 'As installed', html`<ul>${items}</ul>`);
  const result = JSON.parse(view.revision.result) as Result;
  return section('installed', 'As installed', [
    items.length === 0 ? html`<p>Not recorded yet.</p>` : html`<ul>${items}</ul>`,
    details('Record the bank as installed', commissioningForm(place(view), result)),
  ]);
}

function logPart({ shown }: ReviewView): Html {
  const lines = shown.log.map(
    ({ sequence, at, by, text, hash }) =>
      html`<li value="${sequence}"><span class="soft">${at.replace('T', ' ').slice(0, 16)}, ${by.name} (${by.role}):</span> ${text} <code class="soft">${hash.slice(0, 16)}</code></li>`,
  );
  return section('log', 'Log', [
    html`<p class="soft">Times are UTC. Each line’s hash covers the one before it.</p>`,
    html`<ol>${lines}</ol>`,
  ]);
}

function ways({ shown, revision }: ReviewView): Html {
  const { siteId } = revision;
  const earlier = Array.from({ length: revision.revision - 1 }, (_, at) => at + 1).slice(-8);
  const compare = earlier.map(
    (other) =>
      html`<li><a href="/sites/${siteId}/revisions/${other}/differences/${revision.revision}">Compare with revision ${other}</a></li>`,
  );
  return html`<section aria-labelledby="ways"><h2 id="ways">Papers</h2><ul class="links">
<li><a href="${shown.links.draft}">Draft as it was prepared (PDF)</a></li>
${shown.links.approved === null ? null : html`<li><a href="${shown.links.approved}">Approved paper (PDF)</a></li>`}
<li><a href="${shown.links.self}">Review as JSON</a></li>${compare}
<li><a href="/sites/${siteId}">The site</a></li><li><a href="/verify">Verify a paper</a></li></ul></section>`;
}
