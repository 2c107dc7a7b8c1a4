import { fieldWords } from '#libs/present/review-words.js';
import type { FieldDifference } from '#libs/review/field-differences.js';
import type { Revision } from '#libs/store/revision.js';
import { type Html, html } from '../home/html.js';
import { framedPage } from '../home/page-frame.js';
import type { Differences } from './differences.js';

/** More rows than this are read by a program: the API gives them all. */
const MOST_ROWS = 400;
/** More rows than this are folded away until somebody wants them. */
const OPEN_ROWS = 40;

/** What a revision says of itself, in words; a path of its inputs or results is an address and stands as it is. */
const ABOUT: Readonly<Record<string, string>> = {
  createdAt: 'made at',
  engineVersion: 'engine version',
  recordHash: 'hash of the record',
  author: 'prepared by',
};

/** Two revisions side by side: only the fields that differ. */
export function differencesPage(before: Revision, after: Revision, found: Differences): string {
  const heads: [string, string] = [`revision ${before.revision}`, `revision ${after.revision}`];
  const title = `${before.number}: ${heads.join(' and ')}`;
  const main = html`<h1>${title}</h1>
${part('Who, when, why, with what', found.about, heads)}
${part('Inputs', found.inputs, heads)}
${part('Results', found.results, heads)}
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
        html`<tr><th scope="row">${ABOUT[path] ?? path}</th><td>${fieldWords(before)}</td><td>${fieldWords(after)}</td></tr>`,
    );
  const rest = fields.length > MOST_ROWS ? html`<p>${fields.length - MOST_ROWS} more stand in the JSON.</p>` : null;
  const table = html`<table class="wide"><thead><tr><th scope="col">field</th><th scope="col">${one}</th><th scope="col">${other}</th></tr></thead><tbody>${rows}</tbody></table>${rest}`;
  const folded = fields.length > OPEN_ROWS ? html`<details><summary>Show them</summary>${table}</details>` : table;
  return html`<section><h2>${heading}: ${said}</h2>${folded}</section>`;
}
