import type { Locator, Page } from 'playwright-core';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { demoLoad } from '#apps/server/demo/demo-load.js';
import { CHROMIUM, type OpenPage, openPage } from '../support/browser.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';

const { create } = databases[0]!;
const METER_FILE = { name: 'load.csv', mimeType: 'text/csv', buffer: Buffer.from([...demoLoad()].join('')) };

describe.runIf(CHROMIUM !== null)('the whole job, from an empty database to a downloaded proposal', () => {
  let database: TestDatabase;
  let server: TestServer;
  let open: OpenPage;

  beforeEach(async () => {
    database = await create();
    server = await startServer(database.url);
    open = await openPage(server.base);
    await open.page.goto(server.base);
  });
  afterEach(async () => {
    expect(open.outside).toEqual([]);
    expect(open.faults).toEqual([]);
    await open.close();
    await server.close();
    await database.drop();
  });

  it('can be done with a pointer', async () => {
    const { page } = open;
    await page.getByRole('heading', { name: 'No site yet' }).waitFor();
    await page.getByLabel('name', { exact: true }).fill('Alder Works');
    await page.getByLabel('fault level, greatest').fill('0,25 GVA');
    await page.getByText('0,25 GVA: 250').waitFor();
    await page.getByRole('button', { name: 'Add the site' }).click();

    await page.getByRole('heading', { name: 'Drop a meter file' }).waitFor();
    await page.locator('input[type=file]').setInputFiles(METER_FILE);
    await page.getByRole('heading', { name: /A year of readings in steps of 15.min, without a gap/ }).waitFor();
    await page.getByRole('heading', { name: /A first look: .* to hold 0\.95/ }).waitFor();
    await page.getByText('active (kW)').first().waitFor();

    await station(page, 'Supply').click();
    await page.getByRole('button', { name: 'Add a load' }).click();
    await page.getByLabel('fundamental').fill('0,32 kA');
    await page.getByText('0,32 kA: 320').waitFor();
    await page.getByRole('button', { name: 'There is none' }).click();

    await station(page, 'Bank').click();
    await page.getByRole('button', { name: 'Design a bank' }).click();
    await page.getByRole('heading', { name: /hold every month above 0\.95/ }).waitFor({ timeout: 60_000 });
    const before = await figure(page);

    const stage = page.getByRole('button', { name: /^Stage 1,/ });
    const box = (await stage.boundingBox())!;
    await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2);
    await page.mouse.down();
    await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2 + 120, { steps: 4 });
    await page.mouse.up();
    await expect.poll(() => figure(page)).not.toBe(before);
    await page.getByRole('button', { name: 'Add a stage' }).click();
    await chooseSharedTariff(page, server);
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    await page.getByText('revision 2, draft').waitFor({ timeout: 60_000 });
    await page.getByText('Revision 2 was made with version 1, from 2026-01-01, and keeps it.').waitFor();
    await page.getByLabel('the tariff is').selectOption({ label: 'the site’s own' });
    expect(await page.getByLabel('kvarh per kWh').inputValue()).toBe('0.33');
    await page.getByRole('button', { name: 'Put back' }).click();
    await page.getByText('“Valley supply”, version 1, holds from').waitFor();

    await station(page, 'Bank').click();
    await bringsBackItsWorking(page, /^The supply’s current falls/);

    await station(page, 'Proposal').click();
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'Download the proposal' }).click(),
    ]);
    expect(await firstBytes(download)).toBe('%PDF-1.7');
  });

  it('can be done with the keyboard alone', async () => {
    const { page } = open;
    await page.getByRole('heading', { name: 'No site yet' }).waitFor();
    await reach(page, page.getByLabel('name', { exact: true }));
    await page.keyboard.type('Birch Mill');
    await reach(page, page.getByRole('button', { name: 'Add the site' }));
    await page.keyboard.press('Enter');

    await page.getByRole('heading', { name: 'Drop a meter file' }).waitFor();
    await reach(page, page.locator('input[type=file]'));
    const [chooser] = await Promise.all([page.waitForEvent('filechooser'), page.keyboard.press('Space')]);
    await chooser.setFiles(METER_FILE);
    await page.getByRole('heading', { name: /A year of readings/ }).waitFor();

    await reach(page, station(page, 'Bank'));
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: 'Design a bank' }).waitFor();
    await reach(page, page.getByRole('button', { name: 'Design a bank' }));
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: /hold every month above 0\.95/ }).waitFor({ timeout: 60_000 });

    await reach(page, station(page, 'Need'));
    await page.keyboard.press('Enter');
    await reach(page, page.getByRole('slider', { name: 'Target power factor' }));
    await page.keyboard.press('ArrowLeft');
    await page.getByRole('heading', { name: /to hold 0\.945/ }).waitFor();

    await reach(page, station(page, 'Bank'));
    await page.keyboard.press('Enter');
    await reach(page, page.getByRole('button', { name: /^Stage 1,/ }));
    const before = await figure(page);
    await page.keyboard.press('Delete');
    await expect.poll(() => figure(page)).not.toBe(before);
    await reach(page, page.getByRole('button', { name: 'Compute and keep' }));
    await page.keyboard.press('Enter');
    await page.getByText('revision 2, draft').waitFor({ timeout: 60_000 });

    await reach(page, station(page, 'Proposal'));
    await page.keyboard.press('Enter');
    await page.getByRole('link', { name: 'Download the proposal' }).waitFor();
    await reach(page, page.getByRole('link', { name: 'Download the proposal' }));
    const [download] = await Promise.all([page.waitForEvent('download'), page.keyboard.press('Enter')]);
    expect(await firstBytes(download)).toBe('%PDF-1.7');
  });
});

