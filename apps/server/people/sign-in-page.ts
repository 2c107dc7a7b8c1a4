import { html } from '../home/html.js';
import { alertLine, formPage } from './form-page.js';

/**
 * The page to sign in on.
 * @param refused why the last try failed, null before one
 */
export function signInPage(refused: string | null): string {
  return formPage(
    'Sign in',
    html`${alertLine(refused)}
<form method="post" action="/sign-in">
<p class="field"><label for="organisation">Organisation</label>
<input id="organisation" name="organisation" maxlength="80" autocomplete="organization" aria-describedby="organisation-note">
<small id="organisation-note">may be left empty where the server has one</small></p>
<p class="field"><label for="signInName">Sign-in name</label>
<input id="signInName" name="signInName" required maxlength="80" autocomplete="username" autocapitalize="none" spellcheck="false"></p>
<p class="field"><label for="password">Password</label>
<input id="password" name="password" type="password" required maxlength="200" autocomplete="current-password"></p>
<p><button type="submit" class="main">Sign in</button></p>
</form>`,
  );
}
