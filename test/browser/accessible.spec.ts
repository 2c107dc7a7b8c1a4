import axe from 'axe-core';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { CHROMIUM, type OpenPage, openPage } from '../support/browser.js';
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

/** What a page shows once it stands. */
const SHOWN: Record<string, RegExp> = {
  ...STATIONS_SHOWN,
  '': /A new site/,
  nowhere: /Nothing stands at this address|Varwright/,
  papers: /^One shared paper/,
  survey: /Look, do not open/,
  'reevaluation?revision=1': /What changed, in numbers/,
};

describe.runIf(CHROMIUM !== null)('every page, by the automated rules of accessibility', () => {
  let open: OpenPage;
  let database: TestDatabase;
  let server: TestServer;
  let siteId: string;

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url, { demo: true });
    siteId = await openDemo(server);
    // A second revision, so that two can be compared.
    expect((await server.ask('POST', `/api/sites/${siteId}/assessments?wait=60`, {})).status).toBe(201);
    const clause = { name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.02 };
    const paper = { kind: 'tariff', name: 'Works tariff', date: '2025-01-01', document: { clauses: [clause] } };
    expect((await server.ask('POST', '/api/papers', paper)).status).toBe(201);
    open = await openPage(server.base);
  });
  afterAll(async () => {
    await open.close();
    await server.close();
    await database.drop();
  });

  // The pages take turns at the looks in the usual run; in the long one every page is seen in every look.
  it.each(LOOKS)('has no violation at $width px, $theme, and nothing wider than the window', async (look) => {
    const { page, outside, faults } = open;
    await page.setViewportSize({ width: look.width, height: 900 });
    await page.emulateMedia({ colorScheme: look.theme });
    const found: string[] = [];
    for (const [at, address] of addressesOf(siteId).entries()) {
      if (!SOAKED && at % LOOKS.length !== LOOKS.indexOf(look)) continue;
      await unfold(page, `${server.base}/${address}`);
      for (const { id, html } of await violationsOn(page)) found.push(`${address} ${id}: ${html}`);
      const wide = await page.evaluate('document.documentElement.scrollWidth - window.innerWidth');
      if (Number(wide) > 0) found.push(`${address} is ${wide} px wider than the window`);
    }
    expect(found).toEqual([]);
    expect(outside).toEqual([]);
    expect(faults).toEqual([]);
  });

  it('turns dark with the machine while it is open, and back', async () => {
    const { page } = open;
    await page.goto(server.base);
    await page.getByText('A new site').waitFor();
    for (const [colorScheme, offered] of [
      ['dark', 'Light'],
      ['light', 'Dark'],
    ] as const) {
      await page.emulateMedia({ colorScheme });
      await page.getByRole('button', { name: offered }).waitFor();
      expect(await page.evaluate('document.documentElement.dataset.theme')).toBe(colorScheme);
    }
  });

  it('finds a violation where there is one: a control for the rules themselves', async () => {
    const { page } = open;
    await page.goto(server.base);
    await page.getByText('A new site').waitFor();
    await page.evaluate('document.querySelectorAll("label").forEach((label) => label.remove())');
    expect((await violationsOn(page)).map(({ id }) => id)).toContain('label');
  });
});

/** Every page: those of the sites, those of one site, and those the server makes itself. */
function addressesOf(siteId: string): string[] {
  const ofSite = [...Object.keys(STATIONS_SHOWN), 'survey', 'reevaluation?revision=1'].map(
    (name) => `#/sites/${siteId}/${name}`,
  );
  const revision = `sites/${siteId}/revisions/1`;
  const own = [`${revision}/review`, `${revision}/differences/2`, `sites/${siteId}`];
  return ['#/', '#/nowhere', '#/papers', ...ofSite, ...own, 'verify', 'account', 'people', 'plain', 'nowhere'];
}

/** What all the rules find on the page as it stands, but for the paper shown in a frame. */
async function violationsOn(page: Page): Promise<{ id: string; html: string }[]> {
  // A document that was judged before still holds the rules.
  if (!(await page.evaluate('typeof axe === "object"'))) await page.evaluate(axe.source);
  const context = { exclude: [['iframe']] };
  const options = { resultTypes: ['violations'], iframes: false };
  const violations = await page.evaluate(
    `axe.run(${JSON.stringify(context)}, ${JSON.stringify(options)}).then((found) => found.violations)`,
  );
  return (violations as axe.Result[]).map(({ id, nodes }) => ({ id, html: nodes[0]?.html.slice(0, 160) ?? '' }));
}

/** Opens an address and all that is folded away; where it has figures, the table and the working of the first. */
async function unfold(page: Page, address: string): Promise<void> {
  await page.goto(address);
  const shown = SHOWN[address.split('/').at(-1)!] ?? /Varwright/;
  await page.getByText(shown).first().waitFor();
  for (const name of [/^Table$/, /^Working$/, /^Show\b/]) {
    const toggle = page.getByRole('button', { name }).first();
    if (await toggle.isVisible()) await toggle.click();
  }
  await page.evaluate('document.querySelectorAll("details").forEach((part) => { part.open = true; })');
}
