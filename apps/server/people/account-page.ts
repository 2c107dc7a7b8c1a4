import type { ApiKey } from '#libs/store/api-key.js';
import { type Html, html } from '../home/html.js';
import { type Actor, covers } from './actor.js';
import { alertLine, formPage, passwordField, textField } from './form-page.js';
import { roleField } from './people-page.js';

/** What the page of one's own account shows. */
export interface AccountView {
  actor: Actor;
  keys: readonly ApiKey[];
  /** nobody has an account: the local user looks at the page */
  isLocal: boolean;
  /** a key that was made just now; it is not shown again */
  made: string | null;
  /** why the last try failed */
  refused: string | null;
}

/** The page of one's own account: password, keys, the end of the session. */
export function accountPage(view: AccountView): string {
  const { actor, keys, isLocal, made, refused } = view;
  const people = covers(actor.role, 'administrator') ? html`<p><a href="/people">People</a></p>` : html``;
  if (isLocal) {
    return formPage('Your account', html`<p>You need none: nobody but this machine reaches the server.</p>${people}`);
  }
  return formPage('Your account', [
    html`${alertLine(refused)}
<p>${actor.name}, ${actor.role}</p>
${people}
<form method="post" action="/sign-out"><p><button type="submit">Sign out</button></p></form>
<section aria-labelledby="password-head"><h2 id="password-head">Change your password</h2>
<form method="post" action="/account/password">
${passwordField('present', 'Present password', 'current-password')}
${passwordField('password', 'New password, at least 12 characters', 'new-password')}
<p><button type="submit">Change the password</button></p>
</form></section>`,
    html`<section aria-labelledby="keys"><h2 id="keys">API keys</h2>
<p>A program that has a key acts in your name, with at most your role.</p>
${made === null ? null : html`<p role="status" class="alert">The new key is shown this once: <code>${made}</code></p>`}
${keys.length === 0 ? null : keyTable(keys)}
<form method="post" action="/account/keys">
${textField('name', 'What the key is for', { required: true, longest: 80 })}
${roleField('viewer')}
${textField('days', 'Days until it expires; empty, it does not', { required: false, longest: 4 })}
<p><button type="submit">Make a key</button></p>
</form></section>`,
  ]);
}

function keyTable(keys: readonly ApiKey[]): Html {
  const rows = keys.map(
    ({ id, name, role, createdAt, expiresAt, revokedAt }) =>
      html`<tr><th scope="row">${name}</th><td>${role}</td><td>${day(createdAt)}</td><td>${expiresAt === null ? '–' : day(expiresAt)}</td><td>${
        revokedAt === null
          ? html`<form method="post" action="/account/keys/${id}/revoke"><button type="submit" class="quiet" aria-label="Revoke the key ${name}">Revoke</button></form>`
          : `revoked ${day(revokedAt)}`
      }</td></tr>`,
  );
  const head = ['for', 'role', 'made', 'expires', ''].map((text) => html`<th scope="col">${text}</th>`);
  return html`<table class="people"><caption>Your keys; an administrator sees everybody’s.</caption><thead><tr>${head}</tr></thead><tbody>${rows}</tbody></table>`;
}

const day = (moment: Date) => moment.toISOString().slice(0, 10);
