import { execFileSync } from 'node:child_process';
import { type Browser, type BrowserContext, chromium, type Page } from 'playwright-core';

/** The browser of this machine, null where there is none: in CI that is a failure, elsewhere the tests are skipped aloud. */
export const CHROMIUM = findChromium();

function findChromium(): string | null {
  const asked = process.env.CHROMIUM;
  if (asked !== undefined) return asked;
  for (const name of ['chromium', 'chromium-browser', 'google-chrome']) {
    try {
      return execFileSync('sh', ['-c', `command -v ${name}`], { encoding: 'utf8' }).trim();
    } catch {}
  }
  if (process.env.CI !== undefined) throw new Error('no chromium: the page’s tests need one in CI');
  process.stderr.write('no chromium on this machine: the page’s tests are skipped\n');
  return null;
}

/** A page of its own, with everything that must not happen on it. */
export interface OpenPage {
  page: Page;
  context: BrowserContext;
  /** requests to anywhere but the server under test */
  outside: string[];
  /** errors of scripts and of the policy that guards them */
  faults: string[];
  close: () => Promise<void>;
}

/** How a page is looked at. */
export interface PageLook {
  width?: number;
  height?: number;
  theme?: 'light' | 'dark';
}

/** Started where a first page needs it; the pages of all test files of a process have it, and it ends with that process. */
let browser: Promise<Browser> | undefined;

/**
 * Opens a page that blocks and records every request that leaves the server under test.
 * @throws Error where the browser does not start
 */
export async function openPage(
  base: string,
  { width = 1280, height = 900, theme = 'light' }: PageLook = {},
): Promise<OpenPage> {
  browser ??= startBrowser();
  const context = await (await browser).newContext({
    viewport: { width, height },
    colorScheme: theme,
    timezoneId: 'Europe/Berlin',
    reducedMotion: 'reduce',
    acceptDownloads: true,
  });
  const page = await context.newPage();
  const outside: string[] = [];
  const faults: string[] = [];
  await context.route(
    (url) => url.protocol.startsWith('http') && !url.href.startsWith(base),
    (route) => {
      outside.push(route.request().url());
      return route.abort();
    },
  );
  page.on('pageerror', (error) => faults.push(error.message));
  page.on('console', (message) => {
    if (message.type() === 'error' && /Content Security Policy|Uncaught/.test(message.text()))
      faults.push(message.text());
  });
  return { page, context, outside, faults, close: () => context.close() };
}

/** The browser, without any connection of its own. */
function startBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: CHROMIUM ?? '',
    headless: true,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      '--disable-dev-shm-usage',
    ],
  });
}
