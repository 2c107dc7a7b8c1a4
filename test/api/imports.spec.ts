import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { minuteFile } from '../support/minute-file.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

/** Nine months of minutes: 17 MB. */
const LARGE = minuteFile(400_000);

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`a meter file that is read as a job, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    let siteId: string;
    const spoolDir = mkdtempSync(join(tmpdir(), 'varwright-import-'));
    const send = (content: string, query: Record<string, string> = {}) =>
      server.upload(siteId, content, { wait: '0', ...query });
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

    it('tells how far it is, at which rate and for how long yet, and ends with the record', async () => {
      const { status, headers, body: job } = await send(LARGE, { name: 'minutes.csv' });
      expect([status, job.kind, job.recordId]).toEqual([202, 'import', null]);
      expect(headers.get('location')).toBe(job.links.self);
      const events = await (await fetch(server.base + job.links.events)).text();
      const told = [...events.matchAll(/^data: (.*)$/gm)].map(([, data]) => JSON.parse(data!));
      const fractions = told.map(({ progress }) => progress);
      expect(fractions).toEqual([...fractions].sort((a, b) => a - b));
      const half = told.filter(({ progress }) => progress > 0 && progress < 1);
      expect(half.length).toBeGreaterThan(0);
      for (const { progress, remainingS, bytesPerS } of half) {
        const elapsedS = (progress * LARGE.length) / bytesPerS;
        expect(remainingS).toBeCloseTo((elapsedS * (1 - progress)) / progress, 6);
      }
      const end = told.at(-1);
      expect(end).toMatchObject({ state: 'done', progress: 1, remainingS: null, bytesPerS: null });
      const record = (await server.ask('GET', end.links.record)).body;
      expect(record).toMatchObject({ file: { name: 'minutes.csv', bytes: LARGE.length } });
      expect(record.record.intervals).toBe(400_000);
      expect(readdirSync(spoolDir)).toEqual([]);
    });

    it('is answered with the record where it is read within the wait, the same as without', async () => {
      const waited = await server.upload(siteId, meterFile(3), { wait: '60' });
      const direct = await server.upload(siteId, meterFile(3));
      expect([waited.status, waited.body.hash]).toEqual([201, direct.body.hash]);
      expect(readdirSync(spoolDir)).toEqual([]);
    });

    it('sent twice at a time is read once', async () => {
      const before = await count();
      const [one, other] = await Promise.all([send(LARGE, { name: 'a.csv' }), send(LARGE, { name: 'a.csv' })]);
      const ends = [one, other].map(({ body }) =>
        fetch(server.base + body.links.events).then((events) => events.text()),
      );
      for (const events of await Promise.all(ends)) expect(events).toContain('event: done');
      expect(await count()).toBe(before + new Set([one.body.id, other.body.id]).size);
      expect(readdirSync(spoolDir)).toEqual([]);
    });

    it('is cancelled with nothing left of it, and the next is read', async () => {
      const before = await count();
      const { body: job } = await send(LARGE);
      const cancelled = await server.ask('DELETE', job.links.self);
      expect([cancelled.status, cancelled.body.state]).toEqual([200, 'cancelled']);
      expect((await server.upload(siteId, meterFile(4), { wait: '60' })).status).toBe(201);
      expect((await server.ask('GET', job.links.self)).body).toMatchObject({ state: 'cancelled', recordId: null });
      expect(await count()).toBe(before + 1);
      // the thread that was reading the file ends in its own time, and the file goes with it
      await expect.poll(() => readdirSync(spoolDir), { timeout: 10_000 }).toEqual([]);
    });

    it('asks its questions like any other, to whoever waits and to whoever comes back', async () => {
      const clock = (i: number) => `0${Math.floor(i / 4)}:${String((i % 4) * 15).padStart(2, '0')}`;
      const rows = Array.from({ length: 36 }, (_, i) => `03/04/2025 ${clock(i)},5,1\n`);
      const open = `begin,active (kW),reactive (kvar)\n${rows.join('')}`;
      const waited = await server.upload(siteId, open, { wait: '60' });
      expect([waited.status, waited.body.questions[0].id]).toEqual([422, 'dateOrder']);
      const { body: job } = await send(open);
      await (await fetch(server.base + job.links.events)).text();
      const { state, error } = (await server.ask('GET', job.links.self)).body;
      expect([state, error.code, error.questions[0].readings.length]).toEqual(['failed', 'question', 2]);
    });

    it('extends a record as well', async () => {
      const { body: first } = await server.upload(siteId, meterFile(3));
      const path = `${server.base}/api/sites/${siteId}/records/${first.id}/revisions?wait=60`;
      const headers = { 'content-type': 'text/csv' };
      const response = await fetch(path, { method: 'POST', headers, body: meterFile(5) });
      const extended = (await response.json()) as { revision: number; record: { intervals: number } };
      expect([response.status, extended.revision, extended.record.intervals]).toEqual([201, 2, 480]);
    });

    it.each(['soon', '61', '-1'])('is not waited for %s seconds', async (wait) => {
      const { status, body } = await server.upload(siteId, meterFile(1), { wait });
      expect([status, body.path]).toEqual([422, 'wait']);
    });

    it('is refused where filling its gaps would make it longer than any record', async () => {
      const rows = ['2000-01-01 00:00,1,1', '2000-01-01 00:01,1,1', '2000-01-01 00:02,1,1', '2025-01-01 00:00,1,1'];
      const map = JSON.stringify({ dateOrder: 'ymd', repair: 'hold', upToS: 1e12 });
      const { status, body } = await server.upload(siteId, `time,kW,kvar\n${rows.join('\n')}\n`, { map });
      expect([status, body.code, body.problems[0].expected]).toEqual([
        413,
        'too-large',
        'a record of at most 5300000 intervals',
      ]);
    });
  });
}
