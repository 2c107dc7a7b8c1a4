import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { databases, type TestDatabase } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

const tariff = (pricePerUnit: number) => ({
  name: 'Works tariff',
  clauses: [{ name: 'reactive', kind: 'kvarhBeyondRatio', freeRatio: 0.33, pricePerUnit }],
});

for (const { name, available, create } of databases) {
  describe.runIf(available)(`shared tariffs and price books over HTTP, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    const keep = (body: object) => server.ask('POST', '/api/papers', body);

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url);
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    it('are referred to by a site, frozen by its revision, and another may stand in for one plan', async () => {
      const head = { kind: 'tariff', name: 'Utility, low voltage' };
      const first = await keep({ ...head, date: '2025-01-01', document: tariff(0.02) });
      expect([first.status, first.body.version]).toEqual([201, 1]);
      expect((await server.ask('GET', first.headers.get('location')!)).body).toEqual(first.body);

      const own = { ...siteFile({ papers: { tariff: { name: head.name } } }), tariff: undefined, prices: undefined };
      const { id } = (await server.ask('POST', '/api/sites', { ...own, catalogue: undefined })).body;
      expect((await server.upload(id, meterFile(33))).status).toBe(201);
      const plan = async (body = {}) => (await server.ask('POST', `/api/sites/${id}/assessments?wait=60`, body)).body;

      const before = await plan();
      expect(before.inputs.site.tariff).toEqual(tariff(0.02));
      expect(before.inputs.site.papers).toEqual({ tariff: { name: head.name, version: 1, date: '2025-01-01' } });
      const said = before.result.assumptions as { code: string; text: string }[];
      expect(said.find(({ code }) => code === 'papers.tariff')?.text).toContain('version 1');

      const second = await keep({ ...head, date: '2026-01-01', after: 1, document: tariff(0.04) });
      expect(second.body.version).toBe(2);
      // what was frozen stays; the same year is planned again under the new version, or under the old by name
      expect((await server.ask('GET', `/api/sites/${id}/revisions/1`)).body).toEqual(before);
      const after = await plan();
      expect(after.revision).toBe(2);
      const total = (body: typeof before) => body.result.money.bills.before.total as number;
      expect(total(after) / total(before)).toBeCloseTo(2, 3);
      expect((await plan({ papers: { tariff: { name: head.name, version: 1 } } })).revision).toBe(1);
      const listed = (await server.ask('GET', '/api/papers')).body.papers as { version: number }[];
      expect(listed.map(({ version }) => version)).toEqual([2, 1]);
      // a paper whose document has no name lends it its own
      const { name: _, ...nameless } = tariff(0.02);
      await keep({ kind: 'tariff', name: 'Small hours', date: '2026-01-01', document: nameless });
      const lent = await plan({ papers: { tariff: { name: 'Small hours' } } });
      expect(lent.inputs.site.tariff).toEqual({ ...nameless, name: 'Small hours' });
    });

    it('are refused with the path of what does not fit', async () => {
      const clauses = [{ name: 'x', kind: 'formula', expression: 'activeKwh * surprise' }];
      const unknown = await keep({ kind: 'tariff', name: 'A', date: '2026-01-01', document: { clauses } });
      expect([unknown.status, unknown.body.path]).toEqual([422, 'document.clauses[0].expression']);
      const both = await server.ask('POST', '/api/sites', siteFile({ tariff: {}, papers: { tariff: { name: 'A' } } }));
      expect([both.status, both.body.path]).toEqual([422, 'papers.tariff']);
      const file = { ...siteFile({ papers: { tariff: { name: 'Nowhere' } } }), tariff: undefined };
      const { id } = (await server.ask('POST', '/api/sites', file)).body;
      await server.upload(id, meterFile(33));
      const missing = await server.ask('POST', `/api/sites/${id}/plans`, {});
      expect([missing.status, missing.body.path]).toEqual([404, 'papers.tariff']);
    });
  });
}
