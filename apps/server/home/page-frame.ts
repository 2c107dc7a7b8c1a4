import { type Html, html } from './html.js';

/** What differs between pages. */
export interface PageParts {
  title: string;
  main: Html;
  footer?: Html | null;
  /** path of a script of this server */
  script?: string;
  /** after how long it is asked for again [s] */
  refreshS?: number;
}

/**
 * A whole page of the plain kind: one column, one style sheet.
 * @param parts its content
 * @returns an HTML document
 */
export function framedPage({ title, main, footer = null, script, refreshS }: PageParts): string {
  return html`<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
${refreshS === undefined ? null : html`<meta http-equiv="refresh" content="${refreshS}">`}
<title>${title}</title>
<link rel="icon" href="data:,">
<link rel="stylesheet" href="/page.css">
${script === undefined ? null : html`<script type="module" src="${script}"></script>`}
</head>
<body>
<header><p><strong><a href="/">Varwright</a></strong> <span class="soft">plans capacitor banks for power-factor correction</span></p><div class="line"></div></header>
<main>
${main}
</main>
<footer>${footer}</footer>
</body>
</html>
`.text;
}
