import type { Person } from '#libs/store/person.js';
import { type Html, html } from '../home/html.js';
import { ROLES } from './actor.js';
import { alertLine, formPage, passwordField, textField } from './form-page.js';

/** What the page of an organisation's people shows. */
export interface PeopleView {
  people: readonly Person[];
  /** nobody has an account yet, and the local user looks at the page */
  isFirst: boolean;
  /** why the last try failed */
  refused: string | null;
}

/** The page an administrator opens accounts on. */
export function peoplePage({ people, isFirst, refused }: PeopleView): string {
  return formPage('People', [
    html`${alertLine(refused)}`,
    isFirst
      ? html`<p>Nobody has an account. Whoever sits at this machine may do everything, and nobody else reaches the server.</p>
<p>The first account is an administrator’s. From then on everybody signs in, on this machine too.</p>`
      : peopleTable(people),
    html`<section aria-labelledby="add"><h2 id="add">${isFirst ? 'Open the first account' : 'Open an account'}</h2>
<form method="post" action="/people">
${textField('name', 'Name, as it stands under their work', { required: true, longest: 200 })}
${textField('signInName', 'Sign-in name', { required: true, longest: 80 })}
${isFirst ? html`<input type="hidden" name="role" value="administrator">` : roleField('viewer')}
${passwordField('password', 'Password, at least 12 characters', 'new-password')}
<p><button type="submit">Open the account</button></p>
</form></section>`,
  ]);
}

function peopleTable(people: readonly Person[]): Html {
  const rows = people.map(
    ({ id, name, signInName, role, closedAt }) =>
      html`<tr><th scope="row">${closedAt === null ? html`<a href="/people/${id}">${name}</a>` : name}</th><td>${signInName}</td><td>${closedAt === null ? role : 'closed'}</td></tr>`,
  );
  return html`<table class="people"><caption>Each role may do what those before it may: ${ROLES.join(', ')}.</caption>
<thead><tr><th scope="col">name</th><th scope="col">signs in as</th><th scope="col">role</th></tr></thead>
<tbody>${rows}</tbody></table>`;
}

/** A choice of roles. */
export function roleField(chosen: string): Html {
  const options = ROLES.map((role) =>
    role === chosen ? html`<option selected>${role}</option>` : html`<option>${role}</option>`,
  );
  return html`<p class="field"><label for="role">Role</label><select id="role" name="role">${options}</select></p>`;
}

/**
 * The page of one account: name and role, another password, its end.
 * @param person whose
 * @param refused why the last try failed
 */
export function personPage({ id, name, signInName, role, version }: Person, refused: string | null): string {
  const form = (act: string, fields: Html, button: Html) => html`<form method="post" action="/people/${id}">
<input type="hidden" name="act" value="${act}"><input type="hidden" name="version" value="${version}">
${fields}
<p>${button}</p>
</form>`;
  return formPage(name, [
    html`${alertLine(refused)}
<p>Signs in as ${signInName}.</p>`,
    form(
      'change',
      html`${textField('name', 'Name, as it stands under their work', { required: true, longest: 200, value: name })}
${roleField(role)}`,
      html`<button type="submit">Change</button>`,
    ),
    html`<section aria-labelledby="other"><h2 id="other">Another password</h2>
${form('password', passwordField('password', 'Password, at least 12 characters', 'new-password'), html`<button type="submit">Set the password</button>`)}</section>
<section aria-labelledby="end"><h2 id="end">Close the account</h2>
<p>Its sessions end and its keys are revoked; what was done under the name keeps it. A closed account is not opened again.</p>
${form('close', html``, html`<button type="submit" class="quiet">Close the account of ${name}</button>`)}</section>
<p><a href="/people">All people</a></p>`,
  ]);
}
