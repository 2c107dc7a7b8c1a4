import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { estimateZone } from '#libs/contract/estimate-zone.js';
import { planContent } from '#libs/contract/plan-content.js';
import { readSite } from '#libs/contract/read-site.js';
import { assessEstimate, planEstimate, withRobustness } from '#libs/engine/index.js';
import { putEstimateInWords } from '#libs/present/put-in-words.js';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { squeezed, textOf } from '../support/pdf-text.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

const estimate = {
  bills: ['2025-01', '2025-02'].map((month) => ({ month, activeKwh: 100_000, powerFactor: 0.75, maxKw: 320 })),
  equipment: [{ name: 'presses', count: 8, ratedKw: 37, efficiencyPct: 92, powerFactor: 0.78, loadFactor: 0.8 }],
};

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`plans without a load record over HTTP, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    const newSite = async (changes: Record<string, unknown> = { estimate }) =>
      (await server.ask('POST', '/api/sites', siteFile(changes))).body.id as string;
    const asked = (id: string, what: 'plans' | 'assessments') =>
      server.ask('POST', `/api/sites/${id}/${what}?wait=60`, {});

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url);
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    it('are what the engine computes when it is called directly', async () => {
      const id = await newSite();
      const site = readSite(siteFile({ estimate }));
      for (const [what, judge] of [
        ['plans', planEstimate],
        ['assessments', assessEstimate],
      ] as const) {
        const { status, body } = await asked(id, what);
        expect(status).toBe(201);
        const { result } = withRobustness(judge(site, estimateZone(site)));
        // a bank that does not stand there has nothing to be kept out of it
        const beside = what === 'assessments' ? { tonight: null } : {};
        expect(body.result).toEqual(JSON.parse(JSON.stringify({ ...putEstimateInWords(result), ...beside })));
        expect(body).toMatchObject({ recordId: null, recordHash: null, links: { record: null } });
        expect(body.proposed).toMatch(/^estimate: /);
        expect(body.verdict).not.toBe('clear');
        const content = planContent({ ...body.inputs });
        expect(createHash('sha256').update(content).digest('hex')).toBe(body.contentHash);
      }
    });

    it('say of a bank that stands there over a limit what to keep out, by an estimate', async () => {
      const { bank } = siteFile() as { bank: object };
      const id = await newSite({ estimate, bank: { ...bank, installed: true } });
      const { body } = await asked(id, 'assessments');
      expect(body.verdict).toBe('avoid');
      expect(body.result.tonight).toMatchObject({ byEstimate: true, within: { verdict: 'clear' } });
      expect(body.result.tonight.sentences[0]).toMatch(/^Tonight, by an estimate of the load: keep out /);
      const paper = await server.ask('GET', body.links.proposal);
      expect(squeezed(textOf(paper.body))).toContain(squeezed('Tonight, by an estimate of the load'));
    });

    it('have their paper, are listed, and are one revision for equal inputs', async () => {
      const id = await newSite();
      const first = await asked(id, 'plans');
      expect((await asked(id, 'plans')).body.revision).toBe(first.body.revision);
      const paper = await server.ask('GET', first.body.links.proposal);
      expect(paper.body.subarray(0, 5).toString()).toBe('%PDF-');
      const { revisions } = (await server.ask('GET', `/api/sites/${id}/revisions`)).body;
      expect(revisions).toMatchObject([{ revision: 1, recordId: null }]);
      const page = await server.ask('GET', `/sites/${id}`);
      expect(page.body).toContain('An estimate from bills and equipment, without a meter’s record');
      expect(page.body).not.toContain('Load record as JSON');
    });

    it('give way to a record as soon as there is one', async () => {
      const id = await newSite();
      expect((await asked(id, 'plans')).body.recordId).toBeNull();
      const uploaded = await server.upload(id, meterFile());
      const { body } = await asked(id, 'plans');
      expect(body).toMatchObject({ revision: 2, recordId: uploaded.body.id });
      expect(body.result.record.intervals).toBeGreaterThan(0);
    });

    it('are refused where there is neither, and where a bill contradicts itself', async () => {
      const none = await asked(await newSite({}), 'plans');
      expect(none).toMatchObject({ status: 422, body: { code: 'missing', path: 'recordId' } });
      const wrong = { bills: [{ ...estimate.bills[0], maxKw: 90 }] };
      const refused = await asked(await newSite({ estimate: wrong }), 'plans');
      expect(refused.body).toMatchObject({ code: 'inconsistent', path: 'estimate.bills[0].maxKw' });
      const unread = await server.ask('POST', '/api/sites', siteFile({ estimate: {} }));
      expect(unread.body).toMatchObject({ code: 'missing', path: 'estimate' });
    });
  });
}
