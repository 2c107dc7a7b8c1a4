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
<header><p><strong><a href="/">Varwright</a></strong> <span class="soft">plans capacitor banks for power-factor correction</span></p><div class="line"></div></header>
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

/** A line of text in a form. */
export function textField(
  name: string,
  label: string,
  { required, longest, value = '' }: { required: boolean; longest: number; value?: string },
): Html {
  return html`<p class="field"><label for="${name}">${label}</label>
<input id="${name}" name="${name}" value="${value}" maxlength="${longest}" autocomplete="off"${required ? html` required` : null}></p>`;
}

/** A password in a form. */
export function passwordField(name: string, label: string, autocomplete: string): Html {
  return html`<p class="field"><label for="${name}">${label}</label>
<input id="${name}" name="${name}" type="password" required maxlength="200" autocomplete="${autocomplete}"></p>`;
}
