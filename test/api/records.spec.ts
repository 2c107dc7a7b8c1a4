import { createHash } from 'node:crypto';
import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { recordBytes } from '#libs/contract/record-hash.js';
import { readMeterFile } from '#libs/meter-files/read-meter-file.js';
import { openStore } from '#libs/store/open-store.js';
import { readRecord } from '#libs/store/records.js';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { startServer, type TestServer } from '../support/test-server.js';
import { meterFile, siteFile } from './site-builder.js';

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`load records over HTTP, on ${name}`, () => {
    let database: TestDatabase;
    let server: TestServer;
    let siteId: string;
    const spoolDir = mkdtempSync(join(tmpdir(), 'varwright-spool-'));
    const count = async () => (await server.ask('GET', `/api/sites/${siteId}/records`)).body.records.length;

    beforeAll(async () => {
      database = await create();
      server = await startServer(database.url, { spoolDir, uploadBytes: 3_000_000 });
      siteId = (await server.ask('POST', '/api/sites', siteFile())).body.id;
    });

    afterAll(async () => {
      await server.close();
      await database.drop();
      rmSync(spoolDir, { recursive: true });
    });

    it('hold what the reader reads, to the bit, and name the file they came from', async () => {
      const content = meterFile();
      const { status, body, headers } = await server.upload(siteId, content, { name: 'spring.csv' });
      expect(status).toBe(201);
      expect(headers.get('location')).toBe(`/api/sites/${siteId}/records/${body.id}`);
      const sha256 = createHash('sha256').update(content).digest('hex');
      const header = expect.stringMatching(/^[0-9a-f]{64}$/);
      expect(body.file).toEqual({ name: 'spring.csv', sha256, bytes: content.length, header });
      const direct = await readMeterFile(bytesOf(content), { siteTimeZone: 'Europe/Dublin' });
      const store = await openStore(database.url);
      const stored = await store.read((manager) => readRecord(manager, body.id));
      await store.close();
      expect(stored).toStrictEqual(direct.record);
      const hash = createHash('sha256');
      for (const chunk of recordBytes(direct.record)) hash.update(chunk);
      expect(body.hash).toBe(hash.digest('hex'));
      expect(body.record).toMatchObject({ intervals: 3840, intervalS: 900, missing: 0 });
    });

    it('come from a form with the file before or after what is said about it', async () => {
      const form = new FormData();
      form.append('timeZone', 'UTC');
      form.append('file', new Blob([meterFile()]), 'C:\\meters\\form 1.csv');
      form.append('map', JSON.stringify({ decimal: '.' }));
      const response = await fetch(`${server.base}/api/sites/${siteId}/records`, { method: 'POST', body: form });
      const body = (await response.json()) as { file: { name: string } };
      expect(response.status).toBe(201);
      expect(body.file.name).toBe('form 1.csv');
    });

    it('give their intervals back as columns', async () => {
      const { body } = await server.upload(siteId, meterFile(2));
      const columns = (await server.ask('GET', `/api/sites/${siteId}/records/${body.id}/columns`)).body;
      expect(columns.beginS).toHaveLength(192);
      expect(columns.beginS[0]).toBe(Date.UTC(2025, 2, 1) / 1000);
      expect(columns.activeKw[0]).toBe(210);
    });

    const header = 'begin,active (kW),reactive (kvar)\n';
    const row = (minute: string, text: string) => `2025-03-01T00:${minute}:00Z,${text}\n`;
    const broken: [string, string, Record<string, string>][] = [
      ['an empty file', '', {}],
      ['no reactive column', `begin,active (kW)\n${row('00', '1')}${row('15', '2')}`, {}],
      ['text where a number belongs', `${header}${row('00', '1,1')}${row('15', 'many,1')}${row('30', '1,1')}`, {}],
      ['mixed intervals', `${header}${row('00', '1,1')}${row('15', '1,1')}${row('22', '1,1')}${row('31', '2,2')}`, {}],
      ['a repeat with other values', `${header}${row('00', '1,1')}${row('15', '1,1')}${row('15', '2,2')}`, {}],
      ['bytes that are no text', '\u0000\u0001\u0002'.repeat(100), {}],
      ['an unknown format', meterFile(1), { format: 'nonsense' }],
      ['an unknown zone', meterFile(1), { timeZone: 'Mars/Olympus' }],
      ['a map that is no JSON', meterFile(1), { map: '{' }],
      ['a map with an unknown key', meterFile(1), { map: '{"colour":1}' }],
      ['an unknown parameter', meterFile(1), { colour: 'red' }],
    ];

    it.each(broken)('from %s are refused with the reason, and nothing is kept', async (_what, content, query) => {
      const before = await count();
      const { status, headers, body } = await server.upload(siteId, content, query);
      expect([400, 422]).toContain(status);
      expect(headers.get('content-type')).toMatch(/^application\/problem\+json/);
      expect(body.problems.length).toBeGreaterThan(0);
      expect(await count()).toBe(before);
      expect(readdirSync(spoolDir)).toEqual([]);
    });

    it('name row and column of what cannot be read', async () => {
      const content = `${header}${row('00', '1,1')}${row('15', 'many,1')}${row('30', '1,1')}`;
      const { body } = await server.upload(siteId, content);
      expect(body.problems[0]).toMatchObject({ row: 3, column: 2 });
    });

    it('from a sound file are taken after a broken one', async () => {
      const before = await count();
      expect((await server.upload(siteId, `${header}x`)).status).toBe(422);
      expect((await server.upload(siteId, meterFile(3))).status).toBe(201);
      expect(await count()).toBe(before + 1);
    });

    it('that can be read in two ways are asked about, and the answer settles it', async () => {
      const clock = (i: number) => `0${Math.floor(i / 4)}:${String((i % 4) * 15).padStart(2, '0')}`;
      const rows = Array.from({ length: 36 }, (_, i) => `03/04/2025 ${clock(i)},5,1\n`);
      const ambiguous = `${header}${rows.join('')}`;
      const { status, body } = await server.upload(siteId, ambiguous);
      expect([status, body.code]).toEqual([422, 'question']);
      const [question] = body.questions;
      expect(question.readings.length).toBeGreaterThan(1);
      const map = JSON.stringify(question.readings[0].map);
      const answered = await server.upload(siteId, ambiguous, { map });
      expect(answered.status).toBe(201);
    });

    it('over the cap are cut off, in a form as well', async () => {
      const large = `${header}${'x'.repeat(4_000_000)}`;
      const raw = await server.upload(siteId, large);
      expect([raw.status, raw.body.code]).toEqual([413, 'too-large']);
      const form = new FormData();
      form.append('file', new Blob([large]), 'large.csv');
      const response = await fetch(`${server.base}/api/sites/${siteId}/records`, { method: 'POST', body: form });
      expect(response.status).toBe(413);
      expect(readdirSync(spoolDir)).toEqual([]);
    });

    it.each([
      [[['colour', 'red']], 'unknown-key'],
      [[['map', '{']], 'unreadable'],
      [[['file', meterFile(1)]], 'unknown-key'],
    ])('from a form with a field too many or unreadable are refused: %j', async (fields, code) => {
      const form = new FormData();
      form.append('file', new Blob([meterFile(1)]), 'a.csv');
      for (const [field, value] of fields) form.append(field!, value!);
      const response = await fetch(`${server.base}/api/sites/${siteId}/records`, { method: 'POST', body: form });
      expect([400, 422]).toContain(response.status);
      expect(await response.json()).toMatchObject({ code });
    });

    it('from a form without a file are refused', async () => {
      const form = new FormData();
      form.append('timeZone', 'UTC');
      const response = await fetch(`${server.base}/api/sites/${siteId}/records`, { method: 'POST', body: form });
      expect(await response.json()).toMatchObject({ status: 422, code: 'missing', path: 'file' });
    });

    it('are removed, and only from their own site', async () => {
      const { body } = await server.upload(siteId, meterFile(1));
      const other = (await server.ask('POST', '/api/sites', siteFile())).body.id;
      expect((await server.ask('DELETE', `/api/sites/${other}/records/${body.id}`)).status).toBe(404);
      expect((await server.ask('DELETE', `/api/sites/${siteId}/records/${body.id}`)).status).toBe(204);
      expect((await server.ask('GET', `/api/sites/${siteId}/records/${body.id}`)).status).toBe(404);
    });
  });
}

async function* bytesOf(text: string): AsyncGenerator<Uint8Array> {
  yield new TextEncoder().encode(text);
}
