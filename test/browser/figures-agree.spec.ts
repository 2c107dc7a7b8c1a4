import { execFile } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { formatNumber, GAP } from '#libs/present/format-number.js';
import { meterFile, siteFile } from '../api/site-builder.js';
import { CHROMIUM, openPage } from '../support/browser.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';

const CLI = join(import.meta.dirname, '../../dist/apps/cli/main.js');

/** Three sites that differ in what their figures rest on. */
const SITES = [
  { name: 'Alder Works', changes: {}, days: 40 },
  { name: 'Birch Mill', changes: { target: { powerFactor: 0.9 }, bus: { nominalV: 415, highestV: 440 } }, days: 61 },
  {
    name: 'Cedar Foundry',
    changes: { supply: { faultLevelMva: { max: 25 } }, meteredAt: 'bus', loads: { distorting: [], backgroundPct: [] } },
    days: 30,
  },
];

describe.runIf(CHROMIUM !== null)('a figure of a site', () => {
  let database: TestDatabase;
  let server: TestServer;
  const folder = mkdtempSync(join(tmpdir(), 'varwright-agree-'));

  beforeAll(async () => {
    database = await databases[0]!.create();
    server = await startServer(database.url);
  });
  afterAll(async () => {
    await server.close();
    await database.drop();
    rmSync(folder, { recursive: true });
  });

  it.each(SITES)('is the same on the page, in the API and by the command: $name', async ({ name, changes, days }) => {
    const file = siteFile({ name, ...changes });
    const load = meterFile(days);
    writeFileSync(join(folder, 'site.json'), JSON.stringify(file));
    writeFileSync(join(folder, 'load.csv'), load);
    const paths = [join(folder, 'site.json'), '--load', join(folder, 'load.csv'), '--json'];
    const command = JSON.parse(await printed(['assess', ...paths]));

    const { id } = (await server.ask('POST', '/api/sites', file)).body;
    expect((await server.upload(id, load)).status).toBe(201);
    const { result: api } = (await server.ask('POST', `/api/sites/${id}/assessments?wait=60`, {})).body;
    expect(api).toEqual(command);

    const { page, close } = await openPage(server.base);
    const quantity = (value: number, unit: string) => `${formatNumber(value)}${unit === '' ? '' : GAP}${unit}`;
    const text = (selector: string) => page.locator(selector).allTextContents();
    await page.goto(`${server.base}/#/sites/${id}/need`);
    await page.getByText('Rows are hours of the day').waitFor();
    expect(await text('.figures .value')).toEqual([
      quantity(api.requirement.maxKvar, 'kvar'),
      quantity(api.requirement.p95Kvar, 'kvar'),
      quantity(api.requirement.meanKvar, 'kvar'),
      quantity(api.record.powerFactorLagging, ''),
    ]);
    const stations = await text('.station .deciding');
    expect(stations).toContain(quantity(api.network.shortCircuitMva, 'MVA'));
    expect(stations).toContain(quantity(api.requirement.p99Kvar, 'kvar'));
    expect(stations).toContain(quantity(api.bank.effectiveKvar, 'kvar'));

    // What the page's own engine says of the same inputs, read from the charts it draws.
    await page.goto(`${server.base}/#/sites/${id}/bank`);
    await page.getByText('replayed').first().waitFor();
    const months = page.locator('section', {
      has: page.getByRole('heading', { name: /^Every month|^\d+ months|^One month/ }),
    });
    await months.getByRole('button', { name: 'Table' }).click();
    const after = await months.locator('.table td:nth-child(3)').allTextContents();
    expect(after.slice(0, api.operation.months.length).map(Number)).toEqual(
      api.operation.months.map(({ powerFactorLagging }: { powerFactorLagging: number }, at: number) =>
        Number(powerFactorLagging.toFixed(after[at]!.length - 2)),
      ),
    );
    const switchings = page.locator('section', { has: page.getByRole('heading', { name: /switchings, at most/ }) });
    await switchings.getByRole('button', { name: 'Table' }).click();
    const counts = (await switchings.locator('.table td:nth-child(2)').allTextContents()).map((one) =>
      Number(one.replaceAll(GAP, '')),
    );
    expect(counts.slice(0, api.operation.switchings.length)).toEqual(api.operation.switchings);
    await close();
  });
});

/** What a command prints; it ends in 6 where a limit is passed, which is no failure here. */
async function printed(args: string[]): Promise<string> {
  try {
    return (await promisify(execFile)(process.execPath, [CLI, ...args], { maxBuffer: 1e8 })).stdout;
  } catch (error) {
    const { code, stdout } = error as { code: number; stdout: string };
    if (code === 6) return stdout;
    throw error;
  }
}
