import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { siteFile } from '../api/site-builder.js';
import { CHROMIUM, openPage } from '../support/browser.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';

const { create } = databases[0]!;

describe.runIf(CHROMIUM !== null)('a site without a meter file', () => {
  let database: TestDatabase;
  let server: TestServer;

  beforeAll(async () => {
    database = await create();
    server = await startServer(database.url);
  });
  afterAll(async () => {
    await server.close();
    await database.drop();
  });

  it('is estimated from bills typed at the record, refused at their fields until they hold, and called an estimate', async () => {
    const { id } = (await server.ask('POST', '/api/sites', siteFile({ bank: undefined }))).body;
    const open = await openPage(server.base);
    const { page } = open;
    await page.goto(`${server.base}/#/sites/${id}/record`);
    await page.getByRole('button', { name: 'Add a bill' }).click();
    const bill = page.getByRole('group', { name: 'Bill 1' });
    await bill.getByLabel('month').fill('2025-01');
    await bill.getByLabel('active energy', { exact: true }).fill('100 MWh');
    await bill.getByLabel('or power factor').fill('0.75');
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    await bill.getByText('Needs maxKw or maxKva; found neither.').waitFor();
    await bill.getByLabel('greatest demand', { exact: true }).fill('90');
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    await bill.getByText(/Needs at least the mean of the month/).waitFor({ timeout: 60_000 });
    await bill.getByLabel('greatest demand', { exact: true }).fill('320');
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    await page.getByText('revision 1, draft').waitFor({ timeout: 60_000 });

    await page.getByRole('navigation').getByRole('link', { name: /Need/ }).click();
    await page.getByRole('heading', { name: /An estimate from bills, without a meter’s record/ }).waitFor();
    await page.getByRole('heading', { name: /Left out, since an estimate can’t support it/ }).waitFor();
    expect(await page.getByRole('row', { name: /Jan 2025/ }).textContent()).toContain('kvar');
    await page
      .getByRole('navigation')
      .getByRole('link', { name: /Proposal/ })
      .click();
    await page.getByRole('heading', { name: /Proposed: estimate:/ }).waitFor();
    // What was typed as a factor is what was kept as kvarh: nothing has changed since.
    expect(await page.getByText('The inputs have changed since this paper was made').count()).toBe(0);
    expect(await page.getByText('Not computed').count()).toBe(0);
    expect(open.faults).toEqual([]);
    expect(open.outside).toEqual([]);
    await open.close();
  });
});
