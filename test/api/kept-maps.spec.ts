import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { siteFile } from './site-builder.js';

/** Nine hours in which a date can be read in two ways. */
function ambiguous(day: string, header = 'begin,active (kW),reactive (kvar)'): string {
  const clock = (i: number) => `0${Math.floor(i / 4)}:${String((i % 4) * 15).padStart(2, '0')}`;
  return `${header}\n${Array.from({ length: 36 }, (_, i) => `${day} ${clock(i)},5,1\n`).join('')}`;
}

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`answers kept under a name, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    let siteId: string;
    const keep = (body: unknown) => server.ask('POST', '/api/kept-maps', body);

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url);
      siteId = (await server.ask('POST', '/api/sites', siteFile())).body.id;
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
    });

    it('settle the next file where they are named, are offered where the header is the same, and never taken unasked', async () => {
      const answered = await server.upload(siteId, ambiguous('03/04/2025'), { map: '{"dateOrder":"dmy"}' });
      expect(answered.status).toBe(201);
      const { header } = answered.body.file;
      expect(header).toMatch(/^[0-9a-f]{64}$/);
      const kept = (await keep({ name: 'Main meter', map: { dateOrder: 'dmy' }, header })).body;
      const next = ambiguous('05/06/2025', 'Begin, Active (kW), Reactive (kvar)'.replaceAll(', ', ','));
      const asked = await server.upload(siteId, next);
      expect([asked.status, asked.body.code]).toEqual([422, 'question']);
      expect(asked.body.offered).toEqual([{ id: kept.id, name: 'Main meter' }]);
      const read = await server.upload(siteId, next, { keptMap: 'Main meter' });
      expect(read.status).toBe(201);
      expect(read.body.record.beginS).toBe(Date.UTC(2025, 5, 5) / 1000 - 3600);
      const notes = read.body.record.notes as { code: string; text: string }[];
      expect(notes.find(({ code }) => code === 'kept-answers-used')?.text).toContain('“Main meter”, version 1');
    });

    it('are not offered for a file with another header', async () => {
      const { body } = await server.upload(siteId, ambiguous('05/06/2025', 'time,active (kW),reactive (kvar)'));
      expect(body.code).toBe('question');
      expect(body.offered).toBeUndefined();
    });

    it('give way to what is said with the file', async () => {
      await keep({ name: 'Month first', map: { dateOrder: 'mdy', stamp: 'end' } });
      const read = await server.upload(siteId, ambiguous('05/06/2025'), {
        keptMap: 'Month first',
        map: '{"dateOrder":"dmy"}',
      });
      expect(read.body.record.beginS).toBe(Date.UTC(2025, 5, 5) / 1000 - 3600 - 900);
    });

    it('are a resource with a version, as a site is', async () => {
      const { status, body, headers } = await keep({ name: 'Version', map: { decimal: ',' } });
      expect([status, headers.get('etag'), headers.get('location')]).toEqual([201, '"1"', `/api/kept-maps/${body.id}`]);
      const path = `/api/kept-maps/${body.id}`;
      const change = { name: 'Version', map: { decimal: '.' } };
      expect((await server.ask('PUT', path, change)).status).toBe(428);
      const changed = await server.ask('PUT', path, change, { 'if-match': '"1"' });
      expect([changed.status, changed.body.map, changed.body.version]).toEqual([200, { decimal: '.' }, 2]);
      expect((await server.ask('PUT', path, change, { 'if-match': '"1"' })).status).toBe(412);
      expect((await server.ask('DELETE', path, undefined, { 'if-match': '"1"' })).status).toBe(412);
      expect((await server.ask('DELETE', path)).status).toBe(204);
      expect((await server.ask('GET', path)).status).toBe(404);
      const { keptMaps } = (await server.ask('GET', '/api/kept-maps')).body;
      expect(keptMaps.map(({ name: kept }: { name: string }) => kept)).not.toContain('Version');
    });

    it.each([
      ['without a name', { map: {} }, 422, 'name'],
      ['with an unknown key', { name: 'a', map: { colour: 1 } }, 422, 'map.colour'],
      ['with an answer that holds for one file only', { name: 'a', map: { overlap: 'later' } }, 422, 'map.overlap'],
      ['with a header that is none', { name: 'a', map: {}, header: 'time,kW' }, 422, 'header'],
    ])('are refused %s', async (_what, body, status, path) => {
      const answer = await keep(body);
      expect([answer.status, answer.body.path]).toEqual([status, path]);
    });

    it('have a name of their own', async () => {
      expect((await keep({ name: 'Twice', map: {} })).status).toBe(201);
      const second = await keep({ name: 'Twice', map: {} });
      expect([second.status, second.body.code, second.body.path]).toEqual([409, 'conflict', 'name']);
    });

    it('that nobody kept are refused by their name', async () => {
      const { status, body } = await server.upload(siteId, ambiguous('05/06/2025'), { keptMap: 'Nobody’s' });
      expect([status, body.code]).toEqual([404, 'not-found']);
      expect(body.detail).toContain('Nobody’s');
    });
  });
}
