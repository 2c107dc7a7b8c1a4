import type { EstimateResult, Result, Verdict } from '#libs/engine/index.js';
import { formatNumber, formatQuantity } from '#libs/present/format-number.js';
import { formatMonth } from '#libs/present/local-stamp.js';
import { noPermission, VERDICT_WORDS } from '#libs/present/verdict-words.js';
import { type Html, html } from './html.js';
import { framedPage } from './page-frame.js';
import type { ShownRevision, SiteView } from './site-view.js';

/**
 * The page of a site: its verdict in words, what is needed, what is proposed, and the ways on.
 * @param view what to show
 * @returns a whole HTML document
 */
export function homePage(view: SiteView): string {
  const { site, revision, others } = view;
  const isComputing = view.job?.state === 'queued' || view.job?.state === 'running';
  const title = site === null ? 'Varwright' : `${site.name} – Varwright`;
  const main = html`<h1>${site === null ? 'No site yet' : site.name}</h1>
${revision === null ? stateWords(view) : revisionParts(revision)}
${others.length === 0 ? null : otherSites(others)}`;
  const refresh = isComputing && revision === null ? { refreshS: 2 } : {};
  return framedPage({ title, main, footer: footer(), ...refresh });
}

function stateWords({ site, job, records }: SiteView): Html {
  if (site === null) return html`<p>Add one with <code>POST /api/sites</code>.</p>`;
  if (job?.state === 'failed') {
    const { detail = 'the server’s log has the details' } = job.error as { detail?: string };
    return html`<p role="status">The plan could not be made: ${detail}.</p>`;
  }
  if (job?.state === 'queued' || job?.state === 'running') {
    return html`<p role="status">The plan is being computed, ${Math.round(job.progress * 100)}${' %'} so far.</p>`;
  }
  if (records === 0) return html`<p>No load record yet. Upload a meter file.</p>`;
  return html`<p>No plan yet.</p>`;
}

function revisionParts(revision: ShownRevision): Html[] {
  const { result, kind } = revision;
  const proposed = `${kind === 'plan' ? 'Proposed' : 'Judged'}: ${revision.proposed}`;
  return [
    html`<p>${proposed}</p>
<p>${verdictMark(result.verdict)}</p>
<p class="soft">${noPermission()}</p>`,
    result.record === null ? estimatedFigures(result) : keyFigures(result),
    rivalWords(revision),
    reasonList(result),
    result.record === null ? leftOut(result) : monthTable(result),
    linkList(revision),
  ].filter((part) => part !== null);
}

const MARKS: Record<Verdict, Html> = {
  clear: html`<circle cx="8" cy="8" r="6.5" fill="none" stroke="currentColor" stroke-width="2"/>`,
  watch: html`<path d="M8 1 15 8 8 15 1 8Z" fill="none" stroke="currentColor" stroke-width="2"/><path d="M8 1V15L1 8Z" fill="currentColor"/>`,
  avoid: html`<rect x="1" y="1" width="14" height="14" fill="none" stroke="currentColor" stroke-width="2"/><path d="M2 14 14 2" stroke="currentColor" stroke-width="2.5"/>`,
};

function verdictMark(verdict: Verdict): Html {
  const mark = html`<svg viewBox="0 0 16 16" aria-hidden="true">${MARKS[verdict]}</svg>`;
  return html`<span class="verdict ${verdict}">${mark}${VERDICT_WORDS[verdict]}</span>`;
}

function keyFigures({ requirement, bank, record, operation, control }: Result): Html {
  const after = operation.months.flatMap(({ powerFactorLagging }) => powerFactorLagging ?? []);
  const rows: [string, string, string][] = [
    ['needed at most', formatNumber(requirement.maxKvar), 'kvar'],
    ['needed in 95 % of the intervals', formatNumber(requirement.p95Kvar), 'kvar'],
    ['the bank gives', formatNumber(bank.effectiveKvar), 'kvar'],
    ['power factor as recorded', factor(record.powerFactorLagging), ''],
    ['with the bank, worst month', factor(after.length === 0 ? null : Math.min(...after)), ''],
    ['target, set point', `${requirement.targetPowerFactor.toFixed(2)}, ${control.setPointPowerFactor.toFixed(2)}`, ''],
  ];
  return html`<section aria-labelledby="need"><h2 id="need">${needWords(requirement.maxKvar)}</h2><dl>${figureItems(rows)}</dl></section>`;
}

function figureItems(rows: readonly [string, string, string][]): Html[] {
  return rows.map(
    ([name, value, unit]) =>
      html`<div><dt>${name}</dt><dd>${value}${unit === '' ? null : html` <small>${unit}</small>`}</dd></div>`,
  );
}

