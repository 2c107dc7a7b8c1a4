import type { Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { meterFile, siteFile } from '../api/site-builder.js';
import { CHROMIUM, type OpenPage, openPage } from '../support/browser.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';

describe.runIf(CHROMIUM !== null)('on a bad day the page', () => {
  let database: TestDatabase;
  let server: TestServer;
  let open: OpenPage;
  let siteId: string;

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url);
  });
  afterAll(async () => {
    await server.close();
    await database.drop();
  });
  beforeEach(async () => {
    siteId = (await server.ask('POST', '/api/sites', siteFile())).body.id;
    await server.upload(siteId, meterFile());
    open = await openPage(server.base);
  });
  afterEach(async () => {
    expect(open.faults).toEqual([]);
    await open.close();
  });

  it('says a refusal at its field, and keeps what was typed', async () => {
    const { page } = open;
    await at(page, 'supply');
    const least = page.getByLabel('fault level, least');
    await least.fill('380');
    await page.getByText(/^Needs .*; found .*380/).waitFor();
    expect(await least.inputValue()).toBe('380');
    await page.getByLabel('fault level, greatest').fill('12 kV');
    await page.getByText('This is measured in MVA.').waitFor();
    expect(await page.getByRole('button', { name: 'Compute and keep' }).count()).toBe(0);
    await page.getByLabel('fault level, greatest').fill('0.4 GVA');
    await page.getByText(/^Needs/).waitFor({ state: 'detached' });
    await page.getByRole('button', { name: 'Compute and keep' }).waitFor();
  });

  it('says since when there is no connection, keeps the typing over a reload, and saves once it is back', async () => {
    const { page, context } = open;
    await at(page, 'supply');
    await page.getByLabel('fault level, least').fill('95');
    await context.setOffline(true);
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    await page.getByText(/Not saved: no connection since \d\d:\d\d/).waitFor();
    expect(await page.getByLabel('fault level, least').inputValue()).toBe('95');
    // A station whose script is not here yet comes by itself once it can.
    await page.locator('.station a').filter({ hasText: 'Need' }).click();
    await page.getByText(/Not saved: no connection since \d\d:\d\d/).waitFor();
    await context.setOffline(false);
    await page.getByLabel('target power factor').first().waitFor();
    await page.locator('.station a').filter({ hasText: 'Supply' }).click();
    await page.reload();
    await page.getByLabel('fault level, least').waitFor();
    expect(await page.getByLabel('fault level, least').inputValue()).toBe('95');
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    await page.getByText('revision 1, draft').waitFor({ timeout: 60_000 });
    const { body } = await server.ask('GET', `/api/sites/${siteId}`);
    expect(body.site.supply.faultLevelMva.min).toBe(95);
  });

  it('asks for the record again where the connection was lost before it came', async () => {
    const { page, context } = open;
    let isThere = false;
    await context.route('**/columns', (route) => (isThere ? route.continue() : route.abort('internetdisconnected')));
    await at(page, 'need');
    await page.getByText('The record did not come. It is asked for again.').waitFor();
    isThere = true;
    await page.getByLabel('target power factor').first().waitFor();
    expect(await page.getByText('The record did not come').count()).toBe(0);
  });

  it('says that the server is gone though nothing was asked of it, and that it is back', async () => {
    const { page, context } = open;
    await at(page, 'supply');
    await page.getByLabel('fault level, least').waitFor();
    await context.route('**/healthz', (route) => route.abort('connectionrefused'), { times: 1 });
    const lost = page.getByRole('alert').filter({ hasText: /^No connection since \d\d:\d\d/ });
    await lost.waitFor();
    await lost.waitFor({ state: 'detached' });
  });

  it('shows both versions where another window saved meanwhile, and loses neither unasked', async () => {
    const { page } = open;
    await at(page, 'supply');
    await page.getByLabel('fault level, least').fill('111');
    const { body, headers } = await server.ask('GET', `/api/sites/${siteId}`);
    const theirs = { ...body.site, supply: { ...body.site.supply, faultLevelMva: { max: 250, min: 222 } } };
    const tag = { 'if-match': headers.get('etag')! };
    expect((await server.ask('PUT', `/api/sites/${siteId}`, theirs, tag)).status).toBe(200);
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    const row = page.getByRole('row', { name: /supply, fault level \(MVA\), least/ });
    expect(await row.textContent()).toContain('111');
    expect(await row.textContent()).toContain('222');
    expect((await server.ask('GET', `/api/sites/${siteId}`)).body.site.supply.faultLevelMva.min).toBe(222);
    await page.getByRole('button', { name: 'Go on with mine' }).click();
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    await page.getByText('revision 1, draft').waitFor({ timeout: 60_000 });
    expect((await server.ask('GET', `/api/sites/${siteId}`)).body.site.supply.faultLevelMva.min).toBe(111);
  });

  it('asks in place what a meter file leaves open, and reads it by the answer', async () => {
    const { page } = open;
    await at(page, 'record');
    const rows = ['time;P;Q'];
    for (let i = 0; i < 40 * 96; i++) {
      const stamp = new Date(Date.UTC(2025, 0, 1) + i * 900_000).toISOString().slice(0, 16).replace('T', ' ');
      rows.push(`${stamp};${200 + (i % 50)};${150 + (i % 30)}`);
    }
    const file = { name: 'bare.csv', mimeType: 'text/csv', buffer: Buffer.from(`${rows.join('\n')}\n`) };
    await page.locator('input[type=file]').setInputFiles(file);
    const answers = page.getByRole('region', { name: /which columns hold/ }).getByRole('button');
    await answers.first().waitFor();
    expect(await answers.allTextContents()).toEqual([
      'power in kW and kvar',
      'active in W, reactive in var',
      'energy in kWh and kvarh',
      'active in Wh, reactive in varh',
    ]);
    const before = (await server.ask('GET', `/api/sites/${siteId}/records`)).body.records.length;
    await answers.first().click();
    await expect
      .poll(async () => (await server.ask('GET', `/api/sites/${siteId}/records`)).body.records.length)
      .toBe(before + 1);
  });

  it('draws its figures as wide as the sheet before it prints, and as the window after', async () => {
    const { page } = open;
    await at(page, 'need');
    const drawing = page.locator('.plot svg').first();
    await drawing.waitFor();
    const width = () => drawing.getAttribute('width').then(Number);
    const before = await width();
    await page.evaluate("dispatchEvent(new Event('beforeprint'))");
    expect(await width()).toBe(700);
    await page.evaluate("dispatchEvent(new Event('afterprint'))");
    expect(await width()).toBe(before);
    expect(before).not.toBe(700);
  });

  it('gives a deleted site back, and deletes it once the way back has closed', async () => {
    const { page } = open;
    await page.goto(server.base);
    const row = page.getByRole('listitem').filter({ has: page.locator(`a[href*="${siteId}"]`) });
    await row.getByRole('button', { name: /Delete/ }).click();
    await row.waitFor({ state: 'detached' });
    await page.getByRole('button', { name: 'Undo' }).click();
    await row.waitFor();
    expect((await server.ask('GET', `/api/sites/${siteId}`)).status).toBe(200);
    await row.getByRole('button', { name: /Delete/ }).click();
    await expect
      .poll(async () => (await server.ask('GET', `/api/sites/${siteId}`)).status, { timeout: 20_000 })
      .toBe(404);
  });

  it('says of an unknown address that nothing is there, and names the way on', async () => {
    const { page } = open;
    await page.goto(`${server.base}/#/sites/${siteId.replace(/^./, (one) => (one === '0' ? '1' : '0'))}/bank`);
    await page.getByRole('heading', { name: 'No site stands at this address' }).waitFor();
    await page.goto(`${server.base}/#/elsewhere`);
    await page.getByRole('heading', { name: 'Nothing stands at this address' }).waitFor();
  });

  async function at(page: Page, station: string): Promise<void> {
    await page.goto(`${server.base}/#/sites/${siteId}/${station}`);
    await page.getByText('What this plan still rests on').first().waitFor();
  }
});
