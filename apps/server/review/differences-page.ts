import { fieldWords } from '#libs/present/review-words.js';
import type { FieldDifference } from '#libs/review/field-differences.js';
import type { Revision } from '#libs/store/revision.js';
import { type Html, html } from '../home/html.js';
import { framedPage } from '../home/page-frame.js';
import type { Differences } from './differences.js';

/** More rows than this are read by a program: the API gives them all. */
const MOST_ROWS = 400;

/** Two revisions side by side: only the fields that differ. */
export function differencesPage(before: Revision, after: Revision, found: Differences): string {
  const [one, other] = [`revision ${before.revision}`, `revision ${after.revision}`];
  const main = html`<h1>${before.number}: ${one} and ${other}</h1>
${[part('about', 'Who, when, why, with what', found.about), part('inputs', 'Inputs', found.inputs), part('results', 'Results', found.results)].map((each) => each(one, other))}
<p><a href="/api/sites/${before.siteId}/revisions/${before.revision}/differences/${after.revision}">All of it as JSON</a></p>`;
  return framedPage({ title: `${before.number}, ${one} and ${other} – Varwright`, main });
}

function part(id: string, heading: string, fields: readonly FieldDifference[]) {
  return (one: string, other: string): Html => {
    const count =
      fields.length === 0
        ? 'nothing differs'
        : `${fields.length} ${fields.length === 1 ? 'field differs' : 'fields differ'}`;
    const rows = fields
      .slice(0, MOST_ROWS)
      .map(
        ({ path, before, after }) =>
          html`<tr><th scope="row">${path}</th><td>${fieldWords(before)}</td><td>${fieldWords(after)}</td></tr>`,
      );
    const table = html`<table class="wide"><thead><tr><th scope="col">field</th><th scope="col">${one}</th><th scope="col">${other}</th></tr></thead><tbody>${rows}</tbody></table>`;
    const rest = fields.length > MOST_ROWS ? html`<p>${fields.length - MOST_ROWS} more stand in the JSON.</p>` : null;
    return html`<section aria-labelledby="${id}"><h2 id="${id}">${heading}: ${count}</h2>${fields.length === 0 ? null : table}${rest}</section>`;
  };
}