function estimatedFigures({ requirement, bank, estimate, control }: EstimateResult): Html {
  const { lowerKvar, upperKvar, listKvar, targetPowerFactor } = requirement;
  const bounds: [string, number | null][] = [
    ['needed, lower bound', lowerKvar],
    ['needed, upper bound', upperKvar],
    ['needed by the equipment list', listKvar],
    ['the bank gives', bank.effectiveKvar],
  ];
  const rows = bounds.flatMap(([name, kvar]): [string, string, string][] =>
    kvar === null ? [] : [[name, formatNumber(kvar), 'kvar']],
  );
  const target: [string, string, string] = [
    'target, set point',
    `${targetPowerFactor.toFixed(2)}, ${control.setPointPowerFactor.toFixed(2)}`,
    '',
  ];
  return html`<section aria-labelledby="need"><h2 id="need">An estimate from ${estimate.basis}, without a meter’s record</h2><dl>${figureItems([...rows, target])}</dl></section>`;
}

function leftOut({ estimate }: EstimateResult): Html {
  const items = estimate.refused.map(({ text }) => html`<li>${text}</li>`);
  return html`<section aria-labelledby="left"><h2 id="left">Left out, since an estimate can’t support it</h2><ul>${items}</ul></section>`;
}

function needWords(maxKvar: number): string {
  return maxKvar <= 1e-9
    ? 'No kvar is needed'
    : `The site needs ${formatQuantity(maxKvar, 'kvar')} at its worst interval`;
}

function factor(value: number | null): string {
  return value === null ? '–' : value.toFixed(3);
}

/** The same kvar built the other way: with reactors where the bank has none, without where it has. */
function rivalWords({ rival, distorting, result }: ShownRevision): Html | null {
  if (rival === null) return null;
  const { name, verdict, levelsOver, levelsAll } = rival;
  const loads = distorting.length === 0 ? 'the network’s own harmonics' : `the ${distorting.join(' and the ')}`;
  const rings =
    levelsOver > 0
      ? `It rings with ${loads}: a harmonic voltage passes its limit at ${levelsOver} of its ${levelsAll} levels.`
      : `No harmonic voltage passes its limit at any of its ${levelsAll} levels.`;
  return html`<section aria-labelledby="other"><h2 id="other">The same kvar built the other way is ${VERDICT_WORDS[verdict]}</h2>
<p>${name}: ${verdictMark(verdict)}</p><p>${rings} ${levelsOver > 0 && result.verdict === 'clear' ? 'The bank proposed does not.' : null}</p></section>`;
}

function reasonList({ reasons }: Pick<Result, 'reasons'>): Html | null {
  if (reasons.length === 0) return null;
  return html`<section aria-labelledby="why"><h2 id="why">Why</h2><ul>${reasons.map(({ text }) => html`<li>${text}</li>`)}</ul></section>`;
}

function monthTable({ requirement, operation }: Result): Html {
  const rows = requirement.months.map(({ month, powerFactorLagging }, i) => {
    const after = operation.months[i]?.powerFactorLagging ?? null;
    return html`<tr><th scope="row">${formatMonth(month)}</th><td>${factor(powerFactorLagging)}</td><td class="bank">${factor(after)}</td></tr>`;
  });
  return html`<section aria-labelledby="months"><h2 id="months">Power factor by month</h2>
<table><caption>Energy power factor at the meter.</caption>
<thead><tr><th scope="col">month</th><th scope="col">as recorded</th><th scope="col">with the bank</th></tr></thead>
<tbody>${rows}</tbody></table></section>`;
}

function linkList({ siteId, revision, recordId, kind, number }: ShownRevision): Html {
  const site = `/api/sites/${siteId}`;
  const links: [string, string][] = [
    [`Proposal ${number}, revision ${revision} (PDF)`, `${site}/revisions/${revision}/proposal.pdf`],
    [`${kind === 'plan' ? 'Plan' : 'Assessment'} as JSON`, `${site}/revisions/${revision}`],
    ...(recordId === null ? [] : [['Load record as JSON', `${site}/records/${recordId}`] satisfies [string, string]]),
    [`Review of revision ${revision}`, `/sites/${siteId}/revisions/${revision}/review`],
    ['Site file as JSON', site],
    ['All revisions', `${site}/revisions`],
  ];
  const items = links.map(([text, href]) => html`<li><a href="${href}">${text}</a></li>`);
  return html`<section aria-labelledby="papers"><h2 id="papers">Papers</h2><ul class="links">${items}</ul></section>`;
}

function otherSites(others: SiteView['others']): Html {
  const items = others.map(({ id, name }) => html`<li><a href="/sites/${id}">${name}</a></li>`);
  return html`<section aria-labelledby="sites"><h2 id="sites">Other sites</h2><ul>${items}</ul></section>`;
}

function footer(): Html {
  return html`<section aria-labelledby="more"><h2 id="more">Also here</h2><ul class="links">
<li><a href="/verify">Verify a paper</a></li>
<li><a href="/account">Account and people</a></li>
<li><a href="/api/openapi.json">The API’s description (OpenAPI)</a></li>
<li><a href="/api/sites">Sites as JSON</a></li>
<li><a href="/api/demo/site.json">Example site file</a></li>
<li><a href="/api/demo/load.csv">Example meter file</a></li>
</ul></section>`;
}
