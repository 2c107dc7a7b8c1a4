import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoLoad } from '#apps/server/demo/demo-load.js';
import { DEMO_SITE as PRICED_SITE } from '#apps/server/demo/demo-site.js';
import { dataSourceFor, readAddress } from '#libs/store/data-source.js';
import { openStore } from '#libs/store/open-store.js';
import { RecordColumn } from '#libs/store/record-column.js';
import { readRecord } from '#libs/store/records.js';
import { checkSqliteFile } from '#libs/store/sqlite-checks.js';
import { StoredRecord } from '#libs/store/stored-record.js';
import { databases, type TestDatabase } from '../support/databases.js';
import { type ServerProcess, startProcess } from '../support/server-process.js';
import { SOAKED } from '../support/soak.js';

/** Without a tariff there is no search for the bank that pays, and a plan takes a second or two. */
const DEMO_SITE = { ...PRICED_SITE, tariff: undefined, prices: undefined };
const YEAR = [...demoLoad()].join('');

for (const { name, available, create } of databases) {
  describe.runIf(available)(`a server that is killed, on ${name}`, () => {
    let database: TestDatabase;
    let siteId: string;
    // what the jobs' own tests ask on both databases is asked of a whole server on PostgreSQL in the long run
    const alsoAsked = it.runIf(name === 'SQLite' || SOAKED);
    const dataDir = mkdtempSync(join(tmpdir(), 'varwright-killed-'));
    // whoever takes a dead server's job over need not wait the usual ten seconds for it
    const start = () => startProcess(database.url, dataDir, { JOB_LEASE_S: '3' });

    beforeAll(async () => {
      database = await create();
      const server = await start();
      siteId = (await server.ask('POST', '/api/sites', DEMO_SITE)).body.id;
      await server.end('SIGTERM');
    });

    afterAll(async () => {
      await database.drop();
      rmSync(dataDir, { recursive: true });
    });

    it('in the middle of imports leaves each record whole or absent, and no spooled file after the next start', async () => {
      let acknowledged = 0;
      for (const afterMs of SOAKED ? [120, 240, 360, 600] : [120, 360]) {
        const server = await start();
        const uploads = [1, 2, 3].map(() => server.upload(siteId, YEAR).catch(() => null));
        await sleep(afterMs);
        await server.end('SIGKILL');
        for (const answer of await Promise.all(uploads)) if (answer?.status === 201) acknowledged++;
      }
      const server = await start();
      expect(readdirSync(join(dataDir, 'spool'))).toEqual([]);
      expect((await server.upload(siteId, YEAR)).status).toBe(201);
      await server.end('SIGTERM');
      await expectWhole(database.url, acknowledged + 1);
    });

    it('in the middle of a plan makes it at the next start, once', async () => {
      const first = await start();
      const job = (await first.ask('POST', `/api/sites/${siteId}/plans`, {})).body;
      await untilRunning(first, job.links.self);
      await first.end('SIGKILL');
      const second = await start();
      const events = await (await fetch(second.base + job.links.events)).text();
      expect(events).toMatch(/event: done\n/);
      const done = (await second.ask('GET', job.links.self)).body;
      expect(done).toMatchObject({ state: 'done', attempt: 2, revision: 1 });
      expect((await second.ask('GET', `/api/sites/${siteId}/revisions`)).body.revisions).toHaveLength(1);
      expect(await second.end('SIGTERM')).toBe(0);
    });

    alsoAsked('politely in the middle of a plan hands it on at once', async () => {
      const first = await start();
      await first.ask('PUT', `/api/sites/${siteId}`, { ...DEMO_SITE, name: 'Other' }, { 'if-match': '"1"' });
      const job = (await first.ask('POST', `/api/sites/${siteId}/plans`, {})).body;
      await untilRunning(first, job.links.self);
      expect(await first.end('SIGTERM')).toBe(0);
      const second = await start();
      // taken over at once, however long it then takes: a job whose server died waits out its heartbeat
      const beganMs = Date.now();
      while ((await second.ask('GET', job.links.self)).body.attempt < 2)
        await new Promise((done) => setTimeout(done, 50));
      expect(Date.now() - beganMs).toBeLessThan(5000);
      await (await fetch(second.base + job.links.events)).text();
      expect((await second.ask('GET', job.links.self)).body).toMatchObject({ state: 'done', attempt: 2, revision: 2 });
      await second.end('SIGTERM');
    });

    alsoAsked('by the user through the API leaves no revision of a cancelled plan', async () => {
      const server = await start();
      await server.ask('PUT', `/api/sites/${siteId}`, { ...DEMO_SITE, name: 'Third' }, { 'if-match': '"2"' });
      const job = (await server.ask('POST', `/api/sites/${siteId}/plans`, {})).body;
      await untilRunning(server, job.links.self);
      const cancelled = await server.ask('DELETE', job.links.self);
      expect([cancelled.status, cancelled.body.state]).toEqual([200, 'cancelled']);
      expect((await server.ask('POST', `${job.links.self}/cancel`)).status).toBe(200);
      const again = await server.ask('POST', `/api/sites/${siteId}/plans?wait=60`, {});
      expect([again.status, again.body.revision]).toEqual([201, 3]);
      expect((await server.ask('GET', job.links.self)).body).toMatchObject({ state: 'cancelled', revision: null });
      await server.end('SIGTERM');
      expect(server.said()).not.toMatch(/fault/);
    });
  });
}

async function untilRunning(server: ServerProcess, path: string): Promise<void> {
  for (;;) {
    const { state } = (await server.ask('GET', path)).body;
    if (state === 'running') return;
    if (state !== 'queued') throw new Error(`the job is ${state} already`);
  }
}

/** Every record can be read in full, none has columns without a head, and the database holds no damage. */
async function expectWhole(url: string, atLeast: number): Promise<void> {
  const store = await openStore(url);
  const records = await store.read((manager) => manager.find(StoredRecord));
  expect(records.length).toBeGreaterThanOrEqual(atLeast);
  for (const { id } of records) {
    const record = await store.read((manager) => readRecord(manager, id));
    expect(record?.beginS.length).toBe(35_040);
  }
  const columns = await store.read((manager) => manager.count(RecordColumn));
  expect(columns).toBe(records.length * 4 * 12);
  await store.close();
  const address = readAddress(url);
  if (address.type === 'postgres') return;
  const source = await dataSourceFor(address).initialize();
  await checkSqliteFile(source);
  await source.destroy();
}