/** Names a tariff that several sites share, in place of one of the site's own. */
async function chooseSharedTariff(page: Page, server: TestServer): Promise<void> {
  const clauses = [{ name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit: 0.02 }];
  const paper = { kind: 'tariff', name: 'Valley supply', date: '2026-01-01', document: { clauses } };
  expect((await server.ask('POST', '/api/papers', paper)).status).toBe(201);
  await station(page, 'Money').click();
  await page.getByLabel('the tariff is').selectOption({ label: 'Valley supply, the latest version' });
  await page.getByText('“Valley supply”, version 1, holds from').waitFor();
  await page.getByText('What it says', { exact: true }).click();
  await page.getByRole('rowheader', { name: 'clause 1, free ratio' }).waitFor();
}

/** Opens the working of a figure and copies its link; the link alone opens the same working on the same moment. */
async function bringsBackItsWorking(page: Page, heading: RegExp): Promise<void> {
  const figure = page.getByRole('region', { name: heading });
  await figure.getByRole('button', { name: 'Working' }).click();
  const working = page.getByRole('region', { name: /^Working: current of the supply/ });
  const shown = await working.textContent();
  await page.evaluate('navigator.clipboard.writeText = async (text) => { window.copied = text; }');
  await working.getByRole('button', { name: 'Copy link' }).click();
  await page.goto(await page.evaluate('window.copied'));
  await page.reload();
  await working.waitFor();
  expect(await working.textContent()).toBe(shown);
}

function station(page: Page, name: string): Locator {
  return page
    .getByRole('navigation', { name: 'Stations of the plan' })
    .getByRole('link', { name: new RegExp(`^${name}`) });
}

function figure(page: Page): Promise<string | null> {
  return page.locator('.figures .value').first().textContent();
}

/** Steps through the page with the Tab key until an element has the focus, as a hand without a pointer does. */
async function reach(page: Page, wanted: Locator): Promise<void> {
  await wanted.waitFor();
  for (let step = 0; step < 250; step++) {
    if (await wanted.evaluate((element) => element === element.ownerDocument.activeElement)) return;
    await page.keyboard.press('Tab');
  }
  throw new Error(`the Tab key does not reach ${wanted}`);
}

async function firstBytes(download: { createReadStream(): Promise<NodeJS.ReadableStream> }): Promise<string> {
  for await (const chunk of await download.createReadStream()) return (chunk as Buffer).subarray(0, 8).toString();
  return '';
}
