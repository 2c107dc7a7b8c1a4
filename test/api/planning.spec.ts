import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoLoad } from '#apps/server/demo/demo-load.js';
import { DEMO_SITE } from '#apps/server/demo/demo-site.js';
import { planContent } from '#libs/contract/plan-content.js';
import { readSite } from '#libs/contract/read-site.js';
import { zoneTableOf } from '#libs/contract/time-zone.js';
import { assessBank, ENGINE_VERSION, planBank, withRobustness } from '#libs/engine/index.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { putInWords } from '#libs/present/put-in-words.js';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`plans and assessments over HTTP, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    const content = meterFile();
    const newSite = async (changes = {}, withRecord = true) => {
      const { id } = (await server.ask('POST', '/api/sites', siteFile(changes))).body;
      if (withRecord) expect((await server.upload(id, content)).status).toBe(201);
      return id as string;
    };
    const planned = (id: string, body = {}) => server.ask('POST', `/api/sites/${id}/plans?wait=60`, body);
    const direct = async (judge: typeof planBank, changes = {}) => {
      const site = readSite(siteFile(changes));
      const { record } = await readMeterFile(bytesOf(content), { siteTimeZone: site.timeZone });
      const { result } = withRobustness(judge(site, record, zoneTableOf(site.timeZone, record)));
      return JSON.parse(JSON.stringify(putInWords(result)));
    };

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
      const plan = await planned(id);
      expect(plan.status).toBe(201);
      expect(plan.headers.get('location')).toBe(`/api/sites/${id}/revisions/1`);
      expect(plan.body.result).toEqual(await direct(planBank));
      const assessment = await server.ask('POST', `/api/sites/${id}/assessments?wait=60`, {});
      expect(assessment.body).toMatchObject({ kind: 'assess', revision: 2 });
      // No bank is installed here that would have to be acted on at once.
      expect(assessment.body.result).toEqual({ ...(await direct(assessBank)), tonight: null });
    });

    it('freeze their inputs, and are known by the hash of them', async () => {
      const id = await newSite();
      const { body } = await planned(id, { author: 'R. Aldane', reason: 'first draft' });
      expect(body).toMatchObject({ author: 'R. Aldane', reason: 'first draft', engineVersion: ENGINE_VERSION });
      expect(body.inputs.site).toEqual(readSite(siteFile()));
      expect(body.inputs.zone.zone).toBe('Europe/Dublin');
      expect(body.recordHash).toMatch(/^[0-9a-f]{64}$/);
      const text = planContent({ ...body.inputs, kind: 'plan' });
      expect(createHash('sha256').update(text).digest('hex')).toBe(body.contentHash);
    });

    it('take today’s date at the site where it gives none', async () => {
      const id = await newSite({ asOf: undefined });
      const { body } = await planned(id);
      expect(body.inputs.site.asOf).toMatch(/^\d{4}-\d{2}-\d{2}$/);
    });

    it('of equal inputs have one hash on two sites and are one revision on one', async () => {
      const [a, b] = [await newSite(), await newSite()];
      const [first, other] = [await planned(a), await planned(b)];
      expect(other.body.contentHash).toBe(first.body.contentHash);
      expect(other.body.siteId).not.toBe(first.body.siteId);
      const again = await planned(a, { reason: 'asked again' });
      expect(again.status).toBe(200);
      expect(again.body).toEqual(first.body);
      expect((await server.ask('GET', `/api/sites/${a}/revisions`)).body.revisions).toHaveLength(1);
    });

    it('are asked for by many at once and made once', async () => {
      const id = await newSite();
      const asked = await Promise.all(Array.from({ length: 8 }, () => planned(id)));
      expect(new Set(asked.map(({ body }) => body.revision))).toEqual(new Set([1]));
      expect((await server.ask('GET', `/api/sites/${id}/revisions`)).body.revisions).toHaveLength(1);
    });

    it('are numbered from 1 without a gap, and an earlier one stays as it was', async () => {
      const id = await newSite();
      const first = await planned(id);
      const proposal = await server.ask('GET', `/api/sites/${id}/revisions/1/proposal.pdf`);
      await server.ask('PUT', `/api/sites/${id}`, siteFile({ name: 'Renamed' }), { 'if-match': '"1"' });
      const second = await planned(id);
      expect([second.status, second.body.revision]).toEqual([201, 2]);
      expect((await server.ask('GET', `/api/sites/${id}/revisions/1`)).body).toEqual(first.body);
      const later = await server.ask('GET', `/api/sites/${id}/revisions/1/proposal.pdf`);
      expect(Buffer.compare(later.body, proposal.body)).toBe(0);
    });

    it('come with a proposal whose hash is its ETag', async () => {
      const id = await newSite();
      await planned(id);
      const { status, headers, body } = await server.ask('GET', `/api/sites/${id}/revisions/1/proposal.pdf`);
      expect(status).toBe(200);
      expect(headers.get('content-type')).toBe('application/pdf');
      expect(body.subarray(0, 5).toString()).toBe('%PDF-');
      expect(headers.get('etag')).toBe(`"${createHash('sha256').update(body).digest('hex')}"`);
      expect(headers.get('content-disposition')).toMatch(/^inline; filename="P-\d{4}-revision-1\.pdf"$/);
    });

    it('know no method that would change or remove a revision', async () => {
      const id = await newSite();
      await planned(id);
      for (const method of ['PUT', 'PATCH', 'DELETE', 'POST']) {
        expect((await server.ask(method, `/api/sites/${id}/revisions/1`, {})).status).toBe(404);
      }
    });

    it('answer 202 with a job that is followed to its revision', async () => {
      const id = await newSite();
      const asked = await server.ask('POST', `/api/sites/${id}/plans`, {});
      expect(asked.status).toBe(202);
      expect(asked.headers.get('location')).toBe(`/api/jobs/${asked.body.id}`);
      const events = await (await fetch(server.base + asked.body.links.events)).text();
      const names = [...events.matchAll(/^event: (\w+)$/gm)].map(([, state]) => state);
      expect(names.at(-1)).toBe('done');
      const ids = [...events.matchAll(/^id: (\d+)$/gm)].map(([, step]) => Number(step));
      expect(ids).toEqual([...ids].sort((a, b) => a - b));
      const job = (await server.ask('GET', `/api/jobs/${asked.body.id}`)).body;
      expect(job).toMatchObject({ state: 'done', progress: 1, revision: 1, error: null });
      expect((await server.ask('GET', job.links.revision)).status).toBe(200);
      const seen = { 'last-event-id': `${ids.at(-1)}` };
      expect((await fetch(server.base + job.links.events, { headers: seen })).status).toBe(204);
      expect((await server.ask('DELETE', `/api/jobs/${job.id}`)).status).toBe(409);
    });

    it('that search for the bank that pays are cancelled on the way, and leave no revision', async () => {
      const { id } = (await server.ask('POST', '/api/sites', DEMO_SITE)).body;
      expect((await server.upload(id, [...demoLoad()].join(''))).status).toBe(201);
      const job = (await server.ask('POST', `/api/sites/${id}/plans`, {})).body;
      await untilUnderWay(() => server.ask('GET', job.links.self));
      expect((await server.ask('DELETE', job.links.self)).body).toMatchObject({ state: 'cancelled', revision: null });
      expect((await planned(await newSite())).status).toBe(201);
      expect((await server.ask('GET', `/api/sites/${id}/revisions`)).body.revisions).toEqual([]);
      expect((await server.ask('GET', job.links.self)).body).toMatchObject({ state: 'cancelled', revision: null });
    });

    it('keep a record that they were made from', async () => {
      const id = await newSite();
      const { body } = await planned(id);
      const answer = await server.ask('DELETE', `/api/sites/${id}/records/${body.recordId}`);
      expect([answer.status, answer.body.code]).toEqual([409, 'conflict']);
      expect((await server.ask('DELETE', `/api/sites/${id}`)).status).toBe(204);
    });

    it('are refused where something they need is missing, and no job is kept', async () => {
      const bare = await newSite({}, false);
      const noRecord = await planned(bare);
      expect([noRecord.status, noRecord.body.path]).toEqual([422, 'recordId']);
      const other = await planned(bare, { recordId: '00000000-0000-0000-0000-000000000000' });
      expect(other.status).toBe(404);
      const noBank = await server.ask('POST', `/api/sites/${await newSite({ bank: undefined })}/assessments`, {});
      expect([noBank.status, noBank.body.path]).toEqual([422, 'bank']);
    });

    it('that the engine refuses end as the problem it names', async () => {
      const id = await newSite({ meteredAt: 'primary', supply: tinyTransformer });
      const { status, headers, body } = await planned(id);
      expect(status).toBe(422);
      expect(headers.get('content-type')).toMatch(/^application\/problem\+json/);
      expect(body.code).toBe('load-too-large');
      expect((await server.ask('GET', `/api/sites/${id}/revisions`)).body.revisions).toEqual([]);
    });

    it('of a record of three days say how short it is', async () => {
      const id = await newSite({}, false);
      await server.upload(id, meterFile(3));
      const { status, body } = await planned(id);
      expect(status).toBe(201);
      const said = [
        ...body.result.reasons,
        ...body.result.assumptions,
        ...body.result.cautions,
        ...body.result.record.notes,
      ];
      expect(said.some(({ code }: { code: string }) => /short/i.test(code))).toBe(true);
    });
  });
}

/** Too small for the load: the voltage equation has no real root. */
const tinyTransformer = {
  faultLevelMva: { max: 250, min: 180 },
  transformers: [{ ratedKva: 40, impedancePct: 10 }],
};

async function* bytesOf(text: string): AsyncGenerator<Uint8Array> {
  yield new TextEncoder().encode(text);
}

/** Waits until a job says that a part of it is done. */
async function untilUnderWay(look: () => Promise<{ body: { state: string; progress: number } }>): Promise<void> {
  for (;;) {
    const { state, progress } = (await look()).body;
    if (state === 'running' && progress > 0) return;
    if (state !== 'queued' && state !== 'running') throw new Error(`the job is ${state} already`);
  }
}
