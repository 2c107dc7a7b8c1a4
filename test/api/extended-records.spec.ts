import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { siteFile } from './site-builder.js';

const BEGIN_S = Date.UTC(2025, 2, 1) / 1000;

/** Quarter hours from one slot to another, kW by slot, 50 kvar. */
function slots(from: number, to: number, kw: (slot: number) => number): string {
  const rows = Array.from({ length: to - from }, (_, i) => {
    const stamp = new Date((BEGIN_S + (from + i) * 900) * 1000).toISOString();
    return `${stamp},${kw(from + i)},50\n`;
  });
  return `begin,active (kW),reactive (kvar)\n${rows.join('')}`;
}

const steady = (slot: number) => 100 + (slot % 7);

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`a record that is extended over HTTP, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    let siteId: string;
    const spoolDir = mkdtempSync(join(tmpdir(), 'varwright-extend-'));
    const upload = async (content: string, query: Record<string, string> = {}) =>
      (await server.upload(siteId, content, query)).body;
    const extend = async (id: string, content: string, query: Record<string, string> = {}) => {
      const path = `${server.base}/api/sites/${siteId}/records/${id}/revisions?${new URLSearchParams(query)}`;
      const response = await fetch(path, { method: 'POST', headers: { 'content-type': 'text/csv' }, body: content });
      return { status: response.status, headers: response.headers, body: JSON.parse(await response.text()) };
    };
    const get = async (id: string, of = '') => server.ask('GET', `/api/sites/${siteId}/records/${id}${of}`);
    const count = async () => (await server.ask('GET', `/api/sites/${siteId}/records`)).body.records.length;

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url, { spoolDir });
      siteId = (await server.ask('POST', '/api/sites', siteFile())).body.id;
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
      rmSync(spoolDir, { recursive: true });
    });

    it('is the next revision, what one file would have given, and the earlier one stays readable', async () => {
      const first = await upload(slots(0, 1000, steady), { name: 'march.csv' });
      expect(first).toMatchObject({ revision: 1, previousId: null });
      const { status, headers, body } = await extend(first.id, slots(900, 1500, steady), { name: 'april.csv' });
      expect(status).toBe(201);
      expect(headers.get('location')).toBe(`/api/sites/${siteId}/records/${body.id}`);
      expect(body).toMatchObject({ revision: 2, previousId: first.id, file: { name: 'april.csv' } });
      const whole = await upload(slots(0, 1500, steady));
      expect((await get(body.id, '/columns')).body).toEqual((await get(whole.id, '/columns')).body);
      expect((await get(first.id)).body.record).toEqual(first.record);
      expect((await get(first.id, '/columns')).body.beginS).toHaveLength(1000);
      for (const id of [first.id, body.id]) {
        const line = (await get(id, '/revisions')).body.records;
        expect(line.map(({ revision }: { revision: number }) => revision)).toEqual([2, 1]);
      }
    });

    it('is what a plan is made with from then on', async () => {
      const first = await upload(slots(0, 1000, steady));
      const { body } = await extend(first.id, slots(1000, 1400, steady));
      const plan = await server.ask('POST', `/api/sites/${siteId}/assessments?wait=60`, {});
      expect(plan.body).toMatchObject({ recordId: body.id, result: { record: { intervals: 1400 } } });
    });

    it('asks which counts where they disagree, keeps nothing until it is told, and then keeps that', async () => {
      const first = await upload(slots(0, 1000, () => 100));
      const before = await count();
      const correction = slots(500, 1100, (slot) => (slot < 504 ? 160 : 100));
      const asked = await extend(first.id, correction);
      expect([asked.status, asked.body.code]).toEqual([422, 'question']);
      const [question] = asked.body.questions;
      expect(question).toMatchObject({
        id: 'overlap',
        overlap: { disagreed: 4, agreed: 496, added: 100, spanCount: 1 },
      });
      expect(question.overlap.largest).toEqual({ activeKw: 60 });
      expect([await count(), readdirSync(spoolDir)]).toEqual([before, []]);
      const [earlier, later] = question.readings;
      const settled = await extend(first.id, correction, { map: JSON.stringify(later.map) });
      expect(settled.body.record).toMatchObject({ maxKw: later.maxKw, activeKwh: later.activeKwh, intervals: 1100 });
      expect([earlier.maxKw, later.maxKw]).toEqual([100, 160]);
      const { notes } = settled.body.record;
      expect(notes.map(({ code }: { code: string }) => code)).toContain('overlap-settled');
    });

    it('is the record as it stands where the file adds nothing', async () => {
      const first = await upload(slots(0, 500, steady));
      const before = await count();
      const again = await extend(first.id, slots(100, 200, steady));
      expect([again.status, again.body.id]).toEqual([200, first.id]);
      expect(await count()).toBe(before);
    });

    it('is refused on another grid, and for a record of another site', async () => {
      const first = await upload(slots(0, 500, steady));
      const hourly = slots(0, 400, steady)
        .split('\n')
        .filter((row, i) => i === 0 || /:00:00\.000Z/.test(row))
        .join('\n');
      const { status, body } = await extend(first.id, hourly);
      expect([status, body.code, body.path]).toEqual([422, 'mixed-intervals', 'intervalS']);
      const other = (await server.ask('POST', '/api/sites', siteFile())).body.id;
      const path = `${server.base}/api/sites/${other}/records/${first.id}/revisions`;
      const foreign = await fetch(path, { method: 'POST', headers: { 'content-type': 'text/csv' }, body: hourly });
      expect(foreign.status).toBe(404);
    });

    it('is extended once where two try at the same moment, and an earlier revision not at all', async () => {
      const first = await upload(slots(0, 500, steady));
      const both = await Promise.all([500, 600].map((from) => extend(first.id, slots(from, from + 50, steady))));
      expect(both.map(({ status }) => status).sort()).toEqual([201, 412]);
      const late = await extend(first.id, slots(700, 750, steady));
      expect([late.status, late.body.code]).toEqual([412, 'stale']);
    });

    it('is removed from its latest revision backwards', async () => {
      const first = await upload(slots(0, 500, steady));
      const { body } = await extend(first.id, slots(500, 600, steady));
      const remove = async (id: string) => (await server.ask('DELETE', `/api/sites/${siteId}/records/${id}`)).status;
      expect([await remove(first.id), await remove(body.id), await remove(first.id)]).toEqual([409, 204, 204]);
    });
  });
}
