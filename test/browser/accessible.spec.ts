import { AxeBuilder } from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { CHROMIUM, openPage, startBrowser } from '../support/browser.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { SOAKED } from '../support/soak.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { openDemo, STATIONS_SHOWN } from './demo-page.js';

const LOOKS = [
  { width: 1280, theme: 'light' },
  { width: 1280, theme: 'dark' },
  { width: 320, theme: 'light' },
  { width: 320, theme: 'dark' },
] as const;

describe.runIf(CHROMIUM !== null)('every page, by the automated rules of accessibility', () => {
  let browser: Browser;
  let database: TestDatabase;
  let server: TestServer;
  let siteId: string;

  beforeAll(async () => {
    browser = await startBrowser();
    database = await databases[0]!.create();
    server = await startServer(database.url, { demo: true });
    siteId = await openDemo(server);
  });
  afterAll(async () => {
    await browser.close();
    await server.close();
    await database.drop();
  });

  // The pages take turns at the looks in the usual run; in the long one every page is seen in every look.
  it.each(LOOKS)('has no violation at $width px, $theme, and nothing wider than the window', async (look) => {
    const { page, close, outside, faults } = await openPage(browser, server.base, look);
    const found: string[] = [];
    const addresses = ['#/', '#/nowhere', ...Object.keys(STATIONS_SHOWN).map((name) => `#/sites/${siteId}/${name}`)];
    for (const [at, address] of [...addresses, `#/sites/${siteId}/survey`].entries()) {
      if (!SOAKED && at % LOOKS.length !== LOOKS.indexOf(look)) continue;
      await unfold(page, `${server.base}/${address}`);
      const { violations } = await new AxeBuilder({ page }).exclude('iframe').analyze();
      for (const { id, nodes } of violations) found.push(`${address} ${id}: ${nodes[0]?.html.slice(0, 160)}`);
      const wide = await page.evaluate('document.documentElement.scrollWidth - window.innerWidth');
      if (Number(wide) > 0) found.push(`${address} is ${wide} px wider than the window`);
    }
    expect(found).toEqual([]);
    expect(outside).toEqual([]);
    expect(faults).toEqual([]);
    await close();
  });

  it('finds a violation where there is one: a control for the rules themselves', async () => {
    const { page, close } = await openPage(browser, server.base);
    await page.goto(server.base);
    await page.getByText('A new site').waitFor();
    await page.evaluate('document.querySelectorAll("label").forEach((label) => label.remove())');
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(violations.map(({ id }) => id)).toContain('label');
    await close();
  });
});

/** Opens an address and all that is folded away; where it has figures, the table and the working of the first. */
async function unfold(page: Page, address: string): Promise<void> {
  await page.goto(address);
  const shown = STATIONS_SHOWN[address.split('/').at(-1) ?? ''] ?? /site/i;
  await page.getByText(shown).first().waitFor();
  for (const name of ['Table', 'Working']) {
    const toggle = page.getByRole('button', { name, exact: true }).first();
    if (await toggle.isVisible()) await toggle.click();
  }
  await page.evaluate('document.querySelectorAll("details").forEach((part) => { part.open = true; })');
}
