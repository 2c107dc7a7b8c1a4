import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { meterFile, siteFile } from '../api/site-builder.js';
import { CHROMIUM, type OpenPage, openPage } from '../support/browser.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { minuteFile } from '../support/minute-file.js';
import { startServer, type TestServer } from '../support/test-server.js';

/** Quarter hours of one kW each from one day to another, columns without units. */
function bareFile(from: number, to: number, kw: (day: number) => number) {
  const rows = ['time;P;Q'];
  for (let i = from * 96; i < to * 96; i++) {
    const stamp = new Date(Date.UTC(2025, 0, 1) + i * 900_000).toISOString().slice(0, 16).replace('T', ' ');
    rows.push(`${stamp};${kw(Math.floor(i / 96))};${50 + (i % 3)}`);
  }
  return { name: `${from}-${to}.csv`, mimeType: 'text/csv', buffer: Buffer.from(`${rows.join('\n')}\n`) };
}

describe.runIf(CHROMIUM !== null)('the meter files of a record, on the page', () => {
  let database: TestDatabase;
  let server: TestServer;
  let open: OpenPage;
  let siteId: string;
  const dir = mkdtempSync(join(tmpdir(), 'varwright-page-files-'));
  const records = async () => (await server.ask('GET', `/api/sites/${siteId}/records`)).body.records;
  const file = (page: Page) => page.locator('input[type=file]');

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url);
  });
  afterAll(async () => {
    await server.close();
    await database.drop();
    rmSync(dir, { recursive: true });
  });
  beforeEach(async () => {
    siteId = (await server.ask('POST', '/api/sites', siteFile())).body.id;
    open = await openPage(server.base);
    await open.page.goto(`${server.base}/#/sites/${siteId}/record`);
    await open.page.getByRole('heading', { name: 'Drop a meter file' }).waitFor();
  });
  afterEach(async () => {
    expect(open.faults).toEqual([]);
    await open.close();
  });

  it('are answered once, kept under a name, offered for the next, and extend the record as decided', async () => {
    const { page } = open;
    await file(page).setInputFiles(bareFile(0, 20, () => 100));
    await page.getByRole('button', { name: 'power in kW and kvar' }).click();
    await page.getByLabel('keep these answers under a name').fill('Hall meter');
    await page.getByRole('button', { name: 'Keep the answers' }).click();
    await page.getByText('The answers are kept as “Hall meter”.').waitFor();

    await page.getByLabel('the file is').selectOption('added to this record');
    await file(page).setInputFiles(bareFile(18, 30, (day) => (day === 19 ? 160 : 100)));
    // offered, not taken: the question stands beside it
    await page.getByRole('button', { name: 'power in kW and kvar' }).waitFor();
    expect(await records()).toHaveLength(1);
    await page.getByRole('button', { name: 'Read it with the answers kept as “Hall meter”' }).click();

    const asked = page.getByRole('region', { name: /^whether the record or the further file counts in 96 intervals/ });
    await asked.getByText('20 Jan 2025 00:00').waitFor();
    expect(await records()).toHaveLength(1);
    await asked.getByRole('button', { name: 'the further file counts' }).click();
    const revisions = page.getByRole('region', { name: 'Revisions of the record' });
    await revisions.getByRole('row', { name: /^2 18-30\.csv/ }).waitFor();
    await revisions.getByRole('row', { name: /^1 0-20\.csv/ }).waitFor();
    const [latest, first] = await records();
    expect([latest.record.maxKw, latest.record.intervals, latest.previousId]).toEqual([160, 30 * 96, first.id]);
    expect(first.record.maxKw).toBe(100);
  });

  it('that hold an hour the clock leaves out are read by the clock that is chosen', async () => {
    const { page } = open;
    await file(page).setInputFiles(bareFile(80, 100, () => 100));
    await page.getByText(/in the hour that was skipped/).waitFor();
    await page.getByRole('button', { name: 'UTC', exact: true }).click();
    await page.getByRole('button', { name: 'power in kW and kvar' }).click();
    await page.getByRole('heading', { name: /20 days of readings/ }).waitFor();
    const [{ record }] = await records();
    expect([record.intervals, record.missing, record.beginS]).toEqual([20 * 96, 0, Date.UTC(2025, 2, 22) / 1000]);
    // Its drawing stands without the page being loaded anew.
    await page.getByLabel(/^The record's kW and kvar over time/).waitFor();
  });

  it('that come after a plan are planned by the next revision', async () => {
    const { page } = open;
    await server.upload(siteId, meterFile());
    await server.ask('POST', `/api/sites/${siteId}/plans?wait=60`, {});
    await page.reload();
    await page.getByText('revision 1, draft').waitFor();
    expect(await page.getByRole('button', { name: 'Compute and keep' }).count()).toBe(0);
    await file(page).setInputFiles(bareFile(0, 30, () => 100));
    await page.getByRole('button', { name: 'power in kW and kvar' }).click();
    await page.getByText('inputs changed since revision 1').waitFor();
    await page.getByRole('button', { name: 'Compute and keep' }).click();
    await page.getByText('revision 2, draft').waitFor();
    const { body } = await server.ask('GET', `/api/sites/${siteId}/revisions/2`);
    expect([body.kind, body.recordId]).toEqual(['plan', (await records())[0].id]);
  });

  it('are read with kept answers where they are chosen before', async () => {
    const { page } = open;
    await server.ask('POST', '/api/kept-maps', { name: 'In watts', map: { units: { active: 'W', reactive: 'var' } } });
    await page.reload();
    await page.getByLabel('read with').selectOption('In watts');
    await file(page).setInputFiles(bareFile(0, 12, () => 5000));
    await page.getByText(/read with the answers kept as “In watts”/).waitFor();
    expect((await records())[0].record.maxKw).toBe(5);
  });

  it('that take long say how far they are, go on over a reload, and can be stopped', async () => {
    const { page } = open;
    const large = join(dir, 'minutes.csv');
    writeFileSync(large, minuteFile(600_000));
    await file(page).setInputFiles(large);
    await page.getByRole('progressbar', { name: 'read of the file' }).waitFor();
    await page.reload();
    await page.getByRole('progressbar', { name: 'read of the file' }).waitFor();
    await page.getByRole('button', { name: 'Stop reading' }).click();
    await page.getByRole('progressbar').waitFor({ state: 'detached' });
    expect(await records()).toEqual([]);
    writeFileSync(large, minuteFile(200_000));
    await file(page).setInputFiles(large);
    await page.getByRole('heading', { name: /139 days of readings/ }).waitFor({ timeout: 90_000 });
  });
});
