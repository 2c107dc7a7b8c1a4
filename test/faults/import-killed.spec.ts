import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DEMO_SITE } from '#apps/server/demo/demo-site.js';
import { type TestDatabase, usualDatabases } from '../support/databases.js';
import { minuteFile } from '../support/minute-file.js';
import { type ServerProcess, startProcess } from '../support/server-process.js';

const LARGE = minuteFile(200_000);

for (const { name, available, create } of usualDatabases) {
  describe.runIf(available)(`a server that is killed while it reads a file as a job, on ${name}`, () => {
    let database: TestDatabase;
    let siteId: string;
    const dataDir = mkdtempSync(join(tmpdir(), 'varwright-import-killed-'));
    // whoever takes a dead server's job over need not wait the usual ten seconds for it
    const start = () => startProcess(database.url, dataDir, { JOB_LEASE_S: '3' });
    const spooled = () => readdirSync(join(dataDir, 'spool'));
    const records = async (server: ServerProcess) =>
      (await server.ask('GET', `/api/sites/${siteId}/records`)).body.records;

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

    it.each(['SIGKILL', 'SIGTERM'] as const)(
      'by %s goes on at the next start, and makes one record',
      async (signal) => {
        const first = await start();
        const before = (await records(first)).length;
        const { body: job } = await first.upload(siteId, LARGE, { wait: '0' });
        expect(job.state).not.toBe('done');
        await first.end(signal);
        expect(spooled()).toHaveLength(1);
        const second = await start();
        const events = await (await fetch(second.base + job.links.events)).text();
        expect(events).toMatch(/event: done\n/);
        const made = await records(second);
        expect(made).toHaveLength(before + 1);
        expect(made[0].record.intervals).toBe(200_000);
        // the file goes once the record is kept, which may be a moment after the end is told
        await expect.poll(spooled, { timeout: 5000 }).toEqual([]);
        await second.end('SIGTERM');
      },
    );

    it('and whose file is lost says so, and keeps nothing', async () => {
      const first = await start();
      const before = (await records(first)).length;
      const { body: job } = await first.upload(siteId, LARGE, { wait: '0' });
      await first.end('SIGKILL');
      for (const place of spooled()) rmSync(join(dataDir, 'spool', place));
      const second = await start();
      await (await fetch(second.base + job.links.events)).text();
      const { state, error } = (await second.ask('GET', job.links.self)).body;
      expect([state, error.code, error.path]).toEqual(['failed', 'stopped', 'file']);
      expect(await records(second)).toHaveLength(before);
      await second.end('SIGTERM');
      expect(second.said()).not.toMatch(/fault/);
    });
  });
}
