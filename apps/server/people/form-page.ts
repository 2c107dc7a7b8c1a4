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
