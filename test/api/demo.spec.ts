import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { demoLoad } from '#apps/server/demo/demo-load.js';
import { DEMO_SITE } from '#apps/server/demo/demo-site.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

/** Seconds, on a machine that does other things as well. */
const SOON = { timeout: 90_000, interval: 100 };

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`the example of a new installation, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    const page = async (path = '/plain') => (await server.ask('GET', path)).body as string;

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url, { demo: true });
      await vi.waitFor(async () => expect(await page()).toContain('Proposed:'), SOON);
    }, 120_000);

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    it('is called one, and its page says the verdict in words', async () => {
      const text = (await page()).replace(/<[^>]+>/g, ' ').replace(/\s+/g, ' ');
      expect(text).toContain('(example)');
      expect(text).toMatch(/within limits|near a limit/);
      expect(text).toContain('no computed limit was passed is not permission to energise');
      expect(text).toMatch(/needs \d{3} kvar/);
      expect(text).toMatch(
        /rings with the extruder drives: a harmonic voltage passes its limit at \d+ of its \d+ levels/,
      );
    });

    it('shows a dilemma: the plain bank is over a limit, the one with reactors is not', async () => {
      const [site] = (await server.ask('GET', '/api/sites')).body.sites;
      const plan = (await server.ask('GET', `/api/sites/${site.id}/revisions/1`)).body;
      expect(plan.verdict).not.toBe('avoid');
      expect(plan.result.bank.stages.every(({ reactorPct }: { reactorPct: number }) => reactorPct === 7)).toBe(true);
      expect(plan.rival).toMatchObject({ verdict: 'avoid', name: 'No reactors' });
      expect(plan.rival.levelsOver).toBeGreaterThan(0);
      expect(plan.result.requirement.months).toHaveLength(12);
      const offered = await server.ask('POST', `/api/sites/${site.id}/assessments?wait=60`, {});
      expect(offered.body.verdict).toBe('avoid');
    });

    it('shows money: the bank that pays, by a tariff and prices that are called invented', async () => {
      const [site] = (await server.ask('GET', '/api/sites')).body.sites;
      const { result } = (await server.ask('GET', `/api/sites/${site.id}/revisions/1`)).body;
      expect(result.money).toMatchObject({ recommended: 'new bank', monthsFilled: 0 });
      expect(result.money.npv).toBeGreaterThan(0);
      expect(result.assumptions.map(({ code }: { code: string }) => code)).toContain('prices.invented');
      expect(DEMO_SITE.tariff.name).toMatch(/invented/);
      expect(DEMO_SITE.prices).toMatchObject({ invented: true, name: expect.stringMatching(/invented/i) });
    });

    it('leads from its page only to what exists, on this server alone', async () => {
      const links = [...(await page()).matchAll(/(?:href|src)="([^"]*)"/g)].map(([, link]) => link!);
      const own = links.filter((link) => !link.startsWith('data:,'));
      expect(own.length).toBeGreaterThan(8);
      for (const link of own) {
        expect(link).toMatch(/^\/(?!\/)/);
        expect((await server.ask('GET', link)).status, link).toBe(200);
      }
    });

    it('has a page with a language, one main heading, landmarks and no script', async () => {
      const text = await page();
      expect(text).toMatch(/^<!doctype html>\n<html lang="en">/);
      expect(text.match(/<h1>/g)).toHaveLength(1);
      for (const part of ['<header>', '<main>', '<footer>', '<title>', 'name="viewport"', '<caption>', 'scope="col"']) {
        expect(text).toContain(part);
      }
      expect(text).not.toMatch(/<script|style=|onclick/);
      const labelled = [...text.matchAll(/aria-labelledby="(\w+)"/g)].map(([, id]) => id);
      for (const id of labelled) expect(text.match(new RegExp(`id="${id}"`, 'g'))).toHaveLength(1);
    });

    it('can be had as files, from which the same site and record come', async () => {
      expect((await server.ask('GET', '/api/demo/site.json')).body).toEqual(DEMO_SITE);
      const csv = (await server.ask('GET', '/api/demo/load.csv')).body as string;
      expect(csv).toBe([...demoLoad()].join(''));
      const { record } = await readMeterFile(bytesOf(csv), { siteTimeZone: DEMO_SITE.timeZone });
      expect(record.beginS).toHaveLength(35_040);
      expect(record.missing).toBe(0);
      expect(Math.max(...record.activeKw)).toBeGreaterThan(400);
      expect(Math.max(...record.activeKw)).toBeLessThan(450);
    });

    it('shares its page with other sites, whose names are text and nothing else', async () => {
      const name = `<script>alert("1")</script> & 'Sons'`;
      const { id } = (await server.ask('POST', '/api/sites', siteFile({ name }))).body;
      const escaped = '&lt;script&gt;alert(&quot;1&quot;)&lt;/script&gt; &amp; &#39;Sons&#39;';
      expect(await page()).toContain(`<a href="/sites/${id}">${escaped}</a>`);
      expect(await page(`/sites/${id}`)).toContain(`<h1>${escaped}</h1>`);
      expect(await page(`/sites/${id}`)).toContain('No load record yet');
      await server.upload(id, meterFile());
      expect(await page(`/sites/${id}`)).toContain('No plan yet');
    });

    it('stays away once it was removed', async () => {
      const [site] = (await server.ask('GET', '/api/sites')).body.sites;
      expect((await server.ask('DELETE', `/api/sites/${site.id}`)).status).toBe(204);
      await server.close();
      server = await startServer(database.url, { demo: true });
      await new Promise((resolve) => setTimeout(resolve, 500));
      const { sites } = (await server.ask('GET', '/api/sites')).body;
      expect(sites.map((left: { name: string }) => left.name)).not.toContain(DEMO_SITE.name);
      for (const { id } of sites) await server.ask('DELETE', `/api/sites/${id}`);
      expect(await page()).toContain('No site yet');
    });
  });
}

async function* bytesOf(text: string): AsyncGenerator<Uint8Array> {
  yield new TextEncoder().encode(text);
}
