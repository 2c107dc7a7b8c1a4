import { type Html, html } from '../home/html.js';

/**
 * A page of forms, without scripts.
 * @param title what it is about
 * @param body its content
 */
export function formPage(title: string, body: Html | Html[]): string {
  return html`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${title} – Varwright</title>
<link rel="icon" href="data:,">
<link rel="stylesheet" href="/page.css">
</head>
<body>
<header><p><a href="/"><strong>Varwright</strong></a></p><div class="line"></div></header>
<main>
<h1>${title}</h1>
${body}
</main>
</body>
</html>
`.text;
}

/** What a form says of the last try; read out at once. */
export function alertLine(text: string | null): Html | null {
  return text === null ? null : html`<p role="alert" class="alert">${text}</p>`;
}

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
<p><button type="submit">Sign in</button></p>
</form>`,
  );
}
