import { type Result, resultChanges } from '#libs/engine/index.js';
import { pathWords } from '#libs/present/path-words.js';
import { CHANGE_HEADS, changeRows } from '#libs/present/reevaluation-words.js';
import { fieldWords } from '#libs/present/review-words.js';
import { VERDICT_WORDS } from '#libs/present/verdict-words.js';
import type { FieldDifference } from '#libs/review/field-differences.js';
import type { Revision } from '#libs/store/revision.js';
import { type Html, html } from '../home/html.js';
import { framedPage } from '../home/page-frame.js';
import type { Differences } from './differences.js';

/** More rows than this are read by a program: the API gives them all. */
const MOST_ROWS = 400;
/** More rows than this are folded away until somebody wants them. */
const OPEN_ROWS = 40;

/** What a revision says of itself, in words. */
const ABOUT: Readonly<Record<string, string>> = {
  kind: 'made as',
  createdAt: 'made at',
  recordHash: 'hash of the record',
  author: 'prepared by',
};

/** Values that are codes, in words. */
const CODES: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  verdict: VERDICT_WORDS,
  kind: { plan: 'a design', assess: 'the site’s own bank, judged' },
};

/** Two revisions side by side: only the fields that differ. */
export function differencesPage(before: Revision, after: Revision, found: Differences): string {
  const heads: [string, string] = [`revision ${before.revision}`, `revision ${after.revision}`];
  const title = `${before.number}: ${heads.join(' and ')}`;
  const main = html`<h1>${title}</h1>
${part('Who, when, why, with what', found.about, heads)}
${part('Inputs', found.inputs, heads)}
${figures(before, after, heads)}
${part('Every field of the results', found.results, heads)}
<p><a href="/api/sites/${before.siteId}/revisions/${before.revision}/differences/${after.revision}">All of it as JSON</a></p>`;
  return framedPage({ title: `${title} – Varwright`, main });
}

function part(heading: string, fields: readonly FieldDifference[], [one, other]: [string, string]): Html {
  const said = fields.length === 1 ? 'one field differs' : `${fields.length} fields differ`;
  if (fields.length === 0) return html`<section><h2>${heading}: nothing differs</h2></section>`;
  const rows = fields
    .slice(0, MOST_ROWS)
    .map(
      ({ path, before, after }) =>
        html`<tr><th scope="row">${ABOUT[path] ?? pathWords(path)}</th><td>${valueWords(path, before)}</td><td>${valueWords(path, after)}</td></tr>`,
    );
  const rest = fields.length > MOST_ROWS ? html`<p>${fields.length - MOST_ROWS} more stand in the JSON.</p>` : null;
  const table = html`<table class="wide"><thead><tr><th scope="col">field</th><th scope="col">${one}</th><th scope="col">${other}</th></tr></thead><tbody>${rows}</tbody></table>${rest}`;
  const folded = fields.length > OPEN_ROWS ? html`<details><summary>Show them</summary>${table}</details>` : table;
  return html`<section><h2>${heading}: ${said}</h2>${folded}</section>`;
}

/** The figures that decide, before and after, where both revisions hold a record's results. */
function figures(before: Revision, after: Revision, [one, other]: [string, string]): Html | null {
  const results = [before, after].map(({ result }) => JSON.parse(result) as Result);
  if (results.some(({ record }) => record === null)) return null;
  const [old, now] = results.map((result) => ({ result, ofGroup: result.bank.stages.map((_, at) => at) }));
  const { site } = JSON.parse(after.inputs) as { site: { currency?: string } };
  const rows = changeRows({ changes: resultChanges(old!, now!) }, site.currency ?? '');
  if (rows.length === 0) return html`<section><h2>Figures: nothing differs</h2></section>`;
  const [what, , , limit] = CHANGE_HEADS;
  const heads = [what!, one, other, limit!];
  return html`<section><h2>Figures: ${rows.length === 1 ? 'one differs' : `${rows.length} differ`}</h2>
<div class="scroll" role="region" aria-label="Figures" tabindex="0"><table class="wide figures"><thead><tr>${heads.map((head) => html`<th scope="col">${head}</th>`)}</tr></thead><tbody>${rows.map(
    // The verdict stands under its name, so that no narrow window cuts off what a limit has come to.
    ([name = '', was = '', is = '', most = '', verdict = '–']) =>
      html`<tr><th scope="row">${name}${verdict === '–' ? null : html`<br><span class="soft">${verdict}</span>`}</th><td>${was}</td><td>${is}</td><td>${most}</td></tr>`,
  )}</tbody></table></div></section>`;
}

function valueWords(path: string, value: unknown): string {
  const words = fieldWords(value);
  if (path === 'createdAt') return `${words.slice(0, 16).replace('T', ' ')} UTC`;
  return CODES[path]?.[words] ?? words;
}
