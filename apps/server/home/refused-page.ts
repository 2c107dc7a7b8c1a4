import type { ProblemJson } from '#libs/contract/error-body.js';
import { html } from './html.js';
import { framedPage } from './page-frame.js';

/**
 * Whether an error is answered with a page: somebody followed an address that is none of the API's.
 * @param request its method, address and what it accepts
 */
export function isForPage(request: { method: string; url: string; headers: { accept?: string | undefined } }): boolean {
  const { method, url, headers } = request;
  return method === 'GET' && !/^\/api(?:\/|$)/.test(url) && /text\/html/.test(headers.accept ?? '');
}

/**
 * What stands where a page was asked for that cannot be shown.
 * @param problem why
 * @returns an HTML document
 */
export function refusedPage({ status, title, detail }: ProblemJson): string {
  const heading = status === 404 ? 'Nothing stands at this address' : title;
  const main = html`<h1>${heading}</h1>
<p>${status === 404 ? 'It may have been deleted, or mistyped.' : detail}</p>
<ul class="links"><li><a href="/">All sites</a></li></ul>`;
  return framedPage({ title: `${heading} – Varwright`, main });
}
